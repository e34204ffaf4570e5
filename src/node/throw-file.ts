/** A throw file on disk and the models it names. */

import { readFile, stat } from "node:fs/promises";
import { dirname, resolve } from "node:path";
import type { ModelSource } from "../bake/props.js";
import { RequestError } from "../math/request-error.js";
import { parseThrowFile } from "../throwfile/parse.js";
import type { ThrowFile } from "../throwfile/types.js";
import { readModelFile } from "./model-files.js";

/** Throw files are written by hand; anything larger is something else, given by mistake. */
const GREATEST_BYTES = 16 * 1024 * 1024;

export interface OpenedThrowFile {
  file: ThrowFile;
  text: string;
  models: ModelSource;
  /** Absolute paths of the throw file and, once read, of every file of its models. */
  inputs: ReadonlySet<string>;
}

/** @throws ThrowFileError for what is written in it, RequestError for a file that cannot be read */
export const openThrowFile = async (path: string): Promise<OpenedThrowFile> =>
  openedText(path, await readThrowFile(path));

/** The same, its text as somebody has read it. */
export function openedText(path: string, text: string): OpenedThrowFile {
  const inputs = new Set([resolve(path)]);
  return {
    text,
    file: parseThrowFile(path, text),
    models: async (model) => {
      const read = await readModelFile(resolve(dirname(path), model), model);
      for (const file of read.paths) inputs.add(file);
      return read;
    },
    inputs,
  };
}

/** @throws RequestError for a file that cannot be read or is no text */
export async function readThrowFile(path: string): Promise<string> {
  const wrong = (fault: string) => new RequestError([path], fault, "name a throw file (YAML or JSON)");
  try {
    const status = await stat(path);
    if (!status.isFile()) throw wrong("is not a file");
    if (status.size > GREATEST_BYTES) throw wrong(`has ${status.size} bytes, too many for a throw file`);
    return new TextDecoder("utf-8", { fatal: true }).decode(await readFile(path));
  } catch (error) {
    if (error instanceof RequestError) throw error;
    if (error instanceof TypeError) throw wrong("is not text in UTF-8");
    const code = (error as NodeJS.ErrnoException).code;
    throw wrong(code === "ENOENT" || code === "ENOTDIR" ? "does not exist" : `cannot be read (${code})`);
  }
}
