import type { Vec3 } from "../math/vec3.js";

/** What the spin of a free body never exceeds. */
export interface RotationBounds {
  /** Of |ω|, rad/s. */
  rate: number;
  /** Of |dω/dt|, the same in the body and in the world (they differ by ω × ω), rad/s². */
  angularAcceleration: number;
}

/** Puts the bounds above the rounding of their own evaluation and of the motion's. */
const ROUNDING = 1 + 1e-11;

/**
 * Bounds of the spin for all time, from energy and angular momentum alone: `spin` in rad/s in the principal frame
 * at any one time, `moments` about its axes.
 *
 * Euler's equations make d(ω_a²)/dt = 2 k_a ω₁ω₂ω₃, so the squares of the components move on one straight line,
 * ω_a² = ω_a²(0) + s k_a, between the two s where one of them is zero: the polhode's turning points (Landau & Lifshitz,
 * Mechanics, §37). |ω|² is linear in s, and |dω/dt|² = Σ k_a² ω_b² ω_c² is monotonic: its derivative is
 * Σ ω_a² k_b k_c (k_b + k_c) with k_b + k_c = −k_a (1 + k_b k_c), where the |k| ≤ 1 of every body give each term the sign
 * of −k₁k₂k₃. Both greatest values are therefore at one of the ends, and exact.
 */
export function rotationBounds(spin: Vec3, moments: Vec3): RotationBounds {
  const ratios = momentRatios(moments);
  const squares: Vec3 = [spin[0] * spin[0], spin[1] * spin[1], spin[2] * spin[2]];
  let from = Number.NEGATIVE_INFINITY;
  let to = Number.POSITIVE_INFINITY;
  for (let a = 0; a < 3; a++) {
    if (ratios[a] > 0) from = Math.max(from, -squares[a] / ratios[a]);
    if (ratios[a] < 0) to = Math.min(to, -squares[a] / ratios[a]);
  }
  // a sphere: every k is zero and the spin is constant
  if (!Number.isFinite(from) || !Number.isFinite(to)) from = to = 0;

  const square = (a: number, s: number): number => Math.max(0, squares[a] + s * ratios[a]);
  const rate = (s: number): number => Math.sqrt(square(0, s) + square(1, s) + square(2, s));
  const acceleration = (s: number): number => {
    const y: Vec3 = [square(0, s), square(1, s), square(2, s)];
    const term = (a: number, b: number, c: number): number => ratios[a] * ratios[a] * y[b] * y[c];
    return Math.sqrt(term(0, 1, 2) + term(1, 2, 0) + term(2, 0, 1));
  };

  return {
    rate: Math.max(rate(from), rate(to)) * ROUNDING,
    angularAcceleration: Math.max(acceleration(from), acceleration(to)) * ROUNDING,
  };
}

/** k_a = (I_b − I_c)/I_a, the only way in which the moments enter Euler's equations ω_a' = k_a ω_b ω_c. */
export const momentRatios = (moments: Vec3): Vec3 => [
  (moments[1] - moments[2]) / moments[0],
  (moments[2] - moments[0]) / moments[1],
  (moments[0] - moments[1]) / moments[2],
];
