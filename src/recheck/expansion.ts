import type { PutValue } from './elementary.ts';

/** Where an expansion is asked for: at x with f(x), both within 10⁻¹⁴ of themselves, and for lower ≤ ξ ≤ upper. */
export interface Place {
  x: number;
  value: number;
  lower: number;
  upper: number;
  /** f at the ends, within 10⁻¹³ of itself. */
  atLower: number;
  atUpper: number;
}

/** f′(x) and f″(x)/2 with what the true ones depart from these by, and bounds of f‴(ξ)/6. A slope of NaN: not known. */
export interface Expansion {
  slope: number;
  slopeError: number;
  bend: number;
  bendError: number;
  thirdLeast: number;
  thirdMost: number;
}

export interface SmoothFunction {
  readonly value: PutValue;
  /** 1 increasing, −1 decreasing, 2 lowest at 0 with the value range[0], 0 unknown, over an interval with ends of these signs. */
  readonly direction: (lower: number, upper: number) => 1 | -1 | 2 | 0;
  /** Of an increasing function: arguments larger in size are not computed. */
  readonly farthest?: number;
  /** What no value is outside of. */
  readonly range: readonly [number, number];
  /** Where the domain begins, and whether the end belongs to it; undefined for every real. */
  readonly begins?: readonly [number, boolean];
  /** 1 or −1 where f‴ has that sign on the whole interval. */
  readonly third: (lower: number, upper: number) => 1 | -1 | 0;
  readonly expand: (place: Place, out: Expansion) => void;
}

/** More than what a derivative of a few operations on numbers within 10⁻¹⁴ is off by. */
export const loose = 1e-13;

/** Derivatives that are off by `loose` of themselves; bounds of f‴/6 as computed, off by 10⁻¹² of themselves. */
export function relative(out: Expansion, slope: number, bend: number, least: number, most: number): void {
  absolute(out, slope, Math.abs(slope) * loose, bend, Math.abs(bend) * loose, least, most);
}

export function absolute(
  out: Expansion,
  slope: number,
  slopeError: number,
  bend: number,
  bendError: number,
  least: number,
  most: number,
): void {
  out.slope = slope;
  out.slopeError = slopeError;
  out.bend = bend;
  out.bendError = bendError;
  out.thirdLeast = least - Math.abs(least) * 1e-12;
  out.thirdMost = most + Math.abs(most) * 1e-12;
}

/** There is no expansion. */
export function none(out: Expansion): void {
  out.slope = Number.NaN;
}

/**
 * The expansion whose f‴ is `third`, computed to 10⁻¹² and monotonic between `extremes`.
 */
export function withExtremes(
  out: Expansion,
  third: (x: number) => number,
  lower: number,
  upper: number,
  extremes: readonly number[],
): void {
  let least = Math.min(third(lower), third(upper));
  let most = Math.max(third(lower), third(upper));
  for (const x of extremes) {
    if (!(lower <= x && x <= upper)) continue;
    least = Math.min(least, third(x));
    most = Math.max(most, third(x));
  }
  out.thirdLeast = (least - 2e-12) / 6;
  out.thirdMost = (most + 2e-12) / 6;
}
