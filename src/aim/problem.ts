import type { Mat3 } from "../math/mat3.js";
import { conjugate, multiply, normalize, type Quat, toMatrix } from "../math/quat.js";
import { scale, type Vec3 } from "../math/vec3.js";
import type { Turn } from "./polish.js";
import { type ReducedBody, reduceBody } from "./reduced-body.js";

/** From pose to pose, in the body's ordered principal frame at release and with the flight as unit of time. */
export interface Problem {
  turn: Turn;
  body: ReducedBody;
  /** Rotation from the principal frame at the end to that at release. */
  rotation: Quat;
  /** Its rows. */
  end: Mat3;
}

export function problemOf(turn: Turn): Problem {
  const body = reduceBody(turn.moments);
  const q = normalize(multiply(conjugate(turn.start), turn.end));
  const [x, y, z] = body.toOrdered([q[0], q[1], q[2]]);
  const rotation: Quat = q[3] < 0 ? [-x, -y, -z, -q[3]] : [x, y, z, q[3]];
  return { turn, body, rotation, end: toMatrix(rotation) };
}

/** Angular velocity at release, rad/s, principal frame, of a reduced momentum; and back. */
export function spinOf({ body, turn }: Problem, momentum: Vec3): Vec3 {
  const [x, y, z] = body.inverse;
  return scale(body.fromOrdered([x * momentum[0], y * momentum[1], z * momentum[2]]), 1 / turn.duration);
}

export function momentumOf({ body, turn }: Problem, spin: Vec3): Vec3 {
  const [x, y, z] = body.inverse;
  const [a, b, c] = scale(body.toOrdered(spin), turn.duration);
  return [a / x, b / y, c / z];
}
