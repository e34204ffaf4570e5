import type { Accessor, GLTF } from "@gltf-transform/core";
import { determinant } from "../math/mat3.js";
import type { Vec3 } from "../math/vec3.js";
import { decodeAccessors } from "./accessors.js";
import { type GltfJson, type Model, ModelError } from "./model.js";
import { applyFrame, type Frame, sceneFrames } from "./scene.js";
import { skinAccessors, skinFrames } from "./skin.js";
import { hasTriangles, triangleList } from "./triangles.js";

export { nodeFrame } from "./scene.js";

/** One primitive of a mesh where one node shows it. */
export interface Surface {
  /** Name of the node; "" where it has none. */
  nodeName: string;
  /** Name of the material; "" where it has none. */
  materialName: string;
  /** Three numbers a vertex, metres, scene frame; only vertices that a triangle uses. */
  positions: Float64Array;
  /** Three vertex numbers a triangle, counter-clockwise seen from outside, mirrored nodes included. */
  triangles: Uint32Array;
}

/** Corners of triangles over all instances and morph targets: a mesh may be shown by any number of nodes. */
const GREATEST_CORNERS = 15_000_000;
const GREATEST_INSTANCES = 100_000;

interface Instance {
  node: number;
  primitive: GLTF.IMeshPrimitive;
  where: string;
  /** Of the mesh's morph targets, in the rest pose. */
  weights: number[];
}

/**
 * All triangles of a model's default scene in its rest pose. A skinned mesh stands where its joints put it, whatever its
 * own node says (glTF 2.0, 3.7.3.3). Points and lines are passed over with a warning. Throws ModelError for indices
 * beyond the vertices, positions that are no finite numbers, and more triangles than are read.
 */
export async function readSurfaces(model: Model): Promise<{ surfaces: Surface[]; warnings: string[] }> {
  const { json } = model;
  const frames = sceneFrames(json);
  const warnings = new Set<string>();
  const instances = listInstances(model, [...frames.keys()], warnings);
  const accessors = await decodeAccessors(
    model,
    instances.flatMap(({ node, primitive }) => [
      primitive.attributes.POSITION,
      ...(primitive.indices === undefined ? [] : [primitive.indices]),
      ...(primitive.targets ?? []).flatMap(({ POSITION }) => (POSITION === undefined ? [] : [POSITION])),
      ...skinAccessors(json, node, primitive),
    ]),
  );
  const skinned = skinFrames(json, accessors);
  const surfaces = instances.flatMap((instance) => {
    const { node, primitive } = instance;
    const frame = frames.get(node)!;
    const surface = readSurface(model, instance, accessors, skinned(node, primitive) ?? (() => frame));
    return surface.triangles.length > 0 ? [surface] : [];
  });
  return { surfaces, warnings: [...warnings] };
}

/** The primitives with triangles that the nodes show; counted as it goes, for a few bytes can name billions. */
function listInstances(model: Model, nodes: number[], warnings: Set<string>): Instance[] {
  const { json } = model;
  const instances: Instance[] = [];
  const shownBy = new Map<number, Omit<Instance, "node" | "weights">[]>();
  let corners = 0;
  for (const node of nodes) {
    const { mesh, name, weights, extensions } = json.nodes![node];
    if (mesh === undefined) continue;
    if (extensions?.EXT_mesh_gpu_instancing)
      warnings.add(`the node "${name ?? node}" has instances (EXT_mesh_gpu_instancing): read as one`);
    let primitives = shownBy.get(mesh);
    if (!primitives) {
      primitives = solidPrimitives(json, mesh, warnings);
      shownBy.set(mesh, primitives);
    }
    for (const { primitive, where } of primitives) {
      const { count } = json.accessors![primitive.indices ?? primitive.attributes.POSITION];
      corners += ((primitive.mode ?? 4) === 4 ? count : 3 * count) * (1 + (primitive.targets?.length ?? 0));
      instances.push({ node, primitive, where, weights: weights ?? json.meshes![mesh].weights ?? [] });
      if (corners > GREATEST_CORNERS || instances.length > GREATEST_INSTANCES)
        throw new ModelError(
          model.name,
          "its scene shows too much",
          `at most ${GREATEST_CORNERS / 3} triangles in ${GREATEST_INSTANCES} pieces are read: use a simpler model`,
        );
    }
  }
  return instances;
}

function solidPrimitives(
  json: GltfJson,
  mesh: number,
  warnings: Set<string>,
): Omit<Instance, "node" | "weights">[] {
  return json.meshes![mesh].primitives.flatMap((primitive, p) => {
    const where = `meshes[${mesh}].primitives[${p}]`;
    if (!hasTriangles(primitive.mode ?? 4)) warnings.add(`${where} is points or lines: passed over`);
    else if (primitive.attributes.POSITION === undefined)
      warnings.add(`${where} has no positions: passed over`);
    else return [{ primitive, where }];
    return [];
  });
}

function readSurface(
  model: Model,
  { node, primitive, where, weights }: Instance,
  accessors: Map<number, Accessor>,
  frameOf: (vertex: number) => Frame,
): Surface {
  const { json } = model;
  const positions = accessors.get(primitive.attributes.POSITION)!;
  const indices = primitive.indices === undefined ? undefined : accessors.get(primitive.indices)!.getArray()!;
  const list = triangleList(primitive.mode ?? 4, indices, positions.getCount());
  const { triangles, vertices } = compact(list, positions.getCount(), (found) => {
    throw new ModelError(
      model.name,
      `${where} uses vertex ${found}`,
      `it has ${positions.getCount()} vertices`,
    );
  });
  const targets = (primitive.targets ?? []).flatMap(({ POSITION }, t) =>
    weights[t] && POSITION !== undefined ? [{ weight: weights[t], moves: accessors.get(POSITION)! }] : [],
  );
  const scenePositions = new Float64Array(vertices.length * 3);
  const element: number[] = [];
  vertices.forEach((vertex, i) => {
    positions.getElement(vertex, element);
    let point: Vec3 = [element[0], element[1], element[2]];
    for (const { weight, moves } of targets) {
      moves.getElement(vertex, element);
      point = [
        point[0] + weight * element[0],
        point[1] + weight * element[1],
        point[2] + weight * element[2],
      ];
    }
    const [x, y, z] = applyFrame(frameOf(vertex), point);
    scenePositions[3 * i] = x;
    scenePositions[3 * i + 1] = y;
    scenePositions[3 * i + 2] = z;
  });
  const infinite = scenePositions.findIndex((value) => !Number.isFinite(value));
  if (infinite >= 0)
    throw new ModelError(
      model.name,
      `${where} has a position that is ${scenePositions[infinite]} (vertex ${vertices[Math.floor(infinite / 3)]})`,
      "it must be finite",
    );
  if (vertices.length > 0 && determinant(frameOf(vertices[0]).linear) < 0) turnRound(triangles);
  return {
    nodeName: json.nodes![node].name ?? "",
    materialName: primitive.material === undefined ? "" : (json.materials![primitive.material].name ?? ""),
    positions: scenePositions,
    triangles,
  };
}

/** Renumbers triangles so that only vertices they use are left, in the order of their first use. */
function compact(
  list: Uint32Array,
  vertexCount: number,
  refuse: (vertex: number) => never,
): { triangles: Uint32Array; vertices: Uint32Array } {
  // Many primitives may share one long list of vertices: a table of all of them is for those that use a good part.
  const table = vertexCount <= 8 * list.length ? new Int32Array(vertexCount).fill(-1) : undefined;
  const numbers = new Map<number, number>();
  const vertices = new Uint32Array(list.length);
  let count = 0;
  const triangles = list.map((vertex) => {
    if (vertex >= vertexCount) refuse(vertex);
    const known = table ? table[vertex] : (numbers.get(vertex) ?? -1);
    if (known >= 0) return known;
    if (table) table[vertex] = count;
    else numbers.set(vertex, count);
    vertices[count] = vertex;
    return count++;
  });
  return { triangles, vertices: vertices.slice(0, count) };
}

function turnRound(triangles: Uint32Array): void {
  for (let i = 0; i < triangles.length; i += 3) {
    const second = triangles[i + 1];
    triangles[i + 1] = triangles[i + 2];
    triangles[i + 2] = second;
  }
}
