/** A folder within the output folder in which a batch is made whole before any of it gets its place; what a stopped run left there, another goes on from. */

import { lstat, readdir, readFile, rename, rm, rmdir, writeFile } from "node:fs/promises";
import { join } from "node:path";
import { deserialize, serialize } from "node:v8";
import type { Shard } from "../bake/plan.js";
import { RequestError } from "../math/request-error.js";
import type { PlainTake } from "../record/plain-take.js";
import { holderOf, takeLock } from "./folder-lock.js";
import { MachineError } from "./machine-error.js";
import { isFolder, isRunning, makeFolder, unwritable } from "./output-folder.js";

const NAME = ".tossbake-part";

/** What a run must have in common with the one it goes on from, told by name. */
export type BatchHeader = Record<string, string>;

/** A few takes of one throw or chain. */
export interface Part {
  takes: PlainTake[];
  /** Takes left out, and why. */
  left: { name: string; reason: string }[];
}

export interface Staging {
  /** Of the folder. */
  path: string;
  /** Whether there was anything to go on from. */
  isResumed: boolean;
  /** Whether a stopped run's work was thrown away. */
  isStale: boolean;
  /** Whether all files were whole and some may have their places already. */
  wasReady: boolean;
  /** Leaves all that is there for another run to go on from. */
  leave(): Promise<void>;
  /** Takes everything away, the output folder too where it was made for this. */
  discard(): Promise<void>;
  /** Takes everything away but the output folder. */
  finish(): Promise<void>;
}

export const stagingName = (shard?: Shard): string =>
  shard ? `${NAME}-${shard.index}-of-${shard.of}` : NAME;

export const isStagingName = (name: string): boolean => name.startsWith(NAME);

/**
 * Opens the staging folder of a batch and holds it against others.
 *
 * @throws MachineError where another bake is at work there, or nothing can be written; RequestError where a stopped run was of another batch
 */
export async function openStaging(
  output: string,
  header: BatchHeader,
  { shard, resume }: { shard?: Shard; resume: boolean },
): Promise<Staging> {
  const path = join(output, stagingName(shard));
  const made = await makeFolder(output).catch((error) => {
    throw unwritable(output, error);
  });
  const unmake = async () => {
    for (const folder of made.reverse()) await rmdir(folder).catch(() => undefined);
  };
  let release = async () => {};
  try {
    for (const name of ["", "parts", "files", "half"]) await refuseLink(join(path, name));
    await refuseOthers(output, path, shard);
    release = await lock(output, path);
    const former = await readHeader(path);
    const isResumed = resume && former !== undefined;
    if (isResumed) compareHeaders(output, former, header);
    else await clear(path);
    for (const name of ["parts", "files", "half"]) await makeFolder(join(path, name));
    if (!isResumed) await writeWhole(path, "batch.json", JSON.stringify(header, null, 2));
    return {
      path,
      isResumed,
      isStale: !resume && former !== undefined,
      wasReady: isResumed && (await exists(join(path, "ready"))),
      leave: release,
      discard: async () => {
        await remove(path);
        await release();
        await unmake();
      },
      finish: async () => {
        await remove(path);
        await release();
      },
    };
  } catch (error) {
    await release();
    await unmake();
    throw error instanceof RequestError ? error : unwritable(output, error);
  }
}

/** What is behind a link is somebody else's: it would be cleared. */
async function refuseLink(path: string): Promise<void> {
  const status = await lstat(path).catch(() => undefined);
  if (!status || status.isDirectory()) return;
  throw new RequestError(
    [path],
    "is a link or a file, where a bake keeps a folder of its own",
    "take it away",
  );
}

/** A file within the staging folder, whole or not there. */
export async function writeWhole(staging: string, name: string, content: Uint8Array | string): Promise<void> {
  const half = join(staging, "half", `${name.replaceAll("/", "-")}.${process.pid}`);
  await writeFile(half, content, { flush: true });
  await rename(half, join(staging, name));
}

const partName = (index: number): string => `parts/${index}`;

export const writePart = (staging: string, index: number, part: Part): Promise<void> =>
  writeWhole(staging, partName(index), serialize(part));

export const readPart = async (staging: string, index: number): Promise<Part> =>
  deserialize(await readFile(join(staging, partName(index))));

/** Indices of the parts that are there. */
export const partsIn = async (staging: string): Promise<Set<number>> =>
  new Set((await readdir(join(staging, "parts"))).map(Number));

/** Gives all files their places, `last` after all others; what has its place already is not there any more. */
export async function giveFiles(
  staging: string,
  output: string,
  last: string,
  signal?: AbortSignal,
): Promise<void> {
  await writeWhole(staging, "ready", "");
  const names = (await readdir(join(staging, "files"))).sort();
  const ordered = [...names.filter((name) => name !== last), ...names.filter((name) => name === last)];
  for (const name of ordered) {
    signal?.throwIfAborted();
    await rename(join(staging, "files", name), join(output, name));
  }
}

async function readHeader(staging: string): Promise<BatchHeader | undefined> {
  try {
    return JSON.parse(await readFile(join(staging, "batch.json"), "utf8"));
  } catch {
    return undefined;
  }
}

function compareHeaders(output: string, former: BatchHeader, header: BatchHeader): void {
  const keys = [...new Set([...Object.keys(former), ...Object.keys(header)])];
  const other = keys.filter((key) => former[key] !== header[key]);
  if (other.length === 0) return;
  const [key] = other;
  throw new RequestError(
    ["--resume"],
    `what was stopped in ${output} was another bake (${key}: ${former[key] ?? "none"} then, ${header[key] ?? "none"} now)`,
    "go back to what it was made of, or leave --resume out to start anew",
  );
}

async function refuseOthers(output: string, own: string, shard?: Shard): Promise<void> {
  for (const name of await readdir(output)) {
    const path = join(output, name);
    if (!isStagingName(name)) continue;
    const remover = /\.(\d+)$/.exec(name)?.[1];
    if (remover && !isRunning(Number(remover))) await rm(path, { recursive: true, force: true });
    if (remover || path === own || !(await isFolder(path))) continue;
    // shards of one batch share a folder, and no file in it
    if (shard && name.endsWith(`-of-${shard.of}`)) continue;
    const holder = await holderOf(path).catch(() => undefined);
    if (holder) throw busy(output, path, holder);
  }
}

async function lock(output: string, path: string): Promise<() => Promise<void>> {
  for (;;) {
    await makeFolder(path);
    try {
      const taken = await takeLock(path);
      if ("release" in taken) return taken.release;
      throw busy(output, path, taken.holder);
    } catch (error) {
      // another has just finished, and taken the folder away
      if ((error as NodeJS.ErrnoException).code !== "ENOENT") throw error;
    }
  }
}

const busy = (output: string, path: string, { host, process: id }: { host: string; process: number }) =>
  new MachineError(
    `${output}: another bake is at work in it (process ${id} on ${host}); wait for it, choose another folder with -o, or, if it no longer runs, remove ${path}`,
  );

/** All but the locks; first what says that there is something to go on from. */
async function clear(path: string): Promise<void> {
  await rm(join(path, "batch.json"), { force: true });
  for (const name of await readdir(path))
    if (!name.startsWith("lock-")) await rm(join(path, name), { recursive: true, force: true });
}

/** First out of the way: nobody finds it half gone, or makes a lock in it meanwhile. */
async function remove(path: string): Promise<void> {
  const aside = `${path}.${process.pid}`;
  await rename(path, aside);
  await rm(aside, { recursive: true, force: true });
}

const exists = (path: string): Promise<boolean> =>
  readFile(path).then(
    () => true,
    () => false,
  );
