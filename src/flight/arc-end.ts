/** The end of an arc that was open: a touch found once the whole motion was known. */

import { RequestError } from "../math/request-error.js";
import { dot, subtract } from "../math/vec3.js";
import type { Arc, ArcRequest } from "./arc.js";
import { pathOf } from "./arc-conditions.js";
import { levelAndRise, makeArc, upOf } from "./arc-frame.js";
import { atMost, shown } from "./arc-message.js";

/**
 * The arc with its duration (s) and its highest point within it.
 *
 * @param request what `solveArc` was asked
 * @throws RequestError where the end comes before the rise or the point that was asked for
 */
export function endArc(request: ArcRequest, arc: Arc, duration: number): Arc {
  const up = upOf(arc.gravity);
  const { rise: climbSpeed, level: levelSpeed, ahead } = levelAndRise([0, 0, 0], arc.velocity, up);
  const ended: Arc = {
    ...makeArc({ ahead, up, levelSpeed, climbSpeed, gravity: arc.gravity, duration }),
    velocity: arc.velocity,
  };
  if (request.apex !== undefined && ended.apex.rise < request.apex * (1 - 1e-12))
    throw new RequestError(
      pathOf("apex"),
      `the flight ends after ${shown(duration)} s, before it has risen ${request.apex} m`,
      `needs at most ${atMost(ended.apex.rise)} m`,
    );
  if (
    request.through !== undefined &&
    dot(subtract(request.through, request.from), ahead) > levelSpeed * duration * (1 + 1e-12)
  )
    throw new RequestError(
      pathOf("through"),
      `the flight ends after ${shown(duration)} s, before it is abreast of the point`,
      `needs a point at most ${atMost(levelSpeed * duration)} m ahead`,
    );
  return ended;
}
