import { cos, sin } from "../math/elementary.js";
import { GreatCircle } from "./great-circle.js";
import type { RotationKeys } from "./rotation-keys.js";

/** Slerp from key to key. */
export interface Slerps {
  played: RotationKeys["played"];
  /** Angular speed in space of a segment, rad/s. */
  speed(segment: number): number;
}

/**
 * @param keys unit quaternions, 4 numbers each, neighbours in one hemisphere
 * @param keyTime s
 */
export function slerps(keys: Float64Array, keyTime: (key: number) => number): Slerps {
  const circle = new GreatCircle();
  const { from, side } = circle;
  const enter = (segment: number): number => {
    circle.set(keys, 4 * segment, keys, 4 * (segment + 1));
    return circle.angle / (keyTime(segment + 1) - keyTime(segment));
  };
  return {
    played(segment) {
      const start = keyTime(segment);
      const speed = enter(segment);
      let c = 1;
      let s = 0;
      let last = Number.NaN;
      let seen = Number.NaN;
      // Times mostly follow each other at one step: then a turn by it takes the place of two series.
      let step = Number.NaN;
      let cosStep = 1;
      let sinStep = 0;
      return (t, out) => {
        const way = t - last;
        last = t;
        if (way === step) {
          const next = c * cosStep - s * sinStep;
          s = s * cosStep + c * sinStep;
          c = next;
        } else {
          c = cos((t - start) * speed);
          s = sin((t - start) * speed);
          if (way === seen) {
            step = way;
            cosStep = cos(step * speed);
            sinStep = sin(step * speed);
          }
          seen = way;
        }
        out[0] = c * from[0] + s * side[0];
        out[1] = c * from[1] + s * side[1];
        out[2] = c * from[2] + s * side[2];
        out[3] = c * from[3] + s * side[3];
      };
    },
    speed: (segment) => 2 * enter(segment),
  };
}
