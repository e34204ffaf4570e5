/** Tells when files have changed, however they were saved. */

import { statSync } from "node:fs";

/** ms between two looks. Looking, and not the system's own notices: those miss what is saved by renaming, and network drives have none. */
const INTERVAL = 80;

export interface Watch {
  /** From now on these. */
  setPaths(paths: readonly string[]): void;
  close(): void;
}

/**
 * Calls with the absolute paths of the files that were changed, made or removed, once all are the same in two looks one after the other, so that none
 * is read while it is half written.
 */
export function watchFiles(onChange: (paths: string[]) => void): Watch {
  let known = new Map<string, string>();
  let before = known;

  const timer = setInterval(() => {
    const now = new Map(Array.from(known.keys(), (path) => [path, stateOf(path)]));
    const changed = [...now.keys()].filter((path) => now.get(path) !== known.get(path));
    const isStill = changed.every((path) => now.get(path) === before.get(path));
    before = now;
    if (changed.length === 0 || !isStill) return;
    known = now;
    onChange(changed);
  }, INTERVAL);

  return {
    setPaths(paths) {
      known = new Map(paths.map((path) => [path, known.get(path) ?? stateOf(path)]));
      before = known;
    },
    close: () => clearInterval(timer),
  };
}

/** Another one is another content, as far as the file system tells. */
function stateOf(path: string): string {
  const status = statSync(path, { bigint: true, throwIfNoEntry: false });
  return status ? `${status.ino} ${status.size} ${status.mtimeNs}` : "none";
}
