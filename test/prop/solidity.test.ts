import { describe, expect, test } from "vitest";
import { combine, type MassProperties } from "../../src/prop/mass.js";
import { weigh } from "../../src/prop/prop.js";
import {
  box,
  difference,
  ell,
  type Mesh,
  moved,
  together,
  turnedRound,
  weighed,
  weighedAs,
} from "./bodies.js";

const PI = Math.PI;
const cube = box([0, 0, 0], [1, 1, 1]);

describe("thin surfaces", () => {
  const triangle: Mesh = {
    vertices: [
      [0, 0, 0],
      [3, 0, 0],
      [0, 6, 0],
    ],
    triangles: [[0, 1, 2]],
  };

  test("a triangle has the moments of handbooks", () => {
    // Right triangle of legs b, h about its centroid: b h³/36, b³ h/36, product −b² h²/72 (Bronshtein & Semendyayev; Meriam & Kraige, Statics,
    // table D/3), times 2 kg/m²; tensor entry xy is minus the product.
    const { body } = weighedAs({ solid: "surface", wall: 0.002 }, triangle);
    expect(body.mass).toBeCloseTo(18, 12);
    expect(body.centerOfMass.map((v) => Number(v.toFixed(12)))).toEqual([1, 2, 0]);
    expect(body.inertia[0][0]).toBeCloseTo((2 * 3 * 216) / 36, 11);
    expect(body.inertia[1][1]).toBeCloseTo((2 * 27 * 6) / 36, 11);
    expect(body.inertia[2][2]).toBeCloseTo(36 + 9, 11);
    expect(body.inertia[0][1]).toBeCloseTo((2 * 9 * 36) / 72, 11);
  });

  test("cutting a triangle up changes nothing", () => {
    const fine: Mesh = {
      vertices: [...triangle.vertices, [1.5, 0, 0], [1.5, 3, 0], [0, 3, 0]],
      triangles: [
        [0, 3, 5],
        [3, 1, 4],
        [5, 4, 2],
        [3, 4, 5],
      ],
    };
    const [coarse, cut] = [triangle, fine].map((mesh) => weighedAs({ solid: "surface" }, mesh).body);
    expect(difference(cut, coarse, 6)).toBeLessThan(1e-14);
  });

  test("a hollow box is six cards", () => {
    const [a, b, c] = [0.5, 0.25, 1];
    const hollow = weighedAs({ solid: "surface", wall: 0.001 }, box([0, 0, 0], [a, b, c])).body;
    // A card of sides p, q: m q²/12, m p²/12, m (p² + q²)/12 (Meriam & Kraige, Dynamics, table D/4).
    const card = (sides: [number, number, number], at: [number, number, number]): MassProperties => {
      const [x, y, z] = sides;
      const area = x === 0 ? y * z : y === 0 ? x * z : x * y;
      return {
        mass: area,
        volume: 0,
        centerOfMass: at,
        inertia: [
          [(area * (y * y + z * z)) / 12, 0, 0],
          [0, (area * (x * x + z * z)) / 12, 0],
          [0, 0, (area * (x * x + y * y)) / 12],
        ],
      };
    };
    const six = combine([
      card([0, b, c], [0, b / 2, c / 2]),
      card([0, b, c], [a, b / 2, c / 2]),
      card([a, 0, c], [a / 2, 0, c / 2]),
      card([a, 0, c], [a / 2, b, c / 2]),
      card([a, b, 0], [a / 2, b / 2, 0]),
      card([a, b, 0], [a / 2, b / 2, c]),
    ]);
    expect(difference(hollow, six)).toBeLessThan(1e-13);
  });

  test("a two-sided one is one layer", () => {
    const { body, warnings } = weighedAs({ solid: "surface" }, together(triangle, turnedRound(triangle)));
    expect(body.mass).toBeCloseTo(18, 12);
    expect(warnings).toEqual(["surface 0: a face is there twice: counted once"]);
  });

  test("of a round shape weighs as a shell does", async () => {
    // Thin spherical shell: 4πr², 2 m r²/3; open-ended parts of a cylinder's: Meriam & Kraige, table D/4. Facets: to about 1e-4.
    const ball = await weigh("ball", { sphere: 0.5 }, { solid: "surface", wall: 0.001 });
    expect(ball.mass / PI).toBeCloseTo(1, 3);
    expect(ball.principal.moments[1] / (ball.mass * 0.25 * (2 / 3))).toBeCloseTo(1, 3);
    const { mass } = await weigh(
      "ring",
      { ring: { radius: 0.4, thickness: 0.2 } },
      { solid: "surface", wall: 0.001 },
    );
    // 4π² R a
    expect(mass / (4 * PI * PI * 0.04)).toBeCloseTo(1, 3);
  });
});

describe("solid: hull", () => {
  test("fills what is hollow, open or between parts", () => {
    const holey = together({ ...cube, triangles: cube.triangles.slice(5) }, box([2, 0, 0], [3, 1, 1]));
    const { body, warnings } = weighedAs({ solid: "hull" }, holey);
    expect(difference(body, weighed(box([0, 0, 0], [3, 1, 1])).body)).toBeLessThan(1e-13);
    expect(warnings).toEqual([]);
  });

  test("of an L is the L and the triangle in its corner", () => {
    // The corner's right triangle: legs 0.375 and 0.25.
    expect(weighedAs({ solid: "hull" }, ell()).body.volume).toBeCloseTo(
      3 / 256 + (0.375 * 0.25 * 0.125) / 2,
      14,
    );
  });

  test("of a convex shape is the shape, of a ring the disc with a round rim", async () => {
    const [ball, hull] = [
      await weigh("b", { sphere: 0.3 }),
      await weigh("b", { sphere: 0.3 }, { solid: "hull" }),
    ];
    expect(hull.mass).toBe(ball.mass);
    const ring = await weigh("r", { ring: { radius: 0.4, thickness: 0.2 } }, { solid: "hull" });
    // Turned round the axis: a rectangle 0.4 × 0.2 and half a circle of radius 0.1, whose centroid is 4r/3π out (Pappus' second theorem).
    const volume = PI * 0.16 * 0.2 + 2 * PI * (0.4 + 0.4 / (3 * PI)) * (PI * 0.005);
    expect(ring.volume / volume).toBeCloseTo(1, 3);
  });

  test("of several densities takes that of the greatest area, with a warning; a flat one is refused", () => {
    const { body, warnings } = weighedAs(
      { solid: "hull", wall: 0.1 },
      [cube, 700],
      [box([1, 0, 0], [1.5, 1, 1]), 3000],
    );
    expect(body.mass).toBeCloseTo(1050, 10);
    expect(warnings).toEqual([
      expect.stringContaining("700 kg/m³: the hull is of several densities"),
      "wall changes nothing: the hull is solid; solid: surface makes thin walls of the faces",
    ]);
    expect(() => weighedAs({ solid: "hull" }, box([0, 0, 0], [1, 1, 0]))).toThrow(/is flat.*solid: surface/);
  });
});

describe("parts that overlap", () => {
  const share = (warnings: string[]) =>
    Number(/about ([\d.]+) % of the mass is counted twice/.exec(warnings.join())?.[1] ?? 0);

  test("both count, and the share is told", () => {
    // 0.4 of 2 m³
    const { body, warnings } = weighed(
      together(
        cube,
        moved(cube, ([x, y, z]) => [x + 0.6, y, z]),
      ),
    );
    expect(body.mass).toBeCloseTo(2000, 9);
    expect(Math.abs(share(warnings) - 20)).toBeLessThan(1);
  });

  test("one within another counts the lighter as too much", () => {
    // A core of 0.5³ m³ of 8000 kg/m³ in a cube of 1000: 125 kg too much of 2000.
    const { warnings } = weighed([cube, 1000], [box([0.25, 0.25, 0.25], [0.75, 0.75, 0.75]), 8000]);
    expect(Math.abs(share(warnings) - 6.25)).toBeLessThan(1);
    expect(warnings[0]).toMatch(/^surface 0; surface 1: parts overlap, and each counts: .*density 0 leaves/);
  });

  test("nothing is told of parts that touch, whose boxes alone overlap, or that lie in a cavity", () => {
    expect(weighed(cube, box([1, 0, 0], [2, 1, 1])).warnings).toEqual([]);
    // Less than a thousandth in common.
    expect(weighed(cube, box([0.9995, 0, 0], [2, 1, 1])).warnings).toEqual([]);
    expect(weighed(ell(), box([0.2, 0.2, 0], [0.5, 0.375, 0.125])).warnings).toEqual([]);
    const seedling = box([0.4, 0.4, 0.4], [0.6, 0.6, 0.6]);
    const hollow = together(cube, turnedRound(box([0.25, 0.25, 0.25], [0.75, 0.75, 0.75])), seedling);
    expect(weighed(hollow).warnings).toEqual([]);
  });

  test("many at once are told of within a moment", () => {
    const chips = [...Array(2000).keys()].map((i) => {
      const [x, y, z] = [(i % 13) / 13, (i % 17) / 17, (i % 19) / 19];
      return box([x, y, z], [x + 0.1, y + 0.1, z + 0.1]);
    });
    const all: Mesh = {
      vertices: chips.flatMap((chip) => chip.vertices),
      triangles: chips.flatMap((chip, n) =>
        chip.triangles.map(([a, b, c]): [number, number, number] => [a + 8 * n, b + 8 * n, c + 8 * n]),
      ),
    };
    const { body, warnings } = weighed(all);
    expect(body.mass).toBeCloseTo(2000, 8);
    // 2 m³ in 1.1³ m³: a third at least
    expect(share(warnings)).toBeGreaterThan(33);
  });
});
