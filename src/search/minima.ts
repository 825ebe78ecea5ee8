import { type Axis, axisUnit } from './axis.ts';
import type { PointFunction } from './block.ts';
import { descend } from './descend.ts';
import type { SearchStop, Spot } from './scan.ts';

export interface MinimaOptions {
  /** Evaluations in all (default 40 000). */
  readonly budget?: number;
  /** Minima that are followed to their end (default 8). */
  readonly keep?: number;
  /** First step in unit coordinates: about that of the grid the starts come from (default 1/32). */
  readonly step?: number;
}

export interface Minima {
  /** Distinct local minima, lowest first. */
  readonly minima: readonly Spot[];
  readonly evaluations: number;
  readonly stop: SearchStop;
}

/** Unit distances along the axes within which two places are taken for one. */
const sameStart = 2e-3;
const sameMinimum = 1e-5;
const quickBudget = 400;

/**
 * Local minima from many starts: a quick descent from each, then the lowest distinct ones followed to
 * their end. The result is never above the lowest start.
 */
export function descendFromMany(
  f: PointFunction,
  starts: readonly Spot[],
  axes: readonly Axis[],
  options: MinimaOptions = {},
): Minima {
  const { budget = 40_000, keep = 8, step = 1 / 32 } = options;
  let evaluations = 0;
  let stop: SearchStop = 'complete';
  const follow = (spots: readonly Spot[], each: number, quick: boolean, unitTolerance: number) =>
    spots.map((spot): Spot => {
      // Half of the budget is kept for the minima that matter.
      const left = (quick ? budget / 2 : budget) - evaluations;
      if (left < 1) {
        stop = 'budget';
        return spot;
      }
      const descent = descend(f, spot.place, axes, { step, quick, unitTolerance, budget: Math.min(each, left) });
      evaluations += descent.evaluations;
      if (descent.stop === 'budget' && !quick) stop = 'budget';
      return descent.value < Infinity ? descent : spot;
    });
  const near = distinct(follow(starts, quickBudget, true, Math.min(1e-3, step / 16)), axes, sameStart);
  const final = follow(near.slice(0, keep), 10_000, false, 1e-12);
  const minima = distinct(final, axes, sameMinimum).map(({ place, value }) => ({ place, value }));
  return { minima, evaluations, stop };
}

/** Sorted by value, each place further than `distance` along some axis from all lower ones. */
function distinct(spots: readonly Spot[], axes: readonly Axis[], distance: number): Spot[] {
  const kept: { readonly spot: Spot; readonly unit: readonly number[] }[] = [];
  const sorted = [...spots].sort((a, b) => (a.value < b.value ? -1 : a.value > b.value ? 1 : 0));
  for (const spot of sorted) {
    const unit = axes.map((axis, index) => axisUnit(axis, spot.place[index] as number));
    const isNew = kept.every((other) =>
      unit.some((at, axis) => Math.abs(at - (other.unit[axis] as number)) > distance),
    );
    if (isNew) kept.push({ spot, unit });
  }
  return kept.map(({ spot }) => spot);
}
