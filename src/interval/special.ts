import { exp, odd } from './exponential.ts';
import { enclose, oneStep, type Pair, productDown, productUp } from './widen.ts';

const pair = new Float64Array(2);

/** 2/√π */
const twoOverRootPi = 1.1283791670955126;

/**
 * 2/√π·exp(−x²)·Σ 2ⁿx^(2n+1)/(2n+1)!! (NIST DLMF 7.6.2). All terms are positive; term n errs by (3n + 2)u, and so does
 * the sum after the last; x² errs by u, so exp(−x²) by x²u + 8u. The terms left out are below the last times a
 * geometric series of ratio 1/2.
 */
function erfPositive(x: number, out: Pair): void {
  if (x > 6) {
    // erfc(6) < 3·10⁻¹⁷
    out[0] = 1 - oneStep;
    out[1] = 1;
    return;
  }
  const square = x * x;
  let term = x;
  let sum = x;
  let count = 0;
  for (; term > sum * 2 ** -56 || 2 * square > count + 1.5; count++) {
    term *= (2 * square) / (2 * count + 3);
    sum += term;
  }
  exp(-square, pair);
  const value = twoOverRootPi * sum * (pair[0] as number);
  enclose(value, (4 * count + square + 40) * 2 ** -53, out);
  if ((out[1] as number) > 1) out[1] = 1;
}

export const erf = odd(erfPositive);

/** −1/e lies between these. */
export const branchPointBelow = -0.3678794411714424;
export const branchPointAbove = -0.3678794411714423;

/** Newton's iteration on log w + w = log x, or Halley's on w·eʷ = x, in ordinary arithmetic: a guess only. */
function guess(x: number): number {
  if (Math.abs(x) < 1e-8) return x * (1 - x);
  if (x > 3) {
    let w = Math.log(x) - Math.log(Math.log(x));
    for (let count = 0; count < 6; count++) w -= (Math.log(w) + w - Math.log(x)) * (w / (1 + w));
    return w;
  }
  let w = x > -0.3 ? Math.log1p(x) * 0.8 : Math.sqrt(Math.max(0, 2 * (1 + Math.E * x))) - 1;
  for (let count = 0; count < 30; count++) {
    const power = Math.exp(w);
    const residual = w * power - x;
    const step = residual / (power * (w + 1) - ((w + 2) * residual) / (2 * w + 2));
    if (!Number.isFinite(step) || step === 0) break;
    w -= step;
  }
  return Number.isNaN(w) ? -1 : Math.max(w, -1);
}

const smallArgument = 2 ** -60;

/**
 * The principal branch of Lambert's W for x ≥ −1/e, verified: w·eʷ increases for w ≥ −1, so a w with w·eʷ ≤ x in
 * rounded-outward arithmetic is a lower bound and one with w·eʷ ≥ x an upper one.
 */
export function lambertW(x: number, out: Pair): void {
  if (x === 0 || x === Number.POSITIVE_INFINITY) {
    out[0] = x === 0 ? 0 : 700;
    out[1] = x;
    return;
  }
  if (Math.abs(x) < smallArgument) {
    // x − x² < W(x) < x
    enclose(x, 2 ** -50, out);
    return;
  }
  const w = guess(x);
  let step = Math.abs(w) * 2 ** -51;
  let lower = w - step;
  while (lower > -1 && !(imageUp(lower) <= x)) {
    step *= 2;
    lower = w - step;
  }
  step = Math.abs(w) * 2 ** -51;
  let upper = w + step;
  while (!(imageDown(upper) >= x)) {
    step *= 2;
    upper = w + step;
  }
  out[0] = Math.max(lower, -1);
  out[1] = upper;
}

function imageUp(w: number): number {
  exp(w, pair);
  return w > 0 ? productUp(w, pair[1] as number) : productUp(w, pair[0] as number);
}

function imageDown(w: number): number {
  exp(w, pair);
  return w > 0 ? productDown(w, pair[0] as number) : productDown(w, pair[1] as number);
}
