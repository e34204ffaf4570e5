/** What property tests of this room draw. */

import fc from "fast-check";
import { fromAxisAngle, type Quat } from "../../src/math/quat.js";
import { length, normalize, type Vec3 } from "../../src/math/vec3.js";

/** Even between the two; `fc.double` is even over the doubles there, most of which are next to nothing. */
export const between = (least: number, most: number): fc.Arbitrary<number> =>
  fc.integer({ min: 0, max: 1e9 }).map((share) => least + (most - least) * (share / 1e9));

/** Any direction, unit length. */
export const direction = (): fc.Arbitrary<Vec3> =>
  fc
    .tuple(between(-1, 1), between(-1, 1), between(-1, 1))
    .filter((v) => length(v) > 1e-3)
    .map(normalize);

export const orientation = (): fc.Arbitrary<Quat> =>
  fc.tuple(direction(), between(-Math.PI, Math.PI)).map(([axis, angle]) => fromAxisAngle(axis, angle));

/** Principal moments of a real body, ascending: those of three masses a, b, c on the axes are b + c, a + c, a + b. */
export const moments = (): fc.Arbitrary<Vec3> =>
  fc.tuple(between(0.05, 1), between(0.05, 1), between(0.05, 1)).map((masses) => {
    const [a, b, c] = masses.sort((p, q) => q - p);
    return [b + c, a + c, a + b];
  });

/** A place within `reach` of the centre of mass, m. */
export const offset = (reach: number): fc.Arbitrary<Vec3> =>
  fc.tuple(direction(), between(0, reach)).map(([d, r]) => [d[0] * r, d[1] * r, d[2] * r]);
