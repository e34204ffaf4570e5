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
 * @param positions 3 numbers a vertex
 * @param triangles 3 indices a triangle: a closed surface, counter-clockwise from outside
 * @returns volume below zero (and mass and inertia with it) where the surface is inside out; where it is zero, there is
 *   no centre of mass and no inertia: NaN
 */
export function solidIntegrals(positions: Float64Array, triangles: Uint32Array): MassProperties {
  const origin = middleOf(positions, triangles);
  const volume = new CompensatedSum();
  const first = sums(3);
  const second = sums(6);
  const p = new Float64Array(9);
  for (let t = 0; t < triangles.length; t += 3) {
    for (let k = 0; k < 9; k++) p[k] = positions[3 * triangles[t + ((k / 3) | 0)] + (k % 3)] - origin[k % 3];
    const d = sixVolumes(p);
    volume.add(d);
    for (let i = 0; i < 3; i++) first[i].add(d * (p[i] + p[3 + i] + p[6 + i]));
    for (let n = 0; n < 6; n++) {
      const [i, j] = PAIRS[n];
      const a = p[i] * p[j] + p[3 + i] * p[3 + j] + p[6 + i] * p[6 + j];
      second[n].add(d * (a + (p[i] + p[3 + i] + p[6 + i]) * (p[j] + p[3 + j] + p[6 + j])));
    }
  }
  const v = volume.value / 6;
  const c: Vec3 = [first[0].value / 24 / v, first[1].value / 24 / v, first[2].value / 24 / v];
  // ∫ (x_i − c_i)(x_j − c_j) dV
  const s = PAIRS.map(([i, j], n) => second[n].value / 120 - v * c[i] * c[j]);
  return {
    mass: v,
    volume: v,
    centerOfMass: [origin[0] + c[0], origin[1] + c[1], origin[2] + c[2]],
    inertia: momentTensor(s),
  };
}

const sums = (count: number) => Array.from({ length: count }, () => new CompensatedSum());

/** a · (b × c) of the three corners in `p`. */
const sixVolumes = (p: Float64Array): number =>
  p[0] * (p[4] * p[8] - p[5] * p[7]) +
  p[1] * (p[5] * p[6] - p[3] * p[8]) +
  p[2] * (p[3] * p[7] - p[4] * p[6]);

/** Middle of the bounding box of the corners used. */
function middleOf(positions: Float64Array, triangles: Uint32Array): Vec3 {
  const { low, high } = boxOf(positions, triangles);
  const middle = (i: number) => low[i] + (high[i] - low[i]) / 2;
  return [middle(0), middle(1), middle(2)];
}
