import { eigenSymmetric } from "../math/eigen.js";
import { type Mat3, map } from "../math/mat3.js";
import type { Cone } from "./curve.js";
import type { ReducedBody } from "./reduced-body.js";

/** The form's entries are made of products of numbers of order 1: this small beside the spread of inverse moments they are rounding. */
const NOTHING = 1e-12;

/**
 * The cone of the directions m of the angular momentum, at release and in the principal frame, that lie on the same polhode as the
 * direction Rᵀm it has in the body at the end: m·Jm = Rᵀm·JRᵀm, so m·(J − RJRᵀ)m = 0, a form without trace and hence a real cone.
 *
 * @param end rows of R, the rotation from the ordered principal frame at the end to that at the start
 * @returns undefined where every direction will do: R leaves the body's ellipsoid of inertia as it is
 */
export function momentumCone(body: ReducedBody, end: Mat3): Cone | undefined {
  // from J₁ − J₃ and J₂ − J₃, which a near-sphere has with all their digits
  const [x, y] = [body.d13, body.d23];
  const form = map(end, (_, i, j) => {
    const own = i !== j ? 0 : i === 0 ? x : i === 1 ? y : 0;
    return own - (x * end[i][0] * end[j][0] + y * end[i][1] * end[j][1]);
  });
  if (form.every((row) => row.every((entry) => Math.abs(entry) <= NOTHING * x))) return undefined;
  const { values, vectors } = eigenSymmetric(form);
  // the lone sign's axis runs through the nappe; λ is then (−, +, +) or its negative
  const turned = values[1] < 0;
  const [lone, middle, last] = turned
    ? [values[2], -values[1], -values[0]]
    : [-values[0], values[1], values[2]];
  const near = Math.max(0, middle);
  return {
    form,
    through: turned ? vectors[2] : vectors[0],
    wide: vectors[1],
    narrow: turned ? vectors[0] : vectors[2],
    widest: Math.sqrt(lone / (near + lone)),
    narrowest: Math.sqrt(lone / (last + lone)),
    lackWide: near / (near + lone),
    lackNarrow: last / (last + lone),
  };
}
