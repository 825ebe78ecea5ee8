import { leaves, register, type Scratch, touches } from './scratch.ts';
import { oneStep, type Pair } from './widen.ts';

/** A function of one variable with enclosures of its values and, where it has them, of its slope and its curvature. */
export interface Smooth {
  /** Encloses f(x); at an end of the domain its limit. */
  readonly at: (x: number, out: Pair) => void;
  /** Least argument; −∞ when every x is allowed. */
  readonly least: number;
  /** Whether the function has no finite value at the least argument. */
  readonly open: boolean;
  /** Whether f has no finite value at 0, a point inside the domain or at its end. */
  readonly pole?: boolean;
  /** Whether f increases (1) or decreases (−1) on its whole domain, or a function that encloses it over an interval. */
  readonly over: 1 | -1 | ((lower: number, upper: number, out: Pair) => void);
  /** Encloses f′(x). */
  readonly slope?: (x: number, out: Pair) => void;
  /** 1 where f is convex on the whole interval, −1 where it is concave, 0 where neither is known. */
  readonly curvature: (lower: number, upper: number) => 1 | -1 | 0;
}

const first = new Float64Array(2);
const second = new Float64Array(2);

/** Replaces the interval in the scratch by an enclosure of its image; sets `outside`. */
export function imageOf(f: Smooth, scratch: Scratch): void {
  let lower = scratch[register.lower] as number;
  const upper = scratch[register.upper] as number;
  scratch[register.outside] = 0;
  if (!(lower >= f.least)) {
    scratch[register.outside] = leaves;
    lower = f.least;
  } else if (lower === f.least && f.open) scratch[register.outside] = touches;
  if (f.pole === true && lower <= 0 && upper >= 0) {
    scratch[register.outside] = (scratch[register.outside] as number) | (lower === 0 || upper === 0 ? touches : leaves);
  }
  if (!(upper >= lower)) {
    scratch[register.outside] = leaves;
    scratch[register.lower] = Number.NEGATIVE_INFINITY;
    scratch[register.upper] = Number.POSITIVE_INFINITY;
    return;
  }
  if (typeof f.over === 'function') {
    f.over(lower, upper, first);
    scratch[register.lower] = first[0] as number;
    scratch[register.upper] = first[1] as number;
    return;
  }
  f.at(lower, first);
  f.at(upper, second);
  scratch[register.lower] = (f.over === 1 ? first[0] : second[0]) as number;
  scratch[register.upper] = (f.over === 1 ? second[1] : first[1]) as number;
}

/**
 * The image as imageOf, and a line: f(x) = slope·x + offset ± error for every x of the interval. The slope is that of
 * the chord. For a convex f the greatest of f(x) − slope·x is at an end of the interval, and it is nowhere below its
 * tangent at any inner point ξ: f(ξ) + f′(ξ)(x − ξ) − slope·x ≥ f(ξ) − slope·ξ − |f′(ξ) − slope|·|x − ξ|. A concave f
 * is the mirror image. Where the curvature is not known, slope 0 and half the width of the image.
 */
export function lineThrough(f: Smooth, scratch: Scratch): void {
  const lower = scratch[register.lower] as number;
  const upper = scratch[register.upper] as number;
  imageOf(f, scratch);
  const bottom = scratch[register.lower] as number;
  const top = scratch[register.upper] as number;
  const curvature = lower >= f.least && upper > lower ? f.curvature(lower, upper) : 0;
  if (curvature === 0 || f.slope === undefined || !(top - bottom < 1e300) || !(upper - lower < 1e300)) {
    level(bottom, top, scratch);
    return;
  }
  f.at(lower, first);
  f.at(upper, second);
  const slope = (((second[0] as number) + (second[1] as number)) / 2 - ((first[0] as number) + (first[1] as number)) / 2) / (upper - lower);
  const side = curvature === 1 ? 1 : 0;
  const atLower = residual(first[side] as number, slope, lower, curvature);
  const atUpper = residual(second[side] as number, slope, upper, curvature);
  const far = curvature === 1 ? Math.max(atLower, atUpper) : Math.min(atLower, atUpper);
  const middle = lower + (upper - lower) / 2;
  f.at(middle, first);
  f.slope(middle, second);
  const reach = Math.max(middle - lower, upper - middle);
  const tilt = Math.max(Math.abs((second[0] as number) - slope), Math.abs((second[1] as number) - slope));
  const slack = tilt * reach * (1 + 8 * oneStep);
  const near = residual(first[1 - side] as number, slope, middle, curvature === 1 ? -1 : 1) - curvature * slack;
  const offset = (far + near) / 2;
  const error = (Math.abs(far - near) / 2) * (1 + 8 * oneStep) + (Math.abs(far) + Math.abs(near)) * 4 * oneStep;
  if (!(error < 1e300) || !(error <= (top - bottom) / 2)) {
    level(bottom, top, scratch);
    return;
  }
  scratch[register.slope] = slope;
  scratch[register.offset] = offset;
  scratch[register.error] = error;
}

/** value − slope·x, rounded outward in the direction given: up for 1, down for −1. */
function residual(value: number, slope: number, x: number, direction: 1 | -1): number {
  const product = slope * x;
  const difference = value - product;
  return difference + direction * (Math.abs(product) + Math.abs(difference)) * oneStep;
}

function level(bottom: number, top: number, scratch: Scratch): void {
  scratch[register.slope] = 0;
  scratch[register.offset] = 0;
  scratch[register.error] = Number.POSITIVE_INFINITY;
  // Infinity makes the generated code fall back on the image.
  if (!(top - bottom < Number.POSITIVE_INFINITY)) return;
  scratch[register.offset] = bottom + (top - bottom) / 2;
  scratch[register.error] = ((top - bottom) / 2) * (1 + 8 * oneStep) + (Math.abs(bottom) + Math.abs(top)) * oneStep;
}
