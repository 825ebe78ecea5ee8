import { type Decimal, decimalContext } from '../number/decimal.ts';
import { putDown, putInfinity, putUp, roughLog, tenTo, toDouble } from './decimal.ts';

/*
 * exp, log and roots at a decimal argument m·10^e, from tables of high-precision decimals and short series. Each puts
 * y and k such that the true value is y·10^k to within `closeness` of itself, y between 10⁻²⁰⁰ and 10²⁰⁰. At an infinite
 * argument it is the limit; NaN says that it is not known. Below, u is 2⁻⁵³ = 1.1·10⁻¹⁶, what one operation in double
 * precision is off by; 80 u are 8.9·10⁻¹⁵.
 */

export const closeness = 9e-15;

export type PutValue = (out: Float64Array, mantissa: number, exponent: number) => void;

const context = decimalContext(30);
const ln10 = context.log(context.from(10)).toNumber();

/** Stores y·10^k, moved down by its closeness, and two places on, moved up. */
export function putAround(out: Float64Array, at: number, y: number, k: number): void {
  if (!(Math.abs(y) < Number.POSITIVE_INFINITY)) {
    putInfinity(out, at, y > 0 ? 1 : -1);
    putInfinity(out, at + 2, y < 0 ? -1 : 1);
    return;
  }
  if (y === 0) {
    for (let index = at; index < at + 4; index++) out[index] = 0;
    return;
  }
  // A poor guess of the number of digits costs digits and nothing else.
  const places = 13 - roughLog(Math.abs(y));
  const scaled = y * tenTo(places);
  // closeness, u for 10^places, u for the product, u for the difference
  const slack = Math.abs(scaled) * 1e-14;
  putDown(out, at, Math.floor(scaled - slack), k - places);
  putUp(out, at + 2, Math.ceil(scaled + slack), k - places);
}

/** Stores a high-precision value as y and k: off by u. */
export function putHighPrecision(out: Float64Array, value: Decimal): void {
  if (!value.isFinite() || value.isZero()) {
    out[0] = value.toNumber();
    out[1] = 0;
    return;
  }
  out[0] = Number(value.toExponential().replace(/e.*/, ''));
  out[1] = value.e;
}

const wholes = new Map<number, readonly [number, number]>();

/** A table of f(i/64) by i, filled as it is needed. */
function table(f: (x: Decimal) => Decimal): (index: number) => number {
  const known = new Map<number, number>();
  return (index) => {
    let value = known.get(index);
    if (value === undefined) {
      value = f(context.from(index).div(64)).toNumber();
      known.set(index, value);
    }
    return value;
  };
}

const partOf = table(context.exp);
const logarithmOf = table(context.log);
const scratch = new Float64Array(2);

/** Beyond this exp and expm1 are not computed: e^100000 = 10^43429.4… */
export const mostExponent = 1e5;

export const putExp: PutValue = (out, mantissa, exponent) => {
  const t = toDouble(mantissa, exponent);
  if (!(Math.abs(t) <= mostExponent)) {
    putBeyond(out, t);
    return;
  }
  const n = Math.round(t);
  // m is 14 digits long: where n is not 0, −e is 14 at most, n·10^−e an integer below 2⁵³ and the difference exact.
  const rest = n === 0 ? t : (mantissa - n * tenTo(-exponent)) / tenTo(-exponent);
  putExpOf(out, n, rest);
};

/** exp(t) of a double: within closeness/2 besides what t is off by. */
export function putExpOfDouble(out: Float64Array, t: number): void {
  if (!(Math.abs(t) <= mostExponent)) {
    putBeyond(out, t);
    return;
  }
  const n = Math.round(t);
  putExpOf(out, n, t - n);
}

function putBeyond(out: Float64Array, t: number): void {
  out[0] = t === Number.NEGATIVE_INFINITY ? 0 : t === Number.POSITIVE_INFINITY ? t : Number.NaN;
  out[1] = 0;
}

/**
 * exp(n)·exp(i/64)·exp(s), |s| ≤ 1/128 + u. The series of exp(s) ends before s⁷/5040 < 4·10⁻¹⁹; its sum is off by 3 u, the
 * tables by u each, the products by u each, the argument by u/2: less than 8 u.
 */
function putExpOf(out: Float64Array, n: number, rest: number): void {
  const index = Math.round(rest * 64);
  const s = rest - index / 64;
  const series = 1 + s * (1 + (s / 2) * (1 + (s / 3) * (1 + (s / 4) * (1 + (s / 5) * (1 + s / 6)))));
  let whole = wholes.get(n);
  if (whole === undefined) {
    putHighPrecision(scratch, context.exp(context.from(n)));
    whole = [scratch[0] as number, scratch[1] as number];
    wholes.set(n, whole);
  }
  out[0] = whole[0] * (partOf(index) * series);
  out[1] = whole[1];
}

/** exp(x) − 1; where |x| < 0.7 by x(1 + x/2(1 + x/3(…))), whose 18th term is below 10⁻¹⁸ and whose brackets exceed 0.6. */
export const putExpm1: PutValue = (out, mantissa, exponent) => {
  const x = toDouble(mantissa, exponent);
  if (Math.abs(x) < 0.7) {
    let sum = 1;
    for (let n = 18; n >= 2; n--) sum = 1 + (x / n) * sum;
    // Below 10⁻²⁰⁰ the double is not to be trusted, and x is the value.
    out[0] = exponent < -200 ? mantissa : x * sum;
    out[1] = exponent < -200 ? exponent : 0;
    return;
  }
  putExp(out, mantissa, exponent);
  const [y, k] = [out[0] as number, out[1] as number];
  // e^x is 2 or more, or below a half: the difference is at least as large as either and off by 8 u of it and u more.
  if (k < 30) {
    out[0] = y * tenTo(k) - 1;
    out[1] = 0;
  }
};

/** log((t + d)/t) = 2·artanh(d/(2t + d)): the quotient is below 0.0125, its 11th power below 10⁻²⁰; 4 u. */
function logOfRatio(difference: number, total: number): number {
  const z = difference / total;
  const square = z * z;
  return 2 * z * (1 + square * (1 / 3 + square * (1 / 5 + square * (1 / 7 + square / 9))));
}

/**
 * log of x = y·10^k with y in 0.316…3.17, by the nearest t = i/64: k·log 10 + log t + log(y/t). For k ≠ 0 the first is at most
 * twice the sum and the others below it; for k = 0 and t ≠ 1 the second is at most twice the sum. So the whole is off by
 * less than 4 u for each of them.
 */
export const putLog: PutValue = (out, mantissa, exponent) => {
  out[1] = 0;
  if (!(mantissa > 0 && mantissa < Number.POSITIVE_INFINITY)) {
    out[0] = mantissa === 0 ? Number.NEGATIVE_INFINITY : mantissa;
    return;
  }
  const isLarge = mantissa > 3.163e13;
  const unit = isLarge ? 1e14 : 1e13;
  const k = exponent + (isLarge ? 14 : 13);
  const index = Math.round((mantissa / unit) * 64);
  // index/64·unit is an integer below 2⁵³, and so are the sum and the difference.
  const place = index * (unit / 64);
  const rest = logOfRatio(mantissa - place, mantissa + place);
  out[0] = k === 0 ? logarithmOf(index) + rest : k * ln10 + logarithmOf(index) + rest;
};

/**
 * log(1 + x). Between −0.6 and 2 by log t + log((1 + x)/t), t = i/64 nearest to 1 + x: x and t − 1 are known to 3 u of x, so that
 * the sum, at least x/2 in size, is off by 20 u; where t = 1 nothing is subtracted.
 */
export const putLog1p: PutValue = (out, mantissa, exponent) => {
  const x = toDouble(mantissa, exponent);
  if (exponent < -200) {
    // x − x²/2 …
    out[0] = mantissa;
    out[1] = exponent;
  } else if (x > -0.6 && x < 2) {
    const index = Math.round((1 + x) * 64);
    const rest = logOfRatio(x - (index - 64) / 64, 1 + x + index / 64);
    out[0] = logarithmOf(index) + rest;
    out[1] = 0;
  } else {
    // 1 + x exactly, or where that needs more than 15 digits, within u of it
    const places = exponent + 13;
    if (places >= 20 || !(Math.abs(x) < Number.POSITIVE_INFINITY)) putLog(out, mantissa, exponent);
    else {
      const sum = mantissa + tenTo(-exponent);
      putSumLog(out, sum, exponent);
    }
  }
};

/** log of sum·10^exponent, the sum any positive integer that a double holds, off by u at most. */
function putSumLog(out: Float64Array, sum: number, exponent: number): void {
  let size = sum;
  let power = exponent;
  while (size >= 1e14) {
    size /= 10;
    power++;
  }
  while (size < 1e13 && size > 0) {
    size *= 10;
    power--;
  }
  putLog(out, size, power);
}
