import seedrandom from "seedrandom";
import { Matrix4, Quaternion, Vector3 } from "three";
import { describe, expect, it } from "vitest";
import { determinant, multiply as multiplyMatrices, multiplyVector, transpose } from "../../src/math/mat3.js";
import {
  angleBetween,
  between,
  conjugate,
  fromAxisAngle,
  fromMatrix,
  fromRotationVector,
  IDENTITY,
  multiply,
  negate,
  normalize,
  type Quat,
  rotate,
  rotateBack,
  toMatrix,
  toRotationVector,
} from "../../src/math/quat.js";
import {
  distance,
  dot,
  length,
  normalize as normalizeVector,
  scale,
  type Vec3,
} from "../../src/math/vec3.js";

// Outside source of the general cases: three.js (Quaternion, Matrix4, Vector3).

const random = seedrandom("quat");
const signed = (): number => 2 * random() - 1;
const vector = (): Vec3 => [signed(), signed(), signed()];
const orientation = (): Quat => normalize([signed(), signed(), signed(), signed()]);
const three = (q: Quat): Quaternion => new Quaternion(...q);
const three3 = (v: Vec3): Vector3 => new Vector3(...v);

function expectClose(found: readonly number[], expected: readonly number[], tolerance = 1e-15): void {
  expect(found.length).toBe(expected.length);
  found.forEach((x, i) => {
    expect(Math.abs(x - expected[i])).toBeLessThanOrEqual(tolerance);
  });
}
/** As rotations: q and −q are the same. */
const expectSameRotation = (found: Quat, expected: Quat, tolerance = 1e-15): void =>
  expectClose(
    found[3] * expected[3] + found[0] * expected[0] < 0 ? negate(found) : found,
    expected,
    tolerance,
  );
const repeat = (check: () => void): void => {
  for (let i = 0; i < 200; i++) check();
};

describe("quaternions agree with three.js", () => {
  it("in products and inverses", () =>
    repeat(() => {
      const [a, b] = [orientation(), orientation()];
      expectClose(multiply(a, b), three(a).multiply(three(b)).toArray());
      expectClose(multiply(a, conjugate(a)), IDENTITY);
    }));

  it("in turning vectors", () =>
    repeat(() => {
      const [q, v] = [orientation(), vector()];
      expectClose(rotate(q, v), three3(v).applyQuaternion(three(q)).toArray());
      expectClose(rotateBack(q, rotate(q, v)), v, 2e-15);
    }));

  it("in rotations about an axis", () =>
    repeat(() => {
      const [axis, angle] = [vector(), 10 * signed()];
      expectClose(
        fromAxisAngle(axis, angle),
        new Quaternion().setFromAxisAngle(three3(axis).normalize(), angle).toArray(),
      );
    }));

  it("in matrices, both ways", () =>
    repeat(() => {
      const q = orientation();
      const m = new Matrix4().makeRotationFromQuaternion(three(q));
      const e = m.elements; // column by column
      const expected = [e[0], e[4], e[8], e[1], e[5], e[9], e[2], e[6], e[10]];
      expectClose(toMatrix(q).flat(), expected);
      expectSameRotation(fromMatrix(toMatrix(q)), q, 2e-15);
      expect(fromMatrix(toMatrix(q))[3]).toBeGreaterThanOrEqual(0);
    }));

  it("in the smallest rotation between two directions", () =>
    repeat(() => {
      const [a, b] = [vector(), vector()];
      const expected = new Quaternion().setFromUnitVectors(three3(a).normalize(), three3(b).normalize());
      expectClose(between(a, b), expected.toArray() as unknown as number[], 1e-13);
    }));

  it("in the angle between two orientations", () =>
    repeat(() => {
      const [a, b] = [orientation(), orientation()];
      expect(Math.abs(angleBetween(a, b) - three(a).angleTo(three(b)))).toBeLessThan(1e-13);
    }));
});

describe("quaternions at the edges", () => {
  it("half a turn comes back from each of the four branches of fromMatrix", () => {
    // the matrix of half a turn about the unit axis n is 2nnᵀ − 1 (Rodrigues)
    for (const n of [
      [1, 0, 0],
      [0, 1, 0],
      [0, 0, 1],
      [0.6, 0, 0.8],
      [0, 0.6, 0.8],
      [0.8, 0.6, 0],
    ] as Vec3[]) {
      // biome-ignore format: a list of axes
      const q: Quat = [n[0], n[1], n[2], 0];
      const entry = (i: number, j: number): number => 2 * n[i] * n[j] - (i === j ? 1 : 0);
      const row = (i: number): Vec3 => [entry(i, 0), entry(i, 1), entry(i, 2)];
      expectSameRotation(fromMatrix([row(0), row(1), row(2)]), q);
      expectClose(toMatrix(q).flat(), [row(0), row(1), row(2)].flat());
    }
    expect(fromMatrix(toMatrix(IDENTITY))).toEqual(IDENTITY);
  });

  it("opposite directions take half a turn about something at right angles", () =>
    repeat(() => {
      const a = normalizeVector(vector());
      const q = between(a, scale(a, -3));
      expectClose(rotate(q, a), scale(a, -1), 2e-15);
      expect(length([q[0], q[1], q[2]])).toBeCloseTo(1, 14);
    }));

  it("nearly opposite directions still meet, and the result is a unit quaternion", () => {
    for (let e = 1; e <= 17; e++) {
      const b = normalizeVector([-1, 10 ** -e, 3 * 10 ** -e]);
      const q = between([1, 0, 0], b);
      expect(Math.abs(Math.hypot(...q) - 1)).toBeLessThan(1e-15);
      expect(distance(rotate(q, [1, 0, 0]), b)).toBeLessThan(1e-14);
    }
  });

  it("directions of any length will do", () => {
    expectClose(between([1e-200, 0, 0], [0, 1e200, 0]), [0, 0, Math.SQRT1_2, Math.SQRT1_2]);
  });

  it("tiny angles keep their digits", () => {
    for (const angle of [1e-3, 1e-8, 1e-12, 1e-20, 1e-100]) {
      const turned = fromAxisAngle([1, 2, -2], angle);
      expect(Math.abs(angleBetween(IDENTITY, turned) / angle - 1)).toBeLessThan(1e-15);
      expectClose(scale(toRotationVector(turned), 1 / angle), [1 / 3, 2 / 3, -2 / 3]);
    }
  });

  it("rotation vectors come back, up to half a turn", () => {
    repeat(() => {
      const v = scale(normalizeVector(vector()), Math.PI * random());
      expectClose(toRotationVector(fromRotationVector(v)), v, 4e-15);
      expectClose(toRotationVector(negate(fromRotationVector(v))), v, 4e-15);
    });
    expect(toRotationVector(IDENTITY)).toEqual([0, 0, 0]);
    expect(fromRotationVector([0, 0, 0])).toEqual(IDENTITY);
    // an angle over half a turn comes back as the shorter way round
    expectClose(toRotationVector(fromRotationVector([0, 1.5 * Math.PI, 0])), [0, -0.5 * Math.PI, 0]);
  });

  it("matrices are rotations: orthonormal, right-handed, composed in the same order", () =>
    repeat(() => {
      const [a, b, v] = [orientation(), orientation(), vector()];
      const m = toMatrix(a);
      expectClose(multiplyMatrices(m, transpose(m)).flat(), [1, 0, 0, 0, 1, 0, 0, 0, 1], 2e-15);
      expect(determinant(m)).toBeCloseTo(1, 14);
      expectClose(multiplyMatrices(m, toMatrix(b)).flat(), toMatrix(multiply(a, b)).flat(), 3e-15);
      expectClose(multiplyVector(m, v), rotate(a, v), 2e-15);
      expect(Math.abs(dot(rotate(a, v), rotate(a, [1, 0, 0])) - v[0])).toBeLessThan(2e-15);
    }));
});
