import { compileIntervals, outcome } from '../kernel/interval.ts';
import { type BranchResult, branchAndBound, relativeWidth } from '../search/branch.ts';
import type { Claim } from './claim.ts';

export interface ProofOptions {
  /** Boxes to look at, at most. */
  readonly budget: number;
  readonly onBoxes?: (boxes: number) => void;
  readonly keepTree?: boolean;
}

/** Tries to decide a claim by branch and bound; see BranchResult. */
export function decideClaim(claim: Claim, options: ProofOptions): BranchResult {
  const { graph, forms, variables, axes, tolerance } = claim;
  const kernel = compileIntervals(graph, forms, variables, { affine: true, nonZero: new Set(['rs']) });
  const out = new Float64Array(kernel.stride * forms.length);
  const count = axes.length;
  return branchAndBound(
    axes,
    (boxes, offset) => {
      kernel.evaluate(boxes, offset, out);
      let best = -1;
      for (let form = 0; form < forms.length; form++) {
        const base = form * kernel.stride;
        // Positive comparisons: NaN proves nothing.
        if (out[base + outcome.outside] !== 0) continue;
        if ((out[base + outcome.lower] as number) >= -tolerance) return 'proved';
        if ((out[base + outcome.upper] as number) < -tolerance) return 'violated';
        best = base;
      }
      if (best < 0) return -1;
      return dividingAxis(best, boxes, offset);
    },
    options,
  );

  /** The axis that contributes most: its linear part, and its share by width of what is not linear. */
  function dividingAxis(base: number, boxes: Float64Array, offset: number): number {
    const rest = out[base + outcome.rest] as number;
    let axis = -1;
    let most = 0;
    for (let index = 0; index < count; index++) {
      const { lower, upper, scale } = axes[index] as (typeof axes)[number];
      const width = relativeWidth(
        boxes[offset + 2 * index] as number,
        boxes[offset + 2 * index + 1] as number,
        lower,
        upper,
        scale,
      );
      const score = rest < 1e300 ? (out[base + outcome.axes + index] as number) + rest * width : width;
      if (score > most) {
        most = score;
        axis = index;
      }
    }
    return axis;
  }
}
