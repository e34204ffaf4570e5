import { CompensatedSum } from "../math/sum.js";
import { cross, length, subtract, type Vec3 } from "../math/vec3.js";
import { type MassProperties, momentTensor, PAIRS } from "./mass.js";
import { vertex } from "./vertex.js";

/**
 * A thin surface of 1 kg/m², exactly; volume 0, for it bounds none. The integrals over a triangle of area A of polynomials of second
 * degree are A/3 times the sum over the middles of its edges (Hammer, Marlowe & Stroud, "Numerical integration over simplexes and
 * cones", Math. Tables Aids Comput. 10 (1956) 130).
 *
 * @returns without a centre of mass and inertia (NaN) where the area is zero
 */
export function sheetIntegrals(positions: Float64Array, triangles: Uint32Array): MassProperties {
  const origin = triangles.length > 0 ? vertex(positions, triangles[0]) : ([0, 0, 0] as const);
  const area = new CompensatedSum();
  const first = [0, 1, 2].map(() => new CompensatedSum());
  const second = PAIRS.map(() => new CompensatedSum());
  for (let t = 0; t < triangles.length; t += 3) {
    const [a, b, c] = [0, 1, 2].map((k) => subtract(vertex(positions, triangles[t + k]), origin));
    const third = length(cross(subtract(b, a), subtract(c, a))) / 6;
    area.add(3 * third);
    for (const [p, q] of [
      [a, b],
      [b, c],
      [c, a],
    ]) {
      const m: Vec3 = [(p[0] + q[0]) / 2, (p[1] + q[1]) / 2, (p[2] + q[2]) / 2];
      for (let i = 0; i < 3; i++) first[i].add(third * m[i]);
      PAIRS.forEach(([i, j], n) => {
        second[n].add(third * m[i] * m[j]);
      });
    }
  }
  const mass = area.value;
  const c = first.map((sum) => sum.value / mass);
  return {
    mass,
    volume: 0,
    centerOfMass: [origin[0] + c[0], origin[1] + c[1], origin[2] + c[2]],
    inertia: momentTensor(PAIRS.map(([i, j], n) => second[n].value - mass * c[i] * c[j])),
  };
}
