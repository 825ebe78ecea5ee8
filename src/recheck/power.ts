import { decimalContext } from '../number/decimal.ts';
import { type Rational, toNumber } from '../number/rational.ts';
import { tenTo } from './decimal.ts';
import { type PutValue, putHighPrecision } from './elementary.ts';
import { loose, none, relative, type SmoothFunction } from './expansion.ts';

const context = decimalContext(30);

/** The largest p of x^(p/q) that is multiplied out: 9 roots, each off by 7 u, as many products and a quotient: below 80 u. */
const mostFactors = 9;

/**
 * x^(p/q) of x = m·10^e ≥ 0: with a power of 10^q taken out, the root of a double, then products, each off by u.
 */
export function powerValue(exponent: Rational): PutValue {
  const [factors, degree] = [Number(exponent.n), Number(exponent.d)];
  const isNegative = exponent.s < 0n;
  const isPlain = factors <= mostFactors && (degree <= 3 || degree === 4 || degree === 6);
  return (out, mantissa, power) => {
    out[1] = 0;
    if (mantissa === 0 || mantissa === Number.POSITIVE_INFINITY) {
      out[0] = (mantissa === 0) === isNegative ? Number.POSITIVE_INFINITY : 0;
      return;
    }
    if (!isPlain) {
      putHighPrecision(out, context.power(context.from(`${mantissa}e${power}`), exponent));
      return;
    }
    // x = z·10^(degree·tens), z from 1 to 10^(degree + 1), off by u
    const tens = Math.floor((power + 13) / degree);
    const root = rootOf(mantissa / tenTo(degree * tens - power), degree);
    let product = root;
    for (let count = 1; count < factors; count++) product *= root;
    out[0] = isNegative ? 1 / product : product;
    out[1] = tens * factors * (isNegative ? -1 : 1);
  };
}

function rootOf(x: number, degree: number): number {
  switch (degree) {
    case 1:
      return x;
    case 2:
      return squareRoot(x);
    case 3:
      return cubeRoot(x);
    case 4:
      return squareRoot(squareRoot(x));
    default:
      return squareRoot(cubeRoot(x));
  }
}

/** Off by 4 u at most, NaN should the platform's guess not be so close: its square is off by 8 u, computing that by u. */
export function squareRoot(x: number): number {
  const guess = Math.sqrt(x);
  return Math.abs(guess * guess - x) <= 7 * 1.1102230246251565e-16 * x ? guess : Number.NaN;
}

/** Off by 4 u at most, or NaN. */
function cubeRoot(x: number): number {
  const guess = Math.cbrt(x);
  return Math.abs(guess * guess * guess - x) <= 9 * 1.1102230246251565e-16 * x ? guess : Number.NaN;
}

const infinity = Number.POSITIVE_INFINITY;
const rising = () => 1 as const;

/** x^(p/q) for x ≥ 0. */
export function powerFunction(exponent: Rational): SmoothFunction {
  const p = toNumber(exponent);
  const factor = (p * (p - 1) * (p - 2)) / 6;
  const sign = Math.sign(factor) as 1 | -1 | 0;
  return {
    value: powerValue(exponent),
    direction: p < 0 ? () => -1 : rising,
    range: [0, infinity],
    ...(p < 0 ? { begins: [0, false] as const } : {}),
    third: () => sign,
    expand: ({ x, value, lower, upper, atLower, atUpper }, out) => {
      // f‴ = p(p − 1)(p − 2)·f/x³ rises or falls all along.
      const first = factor === 0 ? 0 : (factor * atLower) / (lower * lower * lower);
      const last = factor === 0 ? 0 : (factor * atUpper) / (upper * upper * upper);
      const bend = (p * (p - 1) * value) / (2 * x * x);
      relative(out, (p * value) / x, bend, Math.min(first, last), Math.max(first, last));
    },
  };
}

/** x^(p/q) for p > 0, odd q and x of either sign. */
export function powerAcrossZero(exponent: Rational): SmoothFunction {
  const magnitude = powerValue(exponent);
  const p = toNumber(exponent);
  const isOdd = exponent.n % 2n === 1n;
  const isWhole = exponent.d === 1n;
  return {
    value: (out, mantissa, power) => {
      magnitude(out, Math.abs(mantissa), power);
      if (isOdd && mantissa < 0) out[0] = -(out[0] as number);
    },
    direction: isOdd ? rising : () => 2,
    range: [isOdd ? -infinity : 0, infinity],
    third: () => 0,
    expand: ({ x, value, lower, upper }, out) => {
      if (!isWhole) return none(out);
      if (p === 2) return relative(out, 2 * x, 1, 0, 0);
      let size = 1 + p * loose;
      for (let count = 3; count < p; count++) size *= Math.max(-lower, upper);
      const third = (p * (p - 1) * (p - 2) * size) / 6;
      if (x === 0) relative(out, 0, 0, -third, third);
      else relative(out, (p * value) / x, (p * (p - 1) * value) / (2 * x * x), -third, third);
    },
  };
}
