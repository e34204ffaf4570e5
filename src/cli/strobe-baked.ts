/** `strobe` of what is baked already, or comes from another program. */

import { stat } from "node:fs/promises";
import { basename, extname, join } from "node:path";
import { RequestError } from "../math/request-error.js";
import { readBakedFolder } from "../node/baked-folder.js";
import { readModelFile } from "../node/model-files.js";
import type { ClipRecord, TakesRecord } from "../record/clip-record.js";
import { fallsOtherwise } from "../record/compare-host.js";
import { type ClipFile, clipSheets } from "../review/clip-sheets.js";
import { motionOfRecord } from "../review/page-of-record.js";
import { ExitCode } from "./exit-code.js";
import { writeSheets } from "./write-sheets.js";

/** Whether a path names a glTF file or a folder, and no throw file. */
export async function isBaked(path: string): Promise<boolean> {
  if ([".glb", ".gltf"].includes(extname(path).toLowerCase())) return true;
  return stat(path).then(
    (status) => status.isDirectory(),
    () => false,
  );
}

/** Writes a sheet for each clip of a glTF file, or of all files of a folder that was baked into; answers the exit code. */
export async function strobeBaked(path: string, output: string): Promise<number> {
  const inputs: string[] = [];
  const read = async (file: string) => {
    const { model, paths } = await readModelFile(file, file);
    inputs.push(...paths);
    return model;
  };
  const files = (await stat(path).catch(() => undefined))?.isDirectory()
    ? await filesOfFolder(path, read)
    : [{ model: await read(path) }];
  const title = basename(path, extname(path));
  const { sheets, notes } = await clipSheets(title, files);
  for (const note of notes) process.stderr.write(`${note}\n`);
  if (sheets.length === 0) {
    if (notes.length === 0)
      throw new RequestError([path], "has no animation", "name a file whose clips move one rigid piece");
    return ExitCode.checkFailed;
  }
  await writeSheets(output, sheets, inputs);
  return ExitCode.done;
}

/** In the record's order. */
async function filesOfFolder(
  folder: string,
  read: (file: string) => Promise<ClipFile["model"]>,
): Promise<ClipFile[]> {
  const { record } = await readBakedFolder(folder);
  const names = [...new Set(record.clips.map(({ file }) => file))];
  const files: ClipFile[] = [];
  for (const name of names) {
    // a record that was tampered with may name a file elsewhere
    if (basename(name) !== name)
      throw new RequestError(
        [join(folder, "takes.json")],
        `names the file "${name}"`,
        "a name within its folder",
      );
    files.push({ model: await read(join(folder, name)), ...known(record, name) });
  }
  return files;
}

function known({ props, clips }: TakesRecord, file: string): Pick<ClipFile, "known"> {
  // no picture could be drawn from the numbers of a host
  const isHosts = fallsOtherwise(clips) !== undefined;
  const takeOf = (clip: ClipRecord) =>
    isHosts || !Object.hasOwn(props, clip.prop)
      ? undefined
      : { take: motionOfRecord(clip, props[clip.prop]), turns: clip.turns };
  const own = clips.filter((clip) => clip.file === file);
  return { known: new Map(own.map((clip) => [clip.name, takeOf(clip)])) };
}
