import { type Rational, toNumber } from '../number/rational.ts';
import { exp } from './exponential.ts';
import { log } from './logarithm.ts';
import { exponentByRoots, positivePower } from './root.ts';
import type { Smooth } from './smooth.ts';
import { down, type Pair, productDown, productUp, quotientDown, quotientUp, up } from './widen.ts';

type At = (x: number, out: Pair) => void;

/** x^(p/q) for x ≥ 0, by verified roots and products, or as exp((p/q)·log x). */
function positive(exponent: Rational): At {
  const byRoots = exponentByRoots(exponent);
  if (byRoots !== undefined) return (x, out) => positivePower(x, byRoots, out);
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
  const below = exponent.sub(1);
  const slopeMagnitude = below.equals(0) ? undefined : positive(below);
  const value = toNumber(exponent);
  const [low, high] = exponent.d === 1n ? [value, value] : [down(value), up(value)];
  const at: At = (x, out) => {
    magnitude(Math.abs(x), out);
    if (x < 0 && !isEven) mirror(out);
  };
  const slope: At = (x, out) => {
    // p/q·|x|^(p/q − 1), odd in x where x^(p/q) is even
    if (slopeMagnitude === undefined) out.fill(1);
    else slopeMagnitude(Math.abs(x), out);
    const [a, b] = [out[0] as number, out[1] as number];
    out[0] = Math.min(productDown(low, a), productDown(low, b), productDown(high, a), productDown(high, b));
    out[1] = Math.max(productUp(low, a), productUp(low, b), productUp(high, a), productUp(high, b));
    if (x < 0 && isEven) mirror(out);
  };
  // On x > 0 the second derivative has the sign of (p/q)(p/q − 1).
  const bend = isNegative || value > 1 ? 1 : -1;
  const pair = new Float64Array(2);
  const over = (lower: number, upper: number, out: Pair): void => {
    if (lower >= 0) monotone(lower, upper, isNegative);
    else if (upper <= 0) monotone(lower, upper, isNegative !== isEven);
    else if (!isNegative) {
      if (!isEven) monotone(lower, upper, false);
      else {
        at(Math.max(-lower, upper), out);
        out[0] = 0;
      }
    } else {
      out[0] = Number.NEGATIVE_INFINITY;
      out[1] = Number.POSITIVE_INFINITY;
      if (isEven) at(Math.max(-lower, upper), pair);
      if (isEven) out[0] = pair[0] as number;
    }
    function monotone(from: number, to: number, decreases: boolean): void {
      at(decreases ? to : from, out);
      const least = out[0] as number;
      // The end 0 of an interval of negative numbers is approached from below.
      at(decreases ? from : to, out);
      if (isNegative && to === 0 && !isEven) {
        out[0] = Number.NEGATIVE_INFINITY;
        at(from, pair);
        out[1] = pair[1] as number;
        return;
      }
      out[0] = least;
    }
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
