import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { diagonal, type Mat3, map, multiply, transpose } from "../../src/math/mat3.js";
import { fromAxisAngle, type Quat, rotate, toMatrix, normalize as unitQuat } from "../../src/math/quat.js";
import { cross, distance, dot, type Vec3 } from "../../src/math/vec3.js";
import { axisNames, principalAxes } from "../../src/prop/principal.js";

/** The tensor of a body whose own x, y, z have these moments, turned by `q`. */
function tensor(moments: Vec3, q: Quat): Mat3 {
  const R = toMatrix(q);
  return multiply(multiply(R, diagonal(moments)), transpose(R));
}

/** Symmetric rounding of relative size 1e-15. */
const shaken = (m: Mat3): Mat3 =>
  map(m, (value, i, j) => value + (((i + j * 3 + i * j) % 5) - 2) * 1e-15 * m[0][0]);

const coordinate = fc.double({ min: -1, max: 1, noNaN: true });
const rotation = fc
  .tuple(coordinate, coordinate, coordinate, coordinate)
  .filter((q) => Math.hypot(...q) > 0.1)
  .map((q): Quat => unitQuat(q));
const seed = { seed: 21, numRuns: 100 };
const S = Math.SQRT1_2;

// The rule for signs and ties is this program's own: the design of the throw file. Directions below are worked out from it by hand.

describe("principal axes", () => {
  test("make the tensor diagonal, whatever the body", () => {
    const moment = fc.double({ min: 0.5, max: 1, noNaN: true });
    fc.assert(
      fc.property(fc.tuple(moment, moment, moment), rotation, (moments, q) => {
        const inertia = tensor(moments, q);
        const { axes, moments: found } = principalAxes(inertia);
        const R = toMatrix(axes);
        const inAxes = multiply(multiply(transpose(R), inertia), R);
        map(inAxes, (value, i, j) => {
          expect(Math.abs(value - (i === j ? found[i] : 0))).toBeLessThan(1e-9);
          return value;
        });
        expect([...moments].sort().map((m, i) => Math.abs(m - found[i]) < 1e-9)).toEqual([true, true, true]);
      }),
      seed,
    );
  });

  test("are to the last bit the model's own where the tensor is diagonal but for rounding", () => {
    expect(principalAxes(shaken(diagonal([1, 2, 3]))).axes).toEqual([0, 0, 0, 1]);
    // long = z, middle = x, short = z × x = y: x → z → y → x is a third of a turn about (1, 1, 1), backwards
    expect(principalAxes(shaken(diagonal([2, 3, 1]))).axes).toEqual([-0.5, -0.5, -0.5, 0.5]);
  });

  test("of a body that is square in a plane are settled there, and both moments are one number", () => {
    const { moments, axes } = principalAxes(shaken(diagonal([2, 1, 2])));
    expect(moments[1]).toBe(moments[2]);
    // long = y, middle = x (first of x and z), short = y × x = -z
    expect(rotate(axes, [1, 0, 0]).map(Math.round)).toEqual([0, 1, 0]);
    expect(rotate(axes, [0, 1, 0]).map(Math.round)).toEqual([1, 0, 0]);
    expect(rotate(axes, [0, 0, 1]).map(Math.round)).toEqual([0, 0, -1]);
  });

  test("stay true where moments differ by a part in a million", () => {
    const turned = fromAxisAngle([0, 0, 1], 0.5);
    const { axes } = principalAxes(tensor([1, 1.000001, 2], turned));
    expect(distance(rotate(axes, [1, 0, 0]), rotate(turned, [1, 0, 0]))).toBeLessThan(1e-8);
  });
});

describe("the names long, middle, short", () => {
  test("follow the moments, with the largest component of long and middle positive", () => {
    fc.assert(
      fc.property(rotation, (q) => {
        const { long, middle, short } = axisNames(tensor([1, 2, 2.5], q));
        expect(Math.abs(dot(long, rotate(q, [1, 0, 0])))).toBeCloseTo(1, 12);
        expect(Math.abs(dot(middle, rotate(q, [0, 1, 0])))).toBeCloseTo(1, 12);
        expect(distance(short, cross(long, middle))).toBeLessThan(1e-12);
        for (const axis of [long, middle])
          expect(Math.max(...axis)).toBeGreaterThanOrEqual(-Math.min(...axis) - 1e-9);
      }),
      seed,
    );
  });

  test("take the first of components of equal size as the largest, whatever rounding says", () => {
    const q = fromAxisAngle([0, 0, 1], -Math.PI / 4);
    for (const noise of [-1e-15, 0, 1e-15, 3e-15]) {
      const uneven = map(tensor([1, 2, 3], q), (value, i, j) => (i === j ? value + i * noise : value));
      const { long, middle } = axisNames(uneven);
      expect(distance(long, [S, -S, 0])).toBeLessThan(1e-14);
      expect(distance(middle, [S, S, 0])).toBeLessThan(1e-14);
    }
  });

  test("of a turned cube and of a ball are x, y, z", () => {
    const expected = { long: [1, 0, 0], middle: [0, 1, 0], short: [0, 0, 1] };
    expect(axisNames(shaken(tensor([2, 2, 2], fromAxisAngle([1, 2, 3], 0.7))))).toEqual(expected);
    expect(axisNames(diagonal([2.015, 2, 2.01]))).toEqual(expected);
  });

  test("of a rod along z: long is z, the others the model's own", () => {
    expect(axisNames(shaken(diagonal([5, 5, 1])))).toEqual({
      long: [0, 0, 1],
      middle: [1, 0, 0],
      short: [0, 1, 0],
    });
  });

  test("of a disc about y: long is x, middle z, short the axis turned down", () => {
    expect(axisNames(shaken(diagonal([1, 2, 1])))).toEqual({
      long: [1, 0, 0],
      middle: [0, 0, 1],
      short: [0, -1, 0],
    });
  });

  test("of a tilted disc: the axis of the model that lies in its plane, and the one square to it", () => {
    // A disc about y, tipped by 45° about x: x stays in its plane, the square to it is (0, -1, 1)/√2: a tie, y positive.
    const { long, middle, short } = axisNames(
      shaken(tensor([1, 2, 1], fromAxisAngle([1, 0, 0], Math.PI / 4))),
    );
    expect(distance(long, [1, 0, 0])).toBe(0);
    expect(distance(middle, [0, S, -S])).toBeLessThan(1e-14);
    expect(distance(short, [0, S, S])).toBeLessThan(1e-14);
  });

  test("moments within 1 % are equal for the names alone", () => {
    const inertia = tensor([1, 1.009, 2], fromAxisAngle([0, 0, 1], 0.5));
    expect(axisNames(inertia)).toEqual({ long: [1, 0, 0], middle: [0, 1, 0], short: [0, 0, 1] });
    expect(Math.abs(rotate(principalAxes(inertia).axes, [1, 0, 0])[1])).toBeCloseTo(Math.sin(0.5), 12);
    const different = tensor([1, 1.011, 2], fromAxisAngle([0, 0, 1], 0.5));
    expect(axisNames(different).long[1]).toBeCloseTo(Math.sin(0.5), 12);
  });

  test("where the middle moment is within 1 % of both others it goes with the nearer", () => {
    const q = fromAxisAngle([0, 0, 1], 0.5);
    const { long, middle, short } = axisNames(tensor([1, 1.006, 1.0145], q));
    expect([long, middle, short]).toEqual([
      [1, 0, 0],
      [0, 1, 0],
      [0, 0, 1],
    ]);
    expect(axisNames(tensor([1, 1.009, 1.0145], q)).long[1]).toBeCloseTo(Math.sin(0.5), 10);
  });

  test("do not hang on rounding, however a symmetric body lies", () => {
    fc.assert(
      fc.property(rotation, fc.constantFrom<Vec3>([1, 1, 2], [2, 2, 1]), (q, moments) => {
        const inertia = tensor(moments, q);
        const [calm, rough] = [axisNames(inertia), axisNames(shaken(inertia))];
        for (const name of ["long", "middle", "short"] as const)
          expect(distance(calm[name], rough[name])).toBeLessThan(1e-12);
      }),
      seed,
    );
  });
});
