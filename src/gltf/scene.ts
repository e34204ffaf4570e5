import { determinant, type Mat3, multiply, multiplyVector, transpose } from "../math/mat3.js";
import { fromMatrix, IDENTITY as IDENTITY_ROTATION, normalize, type Quat, toMatrix } from "../math/quat.js";
import {
  add,
  cross,
  dot,
  length,
  normalize as normalizeVector,
  scale,
  subtract,
  type Vec3,
  ZERO,
} from "../math/vec3.js";
import { type GltfJson, type Model, ModelError } from "./model.js";

/** An affine map x → linear·x + origin. */
export interface Frame {
  linear: Mat3;
  origin: Vec3;
}

const IDENTITY: Frame = {
  linear: [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ],
  origin: ZERO,
};

/** The roots of the default scene: of `scene`, else of the first; without any scene, all nodes that are no children. */
export function sceneRoots(json: GltfJson): number[] {
  return json.scenes?.length ? (json.scenes[json.scene ?? 0].nodes ?? []) : treeRoots(json);
}

/** All nodes that are no other's child. */
export function treeRoots(json: GltfJson): number[] {
  const children = new Set((json.nodes ?? []).flatMap((node) => node.children ?? []));
  return (json.nodes ?? []).flatMap((_, i) => (children.has(i) ? [] : [i]));
}

/** The given nodes and all below them. */
export function subtree(json: GltfJson, roots: Iterable<number>): Set<number> {
  // A set may grow while it is gone through.
  const nodes = new Set(roots);
  for (const node of nodes) for (const child of json.nodes![node].children ?? []) nodes.add(child);
  return nodes;
}

/**
 * The frames of all nodes under `roots` (default: those of the default scene), node → scene, parents before children in
 * the order of the file; in double precision from the JSON's numbers, without recursion (glTF 2.0, 3.5.3).
 */
export function sceneFrames(json: GltfJson, roots = sceneRoots(json)): Map<number, Frame> {
  const frames = new Map<number, Frame>();
  const open = roots.toReversed().map((node) => ({ node, parent: IDENTITY }));
  for (let next = open.pop(); next !== undefined; next = open.pop()) {
    const frame = compose(next.parent, localFrame(json, next.node));
    frames.set(next.node, frame);
    for (const child of (json.nodes![next.node].children ?? []).toReversed())
      open.push({ node: child, parent: frame });
  }
  return frames;
}

/** The map that does `inner` first and then `outer`. */
export const compose = (outer: Frame, inner: Frame): Frame => ({
  linear: multiply(outer.linear, inner.linear),
  origin: applyFrame(outer, inner.origin),
});

export const applyFrame = (frame: Frame, point: Vec3): Vec3 =>
  add(multiplyVector(frame.linear, point), frame.origin);

/** A 4×4 matrix in glTF's order, column after column, as a frame. */
export const matrixFrame = (m: ArrayLike<number>): Frame => ({
  linear: [
    [m[0], m[4], m[8]],
    [m[1], m[5], m[9]],
    [m[2], m[6], m[10]],
  ],
  origin: [m[12], m[13], m[14]],
});

/** Place and axes, in the scene frame, of the node of that name in the default scene; undefined where there is none. */
export function nodeFrame(model: Model, nodeName: string): { position: Vec3; rotation: Quat } | undefined {
  const found = [...sceneFrames(model.json)].filter(([node]) => model.json.nodes![node].name === nodeName);
  if (found.length === 0) return undefined;
  if (found.length > 1)
    throw new ModelError(
      model.name,
      `${found.length} nodes are named "${nodeName}"`,
      "the name must be unique",
    );
  const [, frame] = found[0];
  const rotation = frameRotation(frame.linear);
  if (!rotation)
    throw new ModelError(model.name, `the node "${nodeName}" is scaled to nothing`, "it has no axes to take");
  return { position: frame.origin, rotation };
}

/**
 * The rotation nearest the columns of `linear`, taken in the order x, y, z (Gram–Schmidt); a mirrored frame's x is turned
 * round, as players of glTF do. Undefined where a column vanishes.
 */
export function frameRotation(linear: Mat3): Quat | undefined {
  const columns = transpose(linear);
  const x = normalizeVector(determinant(linear) < 0 ? scale(columns[0], -1) : columns[0]);
  const y = normalizeVector(subtract(columns[1], scale(x, dot(columns[1], x))));
  if (length(x) === 0 || length(y) === 0) return undefined;
  return fromMatrix(transpose([x, y, cross(x, y)]));
}

/** A node's own frame: node → parent. */
export function localFrame(json: GltfJson, index: number): Frame {
  const node = json.nodes![index];
  return node.matrix ? matrixFrame(node.matrix) : transformFrame(node);
}

/** The frame of a translation, rotation and scale as glTF states them; what is missing changes nothing. */
export function transformFrame(parts: {
  translation?: readonly number[];
  rotation?: readonly number[];
  scale?: readonly number[];
}): Frame {
  // Stated to float32 as a rule: its length is not quite 1.
  const rotation = toMatrix(normalize((parts.rotation as Quat | undefined) ?? IDENTITY_ROTATION));
  const [x, y, z] = parts.scale ?? [1, 1, 1];
  const row = (r: Vec3): Vec3 => [r[0] * x, r[1] * y, r[2] * z];
  return {
    linear: [row(rotation[0]), row(rotation[1]), row(rotation[2])],
    origin: (parts.translation as Vec3 | undefined) ?? ZERO,
  };
}
