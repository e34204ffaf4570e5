/** Launches in their vertical plane: what is asked of one, and which launch rises to a height or passes a point within the flight. */

import { cosDegrees, sinDegrees } from "../math/degrees.js";
import { RequestError } from "../math/request-error.js";
import type { ArcRequest } from "./arc.js";
import { pathOf } from "./arc-conditions.js";
import { atLeast, shown } from "./arc-message.js";
import type { Passage } from "./arc-passage.js";

/** A launch in its vertical plane, m/s. */
export interface PlaneLaunch {
  levelSpeed: number;
  climbSpeed: number;
}

/** What is known of a launch in its vertical plane. */
export interface PlaneRequest extends Pick<ArcRequest, "apex" | "speed" | "elevation" | "branch"> {
  /** Level and upward part of the velocity, where speed and elevation, or the velocity, are given; m/s. */
  velocity?: PlaneLaunch;
  /** Where the arc passes, from the release: `level` > 0 m ahead, `rise` m higher; `height` is that of the world. */
  through?: { level: number; rise: number; height: number };
  /** s, Infinity where the end is open. */
  duration: number;
}

/** Of the passages that come within the flight, the one of the wished branch. */
export function launchOf(lowFirst: readonly Passage[], plane: PlaneRequest): PlaneLaunch {
  const within = lowFirst.filter((passage) => passage.time <= plane.duration * (1 + 1e-12));
  const chosen = within[plane.branch === "high" ? within.length - 1 : 0];
  if (!chosen)
    throw new RequestError(
      pathOf("through"),
      `the point is passed after ${shown(lowFirst[0].time)} s, when the flight of ${plane.duration} s is over`,
      `needs a flight of at least ${atLeast(lowFirst[0].time)} s (arrive.after) or a point nearer the release`,
    );
  return { levelSpeed: plane.through!.level / chosen.time, climbSpeed: chosen.climb / chosen.time };
}

/** The tangent of an elevation that a launch can have on its way to a point ahead. */
export function slopeOf(elevation: number): number {
  if (Math.abs(elevation) !== 90) return sinDegrees(elevation) / cosDegrees(elevation);
  throw new RequestError(
    pathOf("elevation"),
    `a launch at ${elevation}° never comes abreast of the point`,
    "needs to be between -90° and 90°",
  );
}

/**
 * m/s: √(2 G apex) where the top comes within the flight, else that which is `apex` m up at the end (G T/2 + apex/T): the rise within the
 * flight grows with the speed, so there is always one. The top of a rise of 0 is the release.
 */
export function climbForApex(apex: number, gravity: number, duration: number): number {
  if (gravity === 0 && duration === Number.POSITIVE_INFINITY)
    throw new RequestError(
      pathOf("apex"),
      "without gravity and with an open end there is no highest point",
      "give another condition",
    );
  const topWithin = apex <= 0.5 * gravity * duration * duration;
  return topWithin ? Math.sqrt(2 * gravity * apex) : apex / duration + 0.5 * gravity * duration;
}

/** The passages of the point under a known gravity, rising and falling, of a flight that rises `apex` m. */
export function passagesByApex(
  point: { rise: number; height: number },
  apex: number,
  gravity: number,
  duration: number,
): Passage[] {
  const climbSpeed = climbForApex(apex, gravity, duration);
  const topWithin = apex <= 0.5 * gravity * duration * duration;
  // (w² − 2 G rise) is 2 G (apex − rise) where the top lies within the flight, without cancellation.
  const square = topWithin
    ? 2 * gravity * (apex - point.rise)
    : climbSpeed * climbSpeed - 2 * gravity * point.rise;
  if (apex < point.rise || square < 0)
    throw new RequestError(
      pathOf("through"),
      `a flight that rises ${apex} m never is at a height of ${shown(point.height)} m`,
      `needs a height of at most ${shown(point.height - point.rise + apex)} m, or an apex of at least ${shown(point.rise)} m`,
    );
  const root = Math.sqrt(square);
  const times = [(2 * point.rise) / (climbSpeed + root)];
  if (gravity > 0 && root > 0) times.push((climbSpeed + root) / gravity);
  const passages = times
    .filter((time) => time > 0)
    .map((time) => ({ time, climb: climbSpeed * time, gravity }));
  if (passages.length > 0) return passages;
  throw new RequestError(
    pathOf("through"),
    `a flight that rises ${apex} m is at a height of ${shown(point.height)} m at the release only`,
    `needs a height above ${shown(point.height - point.rise)} m`,
  );
}
