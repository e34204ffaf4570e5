/** Whether a flying body keeps to one side of a plane, or out of a box, over the whole continuous flight. */

import { type Quat, rotate, rotateBack } from "../math/quat.js";
import { add, dot, subtract, type Vec3 } from "../math/vec3.js";
import { bodyOrientation, type FlyingBody, gapRounding, lookAt, type Side } from "./clearance.js";
import { separation } from "./clearance-axis.js";

/** A box anywhere; world frame, metres. */
export interface Box {
  center: Vec3;
  /** Half its edges. */
  half: Vec3;
  /** Turns the world's axes onto the box's. */
  rotation: Quat;
}

/**
 * How far beyond its bound a body may be, m. A touch must pass and rounding with it, and at a box's corner the way in is √3 of this: under 1e-9 m in all.
 */
const SLACK = 5e-10;
/** Of the slack: what is left of it where a bound counts as broken. */
const BROKEN = 0.01;

/** Whether no point of the body is ever beyond the plane: by more than 5e-10 m it never is, and one that never is passes. */
export function keepsTo(body: FlyingBody, side: Side): boolean {
  const { duration } = body.flight;
  const slack = Math.max(SLACK, 4 * gapRounding(body, side, 0), 4 * gapRounding(body, side, duration));
  const bound = { ...side, offset: side.offset - slack };
  for (let t = 0; ; ) {
    const look = lookAt(body, bound, t);
    if (look.gap <= BROKEN * slack) return false;
    if (t === duration) return true;
    const next = look.safeUntil(duration);
    if (next <= t) return false;
    t = next;
  }
}

/**
 * Whether no point of the body's convex hull is ever inside the box; touching it is allowed. At each moment a plane is laid between the two, and the
 * body surely stays on its side of it for a while (`lookAt`); then the next.
 */
export function keepsOutOf(body: FlyingBody, { center, half, rotation }: Box): boolean {
  const { flight, support } = body;
  const { duration } = flight;
  const away: Side = { normal: [0, 1, 0], offset: Math.max(...center.map(Math.abs)) + Math.max(...half) };
  const slack = Math.max(SLACK, 4 * gapRounding(body, away, 0), 4 * gapRounding(body, away, duration));
  const edges = half.map((value) => Math.max(0, value - slack)) as unknown as Vec3;
  /** The box's point that lies furthest along a direction, from its middle. */
  const furthest = (direction: Vec3): Vec3 => {
    const own = rotateBack(rotation, direction);
    const corner = edges.map((edge, i) => (own[i] < 0 ? -edge : edge)) as unknown as Vec3;
    return rotate(rotation, corner);
  };
  let normal = subtract(flight.centerOfMass(0), center);
  if (normal.every((component) => component === 0)) normal = [0, 1, 0];
  for (let t = 0; ; ) {
    const orientation = bodyOrientation(body, t);
    const between = subtract(flight.centerOfMass(t), center);
    const found = separation(
      (direction) => {
        const arm = rotate(orientation, support.lowest(rotateBack(orientation, direction)));
        return subtract(add(between, arm), furthest(direction));
      },
      normal,
      BROKEN * slack,
    );
    if (!found) return false;
    if (t === duration) return true;
    normal = found.normal;
    const side = { normal, offset: dot(normal, add(center, furthest(normal))) };
    const next = lookAt(body, side, t).safeUntil(duration);
    if (next <= t) return false;
    t = next;
  }
}
