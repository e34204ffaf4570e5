/** Whether a clip moves one rigid piece of its model, and which. */

import type { ReadChannel, ReadClip } from "./clips.js";
import { decompose } from "./decompose.js";
import type { GltfJson, Model } from "./model.js";
import { evenFrame } from "./moved-node.js";
import { localFrame, subtree } from "./scene.js";

type Transform = NonNullable<ReturnType<typeof evenFrame>>;

/** A node on the way from the scene to the piece: how it rests, and what moves it. */
export interface PathNode {
  rest: Pick<Transform, "translation" | "rotation">;
  /** Even; of the piece's own node 1, as that scale is in its geometry. */
  scale: number;
  translation?: ReadChannel;
  rotation?: ReadChannel;
}

export interface RigidClip {
  /** The node that is moved with all below it. */
  node: number;
  /** Of the outermost node that is moved; "" where it has none. */
  name: string;
  /** From a root of the scene down to the node. */
  path: PathNode[];
  /** The model with nothing in its scene but that node, at the origin and not turned, as large as it is in the scene. */
  piece: Model;
}

/** Why a clip is no motion of one rigid piece. */
export interface NotRigid {
  reason: string;
}

/** By so little a key may differ from the node's rest and still move nothing: a float32 rounding or two. */
const NOTHING = 1e-6;

/**
 * A clip's channels are followed through the nodes: what never leaves the rest counts for nothing, nor does what moves no geometry, such as a
 * camera. What is left must be one node, or several one within the other that hold no geometry but the innermost's; nothing above it may scale
 * it unevenly or mirror it, and no skin may tie it to what does not move with it.
 */
export function rigidClip(model: Model, clip: ReadClip): RigidClip | NotRigid {
  const { json } = model;
  const channels = clip.channels.filter((channel) => !isAtRest(json, channel));
  const reason = otherThanRigid(json, clip, channels);
  if (reason !== undefined) return { reason };
  const parents = parentsOf(json);
  const carriers = carriersOf(json);
  const carrying = new Set([...carriers].flatMap((node) => pathTo(parents, node)));
  const moved = [...new Set(channels.map(({ node }) => node))].filter((node) => carrying.has(node));
  if (moved.length === 0) return { reason: "it moves nothing that has geometry" };
  const paths = moved.map((node) => pathTo(parents, node));
  const nodes = paths.reduce((deepest, path) => (path.length > deepest.length ? path : deepest));
  const node = nodes[nodes.length - 1];
  const inside = subtree(json, [node]);
  const below = [...subtree(json, moved)].filter((other) => carriers.has(other));
  if (below.some((other) => !inside.has(other)))
    return { reason: `it moves ${moved.length} nodes that are not one rigid piece (${listed(json, moved)})` };
  const tied = tiedBySkin(json, inside);
  if (tied !== undefined) return { reason: `it moves a part of the skinned ${named(json, tied)}` };
  const own = decompose(localFrame(json, node));
  if (!own) return { reason: `${named(json, node)} is sheared or flat` };
  const path = nodes.flatMap((other): PathNode[] => {
    const rest = other === node ? { ...own, scale: 1 } : evenFrame(localFrame(json, other));
    const of = (path: ReadChannel["path"]) =>
      channels.find((channel) => channel.node === other && channel.path === path);
    return rest
      ? [{ rest, scale: rest.scale, translation: of("translation"), rotation: of("rotation") }]
      : [];
  });
  if (path.length < nodes.length)
    return { reason: `what is above ${named(json, node)} scales it unevenly or mirrors it` };
  const factor = path.reduce((product, { scale }) => product * scale, 1);
  const top = nodes.find((other) => moved.includes(other))!;
  return {
    node,
    name: json.nodes![top].name ?? "",
    path,
    piece: pieceOf(
      model,
      node,
      own.scale.map((scale) => scale * factor),
    ),
  };
}

function otherThanRigid(
  json: GltfJson,
  { pointers }: ReadClip,
  channels: readonly ReadChannel[],
): string | undefined {
  if (pointers.length > 0) return `it animates ${pointers[0]} by its pointer`;
  for (const [i, { node, path }] of channels.entries()) {
    if (path === "scale") return `it scales ${named(json, node)}`;
    if (path === "weights") return `it morphs ${named(json, node)}`;
    if (channels.findIndex((other) => other.node === node && other.path === path) !== i)
      return `it has two channels for the ${path} of ${named(json, node)}`;
  }
  return undefined;
}

/** Whether a channel leaves its node as it is without it. */
function isAtRest(json: GltfJson, { node, path, values, interpolation }: ReadChannel): boolean {
  const rest = restOf(json, node, path, values);
  const size = rest.length;
  const isLike = (at: number, wanted: readonly number[], sign: number) =>
    wanted.every((c, i) => Math.abs(sign * values[at + i] - c) <= NOTHING * Math.max(1, Math.abs(c)));
  const none = rest.map(() => 0);
  for (let at = 0, part = 0; at < values.length; at += size, part++) {
    const isTangent = interpolation === "CUBICSPLINE" && part % 3 !== 1;
    const isStill = isTangent
      ? isLike(at, none, 1)
      : isLike(at, rest, 1) || (path === "rotation" && isLike(at, rest, -1));
    if (!isStill) return false;
  }
  return true;
}

const STILL = { translation: [0, 0, 0], rotation: [0, 0, 0, 1], scale: [1, 1, 1] };

function restOf(
  json: GltfJson,
  index: number,
  path: ReadChannel["path"],
  values: Float32Array,
): readonly number[] {
  const node = json.nodes![index];
  if (path === "weights") {
    const mesh = node.mesh === undefined ? undefined : json.meshes![node.mesh];
    const targets = mesh?.primitives[0].targets?.length ?? 0;
    return node.weights ?? mesh?.weights ?? new Array<number>(targets || values.length).fill(0);
  }
  const rest = node.matrix ? decompose(localFrame(json, index)) : node;
  return rest?.[path] ?? STILL[path];
}

function parentsOf({ nodes = [] }: GltfJson): Int32Array {
  const parents = new Int32Array(nodes.length).fill(-1);
  nodes.forEach(({ children = [] }, node) => {
    for (const child of children) parents[child] = node;
  });
  return parents;
}

function pathTo(parents: Int32Array, node: number): number[] {
  const path: number[] = [];
  for (let at = node; at >= 0; at = parents[at]) path.push(at);
  return path.reverse();
}

/** Nodes that move geometry when they move: those with a mesh, and the joints of those with a skin. */
function carriersOf({ nodes = [], skins = [] }: GltfJson): Set<number> {
  return new Set(
    nodes.flatMap(({ mesh, skin }, node) =>
      mesh === undefined ? [] : [node, ...(skin === undefined ? [] : skins[skin].joints)],
    ),
  );
}

/** A node with a skinned mesh of which some, but not all, is inside. */
function tiedBySkin({ nodes = [], skins = [] }: GltfJson, inside: ReadonlySet<number>): number | undefined {
  const found = nodes.findIndex(({ mesh, skin }, node) => {
    if (mesh === undefined || skin === undefined) return false;
    const parts = [node, ...skins[skin].joints];
    const count = parts.filter((part) => inside.has(part)).length;
    return count > 0 && count < parts.length;
  });
  return found < 0 ? undefined : found;
}

const named = ({ nodes }: GltfJson, node: number): string => `"${nodes![node].name ?? `node ${node}`}"`;

/** The first of them. */
const listed = (json: GltfJson, nodes: readonly number[]): string =>
  [...nodes.slice(0, 3).map((node) => named(json, node)), ...(nodes.length > 3 ? ["…"] : [])].join(", ");

function pieceOf(model: Model, index: number, scale: number[]): Model {
  const { json } = model;
  const nodes = json.nodes!.map((node, i) => {
    if (i !== index) return node;
    const { matrix: _matrix, translation: _translation, rotation: _rotation, ...kept } = node;
    return { ...kept, scale };
  });
  return { ...model, json: { ...json, nodes, scene: 0, scenes: [{ nodes: [index] }], animations: [] } };
}
