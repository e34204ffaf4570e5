/** How far off its own axis a prop turns. */

import type { Flight } from "../../flight/flight.js";
import { rotateBack } from "../../math/quat.js";
import { length, type Vec3 } from "../../math/vec3.js";

/** Moments this much alike, as a share, leave open which of their axes is which. */
const ALIKE = 0.01;

/**
 * Degrees, 0 to 90, between the axis that the prop turns round in space (its angular momentum) and the axis of its own that lay nearest to that at
 * release; between two axes of like moments any one counts. At release it is the throw file's `wobble` of a throw about one of these axes. Null for a
 * prop that does not turn.
 *
 * @param moments about long, middle, short
 * @param t s, from the release on
 */
export function wobbleAngle(flight: Flight, moments: Vec3, t: number): number | null {
  const size = length(flight.angularMomentum);
  if (size === 0) return null;
  const own = (time: number): Vec3 => rotateBack(flight.orientation(time), flight.angularMomentum);
  const first = own(0).map(Math.abs);
  const main = first.indexOf(Math.max(...first));
  const now = own(t);
  const along: Vec3 = [0, 1, 2].map((i) => (isLike(moments, i, main) ? now[i] : 0)) as unknown as Vec3;
  return (Math.acos(Math.min(1, length(along) / size)) * 180) / Math.PI;
}

const isLike = (moments: Vec3, a: number, b: number): boolean =>
  Math.abs(moments[a] - moments[b]) <= ALIKE * moments[b];
