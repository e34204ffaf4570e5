import { atan2 } from "../math/elementary.js";
import { addScaled, cross, dot, length, normalize, perpendicular, scale, type Vec3 } from "../math/vec3.js";
import { momentumCone } from "./cone.js";
import { type Curve, coneCurve, greatCircle } from "./curve.js";
import type { Problem } from "./problem.js";
import type { ReducedBody } from "./reduced-body.js";

/** Poses this near to an exact family, rad, are named by it. */
const NEAR = 1e-4;
/** Moments this near to each other, as a share, are one. */
const ALIKE = 1e-9;

const isSphere = (body: ReducedBody): boolean => body.d13 <= ALIKE;

/**
 * The name of the family of exact solutions that the end pose belongs to, or lies within 1e-4 rad of: poses that leave the ellipsoid of inertia
 * as it was, so that every direction of the momentum is on the right polhode and solutions come in continua.
 */
export function familyOf({ body, rotation }: Problem): string | undefined {
  const [x, y, z, w] = rotation;
  if (isSphere(body)) return "sphere";
  if (2 * length([x, y, z]) < NEAR) return "same pose";
  const oblate = body.d12 <= ALIKE * body.d13;
  const prolate = body.d23 <= ALIKE * body.d13;
  if (oblate && 2 * length([x, y, 0]) < NEAR) return "turned about the axis of symmetry";
  if (prolate && 2 * length([0, y, z]) < NEAR) return "turned about the axis of symmetry";
  if (oblate && 2 * length([z, w, 0]) < NEAR) return "end for end";
  if (prolate && 2 * length([x, w, 0]) < NEAR) return "end for end";
  for (const [axis, name] of ["long", "middle", "short"].entries()) {
    const rest = [x, y, z].filter((_, i) => i !== axis);
    if (2 * length([rest[0], rest[1], w]) < NEAR) return `half turn about the ${name} axis`;
  }
  return undefined;
}

/** The curves on which the momenta that lead to the end pose lie; for an exact family those of a scan through the wished axis. */
export function curvesOf({ body, end }: Problem, axis?: Vec3): Curve[] {
  if (isSphere(body)) return [];
  const cone = momentumCone(body, end);
  if (cone) return [coneCurve(body, cone)];
  if (!axis) return UNITS.map((unit, i) => greatCircle(body, unit, UNITS[(i + 1) % 3]));
  const along = momentumAbout(body, axis);
  const across = UNITS.map((unit) => addScaled(unit, along, -dot(unit, along)));
  return across.filter((v) => length(v) > 0.1).map((v) => greatCircle(body, along, normalize(v)));
}

/**
 * Momenta whose spin stays where it is, or nearly, and leads to the end pose, or nearly, within a number of turns: clean spins about principal
 * axes and the wished one, and about the axis of the rotation between the poses.
 */
export function pureSpins(
  { body, rotation }: Problem,
  leastTurns: number,
  mostTurns: number,
  axis?: Vec3,
): Vec3[] {
  const [x, y, z, w] = rotation;
  const vector: Vec3 = [x, y, z];
  const size = length(vector);
  const wished = axis && normalize(axis);
  const axes: Vec3[] = wished ? [wished, ...UNITS] : [...UNITS];
  if (size > 1e-12) axes.push(normalize(vector));
  else if (isSphere(body) && !wished) axes.push(perpendicular(UNITS[0]));
  const found: Vec3[] = [];
  for (const unit of axes) {
    const along = dot(vector, unit);
    if (length(addScaled(vector, unit, -along)) > STRAY) continue;
    const angle = 2 * atan2(along, w);
    const most = Math.ceil(mostTurns + 1);
    for (let k = -most; k <= most; k++) {
      const turned = angle + 2 * Math.PI * k;
      const turns = Math.abs(turned) / (2 * Math.PI);
      if (turns < leastTurns - 0.01 || turns > mostTurns + 0.01) continue;
      const momentum = overInverse(body, scale(unit, turned));
      // torque in the body's frame: by how much the momentum moves in the body within the flight
      if (length(cross(momentum, scale(unit, turned))) <= STRAY * Math.max(length(momentum), 1e-300))
        found.push(momentum);
    }
  }
  return found;
}

/** How far a pure spin may stray, rad, and still be a start for Newton's method. */
const STRAY = 0.05;

const UNITS: Vec3[] = [
  [1, 0, 0],
  [0, 1, 0],
  [0, 0, 1],
];

const overInverse = ({ inverse }: ReducedBody, v: Vec3): Vec3 => [
  v[0] / inverse[0],
  v[1] / inverse[1],
  v[2] / inverse[2],
];

const momentumAbout = (body: ReducedBody, axis: Vec3): Vec3 => normalize(overInverse(body, axis));
