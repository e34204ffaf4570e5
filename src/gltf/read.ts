import { checkJson } from "./check.js";
import type { Decoders } from "./decoders.js";
import { isGlb, splitGlb } from "./glb.js";
import { parseJson } from "./json-text.js";
import { isFallback } from "./meshopt.js";
import { type GltfJson, type Model, ModelError, type ResolveResource } from "./model.js";
import { dataUriBytes, isDataUri, relativePath } from "./uri.js";

/**
 * Reads a .glb or .gltf file (glTF 2.0) and checks it before anything follows what it says: lengths, indices, cycles,
 * ranges, and that it names no file outside its folder and no address. `name` is used in messages. Files the model names
 * are asked of `resolve`; `decoders` are for compressed meshes, which are decoded when their triangles are asked for. Throws
 * ModelError for whatever is wrong with the model.
 */
export async function readModel(
  name: string,
  bytes: Uint8Array,
  resolve?: ResolveResource,
  decoders?: Decoders,
): Promise<Model> {
  const glb = isGlb(bytes) ? splitGlb(name, bytes) : undefined;
  const { text, value } = parseJson(name, glb?.json ?? bytes);
  checkJson(name, value);
  const json: GltfJson = value;
  const external = collectPaths(name, json);
  const buffers: Uint8Array[] = [];
  for (const [i, buffer] of (json.buffers ?? []).entries()) {
    if (buffer.uri === undefined && isFallback(buffer)) {
      buffers.push(new Uint8Array());
      continue;
    }
    const content = await bufferContent(i);
    if (content.length < buffer.byteLength)
      throw new ModelError(
        name,
        `buffers[${i}].byteLength is ${buffer.byteLength}`,
        `there are only ${content.length} bytes of it`,
      );
    buffers.push(content);
  }
  const images = new Map<number, Uint8Array>();
  for (const [i, path] of external.images) images.set(i, await fetchFile(`images[${i}].uri`, path));
  return {
    name,
    container: glb ? "glb" : "gltf",
    text,
    json,
    buffers,
    images,
    ...(glb?.others && { otherChunks: glb.others }),
    ...(decoders && { decoders }),
  };

  async function bufferContent(i: number): Promise<Uint8Array> {
    const where = `buffers[${i}].uri`;
    const { uri } = json.buffers![i];
    if (uri !== undefined) {
      const path = external.buffers.get(i);
      return path === undefined ? dataUriBytes(name, where, uri) : await fetchFile(where, path);
    }
    if (i === 0 && glb?.binary) return glb.binary;
    throw new ModelError(
      name,
      `buffers[${i}] has no uri`,
      i === 0 && glb ? "the file has no BIN chunk for it" : "it must say where its bytes are",
    );
  }

  async function fetchFile(where: string, path: string): Promise<Uint8Array> {
    if (!resolve)
      throw new ModelError(
        name,
        `${where} names the file "${path}"`,
        "it cannot be read from here: use a .glb file",
      );
    try {
      return await resolve(path);
    } catch (cause) {
      if (cause instanceof ModelError) throw cause;
      throw new ModelError(
        name,
        `the file "${path}" (${where}) cannot be read: ${(cause as Error).message}`,
        "it must stand beside the model",
        {
          cause,
        },
      );
    }
  }
}

/** The paths of all files a model names, all refused or accepted before the first is opened. */
function collectPaths(
  name: string,
  json: GltfJson,
): { buffers: Map<number, string>; images: Map<number, string> } {
  const paths = (list: { uri?: string }[] | undefined, what: string): Map<number, string> =>
    new Map(
      (list ?? []).flatMap(({ uri }, i) =>
        uri === undefined || isDataUri(uri) ? [] : [[i, relativePath(name, `${what}[${i}].uri`, uri)]],
      ),
    );
  return { buffers: paths(json.buffers, "buffers"), images: paths(json.images, "images") };
}
