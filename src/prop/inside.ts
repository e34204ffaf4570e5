import type { Vec3 } from "../math/vec3.js";

/** A way to look that runs along no edge of what people model. */
const SKEW = [0.6180339887498949, 0.2679491924311227];

/**
 * Whether a point lies within a closed surface, whichever way its triangles face: a ray from it crosses them outwards as often
 * as inwards where it lies outside. An edge is seen from its lower vertex, so that two triangles judge alike on which side of it the
 * ray runs.
 */
export function isInside(point: Vec3, positions: Float64Array, triangles: Uint32Array): boolean {
  const [px, py, pz] = point;
  // Seen along the ray: two coordinates across it, and x along it.
  const across = (vertex: number): number =>
    positions[3 * vertex + 1] - py - SKEW[0] * (positions[3 * vertex] - px);
  const up = (vertex: number): number =>
    positions[3 * vertex + 2] - pz - SKEW[1] * (positions[3 * vertex] - px);
  let winding = 0;
  for (let t = 0; t < triangles.length; t += 3) {
    const a = triangles[t];
    const b = triangles[t + 1];
    const c = triangles[t + 2];
    const [ua, ub, uc] = [across(a), across(b), across(c)];
    if ((ua > 0 && ub > 0 && uc > 0) || (ua < 0 && ub < 0 && uc < 0)) continue;
    const [va, vb, vc] = [up(a), up(b), up(c)];
    const ab = a < b ? ua * vb - ub * va : -(ub * va - ua * vb);
    const bc = b < c ? ub * vc - uc * vb : -(uc * vb - ub * vc);
    const ca = c < a ? uc * va - ua * vc : -(ua * vc - uc * va);
    const isLeft = ab > 0 && bc > 0 && ca > 0;
    if (!isLeft && !(ab < 0 && bc < 0 && ca < 0)) continue;
    const depth =
      (bc * (positions[3 * a] - px) + ca * (positions[3 * b] - px) + ab * (positions[3 * c] - px)) /
      (ab + bc + ca);
    if (depth > 0) winding += isLeft ? 1 : -1;
  }
  return winding !== 0;
}
