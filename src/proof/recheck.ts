import { makeSigns, type Signs } from '../graph/sign.ts';
import { isLess, putExactDouble } from '../recheck/decimal.ts';
import { type Bounds, makeEvaluator } from '../recheck/evaluate.ts';
import { lowerBounds } from '../recheck/lower-bounds.ts';
import { arrange, type Program } from '../recheck/program.ts';
import { type BranchAxis, middleOf } from '../search/branch.ts';
import type { Claim } from './claim.ts';
import { coordinatesNotNegative } from './forms.ts';

/** All that checking boxes of a claim needs: plain data, for another thread. */
export interface RecheckWork {
  readonly programs: readonly Program[];
  readonly axes: readonly BranchAxis[];
  readonly tolerance: number;
}

export function recheckWork(claim: Claim): RecheckWork {
  const { graph, forms, variables, axes, tolerance } = claim;
  const signs = ownSigns(claim);
  return { programs: forms.map((form) => arrange(graph, form, variables, signs)), axes, tolerance };
}

/**
 * What is positive inside the domain: told by how nodes are made and by decimal bounds over the whole domain. The signs of
 * the claim rest on the search's arithmetic and are not used. A point of an edge counts where the formula has a value, as in
 * the claim: there what is said to be positive is not negative, or has no value.
 */
function ownSigns({ graph, forms, variables, axes }: Claim): Signs {
  const isPositive = (name: string, index: number) => {
    const { lower, upper } = axes[index] as BranchAxis;
    return coordinatesNotNegative.has(name) && lower >= 0 && upper > 0;
  };
  const positive = new Set(variables.filter(isPositive));
  const byMaking = makeSigns(graph, positive);
  const domain = Float64Array.from(axes.flatMap(({ lower, upper }) => [lower, upper]));
  const bounds = forms.map((form) => lowerBounds(graph, form, variables, domain, byMaking));
  return makeSigns(graph, positive, (id) => Math.max(...bounds.map((boundOf) => boundOf(id))));
}

/** How often a box that the decimal forms do not prove at once is halved. */
const mostHalvings = 6;

/**
 * A function from boxes (lower, upper of each axis in turn) to the index of the first one on which the margin is not shown
 * to be at least −tolerance, −1 when there is none.
 */
export function makeRecheck({ programs, axes, tolerance }: RecheckWork): (boxes: Float64Array) => number {
  const evaluators = programs.map(makeEvaluator);
  const width = 2 * axes.length;
  const least = new Float64Array(4);
  putExactDouble(least, 0, -tolerance);

  return (boxes) => {
    // Of no axes there is one box.
    const count = width === 0 ? 1 : boxes.length / width;
    for (let index = 0; index < count; index++) if (!holds(boxes, index * width, mostHalvings)) return index;
    return -1;
  };

  function holds(boxes: Float64Array, offset: number, halvings: number): boolean {
    for (const evaluate of evaluators) if (isEnough(evaluate(boxes, offset))) return true;
    if (halvings === 0) return false;
    // The decimal forms are not the same as those of the search: a box may need to be halved for them.
    const parts = bestHalves(boxes.slice(offset, offset + width));
    return parts?.every((part) => holds(part, 0, halvings - 1)) ?? false;
  }

  function isEnough({ defined, lower, lowerPower }: Bounds): boolean {
    // −tolerance rounded up. NaN, which no lower end should be, proves nothing.
    return defined && !Number.isNaN(lower) && !isLess(lower, lowerPower, least[2] as number, least[3] as number);
  }

  /** The halves along the axis for which the lower bound of the first form is best on the worse of both. */
  function bestHalves(box: Float64Array): readonly Float64Array[] | undefined {
    let best: { readonly parts: readonly Float64Array[]; readonly worse: Bounds } | undefined;
    const [evaluate] = evaluators;
    axes.forEach(({ scale }, axis) => {
      const middle = middleOf(box[2 * axis] as number, box[2 * axis + 1] as number, scale);
      if (middle === undefined || evaluate === undefined) return;
      const parts = [box.with(2 * axis + 1, middle), box.with(2 * axis, middle)];
      const [first, second] = parts.map((part) => evaluate(part, 0)) as [Bounds, Bounds];
      const worse = isBelow(first, second) ? first : second;
      if (best === undefined || isBelow(best.worse, worse)) best = { parts, worse };
    });
    return best?.parts;
  }
}

function isBelow(a: Bounds, b: Bounds): boolean {
  return isLess(a.lower, a.lowerPower, b.lower, b.lowerPower);
}
