/** Files where there were none: nothing that exists is written over, and what cannot be whole is taken back. */

import { lstat, rm, rmdir, writeFile } from "node:fs/promises";
import { join } from "node:path";
import { RequestError } from "../math/request-error.js";
import { MachineError } from "./machine-error.js";
import { makeFolder, type OutputFile, reason } from "./output-folder.js";

/**
 * Writes the files into the folder, which is made where it does not exist.
 *
 * @throws RequestError where the folder has one of them already, or is none; MachineError when the machine will not take them. Nothing is left behind
 */
export async function writeFreshFiles(folder: string, files: readonly OutputFile[]): Promise<void> {
  for (const { name } of files) await refuseExisting(join(folder, name));
  const made: (() => Promise<void>)[] = [];
  try {
    for (const path of await makeFolder(folder)) made.push(() => rmdir(path));
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
    throw new MachineError(`${folder}: cannot be written (${reason(error)}); name another folder`);
  }
}

async function refuseExisting(path: string): Promise<void> {
  const isThere = await lstat(path).then(
    () => true,
    () => false,
  );
  if (isThere)
    throw new RequestError([path], "exists already, and nothing is written over", "name another folder");
}
