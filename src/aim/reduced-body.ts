import type { Vec3 } from "../math/vec3.js";

/**
 * A body whose greatest moment of inertia is 1, with axes in ascending order of moments; its momentum is measured so that the flight lasts 1.
 * Differences of inverse moments are kept apart: those of a near-symmetric body are small and exact.
 */
export interface ReducedBody {
  /** Inverse moments, descending, J₃ = 1. */
  inverse: Vec3;
  /** J₁ − J₂, J₂ − J₃, J₁ − J₃; none negative. */
  d12: number;
  d23: number;
  d13: number;
  /** From the principal frame as given to the ordered one, and back: both rotations. */
  toOrdered(v: Vec3): Vec3;
  fromOrdered(v: Vec3): Vec3;
}

/** @param moments principal moments in any order and unit */
export function reduceBody(moments: Vec3): ReducedBody {
  const order = [0, 1, 2].sort((a, b) => moments[a] - moments[b] || a - b);
  const [i, j, k] = order;
  // an odd order of axes is a mirror image until one of them is turned round
  const even = (j - i + 3) % 3 === 1;
  const sign = even ? 1 : -1;
  const m = order.map((axis) => moments[axis] / moments[k]);
  const difference = (a: number, b: number): number =>
    (moments[order[b]] - moments[order[a]]) / moments[k] / (m[a] * m[b]);
  return {
    inverse: [1 / m[0], 1 / m[1], 1],
    d12: difference(0, 1),
    d23: difference(1, 2),
    d13: difference(0, 2),
    toOrdered: (v) => [v[i], v[j], sign * v[k]],
    fromOrdered: (v) => {
      const out: [number, number, number] = [0, 0, 0];
      out[i] = v[0];
      out[j] = v[1];
      out[k] = sign * v[2];
      return out;
    },
  };
}
