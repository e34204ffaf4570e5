/** `verify --sheets`: pictures of what drifted. */

import { realpath } from "node:fs/promises";
import { basename, join, resolve } from "node:path";
import { ModelError } from "../gltf/model.js";
import { RequestError } from "../math/request-error.js";
import { readModelFile } from "../node/model-files.js";
import { writeFiles } from "../node/output-folder.js";
import type { Drift } from "../record/compare.js";
import { shapesOfFiles } from "../review/drift-shapes.js";
import { type DriftSource, driftSheets } from "../review/drift-sheets.js";
import type { Host } from "../throwfile/types.js";

export interface Compared {
  before: DriftSource;
  now: DriftSource;
  /** Whose numbers both records hold. */
  host?: Host;
}

/** Writes the pictures, and answers what to say of them. */
export async function writeDriftSheets(
  output: string,
  drifts: readonly Drift[],
  { before, now, host }: Compared,
): Promise<string> {
  const { sheets, notes } = await driftSheets(drifts, before, now, host);
  if (sheets.length > 0) await writeFiles(output, sheets);
  const count = `${sheets.length || "no"} ${sheets.length === 1 ? "picture" : "pictures"}`;
  return [`${count} of drift ${sheets.length > 0 ? `written to ${output}` : "to draw"}`, ...notes]
    .map((line) => `${line}\n`)
    .join("");
}

/**
 * Pictures are for none of the folders that are compared.
 *
 * @throws RequestError for one of them, by whatever path
 */
export async function refuseCompared(output: string, folders: readonly string[]): Promise<void> {
  const real = (path: string) => realpath(path).catch(() => resolve(path));
  for (const folder of folders)
    if ((await real(folder)) === (await real(output)))
      throw new RequestError(
        ["--sheets"],
        `${output} is a folder that is compared, and would no longer be as it was baked`,
        "name another for the pictures",
      );
}

/** What flew, by the clips of a folder. */
export const shapesOfFolder = (folder: string) =>
  shapesOfFiles(async (name) => {
    // a record that was tampered with may name a file elsewhere
    if (basename(name) !== name) return undefined;
    try {
      return (await readModelFile(join(folder, name), name)).model;
    } catch (error) {
      if (error instanceof ModelError) return undefined;
      throw error;
    }
  });

/** What two folders are called where they are shown beside each other: their own names where those differ. */
export function shortNames(before: string, now: string): [string, string] {
  const names = [before, now].map((path) => basename(resolve(path)));
  return names[0] === names[1] ? [before, now] : [names[0], names[1]];
}
