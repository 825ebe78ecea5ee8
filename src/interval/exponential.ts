import { powerOfTwo } from './power-of-two.ts';
import { enclose, oneStep, type Pair } from './widen.ts';

/*
 * exp and what follows from it. All bounds are relative, u = 2⁻⁵³, and are derived below from the rounding of + − × ÷;
 * the bound that is used is the next power of two.
 */

/** log 2 in two parts: the first has 32 significant bits, so that k times it is exact for |k| < 2²¹. */
export const logTwoHigh = 0.6931471803691238;
export const logTwoLow = 1.9082149292705877e-10;
/** Only chooses k; how exact it is does not matter. */
const inverseLogTwo = Math.LOG2E;

/** Beyond these the result is not a normal double. */
const largest = 709.7;
const smallest = -700;
/** exp(−700) < 10⁻³⁰⁴. */
const belowSmallest = 1e-304;

const seventh = (r: number): number =>
  1 +
  (r / 8) *
    (1 + (r / 9) * (1 + (r / 10) * (1 + (r / 11) * (1 + (r / 12) * (1 + (r / 13) * (1 + (r / 14) * (1 + r / 15)))))));

/** (eʳ − 1)/r by its Taylor series to r¹⁴/15!, for |r| ≤ 0.35; the rest is below 10⁻²⁰. */
function taylor(r: number): number {
  return 1 + (r / 2) * (1 + (r / 3) * (1 + (r / 4) * (1 + (r / 5) * (1 + (r / 6) * (1 + (r / 7) * seventh(r))))));
}

/**
 * eˣ for −700 ≤ x ≤ 709.7 within 6u. r = x − k·log 2 with |r| ≤ 0.35: k·logTwoHigh is exact; the two subtractions err
 * by at most 0.35u each and k·logTwoLow by less than 10⁻⁵u, so r, and with it eʳ relatively, by 0.71u. In 1 + r·T(r)
 * T errs by 2u (its last addition u, r/2 times the rest 0.18(3u) and so on), r·T by 3u·0.42 at most, the sum by u: over
 * eʳ ≥ 0.70 that is (1 + 1.3/0.70)u < 3.9u. Multiplication by 2^k is exact.
 */
function exponential(x: number): number {
  const k = Math.floor(x * inverseLogTwo + 0.5);
  const r = x - k * logTwoHigh - k * logTwoLow;
  const value = 1 + r * taylor(r);
  return k > 1000 ? value * powerOfTwo(k - 1000) * powerOfTwo(1000) : value * powerOfTwo(k);
}

/** 8u */
const exponentialBound = 2 ** -50;

export function exp(x: number, out: Pair): void {
  if (x === 0) {
    out[0] = 1;
    out[1] = 1;
  } else if (x > largest) {
    out[0] = Number.MAX_VALUE / 2;
    out[1] = Number.POSITIVE_INFINITY;
  } else if (x < smallest) {
    out[0] = 0;
    out[1] = x === Number.NEGATIVE_INFINITY ? 0 : belowSmallest;
  } else {
    enclose(exponential(x), exponentialBound, out);
  }
}

const nearZero = 0.34;
/** Below this eˣ < u/2. */
const almostMinusOne = -40;

/**
 * eˣ − 1 within 20u: near zero r·T(r), 3u; else (eˣ)(1 ± 6u) − 1, where eˣ/|eˣ − 1| ≤ 3.5 for x ≥ 0.34 and less below
 * −0.34, so 6·3.5·0.9 + 1 < 20.
 */
function exponentialMinusOne(x: number): number {
  return Math.abs(x) <= nearZero ? x * taylor(x) : exponential(x) - 1;
}

/** 32u */
const minusOneBound = 2 ** -48;

export function expm1(x: number, out: Pair): void {
  if (x > largest) {
    exp(x, out);
  } else if (x < almostMinusOne) {
    out[0] = -1;
    out[1] = -1 + oneStep;
  } else {
    enclose(exponentialMinusOne(x), minusOneBound, out);
    if ((out[0] as number) < -1) out[0] = -1;
  }
}

/** (m + m/(1 + m))/2 with m = eˣ − 1 for x ≥ 0: each term keeps the 20u of m or less; three more roundings. */
function sinhPositive(x: number, out: Pair): void {
  if (x > largest) {
    out[0] = Number.MAX_VALUE / 8;
    out[1] = Number.POSITIVE_INFINITY;
    return;
  }
  const m = exponentialMinusOne(x);
  enclose((m + m / (1 + m)) / 2, minusOneBound, out);
}

/** m/(m + 2) with m = e²ˣ − 1 for x ≥ 0: its relative change is at most that of m; two more roundings. */
function tanhPositive(x: number, out: Pair): void {
  if (x > 20) {
    out[0] = 1 - oneStep;
    out[1] = 1;
    return;
  }
  const m = exponentialMinusOne(2 * x);
  enclose(m / (m + 2), minusOneBound, out);
  if ((out[1] as number) > 1) out[1] = 1;
}

/** An odd function from its values on x ≥ 0. */
export function odd(positive: (x: number, out: Pair) => void): (x: number, out: Pair) => void {
  return (x, out) => {
    if (x === 0) {
      out[0] = 0;
      out[1] = 0;
      return;
    }
    positive(Math.abs(x), out);
    if (x > 0) return;
    const lower = out[0] as number;
    out[0] = -(out[1] as number);
    out[1] = -lower;
  };
}

export const sinh = odd(sinhPositive);
export const tanh = odd(tanhPositive);

/** (e + 1/e)/2 with e = e^|x|: 6u and two roundings, both terms positive. */
export function cosh(x: number, out: Pair): void {
  const magnitude = Math.abs(x);
  if (x === 0 || magnitude > largest) {
    out[0] = x === 0 ? 1 : Number.MAX_VALUE / 8;
    out[1] = x === 0 ? 1 : Number.POSITIVE_INFINITY;
    return;
  }
  const e = exponential(magnitude);
  enclose((e + 1 / e) / 2, 2 * exponentialBound, out);
  if ((out[0] as number) < 1) out[0] = 1;
}
