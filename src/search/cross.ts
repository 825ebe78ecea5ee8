import { type Axis, axisUnit, axisValue } from './axis.ts';
import type { PointFunction } from './block.ts';
import type { AxisGrid } from './grid.ts';

/** Where an interval ends: f rises to the level; the domain ends; or f has no value beyond. */
type EndKind = 'crossing' | 'end' | 'no-value';

interface IntervalEnd {
  /** The outermost value known to lie below the level. */
  readonly value: number;
  readonly kind: EndKind;
}

export interface Interval {
  readonly lower: IntervalEnd;
  readonly upper: IntervalEnd;
  readonly evaluations: number;
}

/**
 * The interval around `place` along one axis in which f < level: outward steps on the grid of that
 * axis, then bisection to 1e-10 of the value. What happens between two grid values that are both below
 * the level is not seen. Throws a RangeError where f(place) is not below the level.
 */
export function crossings(
  f: PointFunction,
  place: Float64Array,
  axisIndex: number,
  grid: AxisGrid,
  level: number,
): Interval {
  let evaluations = 0;
  const moved = place.slice();
  const along = (value: number) => {
    moved[axisIndex] = value;
    evaluations += 1;
    const result = f(moved);
    return Number.isFinite(result) ? result : Number.NaN;
  };
  const from = place[axisIndex] as number;
  if (!(along(from) < level)) throw new RangeError('the place is not below the level');
  const endOf = (outward: Iterable<number>): IntervalEnd => {
    let inside = from;
    for (const outside of outward) {
      if (along(outside) < level) inside = outside;
      else return bisect(along, inside, outside, grid.axis, level);
    }
    return { value: inside, kind: 'end' };
  };
  const lower = endOf(grid.values.filter((value) => value < from).reverse());
  const upper = endOf(grid.values.filter((value) => value > from));
  return { lower, upper, evaluations };
}

const accuracy = 1e-10;

/** Closes in on the end between a value below the level and one that is not. */
function bisect(
  along: (value: number) => number,
  inside: number,
  outside: number,
  axis: Axis,
  level: number,
): IntervalEnd {
  let [near, far] = [axisUnit(axis, inside), axisUnit(axis, outside)];
  let [value, beyond] = [inside, outside];
  let last = along(outside);
  for (let step = 0; step < 100; step += 1) {
    if (Math.abs(beyond - value) <= accuracy * Math.max(Math.abs(value), Math.abs(beyond))) break;
    const middle = (near + far) / 2;
    const trial = axisValue(axis, middle);
    if (middle === near || middle === far || trial === value || trial === beyond) break;
    const result = along(trial);
    if (result < level) [near, value] = [middle, trial];
    else [far, beyond, last] = [middle, trial, result];
  }
  return { value, kind: Number.isNaN(last) ? 'no-value' : 'crossing' };
}
