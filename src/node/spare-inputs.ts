/** A bake never writes over what it was made of. */

import { realpath } from "node:fs/promises";
import { join } from "node:path";
import { RequestError } from "../math/request-error.js";

/**
 * @param names of the files to be written into the folder
 * @param inputs paths of the throw file and of its models' files
 * @param option by which another folder is named
 * @throws RequestError for a file that is one of the inputs, by whatever path
 */
export async function spareInputs(
  folder: string,
  names: readonly string[],
  inputs: Iterable<string>,
  option = "-o",
): Promise<void> {
  const kept = new Set(await Promise.all(Array.from(inputs, (path) => realpath(path))));
  for (const name of names) {
    const path = join(folder, name);
    // what is not there yet overwrites nothing
    const real = await realpath(path).catch(() => undefined);
    if (real !== undefined && kept.has(real))
      throw new RequestError(
        [path],
        "would be written over, and the bake is made of it",
        `choose another folder with ${option}`,
      );
  }
}
