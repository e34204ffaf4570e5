/** Whole files or none: everything is written under temporary names first and only then given its own. */

import { mkdir, readdir, rename, rm, rmdir, stat, writeFile } from "node:fs/promises";
import { dirname, join } from "node:path";
import { MachineError } from "./machine-error.js";

export interface OutputFile {
  /** Name within the folder. */
  name: string;
  content: Uint8Array | string;
}

/**
 * Writes the files into the folder (made where it does not exist), in the order given, so that the last one, the record, never speaks of a
 * file that is not there yet.
 *
 * @param option by which another folder is named
 * @throws MachineError when the machine will not take them; the temporary files are then gone and the old ones as they were
 */
export async function writeFiles(folder: string, files: readonly OutputFile[], option = "-o"): Promise<void> {
  const staged = files.map((file) => ({
    ...file,
    path: join(folder, file.name),
    temporary: temporaryName(folder, file.name),
  }));
  try {
    await makeFolder(folder);
    await removeLeftovers(folder);
    for (const file of staged) {
      await refuseFolder(file.path);
      await writeFile(file.temporary, file.content, { flush: true });
    }
    for (const file of staged) await rename(file.temporary, file.path);
  } catch (error) {
    for (const file of staged) await rm(file.temporary, { force: true }).catch(() => undefined);
    throw unwritable(folder, error, option);
  }
}

/** What the machine says of a folder that it will not write to. */
export const unwritable = (folder: string, error: unknown, option = "-o"): MachineError =>
  error instanceof MachineError
    ? error
    : new MachineError(
        `${folder}: cannot be written (${reason(error)}); choose a folder that can, with ${option}`,
        ["ENOSPC", "EDQUOT"].includes(String((error as NodeJS.ErrnoException).code)),
      );

// the process number keeps two bakes into one folder out of each other's temporary files
const temporaryName = (folder: string, name: string) => join(folder, `.${name}.${process.pid}.part`);

/** Temporary files of bakes that were killed: nobody would ever rename them. */
async function removeLeftovers(folder: string): Promise<void> {
  for (const name of await readdir(folder)) {
    const id = /^\..+\.(\d+)\.part$/.exec(name)?.[1];
    if (id && !isRunning(Number(id))) await rm(join(folder, name), { force: true });
  }
}

export function isRunning(id: number): boolean {
  try {
    // signal 0 asks, and does nothing
    return process.kill(id, 0);
  } catch (error) {
    return (error as NodeJS.ErrnoException).code === "EPERM";
  }
}

/**
 * Not `mkdir`'s own recursion: it never ends where a folder takes no new ones and says that it is not there (/proc).
 *
 * @returns the folders that it made, the outermost first
 */
export async function makeFolder(path: string): Promise<string[]> {
  try {
    await mkdir(path);
    return [path];
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException;
    if (code === "ENOENT" && dirname(path) !== path) {
      const above = await makeFolder(dirname(path));
      await mkdir(path).catch(async (error) => {
        for (const folder of above.reverse()) await rmdir(folder).catch(() => undefined);
        throw error;
      });
      return [...above, path];
    }
    if (!(await isFolder(path))) throw error;
    return [];
  }
}

/** A rename would find it out only after the files before it had theirs. */
async function refuseFolder(path: string): Promise<void> {
  if (await isFolder(path)) throw Object.assign(new Error(path), { code: "EISDIR" });
}

export const isFolder = (path: string): Promise<boolean> =>
  stat(path).then(
    (status) => status.isDirectory(),
    () => false,
  );

/** Why the machine would not, in words where they are known. */
export function reason(error: unknown): string {
  const code = (error as NodeJS.ErrnoException).code;
  const words: Record<string, string> = {
    EACCES: "no permission",
    EPERM: "no permission",
    EROFS: "a read-only file system",
    ENOSPC: "the disk is full",
    EDQUOT: "the disk quota is used up",
    ENOTDIR: "a file stands where a folder should be",
    EEXIST: "a file stands where a folder should be",
    EISDIR: "a folder stands where a file should be",
  };
  return (code && words[code]) || (code ?? String(error));
}
