import { cbrt } from "../math/elementary.js";
import { determinant } from "../math/mat3.js";
import { nearestName } from "../math/nearest-name.js";
import { multiply, normalize, type Quat, rotate, toMatrix } from "../math/quat.js";
import { RequestError } from "../math/request-error.js";
import { add, scale as scaleVector, type Vec3 } from "../math/vec3.js";
import { decompose } from "./decompose.js";
import type { GltfJson, Model } from "./model.js";
import { type Frame, frameRotation, localFrame, sceneFrames, subtree } from "./scene.js";

/** A node of a model that is to be moved with all below it, and how it stands at rest. */
export interface MovedNode {
  index: number;
  name: string;
  /** Its parents together, parent frame → scene: x → translation + rotation·(scale·x). */
  parent: { translation: Vec3; rotation: Quat; scale: number };
  /** Its own transform, node → parent. */
  local: { translation: Vec3; rotation: Quat; scale: Vec3 };
  /** Its origin in the scene. */
  position: Vec3;
  /** Its axes in the scene. */
  rotation: Quat;
}

/** Parts by which the parents may differ from a turned, evenly scaled frame: some float32 roundings. */
const EVEN = 1e-6;

/**
 * The node of that name in the default scene. A rigid motion of it can be written into its translation and rotation exactly
 * where its parents only turn, move and evenly scale.
 *
 * Throws RequestError, path ["node"], where there is no such node or several; where its parents are scaled unevenly, mirrored or
 * animated; where it is mirrored or sheared itself; and where a skin ties what moves to what does not.
 */
export function movedNode({ json }: Model, name: string): MovedNode {
  const refuse = (fault: string, remedy: string): never => {
    throw new RequestError(["node"], `"${name}" ${fault}`, remedy);
  };
  const frames = sceneFrames(json);
  const nameOf = (node: number): string | undefined => json.nodes![node].name;
  const named = [...frames.keys()].filter((node) => nameOf(node) === name);
  if (named.length === 0) {
    const names = [...frames.keys()].flatMap((node) => nameOf(node) ?? []);
    refuse(
      "is no node of the default scene",
      names.length > 0 ? `nearest is "${nearestName(name, names)}"` : "the model has no named nodes",
    );
  }
  if (named.length > 1)
    refuse(
      `is the name of ${named.length} nodes (${named.join(", ")})`,
      "the name must be unique: rename them",
    );
  const [index] = named;
  checkTies(json, index, refuse);

  const above = parentOf(json, index);
  const parent = above === undefined ? AT_REST : evenFrame(frames.get(above)!);
  if (!parent)
    return refuse(
      "has parents that mirror it or scale it unevenly: no translation and rotation of it is a rigid motion",
      "apply their scale in the modelling program, or move a node further up",
    );
  const local = decompose(localFrame(json, index));
  if (!local) return refuse("has a transform that is sheared or flat", "apply it in the modelling program");
  if (local.scale.some((factor) => factor < 0))
    refuse(
      "is mirrored, which some players get wrong while it is animated",
      "apply its scale, or put a node above it",
    );
  return {
    index,
    name,
    parent,
    local,
    position: add(parent.translation, rotate(parent.rotation, scaleVector(local.translation, parent.scale))),
    rotation: multiply(parent.rotation, local.rotation),
  };
}

const AT_REST: MovedNode["parent"] = { translation: [0, 0, 0], rotation: [0, 0, 0, 1], scale: 1 };

const parentOf = ({ nodes }: GltfJson, index: number): number | undefined => {
  const found = nodes!.findIndex(({ children }) => children?.includes(index));
  return found < 0 ? undefined : found;
};

/** A frame as an even scale, a rotation and a translation; undefined where it is none. */
export function evenFrame({ linear, origin }: Frame): MovedNode["parent"] | undefined {
  const scale = cbrt(determinant(linear));
  const rotation = frameRotation(linear);
  if (!(scale > 0) || !rotation) return undefined;
  const even = toMatrix(rotation).every((row, i) =>
    row.every((entry, j) => Math.abs(entry * scale - linear[i][j]) <= EVEN * scale),
  );
  return even ? { translation: origin, rotation: normalize(rotation), scale } : undefined;
}

/** What would move the node besides our clips, or be moved by them besides what is below it. */
function checkTies(json: GltfJson, index: number, refuse: (fault: string, remedy: string) => never): void {
  const below = subtree(json, [index]);
  const shown = (node: number): string => `"${json.nodes![node].name ?? node}"`;
  const animated = new Set(
    (json.animations ?? []).flatMap(({ channels }) => channels.flatMap(({ target }) => target.node ?? [])),
  );
  for (let node = parentOf(json, index); node !== undefined; node = parentOf(json, node))
    if (animated.has(node))
      refuse(
        `has the parent ${shown(node)}, which the model's own clips move`,
        "take those clips away, or move a node further up",
      );
  json.nodes!.forEach(({ skin, mesh }, node) => {
    if (skin === undefined || mesh === undefined) return;
    const inside = json.skins![skin].joints.filter((joint) => below.has(joint)).length;
    if (inside === (below.has(node) ? json.skins![skin].joints.length : 0)) return;
    refuse(
      below.has(node)
        ? `holds the skinned mesh ${shown(node)}, but not all of its joints: it would not move with it`
        : `moves joints of the skinned mesh ${shown(node)}, which is not below it`,
      "name a node that holds the mesh and all its joints",
    );
  });
}
