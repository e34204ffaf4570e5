/** A clip's record in glTF's coordinates, whatever host it was written for. */

import { hostFrame } from "../bake/host.js";
import type { MotionState } from "../bake/motion.js";
import type { Host } from "../throwfile/types.js";
import type { ClipRecord } from "./clip-record.js";

/** @param host whose numbers the record holds; none: glTF's, and the record is answered as it is */
export function worldClip(clip: ClipRecord, host?: Host): ClipRecord {
  if (!host) return clip;
  const { vector, rotation, angular, length } = hostFrame(host).toWorld;
  const state = (state: MotionState): MotionState => ({
    centerOfMass: vector(state.centerOfMass),
    rotation: rotation(state.rotation),
    velocity: state.velocity && vector(state.velocity),
    angularVelocity: angular(state.angularVelocity),
  });
  const ends = <T extends { release: MotionState; arrival: MotionState }>(part: T): T => ({
    ...part,
    release: state(part.release),
    arrival: state(part.arrival),
  });
  return {
    ...ends(clip),
    apex: clip.apex && { ...clip.apex, rise: length(clip.apex.rise) },
    ...(clip.parts && { parts: clip.parts.map(ends) }),
  };
}
