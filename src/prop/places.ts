/**
 * Numbers places: equal to the last bit is the same place (0 and −0 are one). An open-addressed hash table over the bits:
 * a text key a vertex would cost more than all the rest of the weighing.
 */
export class Places {
  readonly #table: Int32Array;
  readonly #positions: Float64Array;
  #count = 0;

  /** @param most how many vertices there will be */
  constructor(most: number) {
    let slots = 16;
    while (slots < 1.5 * most) slots *= 2;
    this.#table = new Int32Array(slots);
    this.#positions = new Float64Array(3 * most);
  }

  /** The number of each vertex's place, places counted as they come. */
  numbers(positions: Float64Array): Uint32Array {
    const table = this.#table;
    const known = this.#positions;
    const mask = table.length - 1;
    const numbers = new Uint32Array(positions.length / 3);
    const place = new Float64Array(3);
    const bits = new Uint32Array(place.buffer);
    let count = this.#count;
    for (let v = 0; v < numbers.length; v++) {
      // -0 becomes 0.
      const x = positions[3 * v] + 0;
      const y = positions[3 * v + 1] + 0;
      const z = positions[3 * v + 2] + 0;
      place[0] = x;
      place[1] = y;
      place[2] = z;
      // The rounds of MurmurHash3's finish (A. Appleby, public domain) over a sum of the words times odd numbers.
      let hash =
        Math.imul(bits[0], 0x9e3779b1) ^
        Math.imul(bits[1], 0x85ebca77) ^
        Math.imul(bits[2], 0xc2b2ae3d) ^
        Math.imul(bits[3], 0x27d4eb2f) ^
        Math.imul(bits[4], 0x165667b1) ^
        Math.imul(bits[5], 0xcc9e2d51);
      hash = Math.imul(hash ^ (hash >>> 16), 0x85ebca6b);
      hash = Math.imul(hash ^ (hash >>> 13), 0xc2b2ae35);
      let slot = (hash ^ (hash >>> 16)) & mask;
      // 0 is an empty slot.
      let number = table[slot];
      while (number > 0) {
        const at = 3 * number - 3;
        if (known[at] === x && known[at + 1] === y && known[at + 2] === z) break;
        slot = (slot + 1) & mask;
        number = table[slot];
      }
      if (number === 0) {
        known[3 * count] = x;
        known[3 * count + 1] = y;
        known[3 * count + 2] = z;
        number = ++count;
        table[slot] = number;
      }
      numbers[v] = number - 1;
    }
    this.#count = count;
    return numbers;
  }

  /** 3 numbers a place. */
  get positions(): Float64Array {
    return this.#positions.subarray(0, 3 * this.#count);
  }
}
