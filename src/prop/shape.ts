import type { GltfJson, Model } from "../gltf/model.js";
import { checkShape, type Shape } from "./shape-kind.js";
import { type ShapeMesh, shapeMesh } from "./shape-mesh.js";

export type { Shape };

// From the glTF 2.0 specification.
const FLOAT = 5126;
const UNSIGNED_SHORT = 5123;
const ARRAY_BUFFER = 34962;
const ELEMENT_ARRAY_BUFFER = 34963;

/**
 * A glTF model of the shape: one node, its mesh and plain material, named `name` (the node apart, as the clip's own is), with normals and UVs; axis +Y, centred,
 * metres. Always the same bytes.
 *
 * @throws RequestError at ["shape", …] for lengths that make no body
 */
export function shapeModel(name: string, shape: Shape): Model {
  checkShape(shape);
  const mesh = shapeMesh(shape);
  const { bytes, lengths } = packed(mesh);
  const json = document(name, mesh, lengths, bytes.length);
  return { name, container: "glb", text: JSON.stringify(json), json, buffers: [bytes], images: new Map() };
}

function packed(mesh: ShapeMesh): { bytes: Uint8Array; lengths: number[] } {
  const blocks = [mesh.positions, mesh.normals, mesh.uvs].map(floatBytes);
  blocks.push(shortBytes(mesh.indices));
  const lengths = blocks.map((block) => block.length);
  const total = lengths.reduce((sum, length) => sum + length, 0);
  const bytes = new Uint8Array(Math.ceil(total / 4) * 4);
  let offset = 0;
  for (const block of blocks) {
    bytes.set(block, offset);
    offset += block.length;
  }
  return { bytes, lengths };
}

/** glTF is little-endian on every machine. */
function floatBytes(values: readonly number[]): Uint8Array {
  const view = new DataView(new ArrayBuffer(4 * values.length));
  values.forEach((value, i) => {
    view.setFloat32(4 * i, value, true);
  });
  return new Uint8Array(view.buffer);
}

function shortBytes(values: readonly number[]): Uint8Array {
  const view = new DataView(new ArrayBuffer(2 * values.length));
  values.forEach((value, i) => {
    view.setUint16(2 * i, value, true);
  });
  return new Uint8Array(view.buffer);
}

function document(name: string, mesh: ShapeMesh, lengths: readonly number[], byteLength: number): GltfJson {
  const vertices = mesh.positions.length / 3;
  const bound = (pick: (...values: number[]) => number) =>
    [0, 1, 2].map((axis) => pick(...mesh.positions.filter((_, i) => i % 3 === axis).map(Math.fround)));
  let byteOffset = 0;
  const bufferViews = lengths.map((length, i) => {
    const view = {
      buffer: 0,
      byteOffset,
      byteLength: length,
      target: i < 3 ? ARRAY_BUFFER : ELEMENT_ARRAY_BUFFER,
    };
    byteOffset += length;
    return view;
  });
  const floats = (bufferView: number, type: "VEC3" | "VEC2") =>
    ({ bufferView, componentType: FLOAT, count: vertices, type }) as const;
  return {
    asset: { version: "2.0", generator: "tossbake" },
    scene: 0,
    scenes: [{ nodes: [0] }],
    nodes: [{ name: `${name}-shape`, mesh: 0 }],
    meshes: [
      {
        name,
        primitives: [
          { attributes: { POSITION: 0, NORMAL: 1, TEXCOORD_0: 2 }, indices: 3, material: 0, mode: 4 },
        ],
      },
    ],
    materials: [
      {
        name,
        pbrMetallicRoughness: {
          baseColorFactor: [0.6, 0.6, 0.6, 1],
          metallicFactor: 0,
          roughnessFactor: 0.7,
        },
      },
    ],
    accessors: [
      { ...floats(0, "VEC3"), min: bound(Math.min), max: bound(Math.max) },
      floats(1, "VEC3"),
      floats(2, "VEC2"),
      { bufferView: 3, componentType: UNSIGNED_SHORT, count: mesh.indices.length, type: "SCALAR" },
    ],
    bufferViews,
    buffers: [{ byteLength }],
  };
}
