import type { Bends } from './bends.ts';
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
  /**
   * Whether f increases (1) or decreases (−1); or a function that tells this of an interval, or encloses f over it and
   * answers 0.
   */
  readonly over: 1 | -1 | ((lower: number, upper: number, out: Pair) => 1 | -1 | 0);
  /** Encloses f′(x), given the enclosure of f(x). */
  readonly slope?: (x: number, value: Pair, out: Pair) => void;
  /** 1 where f is convex on the whole interval, −1 where it is concave, 0 where neither is known. */
  readonly curvature: (lower: number, upper: number) => 1 | -1 | 0;
  readonly bends?: Bends;
}

const first = new Float64Array(2);
const second = new Float64Array(2);
const third = new Float64Array(2);
const slopes = new Float64Array(2);
const curves = new Float64Array(2);

/**
 * Replaces the interval in the scratch by an enclosure of its image; sets `outside`. Answers whether the values at the
 * two ends were left in `first` and `second`.
 */
export function imageOf(f: Smooth, scratch: Scratch): boolean {
  let lower = scratch[register.lower] as number;
  const upper = scratch[register.upper] as number;
  let outside = 0;
  if (!(lower >= f.least)) {
    outside = leaves;
    lower = f.least;
  } else if (lower === f.least && f.open) outside = touches;
  if (f.pole === true && lower <= 0 && upper >= 0) outside |= lower === 0 || upper === 0 ? touches : leaves;
  scratch[register.outside] = outside;
  if (!(upper >= lower)) {
    scratch[register.outside] = leaves;
    scratch[register.lower] = Number.NEGATIVE_INFINITY;
    scratch[register.upper] = Number.POSITIVE_INFINITY;
    return false;
  }
  const { over } = f;
  const direction = typeof over === 'function' ? over(lower, upper, first) : over;
  if (direction === 0) {
    scratch[register.lower] = first[0] as number;
    scratch[register.upper] = first[1] as number;
    return false;
  }
  f.at(lower, first);
  f.at(upper, second);
  scratch[register.lower] = (direction === 1 ? first[0] : second[0]) as number;
  scratch[register.upper] = (direction === 1 ? second[1] : first[1]) as number;
  return true;
}

/**
 * The image as imageOf, and a parabola: f(x) = offset + slope·(x − middle) + bend·(x − middle)² ± error for every x of
 * the interval. Of the chord and the Taylor polynomial the one that errs less; half the width of the image where
 * neither is known.
 */
export function expand(f: Smooth, scratch: Scratch): void {
  const lower = scratch[register.lower] as number;
  const upper = scratch[register.upper] as number;
  const hasEnds = imageOf(f, scratch);
  level(scratch);
  const isBounded =
    (scratch[register.upper] as number) - (scratch[register.lower] as number) < 1e300 && upper - lower < 1e300;
  if (f.slope === undefined || !isBounded || !(lower >= f.least && upper > lower)) return;
  if (!hasEnds) {
    f.at(lower, first);
    f.at(upper, second);
  }
  const middle = lower + (upper - lower) * 0.5;
  f.at(middle, third);
  f.slope(middle, third, slopes);
  // Above the distance of any point from the middle.
  const reach = Math.max(middle - lower, upper - middle) * (1 + oneStep);
  const curvature = f.curvature(lower, upper);
  if (curvature !== 0) chord(lower, upper, middle, reach, curvature, scratch);
  if (f.bends !== undefined) taylor(f.bends, lower, upper, middle, reach, scratch);
}

/**
 * For a convex f the greatest of f(x) − slope·x is at an end of the interval, and it is nowhere below its tangent at any
 * inner point ξ: f(ξ) + f′(ξ)(x − ξ) − slope·x ≥ f(ξ) − slope·ξ − |f′(ξ) − slope|·|x − ξ|. A concave f is the mirror
 * image.
 */
function chord(lower: number, upper: number, middle: number, reach: number, curvature: 1 | -1, scratch: Scratch): void {
  const slope =
    (((second[0] as number) + (second[1] as number)) * 0.5 - ((first[0] as number) + (first[1] as number)) * 0.5) /
    (upper - lower);
  const side = curvature === 1 ? 1 : 0;
  const atLower = residual(first[side] as number, slope, lower, curvature);
  const atUpper = residual(second[side] as number, slope, upper, curvature);
  const far = curvature === 1 ? Math.max(atLower, atUpper) : Math.min(atLower, atUpper);
  const tilt = Math.max(Math.abs((slopes[0] as number) - slope), Math.abs((slopes[1] as number) - slope));
  const slack = tilt * reach * (1 + 8 * oneStep);
  const near = residual(third[1 - side] as number, slope, middle, curvature === 1 ? -1 : 1) - curvature * slack;
  const error = Math.abs(far - near) * 0.5 * (1 + 8 * oneStep) + (Math.abs(far) + Math.abs(near)) * 4 * oneStep;
  if (!(error < 1e300) || !(error <= (scratch[register.error] as number))) return;
  scratch[register.slope] = slope;
  scratch[register.offset] = (far + near) * 0.5;
  scratch[register.error] = error;
}

/**
 * f(m + δ) = f(m) + f′(m)δ + ½f″(m)δ² + τδ³ with τ in the range of f‴/6. For any κ, τδ³ = κδ³ ± |τ − κ|r³, and
 * δ³ = ¾r²δ ± r³/4 for |δ| ≤ r, which is Chebyshev's T₃. What the enclosures of the coefficients leave open is added
 * to the error, whose few terms are positive.
 */
function taylor(bends: Bends, lower: number, upper: number, middle: number, reach: number, scratch: Scratch): void {
  if (!bends.third(lower, upper, first, second, curves)) return;
  const [least, most] = [curves[0] as number, curves[1] as number];
  const kappa = (least + most) / 12;
  const spread = Math.max(most / 6 - kappa, kappa - least / 6) + Math.max(Math.abs(least), Math.abs(most)) * oneStep;
  const cube = reach * reach * reach;
  bends.second(middle, third, slopes, curves);
  const slope = ((slopes[0] as number) + (slopes[1] as number)) * 0.5;
  const bend = ((curves[0] as number) + (curves[1] as number)) * 0.25;
  const tilt = 0.75 * reach * reach * kappa;
  const openness =
    ((third[1] as number) - (third[0] as number)) * 0.5 +
    ((slopes[1] as number) - (slopes[0] as number)) * 0.5 * reach +
    ((curves[1] as number) - (curves[0] as number)) * 0.25 * reach * reach;
  const offset = ((third[0] as number) + (third[1] as number)) * 0.5;
  const size =
    Math.abs(offset) +
    (Math.abs(slope) + Math.abs(tilt)) * reach +
    Math.abs(bend) * reach * reach +
    Math.abs(kappa) * cube;
  const error = (Math.abs(kappa) * cube * 0.25 + spread * cube + openness) * (1 + 16 * oneStep) + size * 8 * oneStep;
  if (!(error < 1e300) || !(error < (scratch[register.error] as number))) return;
  scratch[register.middle] = middle;
  scratch[register.offset] = offset;
  scratch[register.slope] = slope + tilt;
  scratch[register.bend] = bend;
  scratch[register.error] = error;
}

/** value − slope·x, rounded outward in the direction given: up for 1, down for −1. */
function residual(value: number, slope: number, x: number, direction: 1 | -1): number {
  const product = slope * x;
  const difference = value - product;
  return difference + direction * (Math.abs(product) + Math.abs(difference)) * oneStep;
}

/** The middle of the image and half its width; an infinite error where it has no end. */
function level(scratch: Scratch): void {
  const bottom = scratch[register.lower] as number;
  const top = scratch[register.upper] as number;
  scratch[register.slope] = 0;
  scratch[register.bend] = 0;
  scratch[register.middle] = 0;
  const isBounded = top - bottom < Number.POSITIVE_INFINITY;
  scratch[register.offset] = isBounded ? bottom + (top - bottom) / 2 : 0;
  scratch[register.error] = isBounded
    ? ((top - bottom) / 2) * (1 + 8 * oneStep) + (Math.abs(bottom) + Math.abs(top)) * oneStep
    : Number.POSITIVE_INFINITY;
}
