import type { Rational } from '../number/rational.ts';
import { toNumber } from '../number/rational.ts';
import { rootEstimate } from './root.ts';
import { down, enclose, oneStep, type Pair, productDown, productUp, up } from './widen.ts';

/** Second and third derivatives of a function, for its Taylor polynomial. */
export interface Bends {
  /** Encloses f″(x), given enclosures of f(x) and f′(x). */
  readonly second: (x: number, value: Pair, slope: Pair, out: Pair) => void;
  /** Encloses f‴ over an interval of the domain, given enclosures of f at its ends; false where no bound is known. */
  readonly third: (lower: number, upper: number, atLower: Pair, atUpper: Pair, out: Pair) => boolean;
}

/** More than the roundings of the few products and quotients behind one number, relatively. */
const few = 16 * oneStep;

function set(out: Pair, lower: number, upper: number): true {
  out[0] = lower;
  out[1] = upper;
  return true;
}

/** exp: every derivative is its value. */
export const expBends: Bends = {
  second: (_x, value, _slope, out) => void set(out, value[0] as number, value[1] as number),
  third: (_lower, _upper, atLower, atUpper, out) => set(out, atLower[0] as number, atUpper[1] as number),
};

/** eˣ − 1: every derivative is its slope, one more than its value. */
export const expm1Bends: Bends = {
  second: (_x, _value, slope, out) => void set(out, slope[0] as number, slope[1] as number),
  third: (_lower, _upper, atLower, atUpper, out) =>
    set(out, Math.max(0, down((atLower[0] as number) + 1)), up((atUpper[1] as number) + 1)),
};

/** log(start + x): f″ = −f′², f‴ = 2/(start + x)³, which falls. */
function logarithmBends(start: 0 | 1): Bends {
  return {
    second(_x, _value, slope, out) {
      const [low, high] = [slope[0] as number, slope[1] as number];
      set(out, -productUp(high, high), -productDown(low, low));
    },
    third(lower, upper, _atLower, _atUpper, out) {
      const from = down(start + lower);
      const to = up(start + upper);
      return from > 0 && set(out, (2 / (to * to * to)) * (1 - few), (2 / (from * from * from)) * (1 + few));
    },
  };
}

export const logBends = logarithmBends(0);
export const log1pBends = logarithmBends(1);

/** Below what any of the absolute roundings here can add to a third derivative, none of which exceeds 3. */
const slack = 1e-13;

/** Encloses a function from its values at the ends and its extremes between them, where it lies there. */
function fromEnds(out: Pair, values: readonly number[]): true {
  return set(out, Math.min(...values) - slack, Math.max(...values) + slack);
}

const within = (lower: number, upper: number, places: readonly number[]) =>
  places.some((place) => lower <= place && place <= upper);

/** f′ = s = 1/(1 + x²), f″ = −2x·s², f‴ = (6x² − 2)·s³ with extremes −2 at 0 and ½ at ±1. */
export const atanBends: Bends = {
  second(x, _value, slope, out) {
    const s = ((slope[0] as number) + (slope[1] as number)) * 0.5;
    enclose(-2 * x * s * s, few, out);
  },
  third(lower, upper, _atLower, _atUpper, out) {
    const at = (x: number) => (6 * x * x - 2) / (1 + x * x) ** 3;
    if (!(Math.abs(lower) < 1e90 && Math.abs(upper) < 1e90)) return false;
    return fromEnds(out, [
      at(lower),
      at(upper),
      ...(within(lower, upper, [0]) ? [-2] : []),
      ...(within(lower, upper, [-1, 1]) ? [0.5] : []),
    ]);
  },
};

/** s = (1 + x²)^(−1/2): f′ = s, f″ = −x·s³, f‴ = (2x² − 1)·s⁵ with extremes −1 at 0 and 2·2.5^(−5/2) < 0.2024 at x² = 1.5. */
export const asinhBends: Bends = {
  second(x, _value, slope, out) {
    const s = ((slope[0] as number) + (slope[1] as number)) * 0.5;
    enclose(-x * s * s * s, 2 * few, out);
  },
  third(lower, upper, _atLower, _atUpper, out) {
    if (!(Math.abs(lower) < 1e60 && Math.abs(upper) < 1e60)) return false;
    const at = (x: number) => {
      const root = rootEstimate(1 + x * x);
      return (2 * x * x - 1) / (root * root * root * root * root);
    };
    // √1.5 = 1.2247…
    const nearCrest = (lower <= 1.23 && upper >= 1.22) || (lower <= -1.22 && upper >= -1.23);
    return fromEnds(out, [
      at(lower),
      at(upper),
      ...(within(lower, upper, [0]) ? [-1] : []),
      ...(nearCrest ? [0.2024] : []),
    ]);
  },
};

/** With t = tanh x: f″ = −2t·f′, f‴ = −2 + 8t² − 6t⁴, which rises in t² to 2/3 at t² = 2/3. */
export const tanhBends: Bends = {
  second(_x, value, slope, out) {
    const t = ((value[0] as number) + (value[1] as number)) * 0.5;
    const s = ((slope[0] as number) + (slope[1] as number)) * 0.5;
    const width = (slope[1] as number) - (slope[0] as number);
    const second = -2 * t * s;
    const margin = Math.abs(second) * (few + 2 ** -46) + 2 * width;
    set(out, second - margin, second + margin);
  },
  third(lower, upper, atLower, atUpper, out) {
    const at = ([low, high]: readonly [number, number]) => {
      const square = (low + high) * (low + high) * 0.25;
      return -2 + 8 * square - 6 * square * square;
    };
    const ends = [at(atLower as unknown as [number, number]), at(atUpper as unknown as [number, number])];
    // artanh √(2/3) = 1.1462…
    const nearCrest = (lower <= 1.15 && upper >= 1.14) || (lower <= -1.14 && upper >= -1.15);
    return fromEnds(out, [...ends, ...(within(lower, upper, [0]) ? [-2] : []), ...(nearCrest ? [0.6667] : [])]);
  },
};

/** f″ = −2x·f′; f‴ = (4x² − 2)·f′ lies between −4/√π at 0 and (8/√π)e^(−3/2) at x² = 1.5. */
export const erfBends: Bends = {
  second(x, _value, slope, out) {
    const [a, b] = [-2 * x * (slope[0] as number), -2 * x * (slope[1] as number)];
    const margin = Math.max(Math.abs(a), Math.abs(b)) * few;
    set(out, Math.min(a, b) - margin, Math.max(a, b) + margin);
  },
  third: (_lower, _upper, _atLower, _atUpper, out) => set(out, -2.2568, 1.0072),
};

/** xᵖ: f″ = (p − 1)·f′/x, f‴ = p(p − 1)(p − 2)·f/x³, which has no extreme on either side of 0. */
export function powerBends(exponent: Rational): Bends {
  const p = toNumber(exponent);
  const twice = toNumber(exponent.sub(1));
  const thrice = toNumber(exponent.mul(exponent.sub(1)).mul(exponent.sub(2)));
  const isPolynomial = exponent.d === 1n && p >= 2 && p <= 4;
  return {
    second(x, _value, slope, out) {
      if (x === 0) {
        const atZero = p === 2 ? 2 : 0;
        set(out, atZero, atZero);
        return;
      }
      const [a, b] = [((slope[0] as number) / x) * twice, ((slope[1] as number) / x) * twice];
      const margin = Math.max(Math.abs(a), Math.abs(b)) * few;
      set(out, Math.min(a, b) - margin, Math.max(a, b) + margin);
    },
    third(lower, upper, atLower, atUpper, out) {
      if (isPolynomial) {
        if (p === 2) return set(out, 0, 0);
        return p === 3 ? set(out, 6, 6) : set(out, down(24 * lower), up(24 * upper));
      }
      if (!(lower > 0 || upper < 0)) return false;
      const atFirst = thrice / lower / lower / lower;
      const atLast = thrice / upper / upper / upper;
      const a = (atLower[0] as number) * atFirst;
      const b = (atLower[1] as number) * atFirst;
      const c = (atUpper[0] as number) * atLast;
      const d = (atUpper[1] as number) * atLast;
      const least = Math.min(a, b, c, d);
      const most = Math.max(a, b, c, d);
      const margin = Math.max(Math.abs(least), Math.abs(most)) * few;
      return set(out, least - margin, most + margin);
    },
  };
}
