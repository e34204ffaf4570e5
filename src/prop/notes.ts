/** Warnings gathered while a model is weighed: one of each kind, which names where and counts how often. */
export class Notes {
  readonly #kinds = new Map<(count: number) => string, Map<string, number>>();

  /** @param say the warning for so many findings; the same function is the same kind */
  add(where: string, say: (count: number) => string, count = 1): void {
    const places = this.#kinds.get(say) ?? new Map<string, number>();
    this.#kinds.set(say, places.set(where, (places.get(where) ?? 0) + count));
  }

  list(): string[] {
    return Array.from(this.#kinds, ([say, places]) => {
      const named = [...places.keys()].slice(0, MOST_NAMED).join("; ");
      const more = places.size > MOST_NAMED ? `; and ${places.size - MOST_NAMED} more` : "";
      return `${named}${more}: ${say([...places.values()].reduce((sum, count) => sum + count, 0))}`;
    });
  }
}

const MOST_NAMED = 5;
