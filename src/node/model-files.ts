/** Models on disk, read so that a model can name no file outside its own folder. */

import { readFile, realpath, stat } from "node:fs/promises";
import { basename, dirname, resolve, sep } from "node:path";
import { type Model, ModelError } from "../gltf/model.js";
import { readModel } from "../gltf/read.js";
import { sha256 } from "../math/hash.js";
import { DECODERS } from "./draco.js";

/** Larger files are refused before they are read: GLB itself counts its length in 32 bits. */
const GREATEST_BYTES = 0xffffffff;

export interface ModelFile {
  model: Model;
  /** Over the file and, in the order in which it first names them, every file it names. */
  sha256: string;
  /** Absolute paths of all files read, for watching. */
  paths: string[];
}

/**
 * Reads and checks the model at `path`; `shownAs` is what messages call it.
 *
 * @throws ModelError for a file that is absent, unreadable, no model, or names files it may not
 */
export async function readModelFile(path: string, shownAs: string): Promise<ModelFile> {
  const bytes = await readGuarded(path, shownAs);
  const folder = await realpath(dirname(resolve(path)));
  const parts = [bytes];
  const paths = [resolve(path)];
  const model = await readModel(shownAs, bytes, readNamed, DECODERS);
  return { model, sha256: await sha256(...parts), paths };

  async function readNamed(uri: string): Promise<Uint8Array> {
    const named = resolve(folder, uri);
    const real = await realpath(named).catch(() => named);
    if (!real.startsWith(folder + sep))
      throw new ModelError(
        shownAs,
        `names the file "${uri}" outside its own folder`,
        "put the file beside the model",
      );
    const content = await readGuarded(real, `${shownAs}: ${basename(uri)}`);
    parts.push(content);
    paths.push(real);
    return content;
  }
}

async function readGuarded(path: string, shownAs: string): Promise<Uint8Array> {
  try {
    const status = await stat(path);
    if (!status.isFile()) throw new ModelError(shownAs, "is not a file", "name a .glb or .gltf file");
    if (status.size > GREATEST_BYTES)
      throw new ModelError(shownAs, `has ${status.size} bytes`, "a model of less than 4 GB");
    const content = await readFile(path);
    // The same memory: models are large.
    return new Uint8Array(content.buffer, content.byteOffset, content.byteLength);
  } catch (error) {
    if (error instanceof ModelError) throw error;
    const code = (error as NodeJS.ErrnoException).code;
    if (code === "ENOENT" || code === "ENOTDIR")
      throw new ModelError(
        shownAs,
        "does not exist",
        "check the path: it is relative to the file that names it",
      );
    throw new ModelError(
      shownAs,
      `cannot be read (${code ?? String(error)})`,
      "check the file's permissions",
    );
  }
}
