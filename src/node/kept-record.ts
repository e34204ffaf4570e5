/** The record of a folder, in which a bake of some throws leaves the others' lines standing. */

import { readFile } from "node:fs/promises";
import { join } from "node:path";
import type { TakesRecord } from "../record/clip-record.js";
import { parseRecord } from "../record/parse.js";
import type { ThrowFile } from "../throwfile/types.js";

/** The folder's record, or undefined where there is none. */
export async function readRecord(folder: string): Promise<TakesRecord | undefined> {
  const path = join(folder, "takes.json");
  try {
    return parseRecord(path, await readFile(path, "utf8"));
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === "ENOENT") return undefined;
    throw error;
  }
}

/**
 * The record to write: `fresh`, and in the throw file's order the lines of throws that it still has but that were not baked this time.
 *
 * @throws RequestError for a takes.json that is none
 */
export async function mergeRecord(folder: string, fresh: TakesRecord, file: ThrowFile): Promise<TakesRecord> {
  const baked = new Set(fresh.clips.map((clip) => clip.throw));
  const missing = [...file.throws.keys()].filter((name) => !baked.has(name));
  const old = missing.length > 0 ? await readRecord(folder) : undefined;
  if (!old) return fresh;
  const kept = old.clips.filter((clip) => missing.includes(clip.throw));
  const clips = [...file.throws.keys()].flatMap((name) =>
    [...fresh.clips, ...kept].filter((clip) => clip.throw === name),
  );
  const props = [...file.props.keys()].flatMap((name) => {
    const prop = fresh.props[name] ?? (kept.some((clip) => clip.prop === name) ? old.props[name] : undefined);
    return prop ? [[name, prop] as const] : [];
  });
  return { ...fresh, props: Object.fromEntries(props), clips };
}
