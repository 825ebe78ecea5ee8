import type { Axis } from './axis.ts';
import type { PointFunction } from './block.ts';
import { compass } from './compass.ts';
import { simplex } from './simplex.ts';
import { type Position, unitFunction } from './unit-function.ts';

export interface DescentOptions {
  /** First step as a part of the unit width of each axis (default 1/32). */
  readonly step?: number;
  /** The step at which the search ends (default 1e-12). */
  readonly unitTolerance?: number;
  /** Evaluations of the function (default 10 000). */
  readonly budget?: number;
  /** Leave out the simplex searches: quick, but stuck in curved valleys (default false). */
  readonly quick?: boolean;
}

/** `converged`: steps of `unitTolerance` do not lead lower; `flat`: the value no longer changes before that. */
type DescentStop = 'converged' | 'flat' | 'budget';

export interface Descent {
  readonly place: Float64Array;
  readonly value: number;
  readonly evaluations: number;
  readonly stop: DescentStop;
}

const maximumRounds = 20;

/**
 * A local minimum of f in the box of the axes, without derivatives: compass search with accelerated
 * moves, and simplex searches for valleys that no coordinate follows, in turn until neither leads
 * lower; steps are taken in unit coordinates. The result lies in the box, ends are reached exactly,
 * and its value is never above f(start). NaN and infinite values count as Infinity; where f(start)
 * is one of these and nothing lower is found, the start is returned with value Infinity. A smooth minimum is found to about 1e-8 of the
 * unit width, all that its values resolve. Throws a RangeError for a start outside the box.
 */
export function descend(
  f: PointFunction,
  start: Float64Array,
  axes: readonly Axis[],
  options: DescentOptions = {},
): Descent {
  const { step = 1 / 32, unitTolerance = 1e-12, budget = 10_000, quick = false } = options;
  const problem = unitFunction(f, start, axes, budget);
  const first: Position = { unit: problem.start, value: problem.evaluate(problem.start) };
  let { position, flat } = compass(problem, first, step, quick ? unitTolerance : Math.max(unitTolerance, step / 64));
  if (!quick) {
    let size = step / 2;
    for (let round = 0; round < maximumRounds && !problem.exhausted(); round += 1) {
      const before = position.value;
      position = simplex(problem, position, size);
      ({ position } = compass(problem, position, Math.min(step, 1e-3), 1e-6));
      const gain = before - position.value;
      if (!(gain > 1e-15 * Math.abs(before))) {
        // Once more with a small simplex: a large one may jump over a narrow valley.
        if (size < 1e-4) break;
        size /= 32;
      }
    }
    ({ position, flat } = compass(problem, position, Math.min(step, 1e-4), unitTolerance));
  }
  return {
    place: problem.placeOf(position.unit),
    value: position.value,
    evaluations: problem.evaluations(),
    stop: problem.exhausted() ? 'budget' : flat ? 'flat' : 'converged',
  };
}
