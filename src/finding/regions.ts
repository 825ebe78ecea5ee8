import type { ProofRecord } from './finding.ts';

/** A rectangle of a plane: its bounds along x and along y. */
export type Rectangle = readonly [xLower: number, xUpper: number, yLower: number, yUpper: number];

/**
 * What branch and bound with interval arithmetic decides on the plane of a map: rectangles that cover it side by side.
 * Over coordinates at their worst: proved to hold for every value of them, proved to be violated at some value.
 */
export interface PlaneRegions {
  readonly proved: readonly Rectangle[];
  readonly violated: readonly Rectangle[];
  readonly undecided: readonly Rectangle[];
  /** Shares of the plane's area, measured as its axes are drawn. */
  readonly shares: Readonly<Record<RegionState, number>>;
  readonly boxes: number;
  readonly stop: Exclude<ProofRecord['stop'], 'not-provable'>;
  readonly rewrites: readonly string[];
}

export const regionStates = ['proved', 'violated', 'undecided'] as const;
export type RegionState = (typeof regionStates)[number];

/** A coordinate that boxes are divided along. */
export interface RegionAxis {
  readonly name: string;
  /** What the bounds are of: the coordinate itself, or w in ζ = 1 − w³. */
  readonly runs: 'plain' | 'root';
  readonly lower: number;
  readonly upper: number;
  readonly scale: 'linear' | 'logarithmic';
  readonly divisions: readonly number[];
}

/** A plane of a domain, where some coordinates are held: for what is violated at some value of them. */
export interface RegionExample {
  readonly held: Readonly<Record<string, number>>;
  readonly tree: RegionTree;
}

/** What is decided on a whole domain, from which the regions on each of its planes follow. */
export interface RegionTree {
  readonly axes: readonly RegionAxis[];
  /** One letter a box, level by level, as in a certificate. */
  readonly letters: string;
  /** Whether the smallest boxes are left out of the letters, and count as undecided. */
  readonly isCut: boolean;
  /** Of the search that it is from. */
  readonly boxes: number;
  readonly stop: PlaneRegions['stop'];
  readonly rewrites: readonly string[];
  readonly examples?: readonly RegionExample[];
}
