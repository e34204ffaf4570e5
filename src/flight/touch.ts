import { cross } from "../math/vec3.js";
import { type FlyingBody, gapRounding, lookAt, type Side, turningAcceleration } from "./clearance.js";

/** A gap of this much is a touch, m. */
const TOUCHING = 1e-12;
/** Nearer than this at release, m, a body stands on the plane, whatever rounding made of its place. */
const STANDING = 1e-9;
/** What a body that touches at release has to part by before it can touch for the first time, m. */
const PARTED = 1e-6;

/**
 * The time, s, at which any point of the body first touches the plane, coming from the side that `side` names; undefined where it does not within the
 * flight. No point is beyond the plane before: conservative advancement, which samples nothing and so jumps over nothing. The gap is then
 * 1e-12 m at most, or what rounding makes of places so far from the origin.
 *
 * A body that touches the plane at release, or is beyond it, has to part from it by a thousandth of a millimetre first.
 */
export function firstTouch(body: FlyingBody, side: Side): number | undefined {
  const end = body.flight.duration;
  let t = lookAt(body, side, 0).gap <= STANDING ? partingTime(body, side) : 0;
  while (t <= end) {
    const look = lookAt(body, side, t);
    if (look.gap <= Math.max(TOUCHING, gapRounding(body, side, t))) return t;
    if (t === end) return undefined;
    const next = look.safeUntil(end);
    // steps below the last digit of the time: it is as near as a number can say
    if (next <= t) return t;
    t = next;
  }
  return undefined;
}

/** When the whole body is first `PARTED` from the plane, Infinity if never: no sooner than the point that is nearest now can be. */
function partingTime(body: FlyingBody, side: Side): number {
  const { flight } = body;
  const { gravity } = flight.launch;
  const n = side.normal;
  let t = 0;
  while (t < flight.duration) {
    const { gap, rate } = lookAt(body, side, t);
    const missing = PARTED - gap;
    if (missing <= PARTED / 1000) return t;
    const tilt = cross(n, flight.angularVelocity(t));
    const pull = n[0] * gravity[0] + n[1] * gravity[1] + n[2] * gravity[2] + turningAcceleration(body, tilt);
    t += Math.max(riseTime(missing, rate, pull), Number.EPSILON * flight.duration);
  }
  return Number.POSITIVE_INFINITY;
}

/** The first s > 0 at which rate·s + pull·s²/2 reaches a height above 0; Infinity if never. */
function riseTime(height: number, rate: number, pull: number): number {
  const square = rate * rate + 2 * pull * height;
  if (square < 0 || (rate <= 0 && pull <= 0)) return Number.POSITIVE_INFINITY;
  const root = Math.sqrt(square);
  return rate > 0 ? (2 * height) / (rate + root) : (root - rate) / pull;
}
