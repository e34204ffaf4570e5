/** One bake at a time in a folder; a bake that died holds nothing. */

import { readFileSync } from "node:fs";
import { readdir, readFile, rm, stat, writeFile } from "node:fs/promises";
import { hostname } from "node:os";
import { join } from "node:path";
import { isRunning } from "./output-folder.js";

export interface Holder {
  host: string;
  process: number;
  /** When that process began, where the system tells: numbers of processes are used again. */
  began?: string;
}

/** What asking for a lock comes to: who has it, or how to give it back. */
export type Lock = { holder: Holder } | { release: () => Promise<void> };

/**
 * Takes the lock of a folder, unless somebody has it. The locks are numbered files, of which the last counts: whoever finds its holder dead makes the next, and
 * only one can.
 */
export async function takeLock(folder: string): Promise<Lock> {
  for (;;) {
    const last = await lastLock(folder);
    if (last > 0) {
      const holder = await readHolder(folder, last);
      if (holder && (await isAlive(folder, last, holder))) return { holder };
    }
    const path = join(folder, lockName(last + 1));
    const content = JSON.stringify(ourselves());
    try {
      await writeFile(path, content, { flag: "wx" });
      // not made again once it is gone
      const beat = setInterval(
        () => void writeFile(path, content, { flag: "r+" }).catch(() => undefined),
        BEAT,
      );
      beat.unref();
      return {
        release: async () => {
          clearInterval(beat);
          await rm(path, { force: true });
        },
      };
    } catch (error) {
      // another was faster
      if ((error as NodeJS.ErrnoException).code !== "EEXIST") throw error;
    }
  }
}

/** Who bakes into a folder, if anybody still does. */
export async function holderOf(folder: string): Promise<Holder | undefined> {
  const last = await lastLock(folder);
  const holder = last > 0 ? await readHolder(folder, last) : undefined;
  return holder && (await isAlive(folder, last, holder)) ? holder : undefined;
}

const lockName = (number: number) => `lock-${number}`;

async function lastLock(folder: string): Promise<number> {
  const numbers = (await readdir(folder)).flatMap((name) => /^lock-(\d+)$/.exec(name)?.[1] ?? []);
  return numbers.reduce((last, number) => Math.max(last, Number(number)), 0);
}

/** ms between two touches of a lock, and after which an untouched one counts for nothing. */
const BEAT = 5_000;
const SILENT = 60_000;
/** How often, and after how many ms, a lock is read that has just been made and is still empty. */
const READINGS = 20;
const PAUSE = 25;

async function readHolder(folder: string, number: number): Promise<Holder | undefined> {
  for (let reading = 0; reading < READINGS; reading++) {
    try {
      return JSON.parse(await readFile(join(folder, lockName(number)), "utf8"));
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code === "ENOENT") return undefined;
      await new Promise((done) => setTimeout(done, PAUSE));
    }
  }
  // whoever made it died before a word
  return undefined;
}

const ourselves = (): Holder => ({ host: hostname(), process: process.pid, began: beginningOf(process.pid) });

/** A process of another machine cannot be asked: it is dead when it has not touched its lock for long, by the clock of the file system. */
async function isAlive(
  folder: string,
  number: number,
  { host, process: id, began }: Holder,
): Promise<boolean> {
  if (host !== hostname()) {
    const probe = join(folder, `now-${process.pid}`);
    await writeFile(probe, "");
    const [now, touched] = [await stat(probe), await stat(join(folder, lockName(number)))];
    await rm(probe, { force: true });
    return now.mtimeMs - touched.mtimeMs < SILENT;
  }
  if (!isRunning(id)) return false;
  const now = beginningOf(id);
  return began === undefined || now === undefined || began === now;
}

/** The 22nd field of Linux's account of a process, counted behind its name in brackets (proc(5)). */
function beginningOf(id: number): string | undefined {
  try {
    const account = readFileSync(`/proc/${id}/stat`, "latin1");
    return account.slice(account.lastIndexOf(")") + 2).split(" ")[19];
  } catch {
    return undefined;
  }
}
