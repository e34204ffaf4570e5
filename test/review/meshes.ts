import type { Model } from "../../src/gltf/model.js";
import { readModel } from "../../src/gltf/read.js";
import type { Vec3 } from "../../src/math/vec3.js";
import { bytesOf, glbOf } from "../gltf/models.js";

/** A model of one mesh, built in code: places that float32 holds exactly. */
export function meshModel(
  places: readonly Vec3[],
  triangles: readonly Vec3[],
  node: object = {},
): Promise<Model> {
  const json = {
    asset: { version: "2.0" },
    scene: 0,
    scenes: [{ nodes: [0] }],
    nodes: [{ name: "mesh", mesh: 0, ...node }],
    meshes: [{ primitives: [{ attributes: { POSITION: 0 }, indices: 1 }] }],
    accessors: [
      {
        bufferView: 0,
        componentType: 5126,
        count: places.length,
        type: "VEC3",
        min: [0, 1, 2].map((k) => Math.min(...places.map((place) => place[k]))),
        max: [0, 1, 2].map((k) => Math.max(...places.map((place) => place[k]))),
      },
      { bufferView: 1, componentType: 5125, count: 3 * triangles.length, type: "SCALAR" },
    ],
    bufferViews: [
      { buffer: 0, byteOffset: 0, byteLength: 12 * places.length },
      { buffer: 0, byteOffset: 12 * places.length, byteLength: 12 * triangles.length },
    ],
    buffers: [{ byteLength: 12 * (places.length + triangles.length) }],
  };
  const binary = bytesOf(Float32Array.from(places.flat()), Uint32Array.from(triangles.flat()));
  return readModel("mesh", glbOf(json, binary));
}

/** A card in the plane z = 0, its middle in the origin. */
export const card = (width: number, height: number): Promise<Model> =>
  meshModel(
    [
      [-width / 2, -height / 2, 0],
      [width / 2, -height / 2, 0],
      [width / 2, height / 2, 0],
      [-width / 2, height / 2, 0],
    ],
    [
      [0, 1, 2],
      [0, 2, 3],
    ],
  );
