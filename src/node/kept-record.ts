/** The record of a folder, in which a bake of some throws or takes leaves the others' lines standing. */

import { readFile } from "node:fs/promises";
import { join } from "node:path";
import type { Planned } from "../bake/plan.js";
import { RequestError } from "../math/request-error.js";
import type { ClipRecord, PropRecord, TakesRecord } from "../record/clip-record.js";
import { clipText } from "../record/format.js";
import { parseRecord } from "../record/parse.js";
import { type ThrowFile, takeNumbers } from "../throwfile/types.js";

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

/** Lines that stay. */
export interface Kept {
  /** The record's props, in the throw file's order: fresh ones, and those of the lines kept. */
  props(fresh: Record<string, PropRecord>): Record<string, PropRecord>;
  /** Lines of a throw or chain that come before a take, each once; without a take all that are left. */
  before(name: string, take?: number): ClipRecord[];
  /** What a take that moves as it did had nearest, for it is among fewer now. */
  nearestOf(name: string, text: string): ClipRecord["nearest"] | undefined;
}

/**
 * Lines of throws and chains that the throw file still has but that are not baked this time, and of takes of those that are baked.
 *
 * @throws RequestError for a takes.json that is none
 */
export async function keptLines(
  folder: string,
  file: ThrowFile,
  plan: readonly Planned[],
): Promise<Kept | undefined> {
  const old = (await readRecord(folder))?.record;
  if (!old) return undefined;
  const baked = new Map(plan.map(({ entry, numbers }) => [entry.name, new Set(numbers)]));
  const takesOf = (name: string) => file.throws.get(file.chains.get(name)?.throws[0] ?? name)?.takes ?? [];
  const wanted = new Map(Array.from(baked.keys(), (name) => [name, new Set(takeNumbers(takesOf(name)))]));
  const isKept = ({ throw: name, take }: ClipRecord): boolean => {
    if (!file.throws.has(name) && !file.chains.has(name)) return false;
    const numbers = baked.get(name);
    return !numbers || (!numbers.has(take) && (wanted.get(name) as Set<number>).has(take));
  };
  const kept = old.clips.filter(isKept);
  const queues = new Map<string, ClipRecord[]>();
  for (const clip of kept) {
    const queue = queues.get(clip.throw) ?? [];
    queue.push(clip);
    queues.set(clip.throw, queue);
  }
  const former = new Map(
    old.clips.flatMap((clip) => (baked.get(clip.throw)?.has(clip.take) ? [[clip.name, clip] as const] : [])),
  );
  return {
    props(fresh) {
      // a throw kept may have been thrown with a prop that the throw file no longer has
      const names = new Set([...file.props.keys(), ...kept.map((clip) => clip.prop)]);
      const props = [...names].flatMap((name) => {
        // own members only: a prop may be called "constructor"
        if (Object.hasOwn(fresh, name)) return [[name, fresh[name]] as const];
        return kept.some((clip) => clip.prop === name) ? [[name, old.props[name]] as const] : [];
      });
      return Object.fromEntries(props);
    },
    before(name, take = Number.POSITIVE_INFINITY) {
      const queue = queues.get(name) ?? [];
      const count = queue.findIndex((clip) => clip.take > take);
      return queue.splice(0, count < 0 ? queue.length : count);
    },
    nearestOf(name, text) {
      const clip = former.get(name);
      if (!clip) return undefined;
      const { nearest, ...line } = clip;
      return clipText(line) === text ? nearest : undefined;
    },
  };
}
