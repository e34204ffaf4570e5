/** The props of a throw file, read and weighed. */

import { type Model, ModelError } from "../gltf/model.js";
import { textSha256 } from "../math/hash.js";
import { RequestError } from "../math/request-error.js";
import { type Prop, weigh } from "../prop/prop.js";
import { shapeModel } from "../prop/shape.js";
import { throwFileError } from "../throwfile/errors.js";
import type { PropEntry, ThrowFile } from "../throwfile/types.js";

export interface LoadedProp {
  prop: Prop;
  model: Model;
  /** As the record names it: the model's path, or the shape as JSON. */
  source: string;
  /** Of the model's files, or of a shape's `source`. */
  sha256: string;
}

/** Hands over a model by the path that the throw file gives it. */
export type ModelSource = (path: string) => Promise<{ model: Model; sha256: string }>;

/**
 * Reads and weighs the props that are named, in the file's order.
 *
 * @throws ThrowFileError for a prop whose model cannot be used or whose keys do not fit it
 */
export async function loadProps(
  file: ThrowFile,
  names: ReadonlySet<string>,
  source: ModelSource,
): Promise<Map<string, LoadedProp>> {
  const loaded = new Map<string, LoadedProp>();
  for (const [name, entry] of file.props) {
    if (!names.has(name)) continue;
    try {
      loaded.set(name, await loadProp(entry, source));
    } catch (error) {
      const fault =
        error instanceof ModelError
          ? new RequestError(["model"], `${error.model}: ${error.fault}`, error.hint)
          : error;
      if (!(fault instanceof RequestError)) throw fault;
      throw throwFileError(file, fault.under("props", name));
    }
  }
  return loaded;
}

async function loadProp(entry: PropEntry, source: ModelSource): Promise<LoadedProp> {
  if (entry.shape) {
    const model = shapeModel(entry.name, entry.shape);
    const source = JSON.stringify(entry.shape);
    return {
      prop: await weigh(entry.name, entry.shape, entry),
      model,
      source,
      sha256: await textSha256(source),
    };
  }
  const { model, sha256 } = await source(entry.model as string);
  return { prop: await weigh(entry.name, model, entry), model, source: entry.model as string, sha256 };
}
