/** Baked files, fetched once for the stage and the strips alike. */

import type { Source } from "./source.js";

export interface Files {
  get(name: string): Promise<ArrayBuffer>;
  /** They are other ones now. */
  forget(names: Iterable<string>): void;
}

export function fetchedOnce(source: Pick<Source, "file">): Files {
  const known = new Map<string, Promise<ArrayBuffer>>();
  return {
    get(name) {
      const found = known.get(name);
      if (found) return found;
      const fetched = source.file(name);
      known.set(name, fetched);
      fetched.catch(() => known.delete(name));
      return fetched;
    },
    forget(names) {
      for (const name of names) known.delete(name);
    },
  };
}
