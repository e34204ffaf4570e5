/** What a rigid body's motion depends on, and how bodies add up. */

import { type Mat3, map } from "../math/mat3.js";
import { CompensatedSum } from "../math/sum.js";
import { dot, scale, subtract, type Vec3 } from "../math/vec3.js";

export interface MassProperties {
  /** kg */
  readonly mass: number;
  /** m³ */
  readonly volume: number;
  /** m, scene frame of the model */
  readonly centerOfMass: Vec3;
  /** Tensor about the centre of mass, axes of the scene frame, kg m²: I_ij = Σ m (r² δ_ij − x_i x_j). */
  readonly inertia: Mat3;
}

/**
 * Several bodies as one: masses add, a hole is a body of negative mass and volume. Inertia by the parallel axis theorem
 * (Goldstein, Classical Mechanics, §5.3), sums compensated. The mass altogether must not be zero.
 */
export function combine(bodies: readonly MassProperties[]): MassProperties {
  const mass = total(bodies.map((body) => body.mass));
  // Places are counted from the first body, so that bodies far from the origin lose no digits.
  const origin = bodies[0].centerOfMass;
  const offsets = bodies.map((body) => subtract(body.centerOfMass, origin));
  const moment = (i: number) => total(bodies.map((body, b) => body.mass * offsets[b][i])) / mass;
  const middle: Vec3 = [moment(0), moment(1), moment(2)];
  const arms = offsets.map((offset) => subtract(offset, middle));
  const inertia = map(bodies[0].inertia, (_, i, j) =>
    total(
      bodies.flatMap((body, b) => [
        body.inertia[i][j],
        body.mass * ((i === j ? dot(arms[b], arms[b]) : 0) - arms[b][i] * arms[b][j]),
      ]),
    ),
  );
  return {
    mass,
    volume: total(bodies.map((body) => body.volume)),
    centerOfMass: [origin[0] + middle[0], origin[1] + middle[1], origin[2] + middle[2]],
    inertia,
  };
}

export const pointMass = (at: Vec3, mass: number): MassProperties => ({
  mass,
  volume: 0,
  centerOfMass: at,
  inertia: [
    [0, 0, 0],
    [0, 0, 0],
    [0, 0, 0],
  ],
});

/** The same body of a material `factor` times as dense. */
export const scaleDensity = (body: MassProperties, factor: number): MassProperties => ({
  ...body,
  mass: body.mass * factor,
  inertia: map(body.inertia, (value) => value * factor),
});

/** The body of the same material with every length multiplied by `s`: mass grows as s³, inertia as s⁵. */
export const scaleLengths = (body: MassProperties, s: number): MassProperties => ({
  mass: body.mass * s * s * s,
  volume: body.volume * s * s * s,
  centerOfMass: scale(body.centerOfMass, s),
  inertia: map(body.inertia, (value) => value * s * s * s * s * s),
});

/** The products of coordinates that `momentTensor` takes the integrals of, in its order. */
export const PAIRS = [
  [0, 0],
  [1, 1],
  [2, 2],
  [0, 1],
  [0, 2],
  [1, 2],
] as const;

/** Inertia from the second moments ∫ x_i x_j dm about the centre of mass. */
export function momentTensor(moments: readonly number[]): Mat3 {
  const [xx, yy, zz, xy, xz, yz] = moments;
  return [
    [yy + zz, -xy, -xz],
    [-xy, xx + zz, -yz],
    [-xz, -yz, xx + yy],
  ];
}

function total(values: readonly number[]): number {
  const sum = new CompensatedSum();
  for (const value of values) sum.add(value);
  return sum.value;
}
