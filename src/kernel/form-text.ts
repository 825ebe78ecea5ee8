import { formSize, pairsOf, part, places } from './form-layout.ts';

/*
 * Second-order forms over a box. For each axis ε runs from −1 to 1 over the box; a node that depends on some of the axes
 * is, besides lying in an interval, centre + Σ aᵢεᵢ + Σ qᵢⱼεᵢεⱼ with an error that does not exceed `error`.
 *
 * A form lies in a run of doubles: what `part` names, then aᵢ of its own axes, then qᵢⱼ for i ≤ j. The functions below are
 * written out for each set of axes, as JavaScript.
 *
 * Soundness. Every number of a result is a sum of at most a dozen terms, each the product of a few numbers; in double
 * arithmetic it errs by at most 16u (u = 2⁻⁵³) of the sum of the terms' magnitudes, and all numbers of a result together
 * by 16u of the product (or sum) of the operands' whole sizes. Twice that is added to the error, 1e-150 for
 * underflow, and the error, a sum of positive terms, is rounded up by a factor. Every interval is also enclosed by
 * interval arithmetic rounded outward, and the form may only tighten it. NaN fails each comparison that would let it; a
 * form whose error is half the width of the interval or more, or NaN, becomes the middle of the interval.
 */

/** 2u; 32u; and what a sum of some positive numbers is multiplied by. */
const step = '2.220446049250313e-16';
const round = '3.552713678800501e-15';
export const above = '1.0000000000000071';
const underflow = '1e-150';

const read = (form: string, offset: number) => `V[${form}${offset === 0 ? '' : ` + ${offset}`}]`;
const size = (form: string) =>
  `Math.abs(${read(form, part.centre)}) + ${read(form, part.linear)} + ${read(form, part.bent)}`;

/** Gives the form up for the middle of the interval l…u, and stores that. */
function levelText(mask: number): string {
  const { axes } = places(mask);
  const last = formSize(axes.length);
  const zeros = Array.from({ length: last - part.linear }, (_, index) => `${read('o', part.linear + index)} = 0;`);
  return `{ V[o] = l; V[o + 1] = u; ${zeros.join(' ')}
const h = (u - l) * 0.5;
if (h < Infinity) { V[o + 2] = l + h; V[o + 3] = (h + (Math.abs(l) + Math.abs(u)) * ${step}) * ${above}; }
else { V[o + 2] = 0; V[o + 3] = Infinity; } return; }`;
}

/** Intersects l…u with the range of the form c, e and the locals of its coefficients, and stores what is left. */
function settleText(mask: number): string {
  const { axes, linear, bent } = places(mask);
  const lines = ['let low = 0, high = 0, linear = 0, bent = 0, p = 0, q = 0;'];
  for (const axis of axes) {
    lines.push(
      `p = Math.abs(a${axis}); q = b${axis}_${axis}; linear += p;`,
      `if (q >= 0) { bent += q; high += p + q; low += p >= q + q ? q - p : -(p * p) / (4 * q); }`,
      `else { bent -= q; low += q - p; high += p >= -(q + q) ? q + p : -(p * p) / (4 * q); }`,
    );
  }
  for (const [a, b] of pairsOf(axes))
    if (a !== b) lines.push(`p = Math.abs(b${a}_${b}); bent += p; low -= p; high += p;`);
  return `${lines.join('\n')}
const slack = e + (linear + bent + Math.abs(c)) * ${round};
low = c + low - slack; high = c + high + slack;
if (low > l && low <= u) l = low;
if (high < u && high >= l) u = high;
if (!(e <= (u - l) * 0.5)) ${levelText(mask)}
V[o] = l; V[o + 1] = u; V[o + 2] = c; V[o + 3] = e; V[o + 4] = linear; V[o + 5] = bent;
${axes.map((axis) => `${read('o', linear(axis) as number)} = a${axis};`).join(' ')}
${pairsOf(axes)
  .map(([a, b]) => `${read('o', bent(a, b) as number)} = b${a}_${b};`)
  .join(' ')}`;
}

export function sumText(x: number, y: number, sign: '+' | '-'): string {
  const [X, Y, mask] = [places(x), places(y), x | y];
  const { axes } = places(mask);
  const joined = (a: number | undefined, b: number | undefined) => {
    if (a !== undefined && b !== undefined) return `${read('x', a)} ${sign} ${read('y', b)}`;
    if (a !== undefined) return read('x', a);
    return b === undefined ? '0' : sign === '-' ? `-${read('y', b)}` : read('y', b);
  };
  const [low, high] = sign === '-' ? ['V[y + 1]', 'V[y]'] : ['V[y]', 'V[y + 1]'];
  return `let l = V[x] ${sign} ${low}, u = V[x + 1] ${sign} ${high};
l -= Math.abs(l) * ${step}; u += Math.abs(u) * ${step};
if (!(l <= u)) { l = -Infinity; u = Infinity; }
const e = (V[x + 3] + V[y + 3] + (${size('x')} + ${size('y')}) * ${step}) * ${above};
if (!(e < Infinity)) ${levelText(mask)}
const c = V[x + 2] ${sign} V[y + 2];
${axes.map((axis) => `const a${axis} = ${joined(X.linear(axis), Y.linear(axis))};`).join(' ')}
${pairsOf(axes)
  .map(([a, b]) => `const b${a}_${b} = ${joined(X.bent(a, b), Y.bent(a, b))};`)
  .join(' ')}
${settleText(mask)}`;
}

/**
 * The terms of order three and more are bounded by the sums of magnitudes. Of these the pure cubes are
 * kε³ = ¾kε ± ¼|k|, Chebyshev's T₃, and are taken out of the bound before ¼|k| is added.
 */
export function productText(x: number, y: number): string {
  const [X, Y, mask] = [places(x), places(y), x | y];
  const { axes } = places(mask);
  const lines: string[] = [];
  for (const axis of axes) {
    const [a, b] = [X.linear(axis), Y.linear(axis)];
    if (a !== undefined) lines.push(`const p${axis} = ${read('x', a)};`);
    if (b !== undefined) lines.push(`const q${axis} = ${read('y', b)};`);
    const terms = [...(b === undefined ? [] : [`xc * q${axis}`]), ...(a === undefined ? [] : [`yc * p${axis}`])];
    lines.push(`let a${axis} = ${terms.join(' + ')};`);
  }
  for (const [i, j] of pairsOf(axes)) {
    const [a, b] = [X.bent(i, j), Y.bent(i, j)];
    const has = (k: number, form: typeof X) => form.linear(k) !== undefined;
    const terms = [
      ...(b === undefined ? [] : [`xc * ${read('y', b)}`]),
      ...(a === undefined ? [] : [`yc * ${read('x', a)}`]),
      ...(has(i, X) && has(j, Y) ? [`p${i} * q${j}`] : []),
      ...(i !== j && has(j, X) && has(i, Y) ? [`p${j} * q${i}`] : []),
    ];
    lines.push(`const b${i}_${j} = ${terms.length === 0 ? '0' : terms.join(' + ')};`);
  }
  for (const axis of axes) {
    const [a, b] = [X.bent(axis, axis), Y.bent(axis, axis)];
    if (a === undefined || b === undefined) continue;
    lines.push(
      `{ const s = p${axis} * ${read('y', b)}, t = q${axis} * ${read('x', a)}, k = s + t;`,
      `a${axis} += 0.75 * k; rest += 0.25 * Math.abs(k) - Math.abs(s) - Math.abs(t); }`,
    );
  }
  return `${intervalProductText()}
const xe = V[x + 3], ye = V[y + 3];
if (!(xe < Infinity && ye < Infinity)) ${levelText(mask)}
const xc = V[x + 2], yc = V[y + 2];
const xs = ${size('x')}, ys = ${size('y')};
let rest = V[x + 4] * V[y + 5] + V[x + 5] * V[y + 4] + V[x + 5] * V[y + 5];
const c = xc * yc;
${lines.join('\n')}
const e = (xs * ye + ys * xe + xe * ye + Math.max(rest, 0) + xs * ys * ${round} + ${underflow}) * ${above};
${settleText(mask)}`;
}

/** l, u of a product, with one step outward; a call where a product is zero, tiny, huge or not a number. */
function intervalProductText(): string {
  return `let l = 0, u = 0;
{ const k = V[x], m = V[x + 1], r = V[y], s = V[y + 1];
const kr = k * r, ks = k * s, mr = m * r, ms = m * s;
l = Math.min(kr, ks, mr, ms); u = Math.max(kr, ks, mr, ms);
const t = Math.abs(l), q = Math.abs(u);
if (t > 1e-280 && t < 1e300 && q > 1e-280 && q < 1e300) { l -= t * ${step}; u += q * ${step}; }
else { S[0] = k; S[1] = m; S[2] = r; S[3] = s; multiply(S); l = S[0]; u = S[1]; } }`;
}

/** offset + slope·d + bend·d² ± error, with d = x − middle; cubes as in a product. */
export function applyText(x: number): string {
  const { axes, linear, bent } = places(x);
  const a = (axis: number) => read('x', linear(axis) as number);
  const b = (i: number, j: number) => read('x', bent(i, j) as number);
  const pairs = pairsOf(axes);
  return `let l = R[0], u = R[1];
const xe = V[x + 3], error = R[4];
if (!(xe < Infinity && error < Infinity)) ${levelText(x)}
const offset = R[3], slope = R[2], bend = R[6], middle = R[7];
const d = V[x + 2] - middle, linearSize = V[x + 4], bentSize = V[x + 5];
const s = Math.abs(V[x + 2]) + Math.abs(middle) + linearSize + bentSize;
const t = slope + 2 * bend * d;
const c = offset + (slope + bend * d) * d;
let rest = (2 * linearSize + bentSize) * bentSize;
${axes.map((i) => `let a${i} = t * ${a(i)};`).join(' ')}
${pairs.map(([i, j]) => `let b${i}_${j} = t * ${b(i, j)};`).join(' ')}
if (bend !== 0) {
${pairs.map(([i, j]) => `b${i}_${j} += bend * ${i === j ? '' : '2 * '}${a(i)} * ${a(j)};`).join(' ')}
${axes.map((i) => `{ const k = 2 * ${a(i)} * ${b(i, i)}; a${i} += 0.75 * bend * k; rest -= 0.75 * Math.abs(k); }`).join('\n')}
}
const k = Math.abs(bend), g = Math.abs(slope);
const reach = Math.abs(d) + linearSize + bentSize;
const e = (g * xe + k * (2 * reach * xe + xe * xe + Math.max(rest, 0)) + error
  + (Math.abs(offset) + (g + 2 * k * s) * s) * ${round} + ${underflow}) * ${above};
${settleText(x)}`;
}

export function copyText(x: number, to: number, sign: '' | '-'): string {
  const [X, O] = [places(x), places(to)];
  const lines = sign === '' ? ['V[o] = V[x]; V[o + 1] = V[x + 1];'] : ['V[o] = -V[x + 1]; V[o + 1] = -V[x];'];
  lines.push(`V[o + 2] = ${sign}V[x + 2]; V[o + 3] = V[x + 3]; V[o + 4] = V[x + 4]; V[o + 5] = V[x + 5];`);
  const copied = (target: number, source: number | undefined) =>
    lines.push(`${read('o', target)} = ${source === undefined ? '0' : `${sign}${read('x', source)}`};`);
  for (const axis of O.axes) copied(O.linear(axis) as number, X.linear(axis));
  for (const [a, b] of pairsOf(O.axes)) copied(O.bent(a, b) as number, X.bent(a, b));
  return lines.join('\n');
}

export function absoluteText(x: number): string {
  return `if (V[x] >= 0) { ${copyText(x, x, '')} return; }
if (V[x + 1] <= 0) { ${copyText(x, x, '-')} return; }
const l = 0, u = Math.max(-V[x], V[x + 1]);
${levelText(x)}`;
}

/**
 * Where neither is the less throughout: with d = x − y in p…q around 0 and λ = q/(q − p), max(d, 0) lies
 * between λd and its chord λ(d − p), so that max(x, y) = λx + (1 − λ)y − λp/2 ± |λp|/2; min(x, y) is
 * x + y − max(x, y).
 */
export function extremeText(x: number, y: number, op: 'min' | 'max'): string {
  const [first, second] = op === 'min' ? ['x', 'y'] : ['y', 'x'];
  const copies = { x: copyText(x, x | y, ''), y: copyText(y, x | y, '').replaceAll('V[x', 'V[y') };
  return `if (V[${first} + 1] <= V[${second}]) { ${copies.x} return; }
if (V[${second} + 1] <= V[${first}]) { ${copies.y} return; }
let l = Math.${op}(V[x], V[y]), u = Math.${op}(V[x + 1], V[y + 1]);
const least = V[x] - V[y + 1], most = V[x + 1] - V[y], share = most / (most - least), half = -0.5 * share * least;
const xw = ${op === 'max' ? 'share' : '1 - share'}, yw = 1 - xw, xe = V[x + 3], ye = V[y + 3];
const shift = ${op === 'max' ? 'half' : '-half'};
const e = (xw * xe + yw * ye + half + (${size('x')} + ${size('y')} + half) * ${round} + ${underflow}) * ${above};
${mixedText(x, y, x | y)}`;
}

/** One of two nodes, it is not known which: the middle of both forms, and half of how far they are apart. */
export function hullText(x: number, y: number, to: number): string {
  const [X, Y] = [places(x), places(y)];
  const coefficients = [
    [part.centre, part.centre] as const,
    ...places(x | y).axes.map((axis) => [X.linear(axis), Y.linear(axis)] as const),
    ...pairsOf(places(x | y).axes).map(([a, b]) => [X.bent(a, b), Y.bent(a, b)] as const),
  ];
  const apart = coefficients.map(([a, b]) => {
    const [p, q] = [a === undefined ? '' : read('x', a), b === undefined ? '' : ` - ${read('y', b)}`];
    return p === '' && q === '' ? '0' : `Math.abs(${p}${q})`;
  });
  return `let l = Math.min(V[x], V[y]), u = Math.max(V[x + 1], V[y + 1]);
const xw = 0.5, yw = 0.5, shift = 0;
const e = (0.5 * (${apart.join(' + ')}) + Math.max(V[x + 3], V[y + 3])
  + (${size('x')} + ${size('y')}) * ${round} + ${underflow}) * ${above};
${mixedText(x, y, to)}`;
}

/** xw·x + yw·y + shift ± e as a form of the axes of a mask. */
function mixedText(x: number, y: number, to: number): string {
  const [X, Y, O] = [places(x), places(y), places(to)];
  const joined = (a: number | undefined, b: number | undefined) => {
    const terms = [
      ...(a === undefined ? [] : [`xw * ${read('x', a)}`]),
      ...(b === undefined ? [] : [`yw * ${read('y', b)}`]),
    ];
    return terms.length === 0 ? '0' : terms.join(' + ');
  };
  return `if (!(e < Infinity)) ${levelText(to)}
const c = xw * V[x + 2] + yw * V[y + 2] + shift;
${O.axes.map((axis) => `const a${axis} = ${joined(X.linear(axis), Y.linear(axis))};`).join(' ')}
${pairsOf(O.axes)
  .map(([a, b]) => `const b${a}_${b} = ${joined(X.bent(a, b), Y.bent(a, b))};`)
  .join(' ')}
${settleText(to)}`;
}

/**
 * x/(x + y) rises with x and falls with y for x, y ≥ 0, so that it lies between its values at two corners; where x and y
 * come to 0 together, between 0 and 1. Three roundings.
 */
export function shareText(to: number): string {
  return `if (!(V[x] >= 0 && V[y] >= 0)) return;
const low = V[x] / (V[x] + V[y + 1]), high = V[x + 1] / (V[x + 1] + V[y]);
const least = low > 0 ? low * (1 - 4 * ${step}) : 0, most = high < 1 ? high * (1 + 4 * ${step}) : 1;
if (least <= V[o] && most >= V[o + 1]) return;
const l = Math.max(V[o], least), u = Math.min(V[o + 1], most);
if (!(l <= u)) return;
V[o] = l; V[o + 1] = u;
if (V[o + 3] <= (u - l) * 0.5) return;
${levelText(to)}`;
}
