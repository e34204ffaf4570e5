import { determinant } from "../math/mat3.js";
import type { Vec3 } from "../math/vec3.js";
import { instanceFrames } from "./instancing.js";
import { type Model, ModelError } from "./model.js";
import { listPieces, type Piece } from "./pieces.js";
import { type Primitives, readPrimitives } from "./primitives.js";
import { applyFrame, compose, type Frame } from "./scene.js";
import { shownNodes } from "./shown-nodes.js";
import { skinFrames } from "./skin.js";

export { type MovedNode, movedNode } from "./moved-node.js";
export { nodeFrame } from "./scene.js";

/** One primitive of a mesh where one node shows it, or one of a node's instances. */
export interface Surface {
  /** Name of the node; "" where it has none. */
  nodeName: string;
  /** Name of the material; "" where it has none. */
  materialName: string;
  /** Three numbers a vertex, metres, scene frame; only vertices that a triangle uses. */
  positions: Float64Array;
  /** Three vertex numbers a triangle, counter-clockwise seen from outside, mirrored nodes included. Surfaces may share it. */
  triangles: Uint32Array;
}

/**
 * All triangles of a model's default scene in its rest pose, or those of its node `top` and all below it. A skinned mesh stands
 * where its joints put it, whatever its own node says (glTF 2.0, 3.7.3.3). Compressed meshes are decoded
 * (EXT_meshopt_compression, KHR_draco_mesh_compression), instances read one by one (EXT_mesh_gpu_instancing), of levels of
 * detail the first (MSFT_lod). Points, lines and hidden nodes are passed over with a warning. Throws ModelError for data
 * that do not decode, indices beyond the vertices, positions that are no finite numbers, and more triangles than are read.
 */
export async function readSurfaces(
  model: Model,
  top?: number,
): Promise<{ surfaces: Surface[]; warnings: string[] }> {
  const { json } = model;
  const warnings = new Set<string>();
  const frames = shownNodes(json, warnings, top);
  const pieces = listPieces(model, frames.keys(), warnings);
  const primitives = await readPrimitives(model, pieces);
  const skinned = skinFrames(json, primitives);
  const surfaces = pieces.flatMap((piece) => {
    const { node, primitive, copies } = piece;
    const joined = skinned(node, primitive);
    if (joined) return surfacesOf(model, piece, primitives, [joined]);
    const frame = frames.get(node)!;
    const instances =
      copies === 1
        ? [frame]
        : instanceFrames(json, node, primitives.plain).map((instance) => compose(frame, instance));
    return surfacesOf(
      model,
      piece,
      primitives,
      instances.map((instance) => () => instance),
    );
  });
  return { surfaces, warnings: [...warnings] };
}

/** The piece once for each frame; none where it has no triangles. */
function surfacesOf(
  { name, json }: Model,
  piece: Piece,
  primitives: Primitives,
  frames: readonly ((vertex: number) => Frame)[],
): Surface[] {
  const { node, primitive, where } = piece;
  const { triangles, vertices } = primitives.triangles(primitive);
  if (triangles.length === 0) return [];
  const points = restPoints(piece, vertices, primitives);
  let turned: Uint32Array | undefined;
  return frames.map((frameOf) => {
    const positions = new Float64Array(points.length);
    vertices.forEach((vertex, i) => {
      const point: Vec3 = [points[3 * i], points[3 * i + 1], points[3 * i + 2]];
      const [x, y, z] = applyFrame(frameOf(vertex), point);
      positions[3 * i] = x;
      positions[3 * i + 1] = y;
      positions[3 * i + 2] = z;
    });
    const infinite = positions.findIndex((value) => !Number.isFinite(value));
    if (infinite >= 0)
      throw new ModelError(
        name,
        `${where} has a position that is ${positions[infinite]} (vertex ${vertices[Math.floor(infinite / 3)]})`,
        "it must be finite",
      );
    const mirrored = determinant(frameOf(vertices[0]).linear) < 0;
    if (mirrored) turned ??= turnedRound(triangles);
    return {
      nodeName: json.nodes![node].name ?? "",
      materialName: primitive.material === undefined ? "" : (json.materials![primitive.material].name ?? ""),
      positions,
      triangles: mirrored ? turned! : triangles,
    };
  });
}

/** The vertices' places in the mesh's own frame, moved by its morph targets: three numbers each. */
function restPoints(
  { primitive, weights }: Piece,
  vertices: Uint32Array,
  primitives: Primitives,
): Float64Array {
  const positions = primitives.accessor(primitive, primitive.attributes.POSITION);
  const targets = (primitive.targets ?? []).flatMap(({ POSITION }, t) =>
    weights[t] && POSITION !== undefined
      ? [{ weight: weights[t], moves: primitives.accessor(primitive, POSITION) }]
      : [],
  );
  const points = new Float64Array(3 * vertices.length);
  const element: number[] = [];
  vertices.forEach((vertex, i) => {
    positions.getElement(vertex, element);
    for (let axis = 0; axis < 3; axis++) points[3 * i + axis] = element[axis];
    for (const { weight, moves } of targets) {
      moves.getElement(vertex, element);
      for (let axis = 0; axis < 3; axis++) points[3 * i + axis] += weight * element[axis];
    }
  });
  return points;
}

function turnedRound(triangles: Uint32Array): Uint32Array {
  const turned = triangles.slice();
  for (let i = 0; i < turned.length; i += 3) {
    turned[i + 1] = triangles[i + 2];
    turned[i + 2] = triangles[i + 1];
  }
  return turned;
}
