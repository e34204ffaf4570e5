/** What of a take is likelier a slip of the unit than meant. */

import type { Launch } from "../flight/launch.js";
import { length } from "../math/vec3.js";

/** m/s: the fastest ball thrown by hand left at 47, a struck golf ball leaves at 90 (from memory). */
const FASTEST = 100;
/** Turns a second: a spun top or a flicked coin makes 20 to 50 (from memory). */
const MOST_TURNS = 100;

/** One line each, which names the keys that answer. */
export function takeDoubts({ velocity, spin }: Pick<Launch, "velocity" | "spin">): string[] {
  const speed = length(velocity);
  const turns = length(spin) / (2 * Math.PI);
  return [
    ...(speed > FASTEST
      ? [
          `leaves at ${short(speed)} m/s, faster than anything is thrown: places are in metres and times in seconds; host.unit names another unit`,
        ]
      : []),
    ...(turns > MOST_TURNS
      ? [
          `turns ${short(turns)} times a second: spin.rate is in turns a second and release.angularVelocity in rad/s, neither in degrees`,
        ]
      : []),
  ];
}

const short = (value: number): string => String(Number(value.toPrecision(3)));
