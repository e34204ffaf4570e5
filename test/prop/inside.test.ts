import fc from "fast-check";
import { expect, test } from "vitest";
import type { Vec3 } from "../../src/math/vec3.js";
import { isInside } from "../../src/prop/inside.js";
import { ell, surface, turnedRound } from "./bodies.js";

const { positions, triangles } = surface(ell());

test("a point is inside an L where it is in one of its two bars, whichever way the faces look", () => {
  // On the surface itself there is no right answer: no wall lies at an odd ten-thousandth.
  const coordinate = fc.integer({ min: -500, max: 3000 }).map((n) => (2 * n + 1) / 10_000);
  fc.assert(
    fc.property(fc.tuple(coordinate, coordinate, coordinate), ([x, y, z]) => {
      const within = (v: number, to: number) => v > 0 && v < to;
      const expected =
        within(z, 0.125) && ((within(x, 0.5) && within(y, 0.125)) || (within(x, 0.125) && within(y, 0.375)));
      expect(isInside([x, y, z], positions, triangles)).toBe(expected);
      expect(isInside([x, y, z], positions, surface(turnedRound(ell())).triangles)).toBe(expected);
    }),
    { seed: 4, numRuns: 2000 },
  );
});

test("points in line with corners, edges and diagonals are no exception", () => {
  for (const [x, y, z, expected] of [
    [0.0625, 0.0625, 0.0625, true],
    [-0.0625, 0.0625, 0.0625, false],
    [0.25, 0.0625, 0.0625, true],
    [0.25, 0.25, 0.0625, false],
    [-0.125, 0.125, 0, false],
    [0.625, 0.125, 0.125, false],
  ] as [...Vec3, boolean][])
    expect(isInside([x, y, z], positions, triangles)).toBe(expected);
});
