import { odd } from './exponential.ts';
import { enclose, type Pair } from './widen.ts';

/*
 * sin, cos and atan; bounds in u = 2⁻⁵³, derived from the rounding of + − × ÷.
 */

/** π/2 in three parts; the first two have 33 bits, so that k times each is exact for |k| ≤ 2²⁰. */
const halfPiHigh = 1.5707963267341256;
const halfPiMiddle = 6.077100506303966e-11;
const halfPiLow = 2.0222662487959506e-21;
const inverseHalfPi = 0.6366197723675814;

/** Beyond this nothing is reduced: every value from −1 to 1 is possible. */
export const largestAngle = 1e6;

function sineSeries(r: number): number {
  const z = r * r;
  const inner = 1 - (z / 110) * (1 - (z / 156) * (1 - (z / 210) * (1 - (z / 272) * (1 - z / 342))));
  return r * (1 - (z / 6) * (1 - (z / 20) * (1 - (z / 42) * (1 - (z / 72) * inner))));
}

function cosineSeries(r: number): number {
  const z = r * r;
  const inner = 1 - (z / 132) * (1 - (z / 182) * (1 - (z / 240) * (1 - (z / 306) * (1 - z / 380))));
  return 1 - (z / 2) * (1 - (z / 12) * (1 - (z / 30) * (1 - (z / 56) * (1 - (z / 90) * inner))));
}

/** 16u: the reduced angle errs by 2u, the series by 3u and their rests, below 0.79²⁰/20!, not at all. */
const bound = 2 ** -49;

/** sin(x + quarter·π/2) for |x| ≤ 10⁶, absolutely within 16u, and relatively where the angle needs no reduction. */
function sineOf(x: number, quarter: number, out: Pair): void {
  const k = Math.floor(x * inverseHalfPi + 0.5);
  const r = x - k * halfPiHigh - k * halfPiMiddle - k * halfPiLow;
  const turn = (((k + quarter) % 4) + 4) % 4;
  const value = (turn >= 2 ? -1 : 1) * (turn % 2 === 0 ? sineSeries(r) : cosineSeries(r));
  if (k === 0 && quarter === 0) enclose(value, bound, out);
  else {
    out[0] = Math.max(-1, value - bound);
    out[1] = Math.min(1, value + bound);
  }
}

export function sin(x: number, out: Pair): void {
  wave(x, 0, out);
}

export function cos(x: number, out: Pair): void {
  if (x === 0) {
    out[0] = 1;
    out[1] = 1;
  } else wave(x, 1, out);
}

function wave(x: number, quarter: number, out: Pair): void {
  if (Math.abs(x) <= largestAngle) sineOf(x, quarter, out);
  else {
    out[0] = -1;
    out[1] = 1;
  }
}

/** arctan t by its series to t⁴⁹, for |t| ≤ 0.4375 (z ≤ 0.1915); the rest is below z²⁵/51 < 10⁻¹⁹; within 3u and what t errs by. */
function arctangentSeries(t: number): number {
  const z = t * t;
  let sum = 1 / 49;
  for (let n = 47; n >= 1; n -= 2) sum = 1 / n - z * sum;
  return t * sum;
}

/** arctan of 1/2 and 3/2, π/4 and π/2, each within u. */
const arctangents = {
  half: 0.4636476090008061,
  one: 0.7853981633974483,
  threeHalves: 0.982793723247329,
  infinity: 1.5707963267948966,
};

/**
 * arctan x = arctan c + arctan((x − c)/(1 + cx)) with the c that makes the last argument smallest (within 4u): the
 * series 0.42·7u, the constant and the sum u each, over at least 0.41: 12u.
 */
function atanPositive(x: number, out: Pair): void {
  enclose(arctangent(x), bound, out);
}

function arctangent(x: number): number {
  if (x < 0.4375) return arctangentSeries(x);
  if (x < 0.6875) return arctangents.half + arctangentSeries((2 * x - 1) / (2 + x));
  if (x < 1.1875) return arctangents.one + arctangentSeries((x - 1) / (x + 1));
  if (x < 2.4375) return arctangents.threeHalves + arctangentSeries((x - 1.5) / (1 + 1.5 * x));
  return arctangents.infinity - arctangentSeries(1 / x);
}

export const atan = odd(atanPositive);
