import type { Condition } from '../constraint/condition.ts';
import type { ProofRecord } from '../finding/finding.ts';
import type { RegionAxis, RegionTree } from '../finding/regions.ts';
import type { Functional } from '../functional/functional.ts';
import { parseDecimal, type Rational } from '../number/rational.ts';
import { boxTreeLetters, readBoxTree } from '../search/box-tree.ts';
import { boxLetters } from '../search/branch.ts';
import { type ClaimSettings, claimOf } from './claim.ts';
import { decideClaim } from './decide-claim.ts';
import { polarisationRoot, rewriteNames } from './forms.ts';

export interface RegionOptions {
  /** Boxes to look at, at most. */
  readonly budget: number;
  readonly onBoxes?: (boxes: number) => void;
}

/** What boxes decide of a condition for a functional over the domain of the settings; or why no boxes can. */
export async function decideRegions(
  condition: Condition,
  functional: Functional,
  settings: ClaimSettings,
  options: RegionOptions,
): Promise<RegionTree | string> {
  const claim = claimOf(condition, functional, settings, rewriteNames);
  if (typeof claim === 'string') return claim;
  const { tree, boxes, stop } = await decideClaim(claim, { ...options, keepTree: true });
  const axes = claim.axes.map(({ lower, upper, scale, divisions }, index): RegionAxis => {
    const name = claim.variables[index] as string;
    const isRoot = name === polarisationRoot;
    return { name: isRoot ? 'zeta' : name, runs: isRoot ? 'root' : 'plain', lower, upper, scale, divisions };
  });
  return { axes, letters: tree, isCut: false, boxes, stop, rewrites: claim.rewrites };
}

/** The regions of a condition that is proved. */
export function everywhereProved({ boxes, rewrites }: Pick<ProofRecord, 'boxes' | 'rewrites'>): RegionTree {
  return { axes: [], letters: boxLetters.proved, isCut: false, boxes, stop: 'decided', rewrites };
}

/** The tree in at most so many letters, parts of one state joined; what is left out is undecided. */
export function shortened(tree: RegionTree, most: number): RegionTree {
  const boxes = readBoxTree(tree.axes, tree.letters);
  const all = boxTreeLetters(tree.axes, boxes, Number.POSITIVE_INFINITY);
  if (all.length <= most) return { ...tree, letters: all };
  return { ...tree, letters: boxTreeLetters(tree.axes, boxes, most), isCut: true };
}

/** The condition with more coordinates held fixed, at the numbers that are printed. */
export function conditionAt(condition: Condition, slice: ReadonlyMap<string, number>): Condition {
  const held = [...slice].map(([name, value]) => {
    const exact = parseDecimal(String(value)) as Rational;
    return [name, { kind: 'number', value: exact, offset: 0 }] as const;
  });
  return { ...condition, at: new Map([...condition.at, ...held]) };
}
