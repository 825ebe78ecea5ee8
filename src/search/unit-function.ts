import { type Axis, axisUnit, axisValue, checkAxis } from './axis.ts';
import type { PointFunction } from './block.ts';

export interface Position {
  readonly unit: Float64Array;
  readonly value: number;
}

/** A function in unit coordinates, with a count of its evaluations. */
export interface UnitFunction {
  readonly start: Float64Array;
  /** Axes along which the box has a width. */
  readonly free: readonly number[];
  /** NaN and −Infinity, which are no values, and every value asked for after the budget, are Infinity. */
  readonly evaluate: (unit: Float64Array) => number;
  readonly placeOf: (unit: Float64Array) => Float64Array;
  readonly evaluations: () => number;
  readonly exhausted: () => boolean;
}

/** Throws a RangeError for a start outside the box. */
export function unitFunction(
  f: PointFunction,
  start: Float64Array,
  axes: readonly Axis[],
  budget: number,
): UnitFunction {
  for (const [index, axis] of axes.entries()) {
    checkAxis(axis);
    const value = start[index] as number;
    if (!(value >= axis.lower && value <= axis.upper))
      throw new RangeError(`${axis.name} = ${value} is not in the box`);
  }
  const startUnit = Float64Array.from(axes, (axis, index) => axisUnit(axis, start[index] as number));
  // A coordinate that has not moved keeps its value to the last bit.
  const coordinate = (index: number, unit: number) =>
    unit === startUnit[index] ? (start[index] as number) : axisValue(axes[index] as Axis, unit);
  const fill = (place: Float64Array, unit: Float64Array) => {
    for (let index = 0; index < place.length; index += 1) place[index] = coordinate(index, unit[index] as number);
    return place;
  };
  const scratch = new Float64Array(axes.length);
  let evaluations = 0;
  let refused = false;
  return {
    start: startUnit,
    free: axes.flatMap(({ lower, upper }, index) => (lower < upper ? [index] : [])),
    evaluate(unit) {
      if (evaluations >= budget) {
        refused = true;
        return Infinity;
      }
      evaluations += 1;
      const value = f(fill(scratch, unit));
      return value > -Infinity ? value : Infinity;
    },
    placeOf: (unit) => fill(new Float64Array(axes.length), unit),
    evaluations: () => evaluations,
    exhausted: () => refused,
  };
}
