import { type Rational, toNumber } from '../number/rational.ts';
import { powerBends } from './bends.ts';
import { exp } from './exponential.ts';
import { log } from './logarithm.ts';
import { powerByRoots } from './root.ts';
import type { Smooth } from './smooth.ts';
import { down, type Pair, productDown, productUp, quotientDown, quotientUp, up } from './widen.ts';

type At = (x: number, out: Pair) => void;

/** x^(p/q) for x ≥ 0, by verified roots and products, or as exp((p/q)·log x). */
function positive(exponent: Rational): At {
  const byRoots = powerByRoots(exponent);
  if (byRoots !== undefined) return byRoots;
  const rounded = toNumber(exponent);
  const [low, high] = [down(rounded), up(rounded)];
  return (x, out) => {
    log(x, out);
    const [a, b] = [out[0] as number, out[1] as number];
    const lower = Math.min(productDown(a, low), productDown(a, high));
    const upper = Math.max(productUp(b, low), productUp(b, high), productUp(a, low), productUp(a, high));
    const least = Math.min(lower, productDown(b, low), productDown(b, high));
    exp(least, out);
    const result = out[0] as number;
    exp(upper, out);
    out[0] = result;
  };
}

/**
 * x^(p/q) as the sheets mean it: the real root for odd q (even or odd in x as p is), x ≥ 0 for even q. A negative
 * exponent has no value at 0, on either side of which the image is unbounded.
 */
export function powerFunction(exponent: Rational): Smooth {
  const magnitude = positive(exponent);
  const isNegative = exponent.s < 0n;
  const isReal = exponent.d % 2n === 1n;
  const isEven = exponent.n % 2n === 0n;
  const value = toNumber(exponent);
  const at: At = (x, out) => {
    magnitude(Math.abs(x), out);
    if (x < 0 && !isEven) mirror(out);
  };
  /** p/q·x^(p/q)/x: the middle of the enclosure with four roundings, and what its width adds. */
  const slope = (x: number, result: Pair, out: Pair): void => {
    if (x === 0 && value > 1) {
      out[0] = 0;
      out[1] = 0;
      return;
    }
    const [lower, upper] = [result[0] as number, result[1] as number];
    const middle = (value * (lower + (upper - lower) * 0.5)) / x;
    const margin = Math.abs(middle) * 2 ** -49 + Math.abs(value * (upper - lower)) / Math.abs(x);
    out[0] = middle - margin;
    out[1] = middle + margin;
  };
  // On x > 0 the second derivative has the sign of (p/q)(p/q − 1).
  const bend = isNegative || value > 1 ? 1 : -1;
  const over = (lower: number, upper: number, out: Pair): 1 | -1 | 0 => {
    if (lower >= 0) return isNegative ? -1 : 1;
    // 0 is approached from below there.
    if (upper < 0 || (upper === 0 && (isEven || !isNegative))) return isNegative === isEven ? 1 : -1;
    if (!isNegative) {
      if (!isEven) return 1;
      at(Math.max(-lower, upper), out);
      out[0] = 0;
      return 0;
    }
    at(Math.max(-lower, upper), out);
    const least = out[0] as number;
    out[0] = isEven ? least : Number.NEGATIVE_INFINITY;
    out[1] = Number.POSITIVE_INFINITY;
    if (!isEven && upper === 0) {
      at(lower, out);
      out[0] = Number.NEGATIVE_INFINITY;
    }
    return 0;
  };
  return {
    at,
    least: isReal ? Number.NEGATIVE_INFINITY : 0,
    open: false,
    pole: isNegative,
    over,
    slope,
    curvature: (lower, upper) => {
      if (lower >= 0) return bend;
      if (upper <= 0) return isEven ? bend : bend === 1 ? -1 : 1;
      return isEven && !isNegative && exponent.d === 1n ? 1 : 0;
    },
    bends: powerBends(exponent),
  };
}

function mirror(out: Pair): void {
  const lower = out[0] as number;
  out[0] = -(out[1] as number);
  out[1] = -lower;
}

/** The reciprocal of a positive enclosure, in place. */
export function reciprocal(out: Pair): void {
  const lower = out[0] as number;
  out[0] = quotientDown(1, out[1] as number);
  out[1] = lower === 0 ? Number.POSITIVE_INFINITY : quotientUp(1, lower);
}
