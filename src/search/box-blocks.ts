/** Rows of boxes one after the other: lower and upper bound along each axis, then the share of the domain. */
export type Block = Float64Array<ArrayBuffer>;

/** Rows of a block; even, so that the two halves of a box stay side by side. */
export const blockRows = 512;

/** A growing list of boxes in blocks, each in a buffer of its own that can be given to another thread. */
export class BoxBlocks {
  readonly #width: number;
  readonly #full: Block[] = [];
  #last: Block | undefined;
  #used = 0;

  constructor(width: number) {
    this.#width = width;
  }

  /** Appends the parts of the box at `offset` that meet at `middle` of the axis, with half of its share each. */
  appendHalves(from: Block, offset: number, axis: number, middle: number): void {
    const low = this.#append(from, offset);
    low.block[low.row + 2 * axis + 1] = middle;
    const high = this.#append(from, offset);
    high.block[high.row + 2 * axis] = middle;
  }

  /** All blocks, the last one cut to its rows. Nothing may be appended after. */
  blocks(): Block[] {
    return this.#last === undefined ? this.#full : [...this.#full, this.#last.slice(0, this.#used)];
  }

  #append(from: Block, offset: number): { readonly block: Block; readonly row: number } {
    const width = this.#width;
    if (this.#last === undefined || this.#used === this.#last.length) {
      if (this.#last !== undefined) this.#full.push(this.#last);
      this.#last = new Float64Array(blockRows * width);
      this.#used = 0;
    }
    const block = this.#last;
    const row = this.#used;
    for (let index = 0; index < width; index++) block[row + index] = from[offset + index] as number;
    block[row + width - 1] = (from[offset + width - 1] as number) / 2;
    this.#used += width;
    return { block, row };
  }
}
