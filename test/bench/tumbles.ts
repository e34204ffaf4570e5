/** Flights that turn about a resting centre of mass, and where they truly end. */

import type { Launch } from "../../src/flight/launch.js";
import { angleBetween, normalize, type Quat } from "../../src/math/quat.js";
import { type Vec3, ZERO } from "../../src/math/vec3.js";
import { exactRotation } from "../flight/exact-rotation.js";

export interface Tumble {
  name: string;
  launch: Launch;
  /** Of an orientation at the flight's end, rad, against a 60-digit Taylor series. */
  miss(end: Quat): number;
}

export const TUMBLES: readonly Tumble[] = [
  tumble("wrench end over end, 1 s", [0.02, 0.18, 0.19], [0.4, 0.2, 9], 1),
  tumble("tumble about the middle axis, 2 s", [0.3, 0.8, 1], [0.1, 12, 0.1], 2),
  tumble("needle, 5 s", [1e-4, 1, 1.00005], [30, 9, 4], 5),
];

function tumble(name: string, moments: Vec3, spin: Vec3, duration: number): Tumble {
  const orientation: Quat = [0, 0, 0, 1];
  const launch = {
    centerOfMass: ZERO,
    velocity: ZERO,
    gravity: ZERO,
    orientation,
    spin,
    moments,
    duration,
  };
  const [end] = exactRotation([...orientation], [...spin], [...moments], [duration]);
  const truth = normalize(end.orientation as unknown as Quat);
  return { name, launch, miss: (q) => angleBetween(q, truth) };
}
