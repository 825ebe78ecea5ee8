import { type Block, BoxBlocks, blockRows } from './box-blocks.ts';
import { type BranchAxis, boxLetters, middleOf, rootBoxes, widestAxis } from './branch.ts';

/** What is known of a box: it is all right, all wrong, or to be divided along an axis. */
export type Judgement = 'proved' | 'violated' | number;

/**
 * Judges the box at `offset` (lower, upper of each axis in turn). An answer that is a number is the axis to divide
 * along; −1 leaves the choice to the search.
 */
export type JudgeBox = (boxes: Float64Array, offset: number) => Judgement;

export interface BranchOptions {
  /** Boxes to judge at most, those of `judged` included. */
  readonly budget: number;
  /** Told how many more boxes are judged, and the share of the domain that is not decided yet. */
  readonly onBoxes?: ((boxes: number, undecided: number) => void) | undefined;
  /** Whether the tree of boxes is kept. */
  readonly keepTree?: boolean;
  /** The letters of the boxes that an earlier search of the same domain has judged; see BoxSearch. */
  readonly judged?: string;
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

/** Numbers that a block's judgements use beside those of axes. */
const codes = { divide: -1, proved: -2, violated: -3 } as const;

/** Judges the rows of a block, a number each. */
export type JudgeBlock = (block: Block) => Int8Array<ArrayBuffer>;

export function blockJudge(axes: number, judge: JudgeBox): JudgeBlock {
  const width = 2 * axes + 1;
  return (block) => {
    const judgements = new Int8Array(block.length / width);
    for (let row = 0; row < judgements.length; row++) {
      const judgement = judge(block, row * width);
      judgements[row] = typeof judgement === 'string' ? codes[judgement] : judgement;
    }
    return judgements;
  };
}

/** Divides a domain until each part is proved or violated, or the budget ends, in this thread; see BoxSearch. */
export function branchAndBound(axes: readonly BranchAxis[], judge: JudgeBox, options: BranchOptions): BranchResult {
  const search = new BoxSearch(axes, options);
  const judgeBlock = blockJudge(axes.length, judge);
  for (let block = search.take(); block !== undefined; block = search.take()) search.accept(block, judgeBlock(block));
  return search.result();
}

/** A box is not halved more often: its share of the domain is below 10⁻³⁰. */
const mostHalvings = 100;

/**
 * The state of a branch and bound: level by level, so that the largest boxes come first and what remains is an honest
 * picture. Who judges the blocks, and in how many threads, changes nothing: they are accepted in the order in which they
 * were taken. The boxes judged are therefore always the first of the tree, and their letters are all that a later search
 * needs to go on from there.
 */
export class BoxSearch {
  readonly #axes: readonly BranchAxis[];
  readonly #options: BranchOptions;
  readonly #width: number;
  /** Blocks of this level that nobody has taken. */
  #level: Block[];
  #next: BoxBlocks;
  #depth = 0;
  #taken = 0;
  #judged = 0;
  #unresolved = false;
  readonly #letters: string[] = [];
  readonly #shares = { proved: 0, violated: 0, undecided: 0 };
  readonly #undecidedHull;
  readonly #violatedHull;

  /** Throws a RangeError when the letters of `judged` are not those of a search of this domain. */
  constructor(axes: readonly BranchAxis[], options: BranchOptions) {
    this.#axes = axes;
    this.#options = options;
    this.#width = 2 * axes.length + 1;
    this.#level = [rootBoxes(axes)];
    this.#next = new BoxBlocks(this.#width);
    this.#undecidedHull = emptyHull(axes);
    this.#violatedHull = emptyHull(axes);
    this.#replay(options.judged ?? '');
  }

  /** Boxes that can be taken before those taken are accepted. */
  get waiting(): number {
    const { budget } = this.#options;
    return Math.min(Math.max(0, budget - this.#taken), rowsOf(this.#level, this.#width));
  }

  /** The letters of the boxes judged so far, to go on from; empty when the tree is not kept. */
  get judged(): string {
    return this.#letters.join('');
  }

  /** The next boxes to judge; undefined when the budget is taken, or all of this level. The block is the taker's own. */
  take(): Block | undefined {
    return this.#takeRows(this.#options.budget - this.#taken);
  }

  /** Takes in the judgements of the block that was taken first among those not yet accepted. */
  accept(block: Block, judgements: Int8Array): void {
    const letters = this.#divide(block, judgements);
    if (this.#options.keepTree === true) this.#letters.push(letters);
    const { proved, violated } = this.#shares;
    this.#options.onBoxes?.(judgements.length, Math.max(0, 1 - proved - violated));
  }

  /** What is known now that every block taken is accepted. `proved + violated + undecided` is 1. */
  result(): BranchResult {
    if (this.#judged !== this.#taken) throw new Error('a block is taken and not accepted');
    const shares = { ...this.#shares };
    const undecidedHull = this.#undecidedHull.map(([lower, upper]): [number, number] => [lower, upper]);
    const parts = this.#next.blocks();
    const open = [...this.#level, ...parts];
    for (const block of open) {
      for (let offset = 0; offset < block.length; offset += this.#width) {
        shares.undecided += block[offset + this.#width - 1] as number;
        extend(undecidedHull, block, offset);
      }
    }
    const undecided = open.length > 0 || this.#unresolved;
    const { keepTree = false } = this.#options;
    return {
      stop: open.length > 0 ? 'budget' : undecided ? 'resolution' : 'decided',
      boxes: this.#judged,
      deepest: this.#depth + (parts.length > 0 ? 1 : 0),
      ...shares,
      // Summed shares may miss 1 by round-off.
      proved: !undecided && shares.violated === 0 ? 1 : Math.min(1, shares.proved),
      undecidedHull,
      violatedHull: this.#violatedHull,
      tree: keepTree ? this.judged + boxLetters.undecided.repeat(rowsOf(open, this.#width)) : '',
    };
  }

  #takeRows(most: number): Block | undefined {
    const block = most > 0 ? this.#level.shift() : undefined;
    if (block === undefined) return undefined;
    const rows = Math.min(most, blockRows, block.length / this.#width);
    this.#taken += rows;
    const end = rows * this.#width;
    if (end === block.length) return block;
    this.#level.unshift(block.slice(end));
    return block.slice(0, end);
  }

  /** Divides what is to be divided, and answers a letter for each box. */
  #divide(block: Block, judgements: Int8Array): string {
    const letters = new Array<number>(judgements.length);
    for (let row = 0; row < judgements.length; row++) {
      letters[row] = this.#settle(block, row * this.#width, judgements[row] as number).charCodeAt(0);
    }
    this.#judged += judgements.length;
    if (this.#level.length === 0 && this.#judged === this.#taken) {
      this.#level = this.#next.blocks();
      this.#next = new BoxBlocks(this.#width);
      if (this.#level.length > 0) this.#depth++;
    }
    return String.fromCharCode(...letters);
  }

  #settle(block: Block, offset: number, judgement: number): string {
    const share = block[offset + this.#width - 1] as number;
    if (judgement === codes.proved) {
      this.#shares.proved += share;
      return boxLetters.proved;
    }
    if (judgement === codes.violated) {
      this.#shares.violated += share;
      extend(this.#violatedHull, block, offset);
      return boxLetters.violated;
    }
    const axis = this.#depth < mostHalvings ? this.#divisible(block, offset, judgement) : -1;
    if (axis >= 0) {
      this.#next.appendHalves(block, offset, axis, this.#middle(block, offset, axis) as number);
      return String(axis);
    }
    this.#unresolved = true;
    this.#shares.undecided += share;
    extend(this.#undecidedHull, block, offset);
    return boxLetters.undecided;
  }

  /** The axis that was asked for, else the widest that the box can be divided along, else −1. */
  #divisible(block: Block, offset: number, wanted: number): number {
    const isPossible = wanted >= 0 && this.#middle(block, offset, wanted) !== undefined;
    return isPossible ? wanted : widestAxis(this.#axes, block, offset);
  }

  #middle(block: Block, offset: number, axis: number): number | undefined {
    const { scale } = this.#axes[axis] as BranchAxis;
    return middleOf(block[offset + 2 * axis] as number, block[offset + 2 * axis + 1] as number, scale);
  }

  #replay(letters: string): void {
    let read = 0;
    while (read < letters.length) {
      const block = this.#takeRows(letters.length - read);
      const own = letters.slice(read, read + (block?.length ?? 0) / this.#width);
      const judgements = Int8Array.from(own, (letter) => codeOf(letter, this.#axes.length));
      if (block === undefined || this.#divide(block, judgements) !== own)
        throw new RangeError(`letter ${read + 1} and those after it are not of this domain's boxes`);
      if (this.#options.keepTree === true) this.#letters.push(own);
      read += own.length;
    }
    if (read > 0) this.#options.onBoxes?.(read, 1 - this.#shares.proved - this.#shares.violated);
  }
}

/** A box that could not be divided is judged so again. */
function codeOf(letter: string, axes: number): number {
  if (letter === boxLetters.proved) return codes.proved;
  if (letter === boxLetters.violated) return codes.violated;
  const axis = Number.parseInt(letter, 10);
  return axis < axes ? axis : codes.divide;
}

function rowsOf(blocks: readonly Block[], width: number): number {
  return blocks.reduce((rows, block) => rows + block.length / width, 0);
}

function emptyHull(axes: readonly BranchAxis[]): [number, number][] {
  return axes.map(() => [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY]);
}

function extend(hull: [number, number][], boxes: Float64Array, offset: number): void {
  for (let axis = 0; axis < hull.length; axis++) {
    const bounds = hull[axis] as [number, number];
    bounds[0] = Math.min(bounds[0], boxes[offset + 2 * axis] as number);
    bounds[1] = Math.max(bounds[1], boxes[offset + 2 * axis + 1] as number);
  }
}
