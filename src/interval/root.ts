import { type Rational } from '../number/rational.ts';
import { powerOfTwo } from './power-of-two.ts';
import { down, type Pair, productDown, productUp, quotientDown, quotientUp, up } from './widen.ts';

/*
 * Roots are verified: whatever the platform's Math.sqrt and Math.cbrt return is only a guess, whose square or cube is
 * compared with the argument in rounded-outward arithmetic, and which is moved outward until the comparison holds.
 */

const smallest = 2 ** -900;

/** A lower and an upper bound of √x for x ≥ 0. */
export function sqrt(x: number, out: Pair): void {
  if (x === 0 || x === Number.POSITIVE_INFINITY) {
    out[0] = x;
    out[1] = x;
    return;
  }
  if (x < smallest) {
    sqrt(x * powerOfTwo(400), out);
    out[0] = (out[0] as number) * powerOfTwo(-200);
    out[1] = (out[1] as number) * powerOfTwo(-200);
    return;
  }
  const guess = Math.sqrt(x);
  let step = 2 ** -52;
  let lower = guess - guess * step;
  // Positive comparison: a NaN never ends it, and x > 0 is finite.
  for (; !(up(lower * lower) <= x); step *= 2) lower = guess - guess * step;
  let upper = guess + guess * 2 ** -52;
  for (step = 2 ** -52; !(down(upper * upper) >= x); step *= 2) upper = guess + guess * step;
  out[0] = lower;
  out[1] = upper;
}

const pair = new Float64Array(2);

/** √x for x ≥ 0 within 8u. */
export function rootEstimate(x: number): number {
  sqrt(x, pair);
  return pair[0] as number;
}

/** A lower and an upper bound of the real cube root. */
export function cbrt(x: number, out: Pair): void {
  if (x < 0) {
    cbrt(-x, out);
    const lower = out[0] as number;
    out[0] = -(out[1] as number);
    out[1] = -lower;
    return;
  }
  if (x === 0 || x === Number.POSITIVE_INFINITY) {
    out[0] = x;
    out[1] = x;
    return;
  }
  if (x < smallest) {
    cbrt(x * powerOfTwo(600), out);
    out[0] = (out[0] as number) * powerOfTwo(-200);
    out[1] = (out[1] as number) * powerOfTwo(-200);
    return;
  }
  const guess = Math.cbrt(x);
  let lower = guess - guess * 2 ** -52;
  for (let step = 2 ** -52; !(up(up(lower * lower) * lower) <= x); step *= 2) lower = guess - guess * step;
  let upper = guess + guess * 2 ** -52;
  for (let step = 2 ** -52; !(down(down(upper * upper) * upper) >= x); step *= 2) upper = guess + guess * step;
  out[0] = lower;
  out[1] = upper;
}

/** xⁿ for the enclosure x ≥ 0 in out and a whole n ≥ 1, by repeated squaring with every product rounded outward. */
export function wholePower(out: Pair, n: number): void {
  let [lower, upper] = [1, 1];
  let baseLower = out[0] as number;
  let baseUpper = out[1] as number;
  for (let rest = n; ; ) {
    if (rest % 2 === 1) {
      lower = productDown(lower, baseLower);
      upper = productUp(upper, baseUpper);
    }
    rest = Math.floor(rest / 2);
    if (rest === 0) break;
    baseLower = productDown(baseLower, baseLower);
    baseUpper = productUp(baseUpper, baseUpper);
  }
  out[0] = lower;
  out[1] = upper;
}

export interface RationalExponent {
  readonly numerator: number;
  readonly denominator: number;
  readonly negative: boolean;
}

/** The exponent as numbers; undefined where roots and products do not suffice. */
export function exponentByRoots(exponent: Rational): RationalExponent | undefined {
  if (exponent.n > 1000n || ![1n, 2n, 3n, 4n, 6n, 8n, 12n].includes(exponent.d)) return undefined;
  return { numerator: Number(exponent.n), denominator: Number(exponent.d), negative: exponent.s < 0n };
}

const second = new Float64Array(2);

/** Replaces the enclosure x ≥ 0 in out by one of its root. */
function rootOf(out: Pair, root: (x: number, out: Pair) => void): void {
  root(out[1] as number, second);
  const upper = second[1] as number;
  root(out[0] as number, second);
  out[0] = second[0] as number;
  out[1] = upper;
}

/** x^(p/q) for x ≥ 0; an infinity at x = 0 for a negative exponent, as a limit. */
export function positivePower(x: number, { numerator, denominator, negative }: RationalExponent, out: Pair): void {
  out[0] = x;
  out[1] = x;
  let degree = denominator;
  for (; degree % 2 === 0; degree /= 2) rootOf(out, sqrt);
  if (degree === 3) rootOf(out, cbrt);
  if (numerator > 1) wholePower(out, numerator);
  if (!negative) return;
  const lower = out[0] as number;
  const upper = out[1] as number;
  out[0] = upper === 0 ? Number.MAX_VALUE : quotientDown(1, upper);
  out[1] = lower === 0 ? Number.POSITIVE_INFINITY : quotientUp(1, lower);
}
