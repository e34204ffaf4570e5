/** A folder that was baked into, read to be compared; nothing is written. */

import { readdir, readFile } from "node:fs/promises";
import { basename, join } from "node:path";
import { RequestError } from "../math/request-error.js";
import type { TakesRecord } from "../record/clip-record.js";
import type { BakedFolder, FolderFile } from "../record/compare.js";
import { binOf } from "../record/compare-files.js";
import { readRecord } from "./kept-record.js";
import { isStagingName } from "./staging.js";

/** @throws RequestError where there is no takes.json, or none that can be read */
export async function readBakedFolder(folder: string): Promise<BakedFolder> {
  const baked = await readRecord(folder);
  if (baked) return baked;
  throw new RequestError([folder], "has no takes.json", "name a folder that tossbake has baked into");
}

/** The content a bake has for a file; undefined where it has none. */
export type Contents = (name: string) => Promise<Uint8Array | undefined>;

export const contentsOf =
  (folder: string): Contents =>
  async (name) => {
    try {
      // a record that was tampered with may name a file elsewhere
      return basename(name) === name ? await readFile(join(folder, name)) : undefined;
    } catch (error) {
      const code = (error as NodeJS.ErrnoException).code;
      if (code === "ENOENT") return undefined;
      throw new RequestError([join(folder, name)], `cannot be read (${code})`, "check its permissions");
    }
  };

/** Files that both bakes have, in the first record's order. */
export async function compareFiles(
  records: readonly [TakesRecord, TakesRecord],
  before: Contents,
  now: Contents,
): Promise<FolderFile[]> {
  const [first, second] = records.map(filesOf);
  const files: FolderFile[] = [];
  for (const name of first) {
    const [old, fresh] = second.has(name) ? [await before(name), await now(name)] : [];
    if (old && fresh) files.push({ name, state: Buffer.compare(old, fresh) === 0 ? "same" : "different" });
  }
  return files;
}

/**
 * What a folder lacks of the files of a record, and the .glb and .gltf files it holds beside those.
 *
 * @param known names of files that are others', such as the models thrown
 */
export async function checkFolder(
  folder: string,
  expected: TakesRecord,
  known: ReadonlySet<string>,
): Promise<FolderFile[]> {
  const entries = await readdir(folder, { withFileTypes: true });
  const present = new Set(
    entries
      .filter((entry) => entry.isFile() || entry.isSymbolicLink())
      .map((entry) => entry.name)
      .sort(),
  );
  const wanted = filesOf(expected);
  return [
    ...[...wanted].filter((name) => !present.has(name)).map((name) => ({ name, state: "missing" as const })),
    ...[...present]
      .filter((name) => /\.gl(b|tf)$/.test(name) && !wanted.has(name) && !known.has(name))
      .map((name) => ({ name, state: "stray" as const })),
  ];
}

const filesOf = (record: TakesRecord): Set<string> =>
  new Set(record.clips.flatMap(({ file }) => [file, binOf(file) ?? []].flat()));

/** A sheet as it is drawn now. */
export interface FreshSheet {
  name: string;
  content: string;
  /** Throws and chains that it shows. */
  shows: readonly string[];
}

/** Names of sheets that lie in the folder: of throws or chains, and of all takes. */
export async function sheetsIn(folder: string, names: Iterable<string>): Promise<Set<string>> {
  const present = new Set(await readdir(folder));
  return new Set([...names].filter((name) => present.has(name)));
}

/** What the sheets in a folder are against those drawn now; those that are not there are passed over. */
export async function compareSheets(folder: string, fresh: readonly FreshSheet[]): Promise<FolderFile[]> {
  const read = contentsOf(folder);
  const files: FolderFile[] = [];
  for (const { name, content, shows } of fresh) {
    const old = await read(name);
    if (old) files.push({ name, shows, state: Buffer.from(content).equals(old) ? "same" : "different" });
  }
  return files;
}

/** Whether a bake into the folder is under way or was stopped, so that record and files may be of two bakes. */
export const isBeingBaked = async (folder: string): Promise<boolean> =>
  (await readdir(folder)).some(isStagingName);
