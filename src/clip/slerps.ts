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
      return (t, out) => {
        const c = cos((t - start) * speed);
        const s = sin((t - start) * speed);
        for (let i = 0; i < 4; i++) out[i] = c * from[i] + s * side[i];
      };
    },
    speed: (segment) => 2 * enter(segment),
  };
}
