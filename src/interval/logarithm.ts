import { logTwoHigh, logTwoLow, odd } from './exponential.ts';
import { exponentOf, powerOfTwo } from './power-of-two.ts';
import { rootEstimate } from './root.ts';
import { enclose, type Pair } from './widen.ts';

/*
 * log and what follows from it; relative bounds in u = 2⁻⁵³, derived from the rounding of + − × ÷.
 */

/**
 * 2 artanh(s) by its Taylor series to s²³, for |s| ≤ 0.172 (z = s² ≤ 0.0296); the rest is below z¹²/25 < 2·10⁻²⁰.
 * Horner's rule errs by 1.1u, the product by u, and s itself by what its caller says.
 */
function twiceArtanh(s: number): number {
  const z = s * s;
  const inner = 1 / 11 + z * (1 / 13 + z * (1 / 15 + z * (1 / 17 + z * (1 / 19 + z * (1 / 21 + z * (1 / 23))))));
  return 2 * s * (1 + z * (1 / 3 + z * (1 / 5 + z * (1 / 7 + z * (1 / 9 + z * inner)))));
}

/** log x of a normal x > 0 within 7u. */
function logarithm(x: number): number {
  let e = exponentOf(x);
  // The division is exact: x = m·2^e with 0.70 < m < 1.42.
  let m =
    e > 1000
      ? (x / powerOfTwo(1000)) * powerOfTwo(1000 - e)
      : e < -1000
        ? x * powerOfTwo(1000) * powerOfTwo(-e - 1000)
        : x * powerOfTwo(-e);
  if (m > Math.SQRT2) {
    m /= 2;
    e++;
  }
  // m − 1 is exact. s errs by 2u, the series with it by 4.2u.
  const f = m - 1;
  const series = twiceArtanh(f / (2 + f));
  // e·logTwoHigh is exact; where e ≠ 0 the sum is at least 0.346 and the series at most that: (1.5 + 0.4)/0.346 + 1.
  return e === 0 ? series : e * logTwoHigh + (series + e * logTwoLow);
}

/** 8u */
const logarithmBound = 2 ** -50;
const smallestNormal = 2 ** -1022;

/** log x for x ≥ 0; log 0 = −∞ as a limit. */
export function log(x: number, out: Pair): void {
  if (x === Number.POSITIVE_INFINITY) {
    out[0] = 709;
    out[1] = x;
  } else if (x < smallestNormal) {
    out[0] = Number.NEGATIVE_INFINITY;
    out[1] = x === 0 ? Number.NEGATIVE_INFINITY : -708;
  } else {
    enclose(logarithm(x), logarithmBound, out);
  }
}

/**
 * log(1 + x) for x > −1 within 9u. Near zero the series in s = x/(2 + x), 4.2u. Else log of y = 1 + x rounded, 7u, plus
 * the rest of that sum, which is exact, over y; |log(1 + x)| ≥ 0.34 there and the rest over y is at most u.
 */
function logarithmOnePlus(x: number): number {
  if (x > -0.29 && x < 0.41) return twiceArtanh(x / (2 + x));
  const y = 1 + x;
  const part = y - 1;
  const rest = 1 - (y - part) + (x - part);
  return logarithm(y) + rest / y;
}

/** 16u */
const onePlusBound = 2 ** -49;

/** log(1 + x) for x ≥ −1. */
export function log1p(x: number, out: Pair): void {
  if (x === Number.POSITIVE_INFINITY) log(x, out);
  else if (x === -1) {
    out[0] = Number.NEGATIVE_INFINITY;
    out[1] = Number.NEGATIVE_INFINITY;
  } else enclose(logarithmOnePlus(x), onePlusBound, out);
}

/** log 2 within u. */
const logTwo = logTwoHigh + logTwoLow;

/**
 * log(1 + w) with w = x + x²/(1 + √(1 + x²)) for x ≥ 0: w errs by 9u and log(1 + w) relatively by no more; together
 * 18u. For x > 10⁸ it is log 2 + log x and less than 1/(4x²) more.
 */
function asinhPositive(x: number, out: Pair): void {
  if (x === Number.POSITIVE_INFINITY) log(x, out);
  else if (x > 1e8) enclose(logTwo + logarithm(x), onePlusBound, out);
  else {
    const square = x * x;
    enclose(logarithmOnePlus(x + square / (1 + rootEstimate(1 + square))), 2 * onePlusBound, out);
  }
}

export const asinh = odd(asinhPositive);
