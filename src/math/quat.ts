/** Unit quaternions [x, y, z, w] as rotations, in the order of glTF. */

import { atan2, cos, sin } from "./elementary.js";
import type { Mat3 } from "./mat3.js";
import {
  add,
  addScaled,
  cross,
  dot,
  length,
  normalize as normalizeVector,
  perpendicular,
  scale,
  subtract,
  type Vec3,
} from "./vec3.js";

/** [x, y, z, w], of unit length where it is a rotation; q and -q are the same one. */
export type Quat = readonly [number, number, number, number];

export const IDENTITY: Quat = [0, 0, 0, 1];

/** The rotation that does `b` first and then `a`. */
export const multiply = (a: Quat, b: Quat): Quat => [
  a[3] * b[0] + a[0] * b[3] + a[1] * b[2] - a[2] * b[1],
  a[3] * b[1] - a[0] * b[2] + a[1] * b[3] + a[2] * b[0],
  a[3] * b[2] + a[0] * b[1] - a[1] * b[0] + a[2] * b[3],
  a[3] * b[3] - a[0] * b[0] - a[1] * b[1] - a[2] * b[2],
];

export const conjugate = (q: Quat): Quat => [-q[0], -q[1], -q[2], q[3]];

export const negate = (q: Quat): Quat => [-q[0], -q[1], -q[2], -q[3]];

export const dotQuat = (a: Quat, b: Quat): number => a[0] * b[0] + a[1] * b[1] + a[2] * b[2] + a[3] * b[3];

export function normalize(q: Quat): Quat {
  const l = Math.sqrt(dotQuat(q, q));
  return [q[0] / l, q[1] / l, q[2] / l, q[3] / l];
}

/** Turns the vector `v` by `q`. */
export function rotate(q: Quat, v: Vec3): Vec3 {
  const u: Vec3 = [q[0], q[1], q[2]];
  const t = scale(cross(u, v), 2);
  return add(add(v, scale(t, q[3])), cross(u, t));
}

/** Turns `v` the other way round. */
export const rotateBack = (q: Quat, v: Vec3): Vec3 => rotate(conjugate(q), v);

/** Rotation by `angle` radians about the direction `axis` (any length but zero), right-hand rule. */
export function fromAxisAngle(axis: Vec3, angle: number): Quat {
  const s = sin(angle / 2);
  const n = normalizeVector(axis);
  return [n[0] * s, n[1] * s, n[2] * s, cos(angle / 2)];
}

/** The smallest rotation that takes the direction `from` onto `to`; half a turn about an axis of its choice when opposite. */
export function between(from: Vec3, to: Vec3): Quat {
  const a = normalizeVector(from);
  const b = normalizeVector(to);
  const c = cross(a, b);
  // The cross product of nearly opposite directions is short and points a little along them: squared up again.
  const square = addScaled(c, a, -dot(c, a));
  const axis = length(square) === 0 ? perpendicular(a) : normalizeVector(square);
  const sine = length(subtract(b, a)) / 2;
  const cosine = length(add(a, b)) / 2;
  return normalize([axis[0] * sine, axis[1] * sine, axis[2] * sine, cosine]);
}

/** The angle in radians (0 to π) of the rotation between two orientations; accurate for small angles too. */
export function angleBetween(a: Quat, b: Quat): number {
  const d = multiply(conjugate(a), b);
  return 2 * atan2(length([d[0], d[1], d[2]]), Math.abs(d[3]));
}

/** Axis times angle in radians (angle 0 to π) of a rotation. */
export function toRotationVector(q: Quat): Vec3 {
  const s: Quat = q[3] < 0 ? negate(q) : q;
  const l = length([s[0], s[1], s[2]]);
  if (l === 0) return [0, 0, 0];
  return scale([s[0], s[1], s[2]], (2 * atan2(l, s[3])) / l);
}

/** The rotation whose axis times angle in radians is `v`. */
export function fromRotationVector(v: Vec3): Quat {
  const angle = length(v);
  return angle === 0 ? IDENTITY : fromAxisAngle(v, angle);
}

/** Rows of the rotation matrix of a unit quaternion. */
export function toMatrix(q: Quat): Mat3 {
  const [x, y, z, w] = q;
  return [
    [1 - 2 * (y * y + z * z), 2 * (x * y - z * w), 2 * (x * z + y * w)],
    [2 * (x * y + z * w), 1 - 2 * (x * x + z * z), 2 * (y * z - x * w)],
    [2 * (x * z - y * w), 2 * (y * z + x * w), 1 - 2 * (x * x + y * y)],
  ];
}

/**
 * The unit quaternion of a rotation matrix, w ≥ 0 (Shepperd, J. Guidance and Control 1, 223, 1978: the largest of the
 * four squares is the divisor).
 */
export function fromMatrix(m: Mat3): Quat {
  const trace = m[0][0] + m[1][1] + m[2][2];
  let q: Quat;
  if (trace >= m[0][0] && trace >= m[1][1] && trace >= m[2][2])
    q = [m[2][1] - m[1][2], m[0][2] - m[2][0], m[1][0] - m[0][1], 1 + trace];
  else if (m[0][0] >= m[1][1] && m[0][0] >= m[2][2])
    q = [1 + 2 * m[0][0] - trace, m[0][1] + m[1][0], m[0][2] + m[2][0], m[2][1] - m[1][2]];
  else if (m[1][1] >= m[2][2])
    q = [m[0][1] + m[1][0], 1 + 2 * m[1][1] - trace, m[1][2] + m[2][1], m[0][2] - m[2][0]];
  else q = [m[0][2] + m[2][0], m[1][2] + m[2][1], 1 + 2 * m[2][2] - trace, m[1][0] - m[0][1]];
  const unit = normalize(q);
  return unit[3] < 0 ? negate(unit) : unit;
}
