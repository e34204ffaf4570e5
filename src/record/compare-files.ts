/** What drifted in files, besides what their records say. */

import type { TakesRecord } from "./clip-record.js";
import type { Drift, FolderFile } from "./compare.js";

/** What the records do not explain. */
export function fileDrift(
  { name, state, shows }: FolderFile,
  before: TakesRecord,
  now: TakesRecord,
  told: readonly Drift[],
): Drift[] {
  const row = (what: Drift["what"], text: string): Drift[] => [{ kind: "file", name, what, text }];
  if (shows) return sheetDrift(name, state, isTold(shows, told), row);
  const clipsIn = (record: TakesRecord) =>
    record.clips.filter(({ file }) => file === name || binOf(file) === name);
  const [olds, news] = [clipsIn(before), clipsIn(now)];
  if (state === "stray")
    return row(
      "stray",
      olds.length > 0
        ? `${name} is left over from a throw that is gone`
        : `${name} is a stray: no throw that is known writes it`,
    );
  // the file of a throw that is new cannot be there yet
  if (state === "missing")
    return news.length > 0 && olds.length === 0 ? [] : row("missing", `${name} is missing`);
  if (state === "same") return [];
  const isExplained = told.some(
    (drift) =>
      [...olds, ...news].some((clip) => drift.name === clip.name || drift.name === clip.throw) ||
      (drift.kind === "prop" && news.some((clip) => clip.prop === drift.name)),
  );
  return isExplained
    ? []
    : row("edited", `${name} was changed after it was baked: the record is the same, the file is not`);
}

/** A sheet that is not there is missed by nobody. */
function sheetDrift(
  name: string,
  state: FolderFile["state"],
  isExplained: boolean,
  row: (what: Drift["what"], text: string) => Drift[],
): Drift[] {
  if (state === "stray") return row("stray", `${name} is left over from a throw that is gone`);
  return state === "different" && !isExplained
    ? row("changed", `${name} is not as it is drawn now: bake again`)
    : [];
}

/** Whether what drifted is a throw or chain of these, or a prop, which may be theirs. */
const isTold = (throws: readonly string[], told: readonly Drift[]): boolean =>
  told.some(({ kind, name, throw: own = name }) => kind === "prop" || throws.includes(own));

/** A .gltf has its bytes in a .bin of the same name. */
export const binOf = (file: string): string | undefined =>
  file.endsWith(".gltf") ? file.replace(/\.gltf$/, ".bin") : undefined;
