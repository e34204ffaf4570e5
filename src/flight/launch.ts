import type { Quat } from "../math/quat.js";
import type { Vec3 } from "../math/vec3.js";

/** A throw fully stated: all that the laws of motion need to know at time 0. */
export interface Launch {
  /** World frame, m. */
  centerOfMass: Vec3;
  /** Of the centre of mass, world frame, m/s. */
  velocity: Vec3;
  /** World frame, m/s². */
  gravity: Vec3;
  /** Turns the principal frame onto the world at time 0; need not be of unit length. */
  orientation: Quat;
  /** Angular velocity in the principal frame at time 0, rad/s. */
  spin: Vec3;
  /** Principal moments of inertia about the principal frame's x, y and z (in any order of size), kg m². */
  moments: Vec3;
  /** How long the flight lasts, s; 0 or more. */
  duration: number;
}

/** Relative rounding allowed to the moments of a flat body, whose greatest is the sum of the others. */
const TRIANGLE_SLACK = 1e-6;

/** Throws a RangeError naming the member of `launch` that no body and no flight can have. */
export function checkLaunch(launch: Launch): void {
  for (const key of ["centerOfMass", "velocity", "gravity", "orientation", "spin", "moments"] as const)
    if (!launch[key].every(Number.isFinite))
      throw new RangeError(`launch.${key} is [${launch[key].join(", ")}]: every component must be finite`);
  if (!(launch.duration >= 0 && launch.duration < Number.POSITIVE_INFINITY))
    throw new RangeError(`launch.duration is ${launch.duration}: it must be a time of 0 s or more`);
  if (!launch.moments.every((moment) => moment > 0))
    throw new RangeError(`launch.moments is [${launch.moments.join(", ")}]: each must be greater than 0`);
  const [least, middle, greatest] = [...launch.moments].sort((a, b) => a - b);
  if (greatest > (least + middle) * (1 + TRIANGLE_SLACK))
    throw new RangeError(
      `launch.moments is [${launch.moments.join(", ")}]: no body's greatest moment exceeds the sum of the others`,
    );
  if (launch.orientation.every((component) => component === 0))
    throw new RangeError(
      "launch.orientation is [0, 0, 0, 0]: it must be a quaternion of a length other than 0",
    );
}
