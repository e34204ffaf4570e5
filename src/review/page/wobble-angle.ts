/** How far off its own axis a prop turns. */

import type { Flight } from "../../flight/flight.js";
import { rotateBack } from "../../math/quat.js";
import { length, type Vec3 } from "../../math/vec3.js";

/** Moments this much alike, as a share, leave open which of their axes is which. */
const ALIKE = 0.01;

/**
 * Degrees, 0 to 90, between the axis that the prop turns round in space (its angular momentum) and the axis of the prop that most of its turning
 * is about; between two axes of like moments any one counts. The throw file's `wobble` is this angle at release. Null for a prop that does not turn.
 *
 * @param moments about long, middle, short
 * @param share of the turning about each
 * @param t s, from the release on
 */
export function wobbleAngle(flight: Flight, moments: Vec3, share: Vec3, t: number): number | null {
  const size = length(flight.angularMomentum);
  if (size === 0) return null;
  const main = share.indexOf(Math.max(...share));
  const own = rotateBack(flight.orientation(t), flight.angularMomentum);
  const along = moments.map((moment, i) =>
    i === main || Math.abs(moment - moments[main]) <= ALIKE * moments[main] ? own[i] : 0,
  ) as unknown as Vec3;
  return (Math.acos(Math.min(1, length(along) / size)) * 180) / Math.PI;
}
