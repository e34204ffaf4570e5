/** Models and grafts that the tests of this room share, built in code. */

import { joinGlb } from "../../src/gltf/glb.js";
import type { Graft } from "../../src/gltf/graft.js";

/** A tetrahedron of volume 1/16: three edges of 0.5, 0.75 and 1 from the origin. */
export const TETRAHEDRON = new Float32Array([0, 0, 0, 0.5, 0, 0, 0, 0.75, 0, 0, 0, 1]);
export const FACES = new Uint16Array([0, 2, 1, 0, 1, 3, 0, 3, 2, 1, 2, 3]);

export const bytesOf = (...arrays: (Float32Array | Uint32Array | Uint16Array | Uint8Array)[]): Uint8Array => {
  const parts = arrays.map((array) => new Uint8Array(array.buffer, array.byteOffset, array.byteLength));
  const all = new Uint8Array(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of parts) {
    all.set(part, at);
    at += part.length;
  }
  return all;
};

export const glbOf = (json: unknown, binary?: Uint8Array, others?: Uint8Array): Uint8Array =>
  joinGlb({
    json: new TextEncoder().encode(typeof json === "string" ? json : JSON.stringify(json)),
    ...(binary && { binary }),
    ...(others && { others }),
  });

/** JSON of a tetrahedron in one GLB; `change` edits it before it is written. */
// biome-ignore lint/suspicious/noExplicitAny: the tests break it in every way that types would forbid
export function tetrahedron(change: (json: any) => void = () => {}): Uint8Array {
  const json = {
    asset: { version: "2.0" },
    scene: 0,
    scenes: [{ nodes: [0] }],
    nodes: [{ name: "solid", mesh: 0 }],
    meshes: [{ primitives: [{ attributes: { POSITION: 0 }, indices: 1 }] }],
    accessors: [
      { bufferView: 0, componentType: 5126, count: 4, type: "VEC3", min: [0, 0, 0], max: [0.5, 0.75, 1] },
      { bufferView: 1, componentType: 5123, count: 12, type: "SCALAR" },
    ],
    bufferViews: [
      { buffer: 0, byteOffset: 0, byteLength: 48, target: 34962 },
      { buffer: 0, byteOffset: 48, byteLength: 24, target: 34963 },
    ],
    buffers: [{ byteLength: 72 }],
  };
  change(json);
  return glbOf(json, bytesOf(TETRAHEDRON, FACES));
}

/** Two clips of a node over the scene, the second with cubic keys and times of its own for the rotation. */
export function graft(): Graft {
  const times = new Float32Array([0, 0.25, 0.5]);
  const half = Math.SQRT1_2;
  return {
    nodes: [{ name: "spanner", holdsScene: true }],
    clips: [
      {
        name: "lob_01",
        extras: { throw: "lob", take: 1 },
        channels: [
          {
            target: { added: 0 },
            path: "translation",
            interpolation: "LINEAR",
            times,
            values: new Float32Array([0, 1.4, 0, 1, 1.9, 0.1, 2, 1.2, 0.3]),
          },
          {
            target: { added: 0 },
            path: "rotation",
            interpolation: "LINEAR",
            times: times.slice(),
            values: new Float32Array([0, 0, 0, 1, 0, half, 0, half, 0, 1, 0, 0]),
          },
        ],
      },
      {
        name: "lob_02",
        channels: [
          {
            target: { added: 0 },
            path: "translation",
            interpolation: "LINEAR",
            times,
            values: new Float32Array(9),
          },
          {
            target: { added: 0 },
            path: "rotation",
            interpolation: "CUBICSPLINE",
            times: new Float32Array([0, 0.1]),
            values: new Float32Array([
              0,
              0,
              0,
              0,
              0,
              0,
              0,
              1,
              1,
              0,
              0,
              0,
              1,
              0,
              0,
              0,
              half,
              0,
              0,
              half,
              0,
              0,
              0,
              0,
            ]),
          },
        ],
      },
    ],
  };
}
