/** What a glTF file is to this program: its JSON, as text and parsed, beside the bytes it refers to. */

import type { GLTF } from "@gltf-transform/core";
import type { Decoders } from "./decoders.js";

export type GltfJson = GLTF.IGLTF;

/** A glTF file read and checked (`readModel`): whoever holds one may follow any index in it, and walk its nodes to the end. */
export interface Model {
  /** As shown in messages, e.g. "props/spanner.glb". */
  name: string;
  container: "glb" | "gltf";
  /** The JSON text exactly as read. */
  text: string;
  json: GltfJson;
  /**
   * Content of each of `json.buffers`; at least its `byteLength`, and longer where the chunk or file was. Empty for a buffer
   * that only keeps the place of compressed views and has none.
   */
  buffers: Uint8Array[];
  /** Content of external image files by index in `json.images`. */
  images: Map<number, Uint8Array>;
  /** Chunks of a GLB after the first two, with their headers, as they were. */
  otherChunks?: Uint8Array;
  /** What the caller handed over to read compressed meshes with. */
  decoders?: Decoders;
}

/**
 * Fetches a file the model names. `path` is relative to the model's folder, percent-decoded, with "/" between its parts,
 * and never leaves the folder as a text; links on the disk are the caller's to guard.
 */
export type ResolveResource = (path: string) => Promise<Uint8Array>;

/** A model that cannot be used: which, what is wrong with it, what would be right. */
export class ModelError extends Error {
  override name = "ModelError";

  constructor(
    readonly model: string,
    /** What is wrong, with the place and value found: "nodes[3].mesh is 7". */
    readonly fault: string,
    /** What would be right: "there are 2 meshes, counted from 0". */
    readonly hint: string,
    options?: ErrorOptions,
  ) {
    super(`${model}: ${fault}; ${hint}`, options);
  }
}
