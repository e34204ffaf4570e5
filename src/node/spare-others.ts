/** A bake writes over what tossbake wrote, and over nothing else. */

import { createReadStream } from "node:fs";
import { lstat, open, readdir, stat } from "node:fs/promises";
import { join } from "node:path";
import { createInterface } from "node:readline";
import { RequestError } from "../math/request-error.js";
import { unwritable } from "./output-folder.js";
import { spareInputs } from "./spare-inputs.js";
import { isStagingName } from "./staging.js";

/** Bytes of a file in which it says who made it: a glTF file's `asset` stands at its start, and if not, its record names it. */
const HEAD = 1 << 16;

/**
 * @param names of the files to be written into the folder
 * @param inputs paths of what the bake is made of
 * @throws RequestError for a file that stands there and is an input, or that neither takes.json names nor tossbake has marked as its own; MachineError for a folder
 *   in a file's place
 */
export async function spareOthers(
  folder: string,
  names: readonly string[],
  inputs: Iterable<string>,
): Promise<void> {
  const entries = await readdir(folder).catch(() => []);
  // some file systems are blind to case: whether this one is, it says itself
  const there = new Set(entries.map((entry) => entry.toLowerCase()));
  const taken = names.filter((name) => there.has(name.toLowerCase()));
  await spareInputs(folder, taken, inputs);
  let recorded: Set<string> | undefined;
  for (const name of taken) {
    const status = await lstat(join(folder, name)).catch(() => undefined);
    if (!status) continue;
    if (status.isDirectory()) throw unwritable(folder, Object.assign(new Error(name), { code: "EISDIR" }));
    if ((await isMarkedBin(folder, name)) || (await isMarked(join(folder, name)))) continue;
    recorded ??= await recordedFiles(join(folder, "takes.json"));
    if (recorded.has(name) || recorded.has(name.replace(/\.bin$/, ".gltf"))) continue;
    throw new RequestError(
      [join(folder, name)],
      "stands there already and is not tossbake's: it has no mark of it and no takes.json names it",
      "move it away, or choose another folder with -o",
    );
  }
}

/** As its generator, as the program that made a record, or somewhere in a drawing. A link to nothing or to a folder, a pipe, what cannot be read: none of these is. */
async function isMarked(path: string): Promise<boolean> {
  return (await isFile(path)) && (await hasMark(path).catch(() => false));
}

/** A pipe would be waited for. */
const isFile = (path: string): Promise<boolean> =>
  stat(path).then(
    (status) => status.isFile(),
    () => false,
  );

async function hasMark(path: string): Promise<boolean> {
  const mark = /\.gl(b|tf)$/i.test(path)
    ? /"generator"\s*:\s*"tossbake"/
    : /\.json$/i.test(path)
      ? /"tossbake"\s*:/
      : /tossbake/;
  const file = await open(path);
  try {
    const { buffer, bytesRead } = await file.read(Buffer.alloc(HEAD), 0, HEAD, 0);
    return mark.test(buffer.toString("latin1", 0, bytesRead));
  } finally {
    await file.close();
  }
}

/** A .bin is its .gltf's, which may still wait for its place. */
async function isMarkedBin(folder: string, name: string): Promise<boolean> {
  if (!name.endsWith(".bin")) return false;
  const gltf = name.replace(/\.bin$/, ".gltf");
  const stagings = (await readdir(folder)).filter(isStagingName);
  const places = [folder, ...stagings.map((staging) => join(folder, staging, "files"))];
  for (const place of places) if (await isMarked(join(place, gltf))) return true;
  return false;
}

/** Read line by line: a record may be large. */
async function recordedFiles(path: string): Promise<Set<string>> {
  const names = new Set<string>();
  if (!(await isFile(path))) return names;
  try {
    for await (const line of createInterface({ input: createReadStream(path) }))
      for (const [, name] of line.matchAll(/"file": ?"([^"]+)"/g)) names.add(name);
  } catch {
    // none, or none that can be read: it names nothing
  }
  return names;
}
