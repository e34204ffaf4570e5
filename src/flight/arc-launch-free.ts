/** Launches whose gravity is solved: one condition more than a launch needs. */

import { RequestError } from "../math/request-error.js";
import { pathOf } from "./arc-conditions.js";
import { launchOf, type PlaneLaunch, type PlaneRequest, slopeOf } from "./arc-launch-plane.js";
import { atLeast, atMost, shown } from "./arc-message.js";
import { passageBySpeed, shapeByApex, shapeBySlope } from "./arc-passage.js";

/** A launch and the strength of its gravity, m/s². */
export interface FreeLaunch {
  launch: PlaneLaunch;
  gravity: number;
}

export function freeLaunch(plane: PlaneRequest): FreeLaunch {
  const { velocity, apex, through, speed } = plane;
  if (velocity)
    return {
      launch: velocity,
      gravity: through ? gravityForPoint(velocity, plane) : gravityForApex(velocity, apex!, plane.duration),
    };
  return speed === undefined ? endingAtApex(plane) : atSpeed(plane, speed);
}

/** w²/(2 apex) where the top comes within the flight, else what is `apex` m up at the end: 2 (w T − apex)/T². */
function gravityForApex({ climbSpeed: w }: PlaneLaunch, apex: number, duration: number): number {
  if (!(w > 0))
    throw new RequestError(
      ["gravity"],
      `a launch that does not rise (${shown(w)} m/s upward) has its highest point at release under any gravity`,
      "give arc.through instead of arc.apex, or launch upward",
    );
  if (apex === 0)
    throw new RequestError(
      pathOf("apex"),
      "a launch upward rises more than 0 m",
      "needs to be more than 0 m",
    );
  if (apex <= 0.5 * w * duration) return (w * w) / (2 * apex);
  if (apex < w * duration) return (2 * (w - apex / duration)) / duration;
  throw new RequestError(
    ["gravity"],
    `to rise ${apex} m in ${duration} s from ${shown(w)} m/s upward would need a gravity of 0 or less`,
    `needs less than ${shown(w * duration)} m (arc.apex)`,
  );
}

function gravityForPoint(velocity: PlaneLaunch, plane: PlaneRequest): number {
  const { level, rise, height } = plane.through!;
  const time = level / velocity.levelSpeed;
  const climb = velocity.climbSpeed * time;
  if (!(time < Number.POSITIVE_INFINITY))
    throw new RequestError(
      pathOf("through"),
      "a launch straight up or down is never abreast of the point",
      "give arc.apex instead",
    );
  launchOf([{ time, climb, gravity: 0 }], plane);
  if (climb > rise) return (2 * (climb - rise)) / (time * time);
  throw new RequestError(
    ["gravity"],
    `to pass at a height of ${shown(height)} m would need a gravity of 0 or less`,
    `needs a height below ${atMost(height - rise + climb)} m (arc.through)`,
  );
}

/** Speed, apex and point: apex and point fix the shape (the point before or behind the top), the speed its time. */
function atSpeed(plane: PlaneRequest, speed: number): FreeLaunch {
  const { level, rise, height } = plane.through!;
  const apex = plane.apex!;
  if (apex < rise || apex === 0)
    throw new RequestError(
      pathOf("apex"),
      `an apex of ${apex} m is below the point to pass through (at ${shown(height)} m)`,
      `needs at least ${atLeast(Math.max(0, rise))} m, and more than 0`,
    );
  const passages = [false, true]
    .filter((descending) => descending || (rise > 0 && rise < apex))
    .map((descending) => passageBySpeed(shapeByApex(rise, apex, descending), level, speed));
  const topTime = (passage: (typeof passages)[number]) => passage.climb / passage.time / passage.gravity;
  const within = passages.filter((passage) => topTime(passage) <= plane.duration * (1 + 1e-12));
  if (within.length === 0)
    throw new RequestError(
      ["arrive", "after"],
      `the flight of ${plane.duration} s would end before its highest point`,
      `needs at least ${atLeast(Math.min(...passages.map(topTime)))} s`,
    );
  const launch = launchOf(within, plane);
  return { launch, gravity: within.find((passage) => level / passage.time === launch.levelSpeed)!.gravity };
}

/**
 * Elevation, apex and point, without the speed: elevation and point fix the shape (height x m − κ x² at x ahead), so its top has any height but by
 * chance; the apex is then where the flight ends, still rising: the smaller root of κ x² − m x + apex = 0.
 */
function endingAtApex(plane: PlaneRequest): FreeLaunch {
  const { apex, elevation, through, duration } = plane;
  const { level, rise, height } = through!;
  const slope = slopeOf(elevation!);
  const { sag } = shapeBySlope(level, rise, slope);
  if (!(sag > 0))
    throw new RequestError(
      ["gravity"],
      `to pass at a height of ${shown(height)} m would need a gravity of 0 or less`,
      `needs a height below ${atMost(height + sag)} m (arc.through)`,
    );
  const curve = sag / (level * level);
  const square = slope * slope - 4 * curve * apex!;
  if (duration === Number.POSITIVE_INFINITY || !(slope > 0) || square < 0 || apex === 0)
    throw new RequestError(
      pathOf("apex"),
      `elevation and point fix the shape of the arc, and ${apex} m is not a height at which it could end rising`,
      "give arc.speed instead of it",
    );
  const levelSpeed = (2 * apex!) / (slope + Math.sqrt(square)) / duration;
  const time = level / levelSpeed;
  const launch = launchOf([{ time, climb: level * slope, gravity: 0 }], plane);
  return { launch, gravity: (2 * sag) / (time * time) };
}
