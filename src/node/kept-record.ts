/** The record of a folder, in which a bake of some throws leaves the others' lines standing. */

import { readFile } from "node:fs/promises";
import { join } from "node:path";
import { RequestError } from "../math/request-error.js";
import type { TakesRecord } from "../record/clip-record.js";
import { parseRecord } from "../record/parse.js";
import type { ThrowFile } from "../throwfile/types.js";

/**
 * The folder's record and its text, or undefined where there is none.
 *
 * @throws RequestError for a takes.json that is none or cannot be read
 */
export async function readRecord(folder: string): Promise<{ record: TakesRecord; text: string } | undefined> {
  const path = join(folder, "takes.json");
  try {
    const text = await readFile(path, "utf8");
    return { text, record: parseRecord(path, text) };
  } catch (error) {
    if (error instanceof RequestError) throw error;
    const code = (error as NodeJS.ErrnoException).code;
    if (code === "ENOENT" || code === "ENOTDIR") return undefined;
    throw new RequestError(
      [path],
      `cannot be read (${code})`,
      "check that it is a file, and its permissions",
    );
  }
}

/**
 * The record to write: `fresh`, and in the throw file's order the lines of throws and chains that it still has but that were not baked this time.
 *
 * @throws RequestError for a takes.json that is none
 */
export async function mergeRecord(folder: string, fresh: TakesRecord, file: ThrowFile): Promise<TakesRecord> {
  const baked = new Set(fresh.clips.map((clip) => clip.throw));
  const all = [...file.throws.keys(), ...file.chains.keys()];
  const missing = all.filter((name) => !baked.has(name));
  const old = missing.length > 0 ? (await readRecord(folder))?.record : undefined;
  if (!old) return fresh;
  const kept = old.clips.filter((clip) => missing.includes(clip.throw));
  const clips = all.flatMap((name) => [...fresh.clips, ...kept].filter((clip) => clip.throw === name));
  // a throw kept may have been thrown with a prop that the throw file no longer has
  const names = new Set([...file.props.keys(), ...kept.map((clip) => clip.prop)]);
  const props = [...names].flatMap((name) => {
    // own members only: a prop may be called "constructor"
    if (Object.hasOwn(fresh.props, name)) return [[name, fresh.props[name]] as const];
    return kept.some((clip) => clip.prop === name) ? [[name, old.props[name]] as const] : [];
  });
  return { ...fresh, props: Object.fromEntries(props), clips };
}
