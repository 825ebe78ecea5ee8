import { compileIntervals, outcome } from '../kernel/interval.ts';
import type { JudgeBox } from '../search/box-search.ts';
import { middleOf, relativeWidth } from '../search/branch.ts';
import type { Claim } from './claim.ts';

/**
 * Judges boxes of a claim by the intervals of its forms. Where more of the enclosure is the error of the form than half
 * of what the form tells of the axes, a box is tried in halves along each axis, and divided along that which brings the
 * lower bounds up most; else along the axis that the form says contributes most.
 */
export function boxJudge({ graph, signs, forms, variables, axes, tolerance }: Claim): JudgeBox {
  const kernel = compileIntervals(graph, forms, variables, signs);
  const out = new Float64Array(kernel.stride * forms.length);
  const count = axes.length;
  const half = new Float64Array(2 * count);

  return (boxes, offset) => {
    kernel.evaluate(boxes, offset, out);
    let best = -1;
    for (let base = 0; base < out.length; base += kernel.stride) {
      // Positive comparisons: NaN proves nothing.
      if (out[base + outcome.outside] !== 0) continue;
      if ((out[base + outcome.lower] as number) >= -tolerance) return 'proved';
      if ((out[base + outcome.upper] as number) < -tolerance) return 'violated';
      best = base;
    }
    if (best < 0 || !isTold(best)) return axisOfTrial(boxes, offset);
    return axisOfForm(best, boxes, offset);
  };

  /** Whether the form's own axes say more than half of what its error leaves open. */
  function isTold(base: number): boolean {
    let told = 0;
    for (let axis = 0; axis < count; axis++) told += out[base + outcome.axes + axis] as number;
    return (out[base + outcome.rest] as number) < 0.5 * told;
  }

  function axisOfForm(base: number, boxes: Float64Array, offset: number): number {
    const rest = out[base + outcome.rest] as number;
    let found = -1;
    let most = 0;
    for (let axis = 0; axis < count; axis++) {
      const { lower, upper, scale } = axes[axis] as Claim['axes'][number];
      const [from, to] = [boxes[offset + 2 * axis] as number, boxes[offset + 2 * axis + 1] as number];
      const score = (out[base + outcome.axes + axis] as number) + rest * relativeWidth(from, to, lower, upper, scale);
      if (score > most) {
        most = score;
        found = axis;
      }
    }
    return found;
  }

  /** The axis whose halves miss the claim least, in the geometric mean; −1 where no half says anything. */
  function axisOfTrial(boxes: Float64Array, offset: number): number {
    let found = -1;
    let least = 2 * Math.log(nothing);
    for (let axis = 0; axis < count; axis++) {
      const [from, to] = [boxes[offset + 2 * axis] as number, boxes[offset + 2 * axis + 1] as number];
      const middle = middleOf(from, to, (axes[axis] as Claim['axes'][number]).scale);
      if (middle === undefined) continue;
      const score = shortfall(boxes, offset, axis, from, middle) + shortfall(boxes, offset, axis, middle, to);
      if (score < least) {
        least = score;
        found = axis;
      }
    }
    return found;
  }

  /** Logarithm of how far the lower bound on a part of the box is below zero. */
  function shortfall(boxes: Float64Array, offset: number, axis: number, from: number, to: number): number {
    for (let index = 0; index < half.length; index++) half[index] = boxes[offset + index] as number;
    half[2 * axis] = from;
    half[2 * axis + 1] = to;
    kernel.evaluate(half, 0, out);
    let least = nothing;
    for (let base = 0; base < out.length; base += kernel.stride) {
      const lower = out[base + outcome.lower] as number;
      if (out[base + outcome.outside] === 0 && lower > -nothing) least = Math.min(least, Math.max(0, -lower));
    }
    return Math.log(least + resolution);
  }
}

/** Stands for a bound that says nothing; and what is added so that a logarithm has a value. */
const nothing = 1e300;
const resolution = 1e-12;
