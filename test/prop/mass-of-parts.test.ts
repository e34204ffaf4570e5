import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { type Mat3, multiply, transpose } from "../../src/math/mat3.js";
import { type Quat, rotate, toMatrix, normalize as unitQuat } from "../../src/math/quat.js";
import { add, subtract, type Vec3 } from "../../src/math/vec3.js";
import { combine, type MassProperties } from "../../src/prop/mass.js";
import { box, difference, ell, type Mesh, moved, together, turnedRound, weighed } from "./bodies.js";

const seed = { seed: 20, numRuns: 40 };
const coordinate = fc.double({ min: -1, max: 1, noNaN: true });
const place = fc.tuple(coordinate, coordinate, coordinate);
const rotation = fc
  .tuple(coordinate, coordinate, coordinate, coordinate)
  .filter((q) => Math.hypot(...q) > 0.1)
  .map((q): Quat => unitQuat(q));

const L = weighed(ell()).body;

describe("an L-shaped solid", () => {
  test("weighs what its two boxes weigh", () => {
    // Two boxes: mass, centre and moments of a box from Meriam & Kraige, Dynamics, table D/4; parallel axis theorem.
    const bar = (low: Vec3, high: Vec3): MassProperties => {
      const [a, b, c] = [0, 1, 2].map((i) => high[i] - low[i]);
      const mass = 1000 * a * b * c;
      const moments = [b * b + c * c, a * a + c * c, a * a + b * b].map((s) => (mass / 12) * s);
      return {
        mass,
        volume: a * b * c,
        centerOfMass: [(low[0] + high[0]) / 2, (low[1] + high[1]) / 2, (low[2] + high[2]) / 2],
        inertia: [
          [moments[0], 0, 0],
          [0, moments[1], 0],
          [0, 0, moments[2]],
        ],
      };
    };
    const foot = bar([0, 0, 0], [0.5, 0.125, 0.125]);
    const stem = bar([0, 0.125, 0], [0.125, 0.375, 0.125]);
    expect(difference(L, combine([foot, stem]))).toBeLessThan(1e-14);
  });

  test("that is turned has the turned tensor", () => {
    fc.assert(
      fc.property(rotation, (q) => {
        const R = toMatrix(q);
        const { body } = weighed(moved(ell(), (v) => rotate(q, v)));
        expect(difference(body, turnedBody(L, R))).toBeLessThan(1e-13);
      }),
      seed,
    );
  });

  test("that is moved has the same tensor and a moved centre", () => {
    fc.assert(
      fc.property(place, (shift) => {
        const { body } = weighed(moved(ell(), (v) => add(v, shift)));
        expect(difference(body, { ...L, centerOfMass: add(L.centerOfMass, shift) })).toBeLessThan(1e-13);
      }),
      seed,
    );
  });

  test("loses no digits a kilometre from the origin", () => {
    const shift: Vec3 = [1024, -1024, 2048];
    const far = moved(ell(), (v) => add(rotate(unitQuat([0.1, 0.2, 0.3, 0.9]), v), shift));
    // The same rounded vertices brought back: these differences are exact.
    const near = weighed(moved(far, (v) => subtract(v, shift))).body;
    const { body } = weighed(far);
    expect(difference(body, { ...near, centerOfMass: add(near.centerOfMass, shift) })).toBeLessThan(2e-12);
  });

  test("that is mirrored has products of inertia of the other sign", () => {
    const mirrored = weighed(turnedRound(moved(ell(), ([x, y, z]): Vec3 => [-x, y, z]))).body;
    const [[xx, xy, xz], [, yy, yz], [, , zz]] = L.inertia;
    const expected: MassProperties = {
      ...L,
      centerOfMass: [-L.centerOfMass[0], L.centerOfMass[1], L.centerOfMass[2]],
      inertia: [
        [xx, -xy, -xz],
        [-xy, yy, yz],
        [-xz, yz, zz],
      ],
    };
    expect(difference(mirrored, expected)).toBeLessThan(1e-15);
  });

  test("does not care in which order its triangles, their corners and its vertices come", () => {
    fc.assert(
      fc.property(
        fc.shuffledSubarray([...Array(20).keys()], { minLength: 20 }),
        fc.shuffledSubarray([...Array(12).keys()], { minLength: 12 }),
        fc.nat(2),
        (triangleOrder, vertexOrder, turn) => {
          const { vertices, triangles } = ell();
          const shuffled: Mesh = {
            vertices: vertexOrder.map((v) => vertices[v]),
            triangles: triangleOrder.map((t) => {
              const at = (k: number) => vertexOrder.indexOf(triangles[t][(k + turn) % 3]);
              return [at(0), at(1), at(2)];
            }),
          };
          expect(difference(weighed(shuffled).body, L)).toBeLessThan(1e-14);
        },
      ),
      seed,
    );
  });

  test("cut into surfaces of one density, or with vertices of their own to each triangle, is the same", () => {
    const { vertices, triangles } = ell();
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 19 }), (cut) => {
        const parts = [triangles.slice(0, cut), triangles.slice(cut)].map((t) => ({
          vertices,
          triangles: t,
        }));
        const { body, warnings } = weighed(...parts);
        expect(warnings).toEqual([]);
        expect(difference(body, L)).toBeLessThan(1e-14);
      }),
      seed,
    );
    const split: Mesh = {
      vertices: triangles.flatMap((t) => t.map((v) => vertices[v])),
      triangles: triangles.map((_, t) => [3 * t, 3 * t + 1, 3 * t + 2]),
    };
    expect(difference(weighed(split).body, L)).toBe(0);
  });

  test("with every triangle cut in four is the same", () => {
    const { vertices, triangles } = ell();
    const half = (a: number, b: number): Vec3 => {
      const sum = add(vertices[a], vertices[b]);
      return [sum[0] / 2, sum[1] / 2, sum[2] / 2];
    };
    const fine = together(
      ...triangles.map(
        ([a, b, c]): Mesh => ({
          vertices: [vertices[a], vertices[b], vertices[c], half(a, b), half(b, c), half(c, a)],
          triangles: [
            [0, 3, 5],
            [3, 1, 4],
            [5, 4, 2],
            [3, 4, 5],
          ],
        }),
      ),
    );
    expect(difference(weighed(fine).body, L)).toBeLessThan(1e-14);
  });
});

const INSIDE_OUT = "surface 0: a part is inside out: turned round (turn its faces in the model)";

describe("which side of a part is matter", () => {
  const outer = box([-1, -1, -1], [1, 1, 1]);
  const inner = box([-0.5, -0.25, -0.5], [0.25, 0.5, 0.75]);
  const seedling = box([-0.125, 0, 0], [0.125, 0.25, 0.25]);
  // 8 − 0.75 × 0.75 × 1.25, and 0.25³
  const hollow = 7.296875;
  const kernel = 0.015625;

  test("an inward part within another is a cavity", () => {
    const { body, warnings } = weighed(together(outer, turnedRound(inner)));
    expect([body.volume, body.mass, warnings]).toEqual([hollow, 1000 * hollow, []]);
  });

  test("a cavity takes away what is around it, whatever its own walls are made of", () => {
    expect(weighed([outer, 500], [turnedRound(inner), 8000]).body.mass).toBe(500 * hollow);
  });

  test("a solid in a cavity counts", () => {
    const { body } = weighed([outer, 500], turnedRound(inner), [seedling, 8000]);
    expect(body.mass).toBe(500 * hollow + 8000 * kernel);
  });

  test("a mesh inside out as a whole is turned round, cavities too, with a warning", () => {
    const { body, warnings } = weighed(turnedRound(together(outer, turnedRound(inner), seedling)));
    expect(body.volume).toBe(hollow + kernel);
    expect(warnings).toEqual([INSIDE_OUT]);
  });

  test("a solid of another surface within one that is inside out stays a solid", () => {
    const { body } = weighed([turnedRound(outer), 500], [seedling, 8000]);
    expect(body.mass).toBe(500 * 8 + 8000 * kernel);
  });

  test("a part inside out beside others is turned round", () => {
    const beside = moved(box([0, 0, 0], [0.5, 0.5, 0.5]), (v) => add(v, [3, 0, 0]));
    const { body, warnings } = weighed(together(outer, turnedRound(beside)));
    expect([body.volume, warnings]).toEqual([8.125, [INSIDE_OUT]]);
  });

  test("a part within the box around another but outside it is no cavity", () => {
    // In the empty corner of the L.
    const corner = box([0.25, 0.1875, 0], [0.375, 0.3125, 0.125]);
    const { body, warnings } = weighed(together(ell(), turnedRound(corner)));
    expect([body.volume, warnings.length]).toEqual([L.volume + 1 / 512, 1]);
  });
});

describe("what cannot be weighed", () => {
  const flat = box([0, 0, 0], [1, 1, 0]);

  test("a closed but flat mesh is refused", () => {
    expect(() => weighed(flat)).toThrow(/is flat.*give it a thickness/);
  });

  test("a flat part beside a solid is a thin surface, with a warning that names the key", () => {
    const { body, warnings } = weighed(ell(), flat);
    // 1 m² of 2 mm at 1000 kg/m³: the default wall.
    expect(body.mass).toBeCloseTo(L.mass + 2, 12);
    expect(warnings).toEqual([
      "surface 1: a part has no thickness: taken as a thin surface of 0.002 m; state wall",
    ]);
    // A solid pressed flat has both its sides, cut along other diagonals, and weighs as one.
    const pressed: Mesh = {
      vertices: [
        [0, 0, 0],
        [1, 0, 0],
        [1, 1, 0],
        [0, 1, 0],
      ],
      triangles: [
        [0, 1, 2],
        [0, 2, 3],
        [1, 0, 3],
        [3, 2, 1],
      ],
    };
    expect(weighed(ell(), pressed).body.mass).toBeCloseTo(L.mass + 2, 12);
  });

  test("a solid whose faces are of two densities is weighed as the larger, with a warning", () => {
    const { vertices, triangles } = box([0, 0, 0], [1, 1, 1]);
    const { body, warnings } = weighed(
      [{ vertices, triangles: triangles.slice(0, 4) }, 3000],
      [{ vertices, triangles: triangles.slice(4) }, 700],
    );
    expect([body.mass, warnings]).toEqual([
      700,
      [
        expect.stringMatching(
          /^surface 1, 700 kg\/m³: a solid has faces of other densities too: weighed as that of the greater area/,
        ),
      ],
    ]);
  });
});

const turnedBody = (body: MassProperties, R: Mat3): MassProperties => ({
  ...body,
  centerOfMass: [0, 1, 2].map((i) =>
    R[i].reduce((sum, r, j) => sum + r * body.centerOfMass[j], 0),
  ) as unknown as Vec3,
  inertia: multiply(multiply(R, body.inertia), transpose(R)),
});
