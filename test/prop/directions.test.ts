import { describe, expect, test } from "vitest";
import type { Vec3 } from "../../src/math/vec3.js";
import { propDirection } from "../../src/prop/directions.js";
import { weigh } from "../../src/prop/prop.js";

const slab = await weigh(
  "slab",
  { box: [0.3, 0.1, 0.6] },
  { points: { grip: [0, 0, -0.2], corner: [0.15, 0.05, 0.3], middlepoint: [0, 0, 0] } },
);

describe("directions of a prop", () => {
  test("are its principal axes, the model's own, its points, vectors, and their opposites", () => {
    // The least moment of a box lies along its longest edge (m (b² + c²) / 12).
    const expected: [string | Vec3, Vec3][] = [
      ["long", [0, 0, 1]],
      ["middle", [1, 0, 0]],
      ["short", [0, 1, 0]],
      ["y", [0, 1, 0]],
      ["grip", [0, 0, -1]],
      [
        [0, 3, 0],
        [0, 1, 0],
      ],
    ];
    for (const [direction, vector] of expected) {
      expect(propDirection(slab, direction)).toEqual(vector);
      if (typeof direction === "string")
        expect(propDirection(slab, `-${direction}`)).toEqual(vector.map((value) => -value));
    }
  });

  test("go to a point from the centre of mass, not from the origin", async () => {
    const weighted = await weigh(
      "weighted",
      { box: [0.3, 0.1, 0.6] },
      { mass: 2, weights: [{ at: [0, 0, 0.3], mass: 1 }], points: { tip: [0, 0.15, 0] } },
    );
    // centre of mass at z = 0.15
    const S = Math.SQRT1_2;
    const direction = propDirection(weighted, "tip");
    [0, S, -S].forEach((value, i) => {
      expect(direction[i]).toBeCloseTo(value, 14);
    });
  });

  test("that are unknown name the nearest, and all there are", () => {
    expect(() => propDirection(slab, "-grib")).toThrow(
      '"grib" is no direction of "slab"; nearest is "grip"; there are long, middle, short, x, y, z, grip, corner, middlepoint',
    );
    expect(() => propDirection(slab, "constructor")).toThrow("is no direction");
    expect(() => propDirection(slab, "--long")).toThrow('nearest is "long"');
  });

  test("are none for a point at the centre of mass and the zero vector", () => {
    expect(() => propDirection(slab, "middlepoint")).toThrow(
      /lies at the centre of mass; needs a point off it/,
    );
    expect(() => propDirection(slab, [0, 0, 0])).toThrow(/points nowhere/);
  });
});
