/** The clips that a file of takes adds to a prop that is a node of its model: they move that node itself. */

import type { Graft, Rest } from "../gltf/splice.js";
import type { MovedNode } from "../gltf/surfaces.js";
import { type Quat, rotateBack } from "../math/quat.js";
import { scale, subtract, type Vec3 } from "../math/vec3.js";
import { firstKey, type NamedTrack, newClips, onlyTrack } from "./graft.js";

/**
 * The node keeps its own scale, times the model's factor. It rests as modelled, or, where the file holds one clip, at that
 * clip's first key.
 *
 * @param factor on the whole model
 */
export function nodeGraft(node: MovedNode, factor: number, clips: readonly NamedTrack[]): Graft {
  const only = onlyTrack(clips);
  const rest: Rest | undefined = only
    ? {
        node: node.index,
        translation: firstKey<Vec3>(only.translation),
        rotation: firstKey<Quat>(only.rotation),
      }
    : factor === 1
      ? undefined
      : { node: node.index, translation: placeInParent(node, scale(node.position, factor)) };
  if (rest && factor !== 1) rest.scale = scale(node.local.scale, factor);
  return {
    nodes: [],
    ...(rest && { rests: [rest] }),
    clips: newClips(clips, { translation: { node: node.index }, rotation: { node: node.index } }),
  };
}

const placeInParent = ({ parent }: MovedNode, place: Vec3): Vec3 =>
  scale(rotateBack(parent.rotation, subtract(place, parent.translation)), 1 / parent.scale);
