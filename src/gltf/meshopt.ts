import type { GLTF } from "@gltf-transform/core";
import type { GltfJson, Model } from "./model.js";
import { ModelError } from "./model.js";

/** The extension's two names: its ratified successor differs by a further filter alone (from memory). */
export const MESHOPT = ["EXT_meshopt_compression", "KHR_meshopt_compression"] as const;

/** How a buffer view is compressed, checked by `checkMeshopt`. */
export interface MeshoptView {
  buffer: number;
  byteOffset?: number;
  byteLength: number;
  byteStride: number;
  count: number;
  mode: "ATTRIBUTES" | "TRIANGLES" | "INDICES";
  filter?: string;
}

/** Bytes that all compressed views of a model may unpack to: some kilobytes may state gigabytes. */
const GREATEST_UNPACKED = 1 << 27;

/** How the view is compressed; undefined where it is not. */
function meshoptView({ bufferViews = [] }: GltfJson, view: number): MeshoptView | undefined {
  const { extensions = {} } = bufferViews[view];
  return MESHOPT.map((name) => extensions[name] as MeshoptView | undefined).find(Boolean);
}

/** Whether a buffer only keeps the place of what is compressed, and so may have no content. */
export const isFallback = ({ extensions }: GLTF.IBuffer): boolean =>
  MESHOPT.some((name) => (extensions?.[name] as { fallback?: unknown } | undefined)?.fallback === true);

/**
 * Content of those of the given buffer views that are compressed (EXT_meshopt_compression), by the decoder of the
 * meshoptimizer package, which is loaded where there are any. Throws ModelError for data that do not decode.
 */
export async function unpackViews(model: Model, views: Iterable<number>): Promise<Map<number, Uint8Array>> {
  const packed = [...new Set(views)].flatMap((view) => {
    const how = meshoptView(model.json, view);
    return how ? [{ view, how }] : [];
  });
  if (packed.length === 0) return new Map();
  const total = packed.reduce((sum, { how }) => sum + how.count * how.byteStride, 0);
  if (total > GREATEST_UNPACKED)
    throw new ModelError(
      model.name,
      `its compressed buffer views state ${total} bytes`,
      `at most ${GREATEST_UNPACKED} are read`,
    );
  const { MeshoptDecoder } = await import("meshoptimizer/decoder");
  await MeshoptDecoder.ready;
  return new Map(packed.map(({ view, how }) => [view, unpack(view, how)]));

  function unpack(view: number, { buffer, byteOffset = 0, byteLength, ...how }: MeshoptView): Uint8Array {
    const content = new Uint8Array(how.count * how.byteStride);
    const source = model.buffers[buffer].subarray(byteOffset, byteOffset + byteLength);
    try {
      MeshoptDecoder.decodeGltfBuffer(content, how.count, how.byteStride, source, how.mode, how.filter);
    } catch (cause) {
      throw new ModelError(
        model.name,
        `the compressed content of bufferViews[${view}] cannot be decoded`,
        "the file is damaged",
        { cause },
      );
    }
    return content;
  }
}
