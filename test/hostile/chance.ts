/** Chance that falls the same way on every machine: a case that fails is found again by its number. */

export class Chance {
  #state: number;

  constructor(...seeds: number[]) {
    this.#state = seeds.reduce((state, seed) => Math.imul(state ^ seed, 0x9e3779b1) + 0x7f4a7c15, 1);
    for (let i = 0; i < 8; i++) this.#next();
  }

  /** Marsaglia's xorshift with shifts 13, 17, 5 (Journal of Statistical Software 8 (14), 2003), scrambled by a product. */
  #next(): number {
    let x = this.#state | 0 || 1;
    x ^= x << 13;
    x ^= x >>> 17;
    x ^= x << 5;
    this.#state = x;
    return Math.imul(x, 0x2545f491) >>> 0;
  }

  /** At least 0, below 1. */
  part = (): number => this.#next() / 2 ** 32;

  /** A whole number from 0 to below `count`; 0 where there is none. */
  below = (count: number): number => Math.floor(this.part() * Math.max(1, count));

  pick = <T>(list: readonly T[]): T => list[this.below(list.length)];

  /** Small numbers most often, to `most`. */
  few = (most: number): number => 1 + Math.floor(most * this.part() ** 3);
}
