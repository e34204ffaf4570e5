import { describe, expect, it } from "vitest";
import { dot, type Vec3 } from "../../src/math/vec3.js";
import { weigh } from "../../src/prop/prop.js";
import { type Shape, shapeModel } from "../../src/prop/shape.js";
import { shapeMesh } from "../../src/prop/shape-mesh.js";
import { propSupport, shapeLowest } from "../../src/prop/support.js";
import { pointsSupport } from "../../src/prop/support-points.js";
import { anyDirection, between, random } from "../flight/tumbling.js";

const SHAPES: Shape[] = [
  { box: [0.2, 0.3, 0.5] },
  { sphere: 0.3 },
  { ellipsoid: [0.1, 0.2, 0.3] },
  { cylinder: { radius: 0.1, length: 0.3 } },
  { cone: { radius: 0.2, length: 0.5 } },
  { capsule: { radius: 0.1, length: 0.5 } },
  { ring: { radius: 0.2, thickness: 0.06 } },
  { disc: { radius: 0.2, thickness: 0.01 } },
  { tube: { outer: 0.2, inner: 0.1, length: 0.7 } },
];

const brute = (points: Float64Array, d: Vec3): number => {
  let least = Number.POSITIVE_INFINITY;
  for (let i = 0; i < points.length; i += 3)
    least = Math.min(least, points[i] * d[0] + points[i + 1] * d[1] + points[i + 2] * d[2]);
  return least;
};

describe("the support of a shape", () => {
  it.each(SHAPES)(
    "%o is that of the ideal body, of which a fine mesh falls short a little and never the other way",
    (shape) => {
      const next = random(2);
      const lowest = shapeLowest(shape);
      const { positions } = shapeMesh(shape, 512);
      const points = Float64Array.from(positions);
      // Corners of the mesh lie on the body; a chord of 1/512 turn sags by r(1 − cos(π/512)) < 2e-5 r, half as fine from pole to pole: 8e-5 r.
      for (let i = 0; i < 200; i++) {
        const d =
          i < 6
            ? (
                [
                  [1, 0, 0],
                  [0, 1, 0],
                  [0, 0, 1],
                  [-1, 0, 0],
                  [0, -1, 0],
                  [0, 0, -1],
                ] as Vec3[]
              )[i]
            : anyDirection(next);
        const exact = dot(lowest(d), d);
        const mesh = brute(points, d);
        expect(exact).toBeLessThan(mesh + 1e-15);
        expect(exact).toBeGreaterThan(mesh - 1e-4);
      }
    },
  );

  it("of a sphere is its radius, in every direction of any length", () => {
    const lowest = shapeLowest({ sphere: 0.3 });
    const next = random(3);
    for (let i = 0; i < 100; i++) {
      const d = anyDirection(next);
      // |p| = r and p against d: definition of a sphere
      expect(dot(lowest(d), d)).toBeCloseTo(-0.3, 15);
      expect(dot(lowest([7 * d[0], 7 * d[1], 7 * d[2]]), d)).toBeCloseTo(-0.3, 15);
    }
  });

  it("counts from the centre of mass, wherever that is stated to be, after the scale", async () => {
    const shape: Shape = { sphere: 0.1 };
    const prop = await weigh("ball", shape, { scale: 2, centerOfMass: [0.05, 0, 0] });
    // The sphere of radius 0.2 reaches from -0.25 to 0.15 about a centre of mass 0.05 to the right.
    expect(propSupport(prop, shape).lowest([1, 0, 0])[0]).toBeCloseTo(-0.25, 15);
    expect(propSupport(prop, shape).lowest([-1, 0, 0])[0]).toBeCloseTo(0.15, 15);
  });
});

describe("the support of a mesh", () => {
  it("is that of its lowest vertex", async () => {
    const prop = await weigh("egg", shapeModel("egg", { ellipsoid: [0.1, 0.2, 0.3] }));
    const next = random(4);
    const support = propSupport(prop);
    const arms = prop.extremes.map((value, i) => value - prop.centerOfMass[i % 3]);
    for (let i = 0; i < 100; i++) {
      const d = anyDirection(next);
      expect(dot(support.lowest(d), d)).toBeCloseTo(brute(arms, d), 13);
    }
  });

  it.each([1, 2, 13, 500, 20_000])(
    "of %i points, with many at one place and in one plane, is exactly the lowest",
    (count) => {
      const next = random(count);
      const points = Float64Array.from({ length: 3 * count }, (_, i) =>
        i % 3 === 2 && i % 2 ? 0.25 : Math.round(between(next, -1, 1) * (i % 5 ? 1e6 : 4)) / 1e6,
      );
      const support = pointsSupport(points);
      for (let i = 0; i < 200; i++) {
        const d: Vec3 = i === 0 ? [0, 0, 1] : i === 1 ? [1, 0, 0] : anyDirection(next);
        expect(dot(support.lowest(d), d)).toBe(brute(points, d));
      }
    },
  );
});
