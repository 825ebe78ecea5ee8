import { indicesOf } from './block.ts';
import { neighbour, neighbourSteps } from './cells.ts';
import type { Tally } from './tally.ts';

/** Part of the candidates that are the smallest cells not beside a chosen one, whatever surrounds them. */
const fillShare = 1 / 4;

/**
 * Cells from whose smallest points a local search should start, smallest first, at most `count`: cells
 * smaller than all their neighbours (diagonal ones included; of equal cells the first counts as
 * smaller), and, for valleys that run across the cells, the smallest ones that touch no chosen cell.
 */
export function candidateCells(tally: Tally, count: number): number[] {
  const { layout, minimum } = tally;
  const { counts, strides } = layout;
  const axes = counts.length;
  const around = neighbourSteps(axes, axes);
  const below = (cell: number, other: number) => {
    const [a, b] = [minimum[cell] as number, minimum[other] as number];
    return a < b || (a === b && cell < other);
  };
  const isBelowFaces = (cell: number, position: Int32Array) => {
    const value = minimum[cell] as number;
    for (let axis = 0; axis < axes; axis += 1) {
      const stride = strides[axis] as number;
      const index = position[axis] as number;
      if (index > 0 && !(value < (minimum[cell - stride] as number))) return false;
      if (index + 1 < (counts[axis] as number) && !(value <= (minimum[cell + stride] as number))) return false;
    }
    return true;
  };
  const isBelowAll = (cell: number, position: ArrayLike<number>) =>
    around.every((step) => {
      const other = neighbour(layout, position, step);
      return other < 0 || below(cell, other);
    });
  const lowest: number[] = [];
  const others: number[] = [];
  // The smallest cells alone, without sorting all of them.
  const worthKeeping = smallestLevel(minimum, 4 * count);
  const position = new Int32Array(axes);
  for (let cell = 0; cell < layout.total; cell += 1) {
    if ((minimum[cell] as number) < Infinity) {
      if (isBelowFaces(cell, position) && isBelowAll(cell, position)) lowest.push(cell);
      else if ((minimum[cell] as number) <= worthKeeping && others.length < 16 * count) others.push(cell);
    }
    for (let axis = axes - 1; axis >= 0; axis -= 1) {
      position[axis] = (position[axis] as number) + 1;
      if ((position[axis] as number) < (counts[axis] as number)) break;
      position[axis] = 0;
    }
  }
  const bySize = (a: number, b: number) => (below(a, b) ? -1 : 1);
  const chosen = lowest.sort(bySize).slice(0, count);
  const spare = Math.min(count - chosen.length, Math.ceil(count * fillShare));
  const fill: number[] = [];
  const taken = new Set(chosen);
  for (const cell of others.sort(bySize)) {
    if (fill.length >= spare) break;
    const position = indicesOf(cell, layout.counts);
    if (around.some((step) => taken.has(neighbour(layout, position, step)))) continue;
    taken.add(cell);
    fill.push(cell);
  }
  return [...chosen, ...fill].sort(bySize);
}

/** A value that about `count` entries do not exceed, from a sample of them. */
function smallestLevel(values: Float64Array, count: number): number {
  const stride = Math.max(1, Math.floor(values.length / 4096));
  const sample = Float64Array.from(
    { length: Math.ceil(values.length / stride) },
    (_, i) => values[i * stride] as number,
  );
  sample.sort();
  return sample[Math.min(sample.length - 1, Math.ceil(count / stride))] as number;
}
