import { describe, expect, it } from "vitest";
import { rotate } from "../../src/math/quat.js";
import { cross, dot, length, subtract, type Vec3 } from "../../src/math/vec3.js";
import { convexHull, type Hull } from "../../src/prop/hull.js";
import { sideOf } from "../../src/prop/hull-exact.js";
import { shapeMesh } from "../../src/prop/shape-mesh.js";
import { anyDirection, anyOrientation, between, random } from "../flight/tumbling.js";

const at = (points: Float64Array, i: number): Vec3 => [points[3 * i], points[3 * i + 1], points[3 * i + 2]];
const cloud = (list: readonly Vec3[]) => Float64Array.from(list.flat());
const sphere = (count: number) =>
  cloud(
    Array.from({ length: count }, (_, i): Vec3 => {
      const z = 1 - (2 * (i + 0.5)) / count;
      const angle = 2.399963229728653 * i; // golden angle
      return [Math.sqrt(1 - z * z) * Math.cos(angle), Math.sqrt(1 - z * z) * Math.sin(angle), z];
    }),
  );

/** Holds the hull to what makes it one: closed, of one piece, round all points. */
function check(points: Float64Array, { corners, triangles }: Hull): void {
  const edges = new Map<string, number>();
  let greatest = 0;
  for (const value of points) greatest = Math.max(greatest, Math.abs(value));
  for (let i = 0; i < triangles.length; i += 3) {
    const t = [triangles[i], triangles[i + 1], triangles[i + 2]];
    for (const k of [0, 1, 2]) edges.set(`${t[k]},${t[(k + 1) % 3]}`, i);
    const [a, b, c] = t.map((p) => at(points, p));
    const n = cross(subtract(b, a), subtract(c, a));
    const size = length(n);
    if (size < 1e-6 * greatest * greatest) continue;
    let furthest = 0;
    for (let p = 0; p < points.length / 3; p++)
      furthest = Math.max(furthest, dot(n, subtract(at(points, p), a)) / size);
    expect(furthest).toBeLessThan(1e-12 * greatest);
  }
  // each edge once in each direction: closed and oriented
  expect(edges.size).toBe(triangles.length);
  for (const edge of edges.keys()) expect(edges.has(edge.split(",").reverse().join(","))).toBe(true);
  expect(new Set(triangles)).toEqual(new Set(corners));
  // Euler's formula for one piece: V − E + F = 2
  expect(corners.length - edges.size / 2 + triangles.length / 3).toBe(2);
}

const lowest = (points: Float64Array, indices: Iterable<number>, d: Vec3) => {
  let least = Number.POSITIVE_INFINITY;
  for (const i of indices) least = Math.min(least, dot(at(points, i), d));
  return least;
};

describe("the convex hull", () => {
  it("of a cube's grid of points, turned any way, is its eight corners, and hardly any more", () => {
    const next = random(21);
    for (let round = 0; round < 20; round++) {
      const q = anyOrientation(next);
      const grid: Vec3[] = [];
      for (let x = 0; x <= 6; x++)
        for (let y = 0; y <= 6; y++) for (let z = 0; z <= 6; z++) grid.push([x, y, z]);
      const points = cloud(round === 0 ? grid : grid.map((p) => rotate(q, p)));
      const hull = convexHull(points)!;
      check(points, hull);
      // Rounding of the turn moves points of a side off its plane by 1e-15: those are no corners, but where slivers between them cannot be measured.
      if (round === 0) expect(hull.corners.length).toBe(8);
      expect(hull.corners.length, `round ${round}`).toBeLessThanOrEqual(16);
    }
  });

  it("of random clouds, many points twice, in one plane or in one line, holds them all", () => {
    const next = random(22);
    for (let round = 0; round < 200; round++) {
      const coarse = round % 3 === 0 ? 4 : round % 3 === 1 ? 100 : 1e9;
      const flatten = round % 5 === 0 ? 1e-9 : 1;
      const points = cloud(
        Array.from({ length: 5 + Math.floor(next() * 120) }, (): Vec3 => {
          const value = () => Math.round(between(next, -1, 1) * coarse) / coarse;
          return [value(), value() * flatten, value()];
        }),
      );
      const hull = convexHull(points);
      if (hull) check(points, hull);
      else expect(points.length).toBeLessThan(30);
    }
  });

  it("of sides that are flat but for noise near the slack is closed and of one piece too", () => {
    const next = random(24);
    for (let round = 0; round < 60; round++) {
      const q = anyOrientation(next);
      const noise = [1e-12, 3e-13, 1e-13][round % 3];
      const points = cloud(
        Array.from({ length: 300 }, (_, i): Vec3 => {
          const sheet = (i % 2) * (round % 2 ? 1 : 1e-6) + between(next, -noise, noise);
          return rotate(q, [Math.round(between(next, 0, 9)) / 9, Math.round(between(next, 0, 9)) / 9, sheet]);
        }),
      );
      check(points, convexHull(points)!);
    }
  });

  it("of the meshes of shapes has the support of all their vertices", () => {
    const next = random(23);
    for (const shape of [
      { ring: { radius: 0.2, thickness: 0.06 } },
      { tube: { outer: 0.2, inner: 0.1, length: 0.7 } },
      { capsule: { radius: 0.1, length: 0.5 } },
      { disc: { radius: 0.2, thickness: 1e-4 } },
    ]) {
      const points = Float64Array.from(shapeMesh(shape).positions);
      const hull = convexHull(points)!;
      expect(hull.corners.length).toBeLessThan(points.length / 3);
      const all = Array.from({ length: points.length / 3 }, (_, i) => i);
      for (let i = 0; i < 500; i++) {
        const d = anyDirection(next);
        expect(lowest(points, hull.corners, d) - lowest(points, all, d)).toBeLessThan(1e-13);
      }
    }
  });

  it("of 100,000 points on a sphere has each of them for a corner, and with as many inside no other", () => {
    const outer = sphere(100_000);
    const points = new Float64Array(2 * outer.length);
    points.set(outer);
    outer.forEach((value, i) => {
      points[outer.length + i] = 0.99 * value;
    });
    const hull = convexHull(points)!;
    expect(hull.corners.length).toBe(100_000);
    // F = 2V − 4 of a triangulated sphere (Euler)
    expect(hull.triangles.length / 3).toBe(2 * 100_000 - 4);
  });

  it("of points in one plane is none", () => {
    expect(
      convexHull(
        cloud([
          [0, 0, 1],
          [1, 0, 1],
          [0, 1, 1],
          [1, 1, 1],
          [0.5, 2, 1],
        ]),
      ),
    ).toBeUndefined();
    expect(
      convexHull(
        cloud([
          [0, 0, 0],
          [0, 0, 0],
          [0, 0, 0],
          [0, 0, 0],
        ]),
      ),
    ).toBeUndefined();
  });

  it("decides sides exactly where doubles cannot", () => {
    // a plane through whole points of 50 digits, and points one unit to either side of it
    const n = 2 ** 49;
    const places = Float64Array.of(
      0,
      0,
      0,
      n,
      1,
      0,
      1,
      n,
      0,
      n - 7,
      n - 5,
      0,
      n - 7,
      n - 5,
      1,
      n - 7,
      n - 5,
      -1,
    );
    expect(sideOf(places, 0, 1, 2, 3)).toBe(0);
    expect(sideOf(places, 0, 1, 2, 4)).toBe(1);
    expect(sideOf(places, 0, 1, 2, 5)).toBe(-1);
    const skew = Float64Array.of(
      0,
      0,
      0,
      n,
      n - 1,
      n - 2,
      n - 3,
      n - 5,
      n - 8,
      2 * n - 3,
      2 * n - 6,
      2 * n - 10,
    );
    expect(sideOf(skew, 0, 1, 2, 3)).toBe(0);
    skew[11] += 1;
    expect(Math.abs(sideOf(skew, 0, 1, 2, 3))).toBe(1);
  });
});
