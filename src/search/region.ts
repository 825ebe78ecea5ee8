import { placeOf } from './block.ts';
import type { AxisGrid } from './grid.ts';
import type { ScanOutput, Spot } from './scan.ts';

/** The extent of a region along one axis. */
export interface Extent {
  readonly axis: string;
  readonly lower: number;
  readonly upper: number;
  readonly touchesLower: boolean;
  readonly touchesUpper: boolean;
  /** From end to end of the axis. */
  readonly spans: boolean;
}

/** A connected set of violated cells. */
export interface Region {
  /** Part of the domain's points with a value, in the measure of the axes. */
  readonly share: number;
  /** Violated grid points that were seen. */
  readonly points: number;
  readonly hull: readonly Extent[];
  /** The smallest value met in it. */
  readonly deepest: Spot;
  /** The grid points where the hull's ends were met: [lowest, highest] along each axis. */
  readonly ends: readonly (readonly [Float64Array, Float64Array])[];
}

export interface Regions {
  /** Largest share first. */
  readonly kept: readonly Region[];
  readonly more: number;
  /** Share of the regions that are not kept. */
  readonly shareOfMore: number;
}

/**
 * Regions of violated cells that meet in a face or an edge (a band that runs across the grid at a slant
 * is one region). Two regions closer than a cell of the scan's map are one. Hull ends are grid values.
 */
export function regionsOf(output: ScanOutput, grids: readonly AxisGrid[], keep = 8): Regions {
  const { tally } = output;
  const { violated, layout } = tally;
  const roots = connect(output);
  const members = new Map<number, number[]>();
  for (let slot = 0; slot < violated.length; slot += 1) {
    const root = rootOf(roots, slot);
    const known = members.get(root);
    if (known === undefined) members.set(root, [slot]);
    else known.push(slot);
  }
  const weightOf = (slots: readonly number[]) =>
    slots.reduce((sum, slot) => sum + (violated.weight[slot] as number), 0) / tally.valuedWeight;
  const sorted = [...members.values()]
    .map((slots) => ({ slots, share: weightOf(slots) }))
    .sort((a, b) => b.share - a.share || (a.slots[0] as number) - (b.slots[0] as number));
  const kept = sorted.slice(0, keep).map(({ slots, share }): Region => {
    const axes = layout.lengths.length;
    let points = 0;
    let deepest = violated.cell[slots[0] as number] as number;
    for (const slot of slots) {
      const cell = violated.cell[slot] as number;
      points += violated.points[slot] as number;
      if ((tally.minimum[cell] as number) < (tally.minimum[deepest] as number)) deepest = cell;
    }
    const ends = grids.map((_, axis) => {
      const extreme = (side: 0 | 1) => {
        let best = -1;
        let bestIndex = 0;
        for (const slot of slots) {
          const entry = (slot * axes + axis) * 2 + side;
          const index = violated.extreme[entry] as number;
          if (best < 0 || (side === 0 ? index < bestIndex : index > bestIndex)) [best, bestIndex] = [entry, index];
        }
        return placeOf(violated.extremeAt[best] as number, grids);
      };
      return [extreme(0), extreme(1)] as const;
    });
    return {
      share,
      points,
      hull: grids.map(({ axis }, index) => {
        const [low, high] = ends[index] as readonly [Float64Array, Float64Array];
        return extentOf(axis, low[index] as number, high[index] as number);
      }),
      deepest: {
        place: placeOf(tally.minimumAt[deepest] as number, grids),
        value: tally.minimum[deepest] as number,
      },
      ends,
    };
  });
  const rest = sorted.slice(keep);
  return { kept, more: rest.length, shareOfMore: rest.reduce((sum, { share }) => sum + share, 0) };
}

export function extentOf(axis: AxisGrid['axis'], lower: number, upper: number): Extent {
  const [touchesLower, touchesUpper] = [lower <= axis.lower, upper >= axis.upper];
  return { axis: axis.name, lower, upper, touchesLower, touchesUpper, spans: touchesLower && touchesUpper };
}

/** Union-find over the slots of violated cells. */
function connect({ tally: { violated, layout, slotOf } }: ScanOutput): Int32Array {
  const roots = Int32Array.from({ length: violated.length }, (_, slot) => slot);
  const { counts, strides } = layout;
  const axes = counts.length;
  const join = (slot: number, cell: number): boolean => {
    const other = slotOf[cell] as number;
    if (other < 0) return false;
    const [a, b] = [rootOf(roots, slot), rootOf(roots, other)];
    if (a !== b) roots[Math.max(a, b)] = Math.min(a, b);
    return true;
  };
  for (let slot = 0; slot < violated.length; slot += 1) {
    const cell = violated.cell[slot] as number;
    for (let axis = 0; axis < axes; axis += 1) {
      const stride = strides[axis] as number;
      // Of each pair of neighbours, the one that comes later looks back.
      if (Math.floor(cell / stride) % (counts[axis] as number) === 0) continue;
      // Beyond a violated face lie only cells that meet it in faces.
      if (join(slot, cell - stride)) continue;
      for (let other = axis + 1; other < axes; other += 1) {
        const step = strides[other] as number;
        const index = Math.floor(cell / step) % (counts[other] as number);
        if (index > 0) join(slot, cell - stride - step);
        if (index + 1 < (counts[other] as number)) join(slot, cell - stride + step);
      }
    }
  }
  return roots;
}

function rootOf(roots: Int32Array, slot: number): number {
  let root = slot;
  while (roots[root] !== root) root = roots[root] as number;
  for (let at = slot; at !== root; ) {
    const next = roots[at] as number;
    roots[at] = root;
    at = next;
  }
  return root;
}
