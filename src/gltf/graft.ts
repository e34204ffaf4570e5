/** What is added to a model: plain nodes and clips, before they are written into a file or a document. */

import type { Quat } from "../math/quat.js";
import type { Vec3 } from "../math/vec3.js";
import { ModelError } from "./model.js";

/** Written into every file we change or make; without a version, so that files of the same content are the same. */
export const GENERATOR = "tossbake";

/** A node that is added; what is missing is glTF's default. */
export interface NewNode {
  name: string;
  /** m */
  translation?: Vec3;
  rotation?: Quat;
  scale?: Vec3;
  /** Indices into the list of new nodes. */
  children?: number[];
  /** Takes the default scene's former roots as children, after its own. */
  holdsScene?: boolean;
}

/** Keys that move one node. */
export interface ClipChannel {
  /** A new node, or one of the model's own. */
  target: { added: number } | { node: number };
  path: "translation" | "rotation";
  interpolation: "LINEAR" | "CUBICSPLINE";
  /** s, ascending from 0 */
  times: Float32Array;
  /** Three numbers (translation, m) or four (rotation) a key, three times as many for CUBICSPLINE; Int16Array: 32767 is 1. */
  values: Float32Array | Int16Array;
}

/** A glTF animation, its times from 0. */
export interface NewClip {
  name: string;
  extras?: object;
  channels: ClipChannel[];
}

/** How one of the model's own nodes rests from now on; what is missing stays as it is. */
export interface Rest {
  node: number;
  translation?: Vec3;
  rotation?: Quat;
  scale?: Vec3;
}

/** What is added to a model. */
export interface Graft {
  /** The first becomes the only root of the default scene; without any, the scene stays as it is. */
  nodes: NewNode[];
  clips: NewClip[];
  rests?: Rest[];
}

export type SamplerType = "SCALAR" | "VEC3" | "VEC4";

export const outputType = (path: ClipChannel["path"]): SamplerType => (path === "rotation" ? "VEC4" : "VEC3");

/** The same for arrays that may share an accessor: their type and their bytes, two a character. */
export function contentKey(array: Float32Array | Int16Array, type: SamplerType): string {
  const pairs = new Uint16Array(array.buffer, array.byteOffset, array.byteLength / 2);
  let key = `${type} ${array instanceof Float32Array} `;
  for (let i = 0; i < pairs.length; i += MOST_ARGUMENTS)
    key += String.fromCharCode.apply(null, pairs.subarray(i, i + MOST_ARGUMENTS) as unknown as number[]);
  return key;
}

/** Engines limit how many a call may have. */
const MOST_ARGUMENTS = 8192;

/** Players find a clip by its name: throws ModelError where two would have the same. */
export function checkClipNames(model: string, own: Iterable<string | undefined>, clips: NewClip[]): void {
  const names = new Set(own);
  for (const { name } of clips) {
    if (names.has(name))
      throw new ModelError(
        model,
        `it would have two animations named "${name}"`,
        "rename the throw or the model's animation",
      );
    names.add(name);
  }
}
