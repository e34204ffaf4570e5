import { addScaled, cross, dot, length, normalize, scale, subtract, type Vec3 } from "../math/vec3.js";

/** A direction along which a convex set lies wholly beyond the origin. */
export interface Separation {
  /** Unit. */
  normal: Vec3;
  /** Least of normal·x over the set, above 0 and at most the distance from the origin. */
  gap: number;
}

/** Of the distance: a plane that leaves so much of it open is good enough. */
const ENOUGH = 0.9;
const MOST_ROUNDS = 100;
/** Of the size of a simplex: what is thinner has no normal. */
const FLAT = 1e-14;

/**
 * A plane between the origin and a convex set, or undefined where the set comes nearer to the origin than `least`: the GJK algorithm (Gilbert,
 * Johnson & Keerthi, IEEE J. Robotics and Automation 4, 193, 1988). What it answers is a bound of the distance by the support function itself, so
 * that nothing hangs on how well a simplex was solved.
 *
 * @param lowest a point x of the set for which direction·x is least
 * @param guess a direction to begin with, of any length but zero
 */
export function separation(
  lowest: (direction: Vec3) => Vec3,
  guess: Vec3,
  least: number,
): Separation | undefined {
  let normal = normalize(guess);
  let simplex: Vec3[] = [];
  let best: Separation | undefined;
  let distance = Number.POSITIVE_INFINITY;
  for (let round = 0; round < MOST_ROUNDS; round++) {
    const point = lowest(normal);
    const gap = dot(normal, point);
    if (gap > (best?.gap ?? 0)) best = { normal, gap };
    if (best && best.gap >= ENOUGH * Math.min(distance, length(point)) && best.gap >= least) return best;
    const nearest = nearestFeature([point, ...simplex]);
    // inside, or rounding is all that still moves
    if (!nearest || nearest.distance < least) break;
    if (nearest.distance >= distance && simplex.some((corner) => length(subtract(corner, point)) === 0))
      break;
    ({ distance, simplex, normal } = nearest);
  }
  return best && best.gap >= least ? best : undefined;
}

interface Feature {
  distance: number;
  /** From the origin towards the feature. */
  normal: Vec3;
  /** The corners that span it. */
  simplex: Vec3[];
}

/**
 * The part of a simplex (1 to 4 corners, the newest first) that is nearest to the origin; undefined where that lies within. Of the parts that have the
 * newest corner, each whose nearest point lies in its inside. Normals come from the parts' sides, not from the short way to the origin, whose digits
 * are lost where that is near.
 */
function nearestFeature(corners: readonly Vec3[]): Feature | undefined {
  const [a, ...others] = corners;
  const found: Feature[] = [];
  const add = (feature: Feature | undefined): void => {
    if (feature) found.push(feature);
  };
  const apart = length(a);
  if (apart === 0) return undefined;
  add({ distance: apart, normal: scale(a, 1 / apart), simplex: [a] });
  for (const b of others) add(edge(a, b));
  others.forEach((b, i) => {
    for (const c of others.slice(i + 1)) add(face(a, b, c));
  });
  if (others.length === 3 && isInside(a, others as [Vec3, Vec3, Vec3])) return undefined;
  return found.reduce((least, feature) => (feature.distance < least.distance ? feature : least));
}

function edge(a: Vec3, b: Vec3): Feature | undefined {
  const along = subtract(b, a);
  const square = dot(along, along);
  const share = -dot(a, along) / square;
  if (!(share > 0 && share < 1)) return undefined;
  const way = addScaled(a, along, share);
  const square2 = addScaled(way, along, -dot(way, along) / square);
  const distance = length(square2);
  return distance === 0 ? undefined : { distance, normal: scale(square2, 1 / distance), simplex: [a, b] };
}

function face(a: Vec3, b: Vec3, c: Vec3): Feature | undefined {
  const ab = subtract(b, a);
  const ac = subtract(c, a);
  const n = cross(ab, ac);
  const size = length(n);
  if (!(size > FLAT * length(ab) * length(ac))) return undefined;
  // the origin's shares of the corners, as areas (Ericson, Real-Time Collision Detection, 2005, section 3.4)
  const ofA = dot(n, cross(b, c));
  const ofB = dot(n, cross(c, a));
  const ofC = dot(n, cross(a, b));
  if (!(ofA > 0 && ofB > 0 && ofC > 0)) return undefined;
  const unit = scale(n, 1 / size);
  const height = dot(unit, a);
  return height === 0
    ? undefined
    : { distance: Math.abs(height), normal: height < 0 ? scale(unit, -1) : unit, simplex: [a, b, c] };
}

/** Whether the origin is on the inner side of the three faces at `a`; that of the other one is known, as `a` lies beyond the origin from it. */
function isInside(a: Vec3, [b, c, d]: readonly [Vec3, Vec3, Vec3]): boolean {
  const isWithin = (p: Vec3, q: Vec3, opposite: Vec3): boolean => {
    const n = cross(subtract(p, a), subtract(q, a));
    const side = dot(n, subtract(opposite, a));
    return dot(n, a) * side < 0;
  };
  return isWithin(b, c, d) && isWithin(c, d, b) && isWithin(d, b, c);
}
