/** One coordinate of a domain to be decided; ends may be 0 or infinite on a logarithmic one, and then are never met. */
export interface BranchAxis {
  readonly lower: number;
  readonly upper: number;
  readonly scale: 'linear' | 'logarithmic';
  /** Inner values at which the domain is divided before anything else. */
  readonly divisions: readonly number[];
}

/** What is known of a box: it is all right, all wrong, or to be divided along an axis. */
export type Judgement = 'proved' | 'violated' | number;

/**
 * Judges the box at `offset` (lower, upper of each axis in turn). An answer that is a number is the axis to divide
 * along; −1 leaves the choice to the search.
 */
export type JudgeBox = (boxes: Float64Array, offset: number) => Judgement;

export interface BranchOptions {
  /** Boxes to judge at most. */
  readonly budget: number;
  readonly onBoxes?: (boxes: number) => void;
  /** Whether the tree of boxes is kept. */
  readonly keepTree?: boolean;
}

export interface BranchResult {
  readonly stop: 'decided' | 'budget' | 'resolution';
  readonly boxes: number;
  readonly deepest: number;
  /** Shares of the domain, in the coordinates that run along the axes. */
  readonly proved: number;
  readonly violated: number;
  readonly undecided: number;
  /** The smallest box around what is undecided, and around what is violated. */
  readonly undecidedHull: readonly (readonly [number, number])[];
  readonly violatedHull: readonly (readonly [number, number])[];
  /** One letter a box, level by level: `.` proved, `!` violated, `?` undecided, else the axis it is divided along. */
  readonly tree: string;
}

/** A box is not halved more often: its share of the domain is below 10⁻³⁰. */
const mostHalvings = 100;

export const boxLetters = { proved: '.', violated: '!', undecided: '?' } as const;

/**
 * Divides a box until each part is proved or violated, or the budget ends: level by level, so that the largest boxes
 * come first and what remains is an honest picture. `proved + violated + undecided` is 1.
 */
export function branchAndBound(axes: readonly BranchAxis[], judge: JudgeBox, options: BranchOptions): BranchResult {
  const { budget, onBoxes, keepTree = false } = options;
  const width = 2 * axes.length + 1;
  let level = rootBoxes(axes);
  const tree: string[] = [];
  const shares = { proved: 0, violated: 0, undecided: 0 };
  const undecidedHull = emptyHull(axes);
  const violatedHull = emptyHull(axes);
  let boxes = 0;
  let deepest = 0;
  let unresolved = false;
  for (let depth = 0; level.length > 0; depth++) {
    deepest = depth;
    const next = new BoxList(width);
    const letters: string[] = [];
    for (let offset = 0; offset < level.length; offset += width) {
      const share = level[offset + width - 1] as number;
      if (boxes >= budget) {
        shares.undecided += share;
        extend(undecidedHull, level, offset);
        if (keepTree) letters.push(boxLetters.undecided);
        continue;
      }
      boxes++;
      if (boxes % 16384 === 0) onBoxes?.(16384);
      const judgement = judge(level, offset);
      if (typeof judgement === 'string') {
        shares[judgement] += share;
        if (judgement === 'violated') extend(violatedHull, level, offset);
        if (keepTree) letters.push(boxLetters[judgement]);
        continue;
      }
      const axis = depth < mostHalvings ? next.divide(axes, level, offset, judgement) : -1;
      if (axis < 0) {
        unresolved = true;
        shares.undecided += share;
        extend(undecidedHull, level, offset);
      }
      if (keepTree) letters.push(axis < 0 ? boxLetters.undecided : String(axis));
    }
    if (keepTree) tree.push(letters.join(''));
    level = next.boxes();
  }
  onBoxes?.(boxes % 16384);
  return {
    stop: shares.undecided === 0 ? 'decided' : unresolved && boxes < budget ? 'resolution' : 'budget',
    boxes,
    deepest,
    ...shares,
    // Summed shares may miss 1 by round-off.
    proved: shares.undecided === 0 && shares.violated === 0 ? 1 : Math.min(1, shares.proved),
    undecidedHull,
    violatedHull,
    tree: tree.join(''),
  };
}

/** The domain divided at its divisions, as rows of bounds and the share of each. */
export function rootBoxes(axes: readonly BranchAxis[]): Float64Array {
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

/** A growing list of boxes with their shares. */
class BoxList {
  #data = new Float64Array(1024);
  #used = 0;
  readonly #width: number;

  constructor(width: number) {
    this.#width = width;
  }

  /** Appends the halves of a box along the axis, or along its widest when that is −1; answers the axis, −1 if none can be. */
  divide(axes: readonly BranchAxis[], from: Float64Array, offset: number, wanted: number): number {
    const axis = wanted >= 0 && this.#middle(axes, from, offset, wanted) !== undefined ? wanted : widest();
    const middle = axis < 0 ? undefined : this.#middle(axes, from, offset, axis);
    if (middle === undefined) return -1;
    const width = this.#width;
    this.#reserve(2 * width);
    for (let half = 0; half < 2; half++) {
      const at = this.#used;
      this.#data.set(from.subarray(offset, offset + width), at);
      this.#data[at + 2 * axis + (half === 0 ? 1 : 0)] = middle;
      this.#data[at + width - 1] = (from[offset + width - 1] as number) / 2;
      this.#used += width;
    }
    return axis;

    function widest(): number {
      let best = -1;
      let most = 0;
      axes.forEach(({ lower, upper, scale }, index) => {
        const [low, high] = [from[offset + 2 * index] as number, from[offset + 2 * index + 1] as number];
        const relative = relativeWidth(low, high, lower, upper, scale);
        if (relative > most && middleOf(low, high, scale) !== undefined) {
          most = relative;
          best = index;
        }
      });
      return best;
    }
  }

  boxes(): Float64Array {
    return this.#data.subarray(0, this.#used);
  }

  #middle(axes: readonly BranchAxis[], from: Float64Array, offset: number, axis: number): number | undefined {
    const { scale } = axes[axis] as BranchAxis;
    return middleOf(from[offset + 2 * axis] as number, from[offset + 2 * axis + 1] as number, scale);
  }

  #reserve(more: number): void {
    if (this.#used + more <= this.#data.length) return;
    const larger = new Float64Array(2 * this.#data.length);
    larger.set(this.#data);
    this.#data = larger;
  }
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

function emptyHull(axes: readonly BranchAxis[]): [number, number][] {
  return axes.map(() => [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY]);
}

function extend(hull: [number, number][], boxes: Float64Array, offset: number): void {
  hull.forEach((bounds, axis) => {
    bounds[0] = Math.min(bounds[0], boxes[offset + 2 * axis] as number);
    bounds[1] = Math.max(bounds[1], boxes[offset + 2 * axis + 1] as number);
  });
}
