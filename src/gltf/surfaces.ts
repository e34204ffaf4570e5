import { determinant } from "../math/mat3.js";
import { instanceAccessors, instanceFrames } from "./instancing.js";
import { type Model, ModelError } from "./model.js";
import { listPieces, type Piece } from "./pieces.js";
import { type Primitives, readPrimitives } from "./primitives.js";
import { compose, type Frame } from "./scene.js";
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
    const frame = frames.get(node)!;
    const joined = skinned(node, primitive);
    if (joined) return surfacesOf(model, piece, primitives, [joined]);
    if (copies === 1 && instanceAccessors(json, node).length === 0)
      return surfacesOf(model, piece, primitives, [frame]);
    const instances = instanceFrames(json, node, primitives.plain);
    const placed = instances.map((instance) => compose(frame, instance));
    return surfacesOf(model, piece, primitives, placed);
  });
  return { surfaces, warnings: [...warnings] };
}

/** What takes a vertex into the scene: one frame for all, or one for each. */
type Placing = Frame | ((vertex: number) => Frame);

const frameOf = (placing: Placing, vertex: number): Frame =>
  typeof placing === "function" ? placing(vertex) : placing;

/** The piece once for each placing; none where it has no triangles. */
function surfacesOf(
  { name, json }: Model,
  piece: Piece,
  primitives: Primitives,
  placings: readonly Placing[],
): Surface[] {
  const { node, primitive, where } = piece;
  const { triangles, vertices } = primitives.triangles(primitive);
  if (triangles.length === 0) return [];
  const points = restPoints(piece, vertices, primitives);
  let turned: Uint32Array | undefined;
  return placings.map((placing) => {
    const positions = new Float64Array(points.length);
    for (let i = 0; i < vertices.length; i++) {
      placeInto(positions, 3 * i, points, frameOf(placing, vertices[i]));
      for (let axis = 0; axis < 3; axis++)
        if (!Number.isFinite(positions[3 * i + axis]))
          throw new ModelError(
            name,
            `${where} has a position that is ${positions[3 * i + axis]} (vertex ${vertices[i]})`,
            "it must be finite",
          );
    }
    const mirrored = determinant(frameOf(placing, vertices[0]).linear) < 0;
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
  const points = new Float64Array(3 * vertices.length);
  addPoints(points, vertices, primitives.numbers(primitive, primitive.attributes.POSITION), 1);
  (primitive.targets ?? []).forEach(({ POSITION }, t) => {
    if (weights[t] && POSITION !== undefined)
      addPoints(points, vertices, primitives.numbers(primitive, POSITION), weights[t]);
  });
  return points;
}

function addPoints(
  points: Float64Array,
  vertices: Uint32Array,
  numbers: ArrayLike<number>,
  weight: number,
): void {
  for (let i = 0; i < vertices.length; i++) {
    const from = 3 * vertices[i];
    points[3 * i] += weight * numbers[from];
    points[3 * i + 1] += weight * numbers[from + 1];
    points[3 * i + 2] += weight * numbers[from + 2];
  }
}

/** The same as `applyFrame` without making anything: there may be millions of vertices. */
function placeInto(out: Float64Array, at: number, points: Float64Array, { linear, origin }: Frame): void {
  const x = points[at];
  const y = points[at + 1];
  const z = points[at + 2];
  const [rowX, rowY, rowZ] = linear;
  out[at] = rowX[0] * x + rowX[1] * y + rowX[2] * z + origin[0];
  out[at + 1] = rowY[0] * x + rowY[1] * y + rowY[2] * z + origin[1];
  out[at + 2] = rowZ[0] * x + rowZ[1] * y + rowZ[2] * z + origin[2];
}

function turnedRound(triangles: Uint32Array): Uint32Array {
  const turned = triangles.slice();
  for (let i = 0; i < turned.length; i += 3) {
    turned[i + 1] = triangles[i + 2];
    turned[i + 2] = triangles[i + 1];
  }
  return turned;
}
