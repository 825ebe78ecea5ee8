import type { UnaryOperator } from '../graph/operator.ts';
import { type Decimal, decimalContext } from '../number/decimal.ts';
import { tenTo } from './decimal.ts';
import {
  mostExponent,
  type PutValue,
  putExp,
  putExpm1,
  putExpOfDouble,
  putHighPrecision,
  putLog,
  putLog1p,
} from './elementary.ts';
import { absolute, loose, none, relative, type SmoothFunction, withExtremes } from './expansion.ts';
import { squareRoot } from './power.ts';

const infinity = Number.POSITIVE_INFINITY;
const context = decimalContext(30);
const rising = () => 1 as const;
const unknown = () => 0 as const;
const awayFromZero = (lower: number, upper: number) => (lower >= 0 ? 1 : upper <= 0 ? -1 : 2);
const signOf = (lower: number, upper: number) => (lower >= 0 ? 1 : upper <= 0 ? -1 : 0);
const everywhere: readonly [number, number] = [-infinity, infinity];
// Products, since how exact powers of doubles are is left to the platform.
const cube = (x: number) => x * x * x;
const rootOf3Halves = Math.sqrt(1.5);
const rootOf2Thirds = Math.sqrt(2 / 3);

/** A function of high-precision decimals; values are kept, since they cost some 10 µs. */
function highPrecision(f: (x: Decimal) => Decimal): PutValue {
  const kept = new Map<string, readonly [number, number]>();
  return (out, mantissa, exponent) => {
    const key = `${mantissa}e${exponent}`;
    let known = kept.get(key);
    if (known === undefined) {
      putHighPrecision(out, f(context.from(Number.isFinite(mantissa) ? key : mantissa)));
      known = [out[0] as number, out[1] as number];
      if (kept.size > 200_000) kept.clear();
      kept.set(key, known);
    }
    out[0] = known[0];
    out[1] = known[1];
  };
}

const scratch = new Float64Array(2);

/** e^t of a double; NaN or an infinity where a double does not hold it. */
function exponential(t: number): number {
  putExpOfDouble(scratch, t);
  return (scratch[0] as number) * tenTo(scratch[1] as number);
}

export const smoothFunctions: Record<Exclude<UnaryOperator, 'neg' | 'abs'>, SmoothFunction> = {
  exp: {
    value: putExp,
    farthest: mostExponent,
    direction: rising,
    range: [0, infinity],
    third: rising,
    expand: ({ value, atLower, atUpper }, out) => relative(out, value, value / 2, atLower / 6, atUpper / 6),
  },
  expm1: {
    value: putExpm1,
    farthest: mostExponent,
    direction: rising,
    range: [-1, infinity],
    third: rising,
    expand: ({ value, atLower, atUpper }, out) => {
      const error = (Math.abs(value) + 1) * loose;
      const [least, most] = [atLower + 1 - 1e-12, atUpper + 1 + 1e-12];
      absolute(out, value + 1, error, (value + 1) / 2, error, least / 6, most / 6);
    },
  },
  log: {
    value: putLog,
    direction: rising,
    range: everywhere,
    begins: [0, false],
    third: rising,
    expand: ({ x, lower, upper }, out) =>
      relative(out, 1 / x, -0.5 / (x * x), 1 / (3 * upper * upper * upper), 1 / (3 * lower * lower * lower)),
  },
  log1p: {
    value: putLog1p,
    direction: rising,
    range: everywhere,
    begins: [-1, false],
    third: rising,
    expand: ({ x, lower, upper }, out) => {
      const [at, first, last] = [1 + x, 1 + lower, 1 + upper];
      // 1 + x keeps three digits fewer at most.
      if (!(first > 1e-3)) return none(out);
      const error = (loose * (1 + Math.abs(x))) / (at * at);
      const [least, most] = [(1 - 1e-9) / (3 * last * last * last), (1 + 1e-9) / (3 * first * first * first)];
      absolute(out, 1 / at, error, -0.5 / (at * at), (2 * error) / at, least, most);
    },
  },
  sin: {
    value: highPrecision(context.sin),
    direction: unknown,
    range: [-1, 1],
    third: unknown,
    expand: ({ x, value }, out) => {
      const slope = context.cos(context.from(x)).toNumber();
      absolute(out, slope, loose * (1 + Math.abs(x)), -value / 2, loose, -1 / 6, 1 / 6);
    },
  },
  cos: {
    value: highPrecision(context.cos),
    direction: unknown,
    range: [-1, 1],
    third: unknown,
    expand: ({ x, value }, out) => {
      const slope = -context.sin(context.from(x)).toNumber();
      absolute(out, slope, loose * (1 + Math.abs(x)), -value / 2, loose, -1 / 6, 1 / 6);
    },
  },
  sinh: {
    value: highPrecision(context.sinh),
    direction: rising,
    range: everywhere,
    third: rising,
    expand: ({ value, lower, upper, atLower, atUpper }, out) => {
      const cosh = (sinh: number) => squareRoot(1 + sinh * sinh);
      const [first, last] = [cosh(atLower), cosh(atUpper)];
      const least = lower < 0 && upper > 0 ? 1 : Math.min(first, last);
      relative(out, cosh(value), value / 2, least / 6, Math.max(first, last) / 6);
    },
  },
  cosh: {
    value: highPrecision(context.cosh),
    direction: awayFromZero,
    range: [1, infinity],
    third: signOf,
    expand: ({ x, value, atLower, atUpper }, out) => {
      const grown = exponential(x);
      // x of size t is off by t·10⁻¹⁴, and e^x by that of itself.
      const error = (1 + Math.abs(x)) * value * loose;
      const third = Math.max(atLower, atUpper) / 6;
      absolute(out, (grown - 1 / grown) / 2, error, value / 2, error, -third, third);
    },
  },
  tanh: {
    value: highPrecision(context.tanh),
    direction: rising,
    range: [-1, 1],
    third: unknown,
    expand: ({ value, atLower, atUpper }, out) => {
      const slope = 1 - value * value;
      absolute(out, slope, loose, -value * slope, 2 * loose, 0, 0);
      const third = (t: number) => (1 - t * t) * (6 * t * t - 2);
      withExtremes(out, third, atLower, atUpper, [0, rootOf2Thirds, -rootOf2Thirds]);
    },
  },
  asinh: {
    value: highPrecision(context.asinh),
    direction: rising,
    range: everywhere,
    third: unknown,
    expand: ({ x, lower, upper }, out) => {
      const square = 1 + x * x;
      const root = squareRoot(square);
      relative(out, 1 / root, -x / (2 * square * root), 0, 0);
      const third = (t: number) => (2 * t * t - 1) / ((1 + t * t) * (1 + t * t) * squareRoot(1 + t * t));
      withExtremes(out, third, lower, upper, [0, rootOf3Halves, -rootOf3Halves]);
    },
  },
  atan: {
    value: highPrecision(context.atan),
    direction: rising,
    range: [-2, 2],
    third: unknown,
    expand: ({ x, lower, upper }, out) => {
      const square = 1 + x * x;
      relative(out, 1 / square, -x / (square * square), 0, 0);
      withExtremes(out, (t) => (6 * t * t - 2) / cube(1 + t * t), lower, upper, [0, 1, -1]);
    },
  },
  erf: {
    value: highPrecision(context.erf),
    direction: rising,
    range: [-1, 1],
    third: unknown,
    expand: ({ x, lower, upper }, out) => {
      const factor = 1.1283791670955126; // 2/√π
      const slope = factor * exponential(-x * x);
      const bend = -x * slope;
      const error = loose * (1 + x * x);
      absolute(out, slope, slope * error, bend, Math.abs(bend) * error, 0, 0);
      const third = (t: number) => factor * (4 * t * t - 2) * exponential(-t * t);
      withExtremes(out, third, lower, upper, [0, rootOf3Halves, -rootOf3Halves]);
    },
  },
  lambertW: {
    value: highPrecision(context.lambertW),
    direction: rising,
    range: [-1, infinity],
    // Just above −1/e.
    begins: [-0.36787944117144, true],
    third: rising,
    expand: ({ value, atLower, atUpper }, out) => {
      if (!(atLower > -0.9)) return none(out);
      // W′ = exp(−W)/(1 + W), W″ = −W′²(2 + W)/(1 + W), W‴ = W′³(2W² + 8W + 9)/(1 + W)², which falls
      const slopeAt = (w: number) => exponential(-w) / (1 + w);
      const thirdAt = (w: number) => (cube(slopeAt(w)) * (2 * w * w + 8 * w + 9)) / (6 * (1 + w) * (1 + w));
      const slope = slopeAt(value);
      const bend = (-0.5 * slope * slope * (2 + value)) / (1 + value);
      const error = 100 * loose * (1 + Math.abs(value));
      const least = thirdAt(atUpper) * (1 - 1e-9 * (1 + Math.abs(atUpper)));
      const most = thirdAt(atLower) * (1 + 1e-9 * (1 + Math.abs(atLower)));
      absolute(out, slope, slope * error, bend, -bend * error, least, most);
    },
  },
};
