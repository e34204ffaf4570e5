import type { Accessor } from "@gltf-transform/core";
import type { GltfJson } from "./model.js";
import { type Frame, transformFrame } from "./scene.js";

export const INSTANCING = "EXT_mesh_gpu_instancing";

type Attributes = Partial<Record<"TRANSLATION" | "ROTATION" | "SCALE", number>>;

/** Indices of the accessors that place a node's instances; none where it has none. */
export function instanceAccessors(json: GltfJson, node: number): number[] {
  const { TRANSLATION, ROTATION, SCALE } = attributesOf(json, node);
  return [TRANSLATION, ROTATION, SCALE].filter((index) => index !== undefined);
}

/** How often a node shows its mesh: once without the extension. */
export function instanceCount(json: GltfJson, node: number): number {
  const [first] = instanceAccessors(json, node);
  return first === undefined ? 1 : json.accessors![first].count;
}

/** The frames of a node's instances within the node (EXT_mesh_gpu_instancing); a node without any is one. */
export function instanceFrames(
  json: GltfJson,
  node: number,
  accessors: ReadonlyMap<number, Accessor>,
): Frame[] {
  const { TRANSLATION, ROTATION, SCALE } = attributesOf(json, node);
  const element = (index: number | undefined, i: number): number[] | undefined =>
    index === undefined ? undefined : accessors.get(index)!.getElement(i, []);
  return Array.from({ length: instanceCount(json, node) }, (_, i) =>
    transformFrame({
      translation: element(TRANSLATION, i),
      rotation: element(ROTATION, i),
      scale: element(SCALE, i),
    }),
  );
}

const attributesOf = ({ nodes }: GltfJson, node: number): Attributes =>
  (nodes![node].extensions?.[INSTANCING] as { attributes: Attributes } | undefined)?.attributes ?? {};
