/** Numbers of a block. */
const BLOCK = 1 << 16;

/** Rows of numbers, of any length each, kept in few large blocks: an array of its own costs more than a short row. */
export class PackedRows {
  #blocks: Float64Array[] = [];
  #used = 0;
  /** Block, start and length of each row. */
  readonly #places: number[] = [];

  push(row: Float64Array): void {
    if (this.#blocks.length === 0 || this.#used + row.length > BLOCK) {
      this.#blocks.push(new Float64Array(Math.max(BLOCK, row.length)));
      this.#used = 0;
    }
    const block = this.#blocks.length - 1;
    this.#blocks[block].set(row, this.#used);
    this.#places.push(block, this.#used, row.length);
    this.#used += row.length;
  }

  /** The block that a row is in, and where it starts there: for inner loops. */
  block(index: number): Float64Array {
    return this.#blocks[this.#places[3 * index]];
  }
  start(index: number): number {
    return this.#places[3 * index + 1];
  }

  /** A view of it. */
  row(index: number): Float64Array {
    const start = this.start(index);
    return this.block(index).subarray(start, start + this.#places[3 * index + 2]);
  }
}
