/**
 * Numbers places: equal to the last bit is the same place (0 and −0 are one). An open-addressed hash table over the bits,
 * for a text key a vertex costs more than all the rest of the weighing.
 */
export class Places {
  readonly #table: Int32Array;
  readonly #positions: Float64Array;
  readonly #scratch = new Float64Array(3);
  readonly #bits = new Uint32Array(this.#scratch.buffer);
  #count = 0;

  /** @param most how many places there may be */
  constructor(most: number) {
    let slots = 16;
    while (slots < 2 * most) slots *= 2;
    this.#table = new Int32Array(slots).fill(-1);
    this.#positions = new Float64Array(3 * most);
  }

  /** Number of the place of vertex `index`, places counted as they come. */
  number(positions: Float64Array, index: number): number {
    const p = this.#positions;
    const s = this.#scratch;
    s[0] = positions[3 * index] + 0;
    s[1] = positions[3 * index + 1] + 0;
    s[2] = positions[3 * index + 2] + 0;
    const mask = this.#table.length - 1;
    let slot = this.#hash() & mask;
    for (let known = this.#table[slot]; known >= 0; known = this.#table[slot]) {
      if (p[3 * known] === s[0] && p[3 * known + 1] === s[1] && p[3 * known + 2] === s[2]) return known;
      slot = (slot + 1) & mask;
    }
    this.#table[slot] = this.#count;
    p.set(s, 3 * this.#count);
    return this.#count++;
  }

  /** 3 numbers a place. */
  get positions(): Float64Array {
    return this.#positions.slice(0, 3 * this.#count);
  }

  /** Multiply and rotate as MurmurHash3 (A. Appleby, public domain) does. */
  #hash(): number {
    let hash = 0;
    for (let i = 0; i < 6; i++) {
      let word = Math.imul(this.#bits[i], 0xcc9e2d51);
      word = (word << 15) | (word >>> 17);
      hash ^= Math.imul(word, 0x1b873593);
      hash = (hash << 13) | (hash >>> 19);
      hash = (Math.imul(hash, 5) + 0xe6546b64) | 0;
    }
    hash = Math.imul(hash ^ (hash >>> 16), 0x85ebca6b);
    hash = Math.imul(hash ^ (hash >>> 13), 0xc2b2ae35);
    return (hash ^ (hash >>> 16)) >>> 0;
  }
}
