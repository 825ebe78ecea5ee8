/** One coordinate of a domain to be decided; ends may be 0 or infinite on a logarithmic one, and then are never met. */
export interface BranchAxis {
  readonly lower: number;
  readonly upper: number;
  readonly scale: 'linear' | 'logarithmic';
  /** Inner values at which the domain is divided before anything else. */
  readonly divisions: readonly number[];
}

/** How a tree of boxes tells of a box that is not divided; a divided one has the number of its axis. */
export const boxLetters = { proved: '.', violated: '!', undecided: '?' } as const;

/** The domain divided at its divisions, as rows of bounds and the share of each. */
export function rootBoxes(axes: readonly BranchAxis[]): Float64Array<ArrayBuffer> {
  let rows: number[][] = [[]];
  let shares = [1];
  for (const { lower, upper, divisions, scale } of axes) {
    const inner = divisions.filter((value) => value > lower && value < upper).sort((a, b) => a - b);
    const ends = [lower, ...inner, upper];
    const parts = ends.slice(1).map((end, index) => [ends[index] as number, end] as const);
    const sizes = parts.map(([from, to]) => sizeOf(from, to, scale));
    const total = sizes.reduce((sum, size) => sum + size, 0);
    const even = !(total > 0 && total < Number.POSITIVE_INFINITY);
    const weights = sizes.map((size) => (even ? 1 / parts.length : size / total));
    shares = shares.flatMap((share) => weights.map((weight) => share * weight));
    rows = rows.flatMap((row) => parts.map((part) => [...row, ...part]));
  }
  return Float64Array.from(rows.flatMap((row, index) => [...row, shares[index] as number]));
}

function sizeOf(lower: number, upper: number, scale: BranchAxis['scale']): number {
  return scale === 'logarithmic' ? Math.log(upper / lower) : upper - lower;
}

/** Where an interval is divided; undefined when there is no number between its ends. */
export function middleOf(lower: number, upper: number, scale: BranchAxis['scale']): number | undefined {
  const middle = candidate();
  return middle > lower && middle < upper ? middle : undefined;

  function candidate(): number {
    if (lower === Number.NEGATIVE_INFINITY) return upper === Number.POSITIVE_INFINITY ? 0 : Math.min(-4, upper * 4);
    if (upper === Number.POSITIVE_INFINITY) return Math.max(4, lower * 4);
    if (scale === 'linear') return lower + (upper - lower) / 2;
    if (lower === 0) return upper / 16;
    return upper / lower > 1.01 ? Math.sqrt(lower) * Math.sqrt(upper) : lower + (upper - lower) / 2;
  }
}

/** The axis that a box is widest along among those it can be divided along; −1 when there is none. */
export function widestAxis(axes: readonly BranchAxis[], boxes: Float64Array, offset: number): number {
  let best = -1;
  let most = 0;
  for (let index = 0; index < axes.length; index++) {
    const { lower, upper, scale } = axes[index] as BranchAxis;
    const [low, high] = [boxes[offset + 2 * index] as number, boxes[offset + 2 * index + 1] as number];
    const relative = relativeWidth(low, high, lower, upper, scale);
    if (relative > most && middleOf(low, high, scale) !== undefined) {
      most = relative;
      best = index;
    }
  }
  return best;
}

/** The width of a part in terms of the whole axis; on an axis without end in the coordinate x/(1 + |x|). */
export function relativeWidth(
  low: number,
  high: number,
  lower: number,
  upper: number,
  scale: BranchAxis['scale'],
): number {
  const share = sizeOf(low, high, scale) / sizeOf(lower, upper, scale);
  if (share > 0 && share <= 1) return share;
  return (compact(high) - compact(low)) / (compact(upper) - compact(lower));
}

function compact(x: number): number {
  return Number.isFinite(x) ? x / (1 + Math.abs(x)) : Math.sign(x);
}
