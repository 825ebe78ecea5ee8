import { type Axis, axisValue, checkAxis } from './axis.ts';

/** A list of points: coordinates[axis][point]. */
export interface SampleBlock {
  readonly coordinates: readonly Float64Array[];
  /** 1 for a point that fills the box evenly, 0 for one that has coordinates set to ends. */
  readonly even: Uint8Array;
}

export interface SampleOptions {
  readonly count: number;
  readonly blockPoints?: number;
  /** Part of the points that have about half of their coordinates at an end (default 1/4). */
  readonly edgeShare?: number;
}

/**
 * `count` points of the box in blocks, the same on every run: first the 2^d corners, then the additive
 * recurrence t_k = frac(1/2 + k·g^(−j)) for axis j = 1…d, where g is the root above 1 of g^(d+1) = g + 1
 * (M. Roberts, "The unreasonable effectiveness of quasirandom sequences", 2018), uniform in the unit
 * coordinate of each axis; of these a share of about `edgeShare` has coordinates set to an end.
 */
export function* samplePoints(axes: readonly Axis[], options: SampleOptions): Generator<SampleBlock> {
  const { count, blockPoints = 2 ** 14, edgeShare = 1 / 4 } = options;
  for (const axis of axes) checkAxis(axis);
  const ratios = recurrenceRatios(axes.length);
  const corners = Math.min(2 ** axes.length, count);
  for (let start = 0; start < count; start += blockPoints) {
    const length = Math.min(blockPoints, count - start);
    const even = new Uint8Array(length);
    const coordinates = axes.map(() => new Float64Array(length));
    for (let point = 0; point < length; point += 1) {
      const index = start + point;
      const isCorner = index < corners;
      const atEdge = isCorner || scramble(index) / 2 ** 32 < edgeShare;
      // Two bits an axis: is it set to an end, and to which.
      const bits = scramble(index + 0x5bd1e995);
      even[point] = atEdge ? 0 : 1;
      for (const [axis, values] of coordinates.entries()) {
        let unit = (0.5 + (index + 1) * (ratios[axis] as number)) % 1;
        if (isCorner) unit = (index >> axis) & 1;
        else if (atEdge && (bits >>> (2 * axis)) & 1) unit = (bits >>> (2 * axis + 1)) & 1;
        values[point] = axisValue(axes[axis] as Axis, unit);
      }
    }
    yield { coordinates, even };
  }
}

function recurrenceRatios(axes: number): number[] {
  let root = 2;
  for (let step = 0; step < 60; step += 1) root = (1 + root) ** (1 / (axes + 1));
  return Array.from({ length: axes }, (_, axis) => root ** -(axis + 1) % 1);
}

/** A fixed mixing of 32 bits (the finaliser of MurmurHash3). */
function scramble(index: number): number {
  let bits = index >>> 0;
  bits = Math.imul(bits ^ (bits >>> 16), 0x85ebca6b);
  bits = Math.imul(bits ^ (bits >>> 13), 0xc2b2ae35);
  return (bits ^ (bits >>> 16)) >>> 0;
}
