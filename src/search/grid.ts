import { type Axis, axisMeasure, axisUnit, axisValue, checkAxis } from './axis.ts';

/** Values along an axis, rising, both ends exact, with their weights in the measure of the axis. */
export interface AxisGrid {
  readonly axis: Axis;
  readonly values: Float64Array;
  /** Trapezoid weights in `axisMeasure`; their sum is 1. */
  readonly weights: Float64Array;
}

/** Part of a step within which a pinned value replaces a grid value instead of being added. */
const sameValue = 1e-6;

/**
 * `count` values (at least 2) uniform in the unit coordinate, and each pinned value inside the axis
 * added exactly. A fixed coordinate (lower = upper) has one value of weight 1. Shares are measured in
 * `axisMeasure`: plain for linear and toward-upper axes, logarithmic for logarithmic ones. Throws a
 * RangeError for a faulty axis or count.
 */
export function gridOf(axis: Axis, count: number, pinned: readonly number[] = []): AxisGrid {
  checkAxis(axis);
  if (axis.lower === axis.upper) {
    return { axis, values: Float64Array.of(axis.lower), weights: Float64Array.of(1) };
  }
  if (!(Number.isInteger(count) && count >= 2)) throw new RangeError(`axis ${axis.name}: ${count} grid values`);
  const last = count - 1;
  const values = Array.from({ length: count }, (_, index) => axisValue(axis, index / last));
  for (const value of pinned) {
    if (!(value > axis.lower && value < axis.upper)) continue;
    const position = axisUnit(axis, value) * last;
    const nearest = Math.round(position);
    const replaces = Math.abs(position - nearest) < sameValue && nearest > 0 && nearest < last;
    if (replaces) values[nearest] = value;
    else values.push(value);
  }
  const sorted = Float64Array.from(new Set(values)).sort();
  return { axis, values: sorted, weights: trapezoidWeights(axis, sorted) };
}

function trapezoidWeights(axis: Axis, values: Float64Array): Float64Array {
  const measures = values.map((value) => axisMeasure(axis, value));
  const at = (index: number) => measures[Math.min(values.length - 1, Math.max(0, index))] as number;
  return values.map((_, index) => (at(index + 1) - at(index - 1)) / 2);
}
