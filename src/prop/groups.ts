/** Numbers 0, 1, … in groups that are joined as it goes (union–find with path halving). */
export class Groups {
  readonly #parent: Int32Array;
  #groups: number;

  constructor(count: number) {
    this.#groups = count;
    this.#parent = new Int32Array(count);
    for (let n = 0; n < count; n++) this.#parent[n] = n;
  }

  /** The lowest number of the group. */
  first(n: number): number {
    const parent = this.#parent;
    let at = n;
    while (parent[at] !== at) {
      parent[at] = parent[parent[at]];
      at = parent[at];
    }
    return at;
  }

  join(a: number, b: number): void {
    const parent = this.#parent;
    if (parent[a] === parent[b]) return;
    const one = this.first(a);
    const two = this.first(b);
    if (one === two) return;
    this.#groups--;
    if (one < two) parent[two] = one;
    else parent[one] = two;
  }

  /** How many groups there are. */
  get size(): number {
    return this.#groups;
  }

  /** The groups in the order of their lowest numbers, and the numbers in each, ascending. */
  members(): { firsts: number[]; which: Int32Array[] } {
    const count = this.#parent.length;
    const sizes = new Int32Array(count);
    const firsts: number[] = [];
    for (let n = 0; n < count; n++) {
      const first = this.first(n);
      if (sizes[first]++ === 0) firsts.push(first);
    }
    // Where the numbers of each group start, in one list of all.
    const all = new Int32Array(count);
    const next = new Int32Array(count);
    let start = 0;
    const which = firsts.map((first) => {
      next[first] = start;
      start += sizes[first];
      return all.subarray(next[first], start);
    });
    for (let n = 0; n < count; n++) all[next[this.first(n)]++] = n;
    return { firsts, which };
  }
}
