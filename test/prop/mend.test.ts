import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { type Quat, rotate, normalize as unitQuat } from "../../src/math/quat.js";
import { add, type Vec3 } from "../../src/math/vec3.js";
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

const seed = { seed: 4, numRuns: 40 };
const L = weighed(ell()).body;
const cube = box([0, 0, 0], [1, 1, 1]);
const without = (mesh: Mesh, ...gone: number[]): Mesh => ({
  ...mesh,
  triangles: mesh.triangles.filter((_, t) => !gone.includes(t)),
});
const coordinate = fc.double({ min: -1, max: 1, noNaN: true });
const rotation = fc
  .tuple(coordinate, coordinate, coordinate, coordinate)
  .filter((q) => Math.hypot(...q) > 0.1)
  .map((q): Quat => unitQuat(q));

describe("flat openings", () => {
  test("are capped: a box sawn off is the box, however it is turned", () => {
    const bar = box([-1, -0.5, -0.25], [1, 0.5, 0.25]);
    const whole = weighed(bar).body;
    fc.assert(
      fc.property(rotation, fc.integer({ min: 0, max: 5 }), (q, face) => {
        const turn = (mesh: Mesh) => moved(mesh, (v) => rotate(q, v));
        const { body, warnings } = weighed(turn(without(bar, 2 * face, 2 * face + 1)));
        expect(difference(body, weighed(turn(bar)).body)).toBeLessThan(1e-13);
        expect(body.mass).toBeCloseTo(whole.mass, 9);
        expect(warnings).toEqual([
          "surface 0: not closed: a flat opening is capped and the inside is solid; if it is hollow, state wall",
        ]);
      }),
      seed,
    );
  });

  test("two at once, and of a shape that is not convex, are capped", () => {
    // Both L-shaped ends: fans of 4 triangles each, first in the list.
    const { body, warnings } = weighed(without(ell(), 0, 1, 2, 3, 4, 5, 6, 7));
    expect(difference(body, L)).toBeLessThan(1e-14);
    expect(warnings[0]).toContain("2 flat openings are capped");
  });

  test("that meet in a point are capped each by itself", () => {
    // Without one triangle each of z = 0 and y = 1, which share a corner.
    for (const gone of [
      [0, 6],
      [1, 7],
    ])
      expect(weighed(without(cube, ...gone)).body.volume).toBeCloseTo(1, 14);
  });

  test("are not capped where a wall is stated", () => {
    const { body, warnings } = weighedAs({ wall: 0.01 }, without(cube, 0, 1));
    expect([body.mass, warnings]).toEqual([50, []]);
  });
});

describe("what stays open", () => {
  // The faces z = 0 and x = 0 of the cube are missing: the loop is bent.
  const corner = without(cube, 0, 1, 8, 9);

  test("is a thin surface, with a warning that names the key", () => {
    const { body, warnings } = weighed(corner);
    expect([body.mass, body.volume]).toEqual([8, 0]);
    expect(warnings).toEqual([
      "surface 0: not closed: an open part is taken as a thin surface of 0.002 m; state wall, or solid: hull, or close it in the model",
    ]);
  });

  test("leaves closed parts beside it solid", () => {
    const beside = moved(cube, (v) => add(v, [3, 0, 0]));
    const { body } = weighedAs({ wall: 0.01 }, together(corner, beside));
    expect(body.mass).toBeCloseTo(40 + 1000, 10);
  });

  test("a bent sheet with a flat rim but nothing inside is a surface", () => {
    const sheet: Mesh = {
      vertices: [
        [0, 0, 0],
        [1, 0, 0],
        [1, 1, 0.1],
        [0, 1, 0.1],
      ],
      triangles: [
        [0, 1, 2],
        [0, 2, 3],
      ],
    };
    expect(weighed(sheet).body.mass).toBeCloseTo(2 * Math.hypot(1, 0.1), 12);
  });

  test("a surface of two densities is weighed as both", () => {
    const { body } = weighedAs(
      { wall: 0.01 },
      [without(corner, 4, 5, 6, 7), 1000],
      [without(corner, 0, 1, 2, 3), 3000],
    );
    expect(body.mass).toBeCloseTo(0.01 * (2 * 1000 + 2 * 3000), 10);
  });
});

describe("vertices that are nearly one", () => {
  /** Every triangle for itself, its corners off by up to `by`. */
  const soup = (mesh: Mesh, by: number): Mesh => ({
    vertices: mesh.triangles.flatMap((t, n) =>
      t.map((v, k): Vec3 => {
        const off = (i: number) => by * (((7 * n + 3 * k + 5 * i) % 11) / 5 - 1);
        const [x, y, z] = mesh.vertices[v];
        return [x + off(0), y + off(1), z + off(2)];
      }),
    ),
    triangles: mesh.triangles.map((_, n) => [3 * n, 3 * n + 1, 3 * n + 2]),
  });

  test("are joined, with a warning", () => {
    const { body, warnings } = weighed(soup(ell(), 1e-5));
    // Corners move by up to 2e-5 of the least edge, 0.125 m.
    expect(difference(body, L)).toBeLessThan(1e-3);
    expect(warnings).toEqual([
      expect.stringMatching(
        /^surface 0: \d+ open edges lie within a ten-thousandth of the size of others: joined/,
      ),
    ]);
  });

  test("are not joined further apart", () => {
    const { warnings } = weighed(soup(ell(), 1e-3));
    expect(warnings.join()).not.toContain("joined");
  });

  test("leave what is thin as it is", () => {
    // A lid a fiftieth of the tolerance thick, without its bottom.
    const thin = without(box([0, 0, 0], [1, 1, 2e-6]), 0, 1);
    expect(weighed(thin).body.volume).toBeCloseTo(2e-6, 12);
  });

  test("are not the ends of one short edge", () => {
    // Faces a hundred thousandth of the size, open as the large ones beside them.
    const corner = without(cube, 0, 1, 8, 9);
    const speck = moved(corner, ([x, y, z]) => [2 + 1e-5 * x, 1e-5 * y, 1e-5 * z]);
    expect(weighed(together(corner, speck)).warnings.join()).not.toContain("joined");
  });

  test("a crack beside a vertex on an edge is closed without a word", () => {
    const middle = cube.vertices.length;
    const [[a, b, c], second, ...rest] = cube.triangles;
    const cracked: Mesh = {
      vertices: [...cube.vertices, [0.5, 0.5, 0]],
      triangles: [[a, b, middle], [b, c, middle], second, ...rest],
    };
    for (const wall of [undefined, 0.01]) {
      const { body } = weighedAs({ wall }, cracked);
      expect(body.volume).toBeCloseTo(1, 14);
    }
    expect(weighed(cracked).warnings).toEqual([]);
  });
});

describe("faces that look the other way than their neighbours", () => {
  test("are turned round, with a warning that counts them", () => {
    fc.assert(
      fc.property(fc.uniqueArray(fc.nat(19), { minLength: 1, maxLength: 8 }), (odd) => {
        const { vertices, triangles } = ell();
        const mixed = triangles.map(([a, b, c], t): [number, number, number] =>
          odd.includes(t) ? [a, c, b] : [a, b, c],
        );
        const { body, warnings } = weighed({ vertices, triangles: mixed });
        expect(difference(body, L)).toBeLessThan(1e-14);
        expect(warnings[0]).toMatch(/^surface 0: (a face looks|\d+ faces look) the other way than/);
      }),
      seed,
    );
  });

  test("are turned in open meshes too", () => {
    const { vertices, triangles } = without(cube, 0, 1);
    const [[a, b, c], ...rest] = triangles;
    const { body, warnings } = weighed({ vertices, triangles: [[a, c, b], ...rest] });
    expect([body.volume, warnings.length]).toEqual([1, 2]);
  });

  test("a band with one side only is a surface", () => {
    // A Möbius strip has no facing that agrees throughout.
    const n = 12;
    const vertices = [...Array(n).keys()].flatMap((i): Vec3[] => {
      const around = (2 * Math.PI * i) / n;
      return [-0.2, 0.2].map((w) => {
        const r = 1 + w * Math.cos(around / 2);
        return [r * Math.cos(around), w * Math.sin(around / 2), r * Math.sin(around)];
      });
    });
    const triangles = [...Array(n).keys()].flatMap((i): [number, number, number][] => {
      const [a, b] = [2 * i, 2 * i + 1];
      const [c, d] = i === n - 1 ? [1, 0] : [a + 2, b + 2];
      return [
        [a, b, c],
        [b, d, c],
      ];
    });
    const { body, warnings } = weighed({ vertices, triangles });
    expect([body.volume, warnings.at(-1)?.includes("thin surface")]).toEqual([0, true]);
  });
});

describe("faces that are there twice", () => {
  test("of a solid some of whose faces have a back count once, with a warning", () => {
    const { vertices, triangles } = cube;
    const front = { vertices, triangles: triangles.slice(2, 4) };
    const { body, warnings } = weighed(together(cube, front, turnedRound(front)));
    expect([body.volume, warnings]).toEqual([1, ["surface 0: 4 faces are there twice: counted once"]]);
  });

  test("look the way that most of them do", () => {
    const { vertices, triangles } = cube;
    const front = { vertices, triangles: triangles.slice(2, 4) };
    const { body } = weighed(together(turnedRound(front), cube, front));
    expect([body.volume, body.centerOfMass]).toEqual([1, [0.5, 0.5, 0.5]]);
  });

  test("are a card where they look opposite ways: a bent two-sided sheet is a surface of its area", () => {
    const bent = without(cube, 0, 1, 2, 3, 4, 5, 6, 7);
    const { body, warnings } = weighed(together(bent, turnedRound(bent)));
    expect([body.mass, body.volume]).toEqual([4, 0]);
    expect(warnings).toEqual([
      expect.stringMatching(/no thickness: taken as a thin surface of 0.002 m; state wall/),
    ]);
  });

  test("a fin of two-sided faces on a solid is a surface, a two-sided wall within it nothing", () => {
    const fin: Mesh = {
      vertices: [
        [1, 0, 0],
        [1, 1, 0],
        [2, 1, 0],
        [2, 0, 0],
      ],
      triangles: [
        [0, 1, 2],
        [0, 2, 3],
      ],
    };
    const finned = weighed(together(cube, fin, turnedRound(fin)));
    expect(finned.body.mass).toBeCloseTo(1000 + 2, 10);
    expect(finned.warnings).toHaveLength(1);
    // Two boxes in one mesh, with a face in common: one box.
    const { body, warnings } = weighed(together(cube, box([1, 0, 0], [2, 1, 1])));
    expect([body.volume, warnings]).toEqual([2, []]);
  });

  test("of a whole part there twice in one surface count once, with a warning", () => {
    const { body, warnings } = weighed(together(cube, cube));
    expect([body.volume, warnings]).toEqual([1, ["surface 0: 12 faces are there twice: counted once"]]);
  });
});
