/** The shards of one batch put together: the files side by side, and the takes.json of the whole. */

import { access, constants, copyFile, readdir, rm } from "node:fs/promises";
import { join, resolve } from "node:path";
import type { Planned } from "../bake/plan.js";
import { RequestError } from "../math/request-error.js";
import type { PropRecord } from "../record/clip-record.js";
import type { ThrowEntry } from "../throwfile/types.js";
import { type BatchReport, batchRecord, type Told } from "./batch-record.js";
import { Interrupted } from "./interrupted.js";
import { unwritable } from "./output-folder.js";
import { isShardName, readShard, type ShardEntry, type ShardHead, type ShardLine } from "./shard-record.js";
import { spareOthers } from "./spare-others.js";
import { giveFiles, openStaging } from "./staging.js";
import { TextFile } from "./text-file.js";

export interface MergeReport extends BatchReport {
  props: Record<string, PropRecord>;
}

interface Shard {
  folder: string;
  /** Of its record. */
  path: string;
  head: ShardHead;
  lines: AsyncGenerator<ShardLine>;
}

/** A piece of the whole: what one shard has of one throw or chain. */
interface MergedPart {
  planned: Planned;
  takes: Told[];
  left: { name: string; reason: string }[];
}

/** Takes of a shard that are handed on at once. */
const PIECE = 64;

/**
 * @param folders that shards were baked into; the output may be one of them
 * @throws RequestError for shards that are missing, there twice or of another batch, and for files that a shard has lost; MachineError for a folder that cannot be
 *   written; Interrupted
 */
export async function mergeShards(
  folders: readonly string[],
  output: string,
  signal: AbortSignal,
): Promise<MergeReport> {
  const shards = await openShards(folders);
  try {
    const [{ head }] = shards;
    const others = shards.filter(({ folder }) => resolve(folder) !== resolve(output));
    await spareOthers(output, [...(await clipFilesIn(others)), "takes.json"], []);
    const staging = await openStaging(output, {}, { resume: false });
    try {
      const files = join(staging.path, "files");
      const record = await TextFile.create(join(files, "takes.json"));
      const report = await batchRecord(parts(shards, output, files, signal), {
        head: head.record,
        plan: head.entries.map(plannedOf),
        order: head.entries.map(({ name }) => name),
        reachOf: (prop) => (head.entries.find((entry) => entry.prop === prop) as ShardEntry).reach,
        file: record,
      });
      await record.close();
      await giveFiles(staging.path, output, "takes.json");
      for (const { folder, path } of shards) if (resolve(folder) === resolve(output)) await rm(path);
      await staging.finish();
      return { ...report, props: head.record.props };
    } catch (error) {
      await staging.discard().catch(() => undefined);
      throw error instanceof RequestError || error instanceof Interrupted ? error : unwritable(output, error);
    }
  } finally {
    for (const { lines } of shards) await lines.return(undefined);
  }
}

/** What the record has to know of an entry whose throw file is not at hand. */
const plannedOf = ({ name, prop, throws }: ShardEntry): Planned =>
  ({
    entry: { name, prop, ...(throws && { throws }) } as unknown as ThrowEntry,
    numbers: [],
  }) satisfies Planned;

async function openShards(folders: readonly string[]): Promise<[Shard, ...Shard[]]> {
  const found: Shard[] = [];
  for (const folder of new Map(folders.map((folder) => [resolve(folder), folder])).values()) {
    const names = (await readdir(folder).catch(() => [])).filter(isShardName).sort();
    if (names.length === 0)
      throw new RequestError([folder], "holds no shard", "name folders that bake --shard has written to");
    for (const name of names) {
      const path = join(folder, name);
      found.push({ folder, path, ...(await readShard(path)) });
    }
  }
  const [first] = found;
  const { of } = first.head.shard;
  for (const other of found) {
    const fault = difference(first.head, other.head);
    if (fault)
      throw new RequestError(
        [other.path],
        `is of another batch than ${first.path} (${fault})`,
        "merge shards of one throw file, models and version",
      );
  }
  const byIndex = found.sort((a, b) => a.head.shard.index - b.head.shard.index);
  const twice = byIndex.find(({ head }, i) => head.shard.index === byIndex[i + 1]?.head.shard.index);
  if (twice)
    throw new RequestError(
      [twice.path],
      `shard ${twice.head.shard.index} of ${of} is there twice`,
      "name each shard's folder once",
    );
  const missing = Array.from({ length: of }, (_, i) => i + 1).filter(
    (index) => !byIndex.some(({ head }) => head.shard.index === index),
  );
  if (missing.length > 0)
    throw new RequestError(
      ["merge"],
      `${missing.length === 1 ? "shard" : "shards"} ${missing.slice(0, 10).join(", ")}${missing.length > 10 ? ", …" : ""} of ${of} ${missing.length === 1 ? "is" : "are"} missing`,
      "name the folders of all shards",
    );
  return byIndex as [Shard, ...Shard[]];
}

/** What two shards do not have in common. */
function difference(a: ShardHead, b: ShardHead): string | undefined {
  if (a.shard.of !== b.shard.of) return `${a.shard.of} shards there, ${b.shard.of} here`;
  const facts = ({ record, entries }: ShardHead): Record<string, unknown> => ({
    version: record.tossbake,
    "throw file": record.throwFile,
    ...Object.fromEntries(
      Object.entries(record.props).map(([name, { source, sha256 }]) => [
        `model of ${name}`,
        [source, sha256],
      ]),
    ),
    entries,
    record,
  });
  const [one, other] = [facts(a), facts(b)];
  return Object.keys(one).find((key) => JSON.stringify(one[key]) !== JSON.stringify(other[key]));
}

/** Read ahead and thrown away: what files there will be. */
async function clipFilesIn(shards: readonly Shard[]): Promise<string[]> {
  const names: string[] = [];
  for (const { path } of shards) {
    const { lines } = await readShard(path);
    for await (const line of lines) if ("figures" in line) names.push(...filesOf(line));
  }
  return names;
}

/** Entry by entry, in each shard after shard: shares follow each other by their takes' numbers. */
async function* parts(
  shards: readonly Shard[],
  output: string,
  files: string,
  signal: AbortSignal,
): AsyncGenerator<MergedPart> {
  const next = new Map<Shard, ShardLine | undefined>();
  for (const shard of shards) next.set(shard, await lineOf(shard));
  for (const entry of shards[0].head.entries) {
    const planned = plannedOf(entry);
    for (const shard of shards) {
      let part: MergedPart = { planned, takes: [], left: [] };
      for (let line = next.get(shard); line && "of" in line && line.of === entry.name; ) {
        if (signal.aborted) throw new Interrupted();
        if ("left" in line) part.left.push(line.left);
        else {
          await bringFiles(shard, line, resolve(shard.folder) === resolve(output) ? undefined : files);
          part.takes.push(line);
        }
        if (part.takes.length === PIECE) {
          yield part;
          part = { planned, takes: [], left: [] };
        }
        line = await lineOf(shard);
        next.set(shard, line);
      }
      yield part;
    }
  }
  for (const { path } of shards.filter((shard) => next.get(shard)))
    throw new RequestError([path], "has takes of no throw, or in another order", "bake this shard again");
}

const lineOf = async ({ lines }: Shard): Promise<ShardLine | undefined> => {
  const { value, done } = await lines.next();
  return done ? undefined : value;
};

/** @param files folder to copy to; none: they are in their place */
async function bringFiles({ folder, path }: Shard, take: Told, files?: string): Promise<void> {
  for (const name of filesOf(take))
    try {
      const source = join(folder, name);
      if (files === undefined) await access(source);
      else await copyFile(source, join(files, name), constants.COPYFILE_FICLONE);
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code !== "ENOENT") throw error;
      throw new RequestError(
        [join(folder, name)],
        `is missing, and ${path} names it`,
        "bake this shard again",
      );
    }
}

/** A .gltf has its bytes in a .bin of the same name. */
const filesOf = ({ figures: { file } }: Told): string[] =>
  file.endsWith(".gltf") ? [file.replace(/\.gltf$/, ".bin"), file] : [file];
