/** Files where there were none: nothing that exists is written over, and what cannot be whole is taken back. */

import { lstat, mkdir, rm, rmdir, writeFile } from "node:fs/promises";
import { dirname, join } from "node:path";
import { RequestError } from "../math/request-error.js";
import { MachineError } from "./machine-error.js";
import type { OutputFile } from "./output-folder.js";

/**
 * Writes the files into the folder, which is made where it does not exist.
 *
 * @throws RequestError where the folder has one of them already, or is none; MachineError when the machine will not take them. Nothing is left behind
 */
export async function writeFreshFiles(folder: string, files: readonly OutputFile[]): Promise<void> {
  for (const { name } of files) await refuseExisting(join(folder, name));
  const made: (() => Promise<void>)[] = [];
  try {
    await makeFolder(folder, made);
    for (const { name, content } of files) {
      const path = join(folder, name);
      // "wx" fails where there is a file after all
      await writeFile(path, content, { flag: "wx", flush: true }).catch(async (error) => {
        if (error.code !== "EEXIST") await rm(path, { force: true });
        throw error;
      });
      made.push(() => rm(path, { force: true }));
    }
  } catch (error) {
    for (const undo of made.reverse()) await undo().catch(() => undefined);
    const code = (error as NodeJS.ErrnoException).code ?? String(error);
    throw new MachineError(`${folder}: cannot be written (${WORDS[code] ?? code}); name another folder`);
  }
}

const WORDS: Record<string, string> = {
  EACCES: "no permission",
  EPERM: "no permission",
  EROFS: "a read-only file system",
  ENOSPC: "the disk is full",
  EDQUOT: "the disk quota is used up",
  ENOTDIR: "a file stands where a folder should be",
  EEXIST: "a file stands where a folder should be",
};

async function refuseExisting(path: string): Promise<void> {
  const isThere = await lstat(path).then(
    () => true,
    () => false,
  );
  if (isThere)
    throw new RequestError([path], "exists already, and nothing is written over", "name another folder");
}

/** Notes how to take back each folder that was made. */
async function makeFolder(path: string, made: (() => Promise<void>)[]): Promise<void> {
  try {
    await mkdir(path);
    made.push(() => rmdir(path));
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException;
    if (code === "ENOENT" && dirname(path) !== path) {
      await makeFolder(dirname(path), made);
      await mkdir(path);
      made.push(() => rmdir(path));
    } else if (!(await lstatFolder(path))) throw error;
  }
}

const lstatFolder = (path: string): Promise<boolean> =>
  lstat(join(path, ".")).then(
    (status) => status.isDirectory(),
    () => false,
  );
