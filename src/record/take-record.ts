/** What the record says of takes and tracks, those of throws and of chains. */

import { modelRotation } from "../bake/motion.js";
import { type Take, toleranceOf } from "../bake/take.js";
import { type Track, trackBytes } from "../clip/track.js";
import { rotate } from "../math/quat.js";
import { add, distance } from "../math/vec3.js";
import type { Prop } from "../prop/prop.js";
import type { ThrowFile } from "../throwfile/types.js";

export const trackRecord = (file: ThrowFile, prop: Prop, track: Track) => ({
  tolerance: toleranceOf(file, prop),
  error: track.error,
  keys: { translation: track.translation.times.length, rotation: track.rotation.times.length },
  bytes: trackBytes(track),
});

/** rad from the orientation asked for at arrival. */
export const missAngle = ({ aimed }: Take): number | null => ("missAngle" in aimed ? aimed.missAngle : null);

/** m from the mark to where the arrival point really is at the end, or from the floor to the prop; null without either. */
export function missedBy({ flight, wish, gap }: Take, prop: Prop): number | null {
  const { to } = wish.arc;
  if (!to) return gap === undefined ? null : Math.abs(gap);
  const arm = rotate(modelRotation(flight, prop, flight.duration), wish.arrivalOffset);
  return distance(add(flight.centerOfMass(flight.duration), arm), to);
}
