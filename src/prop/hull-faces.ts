import { atan2 } from "../math/elementary.js";
import { add, cross, dot, length, normalize, subtract, type Vec3, ZERO } from "../math/vec3.js";

/** A flat side of a hull. Places are from the origin that the points are from. */
export interface HullFace {
  /** Outwards, unit. */
  normal: Vec3;
  /** Counter-clockwise from outside, each with the number of the face beyond it. */
  edges: readonly { from: Vec3; to: Vec3; across: number }[];
  /** As seen from the origin, sr. */
  solidAngle: number;
}

/** Of the whole's size: as much as a corner in single precision lies off the plane of a face, and some. */
const FLAT = 1e-6;
/** Cosine below which triangles are no one face, however thin the body. */
const LEVEL = 0.99;

/**
 * Merges a hull's triangles into its flat sides: beginning with the greatest, all around it that lie in its plane.
 *
 * @param points 3 numbers each
 * @param triangles three indices each, counter-clockwise from outside
 * @param size of the whole, in the unit of the points
 */
export function hullFaces(points: Float64Array, triangles: Uint32Array, size: number): HullFace[] {
  const count = triangles.length / 3;
  const point = (corner: number): Vec3 => {
    const p = 3 * triangles[corner];
    return [points[p], points[p + 1], points[p + 2]];
  };
  const areas = Array.from({ length: count }, (_, t) => {
    const [a, b, c] = [point(3 * t), point(3 * t + 1), point(3 * t + 2)];
    return cross(subtract(b, a), subtract(c, a));
  });
  const beyond = neighbours(triangles, points.length / 3);
  const faceOf = new Int32Array(count).fill(-1);
  const members: number[][] = [];
  for (const seed of areas.map((_, t) => t).sort((a, b) => length(areas[b]) - length(areas[a]) || a - b)) {
    if (faceOf[seed] >= 0) continue;
    const normal = normalize(areas[seed]);
    const offset = dot(normal, point(3 * seed));
    const belongs = (t: number): boolean =>
      faceOf[t] < 0 &&
      dot(areas[t], normal) >= LEVEL * length(areas[t]) &&
      [0, 1, 2].every((k) => Math.abs(dot(normal, point(3 * t + k)) - offset) <= FLAT * size);
    const found = [seed];
    faceOf[seed] = members.length;
    for (const t of found)
      for (let k = 0; k < 3; k++) {
        const next = beyond[3 * t + k];
        if (!belongs(next)) continue;
        faceOf[next] = members.length;
        found.push(next);
      }
    members.push(found);
  }
  return members.map((found, face) => ({
    normal: normalize(found.reduce((sum, t) => add(sum, areas[t]), ZERO)),
    edges: found.flatMap((t) =>
      [0, 1, 2]
        .filter((k) => faceOf[beyond[3 * t + k]] !== face)
        .map((k) => ({
          from: point(3 * t + k),
          to: point(3 * t + ((k + 1) % 3)),
          across: faceOf[beyond[3 * t + k]],
        })),
    ),
    solidAngle: found.reduce(
      (sum, t) => sum + solidAngle(point(3 * t), point(3 * t + 1), point(3 * t + 2)),
      0,
    ),
  }));
}

/**
 * Of a triangle as seen from the origin, sr; positive where its corners are clockwise from there (van Oosterom & Strackee, IEEE Trans. Biomedical
 * Engineering 30, 125, 1983).
 */
export function solidAngle(a: Vec3, b: Vec3, c: Vec3): number {
  const [la, lb, lc] = [length(a), length(b), length(c)];
  const under = la * lb * lc + dot(a, b) * lc + dot(a, c) * lb + dot(b, c) * la;
  return 2 * atan2(dot(a, cross(b, c)), under);
}

/** By edge of the triangles (from its corner k to the next): the triangle beyond it. */
function neighbours(triangles: Uint32Array, points: number): Int32Array {
  const owner = new Map<number, number>();
  const end = (corner: number): number => triangles[corner % 3 === 2 ? corner - 2 : corner + 1];
  triangles.forEach((from, corner) => {
    owner.set(from * points + end(corner), Math.floor(corner / 3));
  });
  return Int32Array.from(triangles, (from, corner) => owner.get(end(corner) * points + from) as number);
}
