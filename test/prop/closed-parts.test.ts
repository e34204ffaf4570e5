import { describe, expect, test } from "vitest";
import { findParts } from "../../src/prop/closed-parts.js";
import { box, type Mesh, moved, together, welded } from "./bodies.js";

const cube = box([0, 0, 0], [1, 1, 1]);
const parts = (...meshes: Mesh[]) => findParts(meshes.map(welded));

describe("parts of a mesh", () => {
  test("a cube is one closed part", () => {
    const { closed, open } = parts(cube);
    expect([closed.length, closed[0].triangles.length / 3, open]).toEqual([1, 12, []]);
  });

  test("a cube without a face has four open edges", () => {
    const { closed, open } = parts({ ...cube, triangles: cube.triangles.slice(2) });
    expect([closed, open.map((part) => part.openEdges)]).toEqual([[], [4]]);
  });

  test("a cube with one triangle facing inwards has three edges between faces that face opposite ways", () => {
    const [[a, b, c], ...rest] = cube.triangles;
    const { open } = parts({ ...cube, triangles: [[a, c, b], ...rest] });
    expect(open.map(({ openEdges, contraryEdges }) => [openEdges, contraryEdges])).toEqual([[0, 3]]);
  });

  test("cubes that share a corner are two parts, cubes that share an edge are closed", () => {
    expect(parts(together(cube, box([1, 1, 1], [2, 2, 2]))).closed).toHaveLength(2);
    expect(parts(together(cube, box([1, 1, 0], [2, 2, 1]))).open).toHaveLength(0);
  });

  test("0 and -0 are one place", () => {
    const negative = moved(cube, ([x, y, z]) => [x || -0, y, z || -0]);
    const [one, two] = [cube.triangles.slice(0, 5), cube.triangles.slice(5)];
    const { closed } = parts({ ...cube, triangles: one }, { ...negative, triangles: two });
    expect(closed).toHaveLength(1);
  });

  test("a mesh in two surfaces is closed by both, and knows which triangle is whose", () => {
    const { closed, open } = parts(
      { ...cube, triangles: cube.triangles.slice(0, 5) },
      { ...cube, triangles: cube.triangles.slice(5) },
    );
    expect(open).toEqual([]);
    expect([...closed[0].owners]).toEqual([0, 0, 0, 0, 0, 1, 1, 1, 1, 1, 1, 1]);
  });

  test("a closed part stays by itself where another surface touches it", () => {
    const { closed, open } = parts(cube, box([1, 0, 0], [2, 1, 1]));
    expect([closed.map((part) => part.owners[0]), open]).toEqual([[0, 1], []]);
  });

  test("triangles without an area change nothing, with two corners in one place or three on a line", () => {
    const n = cube.vertices.length;
    const { closed, open } = parts({
      vertices: [...cube.vertices, [0.5, 0.5, 0], [1, 1, 0]],
      triangles: [[0, 0, 1], [3, n + 1, 0], [0, n, 3], ...cube.triangles],
    });
    expect([closed.length, closed[0].triangles.length / 3, open.length]).toEqual([1, 12, 0]);
  });

  test("a triangle without an area closes a crack", () => {
    // The face z = 0 is cut at the middle of the diagonal on one side only.
    const middle = cube.vertices.length;
    const [[a, b, c], second, ...rest] = cube.triangles;
    expect(second).toEqual([a, c, 1]);
    const cracked: Mesh = {
      vertices: [...cube.vertices, [0.5, 0.5, 0]],
      triangles: [[a, b, middle], [b, c, middle], second, ...rest],
    };
    expect(parts(cracked).open.map((part) => part.openEdges)).toEqual([3]);
    const closed: Mesh = { ...cracked, triangles: [...cracked.triangles, [a, middle, c], [a, a, b]] };
    expect([parts(closed).open.length, parts(closed).closed.length]).toEqual([0, 1]);
  });
});
