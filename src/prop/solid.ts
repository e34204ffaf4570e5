import { CompensatedSum } from "../math/sum.js";
import type { Vec3 } from "../math/vec3.js";
import { type MassProperties, momentTensor, PAIRS } from "./mass.js";
import { boxOf } from "./vertex.js";

/**
 * A homogeneous solid bounded by triangles, of density 1, exactly: the sum over the triangles of the integrals over the
 * tetrahedra they make with a point near the middle, signed by the side they show it. Tetrahedron: Tonon, "Explicit
 * exact formulas for the 3-D tetrahedron inertia tensor in terms of its vertex coordinates", J. Math. Stat. 1 (2005) 8;
 * sum over a closed surface: Lien & Kajiya, IEEE Computer Graphics and Applications 4 (1984) 35.
 *
 * @param positions 3 numbers a vertex, none far from the triangles
 * @param triangles 3 indices a triangle: a closed surface, counter-clockwise from outside
 * @returns volume below zero (and mass and inertia with it) where the surface is inside out; where it is zero, there is
 *   no centre of mass and no inertia: NaN
 */
export function solidIntegrals(positions: Float64Array, triangles: Uint32Array): MassProperties {
  const origin = middleOf(positions);
  const sums = Array.from({ length: 10 }, () => new CompensatedSum());
  const block = new Float64Array(10);
  for (let from = 0; from < triangles.length; from += BLOCK) {
    addBlock(block.fill(0), positions, triangles.subarray(from, from + BLOCK), origin);
    sums.forEach((sum, n) => {
      sum.add(block[n]);
    });
  }
  const [six, ...moments] = sums.map((sum) => sum.value);
  const v = six / 6;
  const c: Vec3 = [moments[0] / 24 / v, moments[1] / 24 / v, moments[2] / 24 / v];
  return {
    mass: v,
    volume: v,
    centerOfMass: [origin[0] + c[0], origin[1] + c[1], origin[2] + c[2]],
    // ∫ (x_i − c_i)(x_j − c_j) dV
    inertia: momentTensor(PAIRS.map(([i, j], n) => moments[3 + n] / 120 - v * c[i] * c[j])),
  };
}

/** Corners whose triangles are summed plainly; only the sums of blocks are compensated, for the time it takes. */
const BLOCK = 3 * 64;

/** Adds 6V, 24 times the first and 120 times the second moments (in the order of `PAIRS`) of a few triangles. */
function addBlock(sum: Float64Array, positions: Float64Array, corners: Uint32Array, origin: Vec3): void {
  const [ox, oy, oz] = origin;
  for (let t = 0; t < corners.length; t += 3) {
    const a = 3 * corners[t];
    const b = 3 * corners[t + 1];
    const c = 3 * corners[t + 2];
    const ax = positions[a] - ox;
    const ay = positions[a + 1] - oy;
    const az = positions[a + 2] - oz;
    const bx = positions[b] - ox;
    const by = positions[b + 1] - oy;
    const bz = positions[b + 2] - oz;
    const cx = positions[c] - ox;
    const cy = positions[c + 1] - oy;
    const cz = positions[c + 2] - oz;
    // a · (b × c)
    const d = ax * (by * cz - bz * cy) + ay * (bz * cx - bx * cz) + az * (bx * cy - by * cx);
    const x = ax + bx + cx;
    const y = ay + by + cy;
    const z = az + bz + cz;
    sum[0] += d;
    sum[1] += d * x;
    sum[2] += d * y;
    sum[3] += d * z;
    sum[4] += d * (ax * ax + bx * bx + cx * cx + x * x);
    sum[5] += d * (ay * ay + by * by + cy * cy + y * y);
    sum[6] += d * (az * az + bz * bz + cz * cz + z * z);
    sum[7] += d * (ax * ay + bx * by + cx * cy + x * y);
    sum[8] += d * (ax * az + bx * bz + cx * cz + x * z);
    sum[9] += d * (ay * az + by * bz + cy * cz + y * z);
  }
}

/** Middle of the bounding box. */
function middleOf(positions: Float64Array): Vec3 {
  const { low, high } = boxOf(positions);
  const middle = (i: number) => low[i] + (high[i] - low[i]) / 2;
  return [middle(0), middle(1), middle(2)];
}
