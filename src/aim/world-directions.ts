/** The words for directions of the world: +Y is up, and `ahead` is level, along the throw. */

import { RequestError } from "../math/request-error.js";
import { cross, length, negate, normalize, type Vec3 } from "../math/vec3.js";

export const WORLD_DIRECTIONS = ["up", "down", "ahead", "back", "left", "right", "flight"] as const;

export const UP: Vec3 = [0, 1, 0];

/** What the words that depend on the throw are measured by; vectors of any length, metres or m/s alike. */
export interface ThrowCourse {
  /** Along the throw as asked for: from mark to mark, else the stated heading or velocity. Its level part is `ahead`. */
  ahead?: Vec3;
  /** The centre of mass's velocity at the moment that is meant. */
  travel?: Vec3;
}

/**
 * The unit vector (world, +Y up) that a word or a vector of any length stands for.
 *
 * @throws RequestError where the throw leaves the word without meaning: `ahead` of a vertical throw, `flight` at no speed.
 */
export function worldDirection(direction: string | Vec3, course: ThrowCourse): Vec3 {
  if (typeof direction !== "string") return normalize(direction);
  switch (direction) {
    case "up":
      return UP;
    case "down":
      return negate(UP);
    case "flight":
      return travelOf(course);
    case "ahead":
      return aheadOf(course, direction);
    case "back":
      return negate(aheadOf(course, direction));
    case "right":
      return cross(aheadOf(course, direction), UP);
    case "left":
      return cross(UP, aheadOf(course, direction));
    default:
      throw new RequestError(
        [],
        `no direction of the world is called "${direction}"`,
        `one of ${WORLD_DIRECTIONS.join(", ")}`,
      );
  }
}

function aheadOf(course: ThrowCourse, word: string): Vec3 {
  const level: Vec3 = course.ahead ? [course.ahead[0], 0, course.ahead[2]] : [0, 0, 0];
  // a course within a billionth of the vertical has no level part to speak of, only rounding
  if (!course.ahead || length(level) <= 1e-9 * length(course.ahead))
    throw new RequestError(
      [],
      `"${word}" has no meaning for a throw straight up or down`,
      "name the direction as [x, y, z], or use up or down",
    );
  return normalize(level);
}

function travelOf(course: ThrowCourse): Vec3 {
  if (!course.travel || length(course.travel) === 0)
    throw new RequestError(
      [],
      '"flight" has no meaning where the centre of mass has no speed',
      "name the direction as [x, y, z], or use up, down or ahead",
    );
  return normalize(course.travel);
}
