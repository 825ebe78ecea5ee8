import type { Rational } from '../number/rational.ts';
import { powerOfTwo } from './power-of-two.ts';
import { down, oneStep, type Pair, productDown, productUp, quotientDown, quotientUp, up } from './widen.ts';

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
function cbrt(x: number, out: Pair): void {
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
function wholePower(out: Pair, n: number): void {
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

/** x = y² within 16u of y, and x = y³: a guess whose square or cube misses by no more than 2⁻⁴⁹ relatively errs by less. */
const closeness = 2 ** -49;
/** Of a root in relative terms: half or a third of the closeness, and two roundings. */
const rootBound = 2 ** -49;

function quickSqrt(x: number): number {
  const guess = Math.sqrt(x);
  return Math.abs(guess * guess - x) <= x * closeness ? guess : Number.NaN;
}

function quickCbrt(x: number): number {
  const guess = Math.cbrt(x);
  return Math.abs(guess * guess * guess - x) <= x * closeness ? guess : Number.NaN;
}

const roots: Readonly<Record<number, (x: number) => number>> = {
  1: (x) => x,
  2: quickSqrt,
  3: quickCbrt,
  4: (x) => quickSqrt(quickSqrt(x)),
  6: (x) => quickSqrt(quickCbrt(x)),
};

/** Results outside this range are left to the slow way; inside it nothing underflows. */
const quickRange = 1e250;

/**
 * x^(p/q) for x ≥ 0 by a root and products, undefined where these do not suffice. With r = x^(1/q) within ρ (two
 * roots: 1.5ρ) the p-th power is within 1.5pρ + (p − 1)u and, to first order no more than, 2pρ; its reciprocal u more.
 * An infinity at x = 0 for a negative exponent, as a limit.
 */
export function powerByRoots(exponent: Rational): ((x: number, out: Pair) => void) | undefined {
  const root = roots[Number(exponent.d)];
  if (root === undefined || exponent.n > 64n) return undefined;
  const n = Number(exponent.n);
  const degree = Number(exponent.d);
  const isNegative = exponent.s < 0n;
  const bound = degree === 1 ? (n + 2) * 2 ** -53 : 2 * n * rootBound + 2 ** -52;
  return (x, out) => {
    const base = root(x);
    let power = base;
    if (n === 2) power = base * base;
    else if (n === 4) power = base * base * (base * base);
    else for (let count = 1; count < n; count++) power *= base;
    if (power < quickRange && power > 1 / quickRange) {
      if (isNegative) power = 1 / power;
      const margin = power * (bound + oneStep);
      out[0] = power - margin;
      out[1] = power + margin;
    } else slowPower(x, n, degree, isNegative, out);
  };
}

/** The same by verified roots and products that are rounded outward one by one. */
function slowPower(x: number, n: number, degree: number, isNegative: boolean, out: Pair): void {
  out[0] = x;
  out[1] = x;
  for (let rest = degree; rest % 2 === 0; rest /= 2) rootOf(out, sqrt);
  if (degree % 3 === 0) rootOf(out, cbrt);
  if (n > 1) wholePower(out, n);
  if (!isNegative) return;
  const lower = out[0] as number;
  const upper = out[1] as number;
  out[0] = upper === 0 ? Number.MAX_VALUE : quotientDown(1, upper);
  out[1] = lower === 0 ? Number.POSITIVE_INFINITY : quotientUp(1, lower);
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

/** Bounds of the cube root of a number that itself may be one rounding off; exact for −1, 0 and 1. */
export function cbrtInterval(x: number): [number, number] {
  if (x === 0 || x === 1 || x === -1) return [x, x];
  cbrt(down(x), second);
  const lower = second[0] as number;
  cbrt(up(x), second);
  return [lower, second[1] as number];
}
