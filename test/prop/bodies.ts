/** Meshes that tests weigh, and ways to look at them. */

import type { Surface } from "../../src/gltf/surfaces.js";
import { eigenSymmetric } from "../../src/math/eigen.js";
import type { Vec3 } from "../../src/math/vec3.js";
import type { MassProperties } from "../../src/prop/mass.js";
import { massOfSurfaces, type Solidity } from "../../src/prop/mass-of-surfaces.js";

import { type Triangles, weld } from "../../src/prop/weld.js";

export interface Mesh {
  vertices: Vec3[];
  triangles: [number, number, number][];
}

/** An axis-parallel box. */
export function box(low: Vec3, high: Vec3): Mesh {
  const vertices = [0, 1, 2, 3, 4, 5, 6, 7].map(
    (i): Vec3 => [i & 1 ? high[0] : low[0], i & 2 ? high[1] : low[1], i & 4 ? high[2] : low[2]],
  );
  const faces = [
    [0, 2, 3, 1],
    [4, 5, 7, 6],
    [0, 1, 5, 4],
    [2, 6, 7, 3],
    [0, 4, 6, 2],
    [1, 3, 7, 5],
  ];
  return {
    vertices,
    triangles: faces.flatMap(([a, b, c, d]): [number, number, number][] => [
      [a, b, c],
      [a, c, d],
    ]),
  };
}

/** An L of unequal arms, 0.5 × 0.375 × 0.125 m; all coordinates are whole eighths, so that doubles hold them exactly. */
export function ell(): Mesh {
  const outline = [
    [0, 0],
    [0.5, 0],
    [0.5, 0.125],
    [0.125, 0.125],
    [0.125, 0.375],
    [0, 0.375],
  ];
  const fans = [
    [0, 1, 2],
    [0, 2, 3],
    [0, 3, 5],
    [3, 4, 5],
  ];
  return {
    vertices: [0, 0.125].flatMap((z) => outline.map(([x, y]): Vec3 => [x, y, z])),
    triangles: [
      ...fans.map(([a, b, c]): [number, number, number] => [a, c, b]),
      ...fans.map(([a, b, c]): [number, number, number] => [a + 6, b + 6, c + 6]),
      ...outline.flatMap((_, i): [number, number, number][] => {
        const j = (i + 1) % 6;
        return [
          [i, j, j + 6],
          [i, j + 6, i + 6],
        ];
      }),
    ],
  };
}

export const moved = (mesh: Mesh, move: (v: Vec3) => Vec3): Mesh => ({
  ...mesh,
  vertices: mesh.vertices.map(move),
});

export const turnedRound = (mesh: Mesh): Mesh => ({
  ...mesh,
  triangles: mesh.triangles.map(([a, b, c]) => [a, c, b]),
});

export const together = (...meshes: Mesh[]): Mesh =>
  meshes.reduce((all, mesh) => ({
    vertices: [...all.vertices, ...mesh.vertices],
    triangles: [
      ...all.triangles,
      ...mesh.triangles.map(([a, b, c]): [number, number, number] => {
        const n = all.vertices.length;
        return [a + n, b + n, c + n];
      }),
    ],
  }));

export const surface = (mesh: Mesh, nodeName = "prop", materialName = "stuff"): Surface => ({
  nodeName,
  materialName,
  positions: Float64Array.from(mesh.vertices.flat()),
  triangles: Uint32Array.from(mesh.triangles.flat()),
});

/** As the weighing takes them. */
export const welded = (mesh: Mesh, owner = 0): Triangles => {
  const { positions, triangles } = surface(mesh);
  return weld([{ positions, triangles, owners: new Uint32Array(mesh.triangles.length).fill(owner) }]);
};

/** Weighs meshes, each a surface of its own of the density beside it (else 1000). */
export function weighed(...meshes: (Mesh | [Mesh, number])[]): { body: MassProperties; warnings: string[] } {
  return weighedAs({}, ...meshes);
}

/** The same, with what counts as matter stated. */
export function weighedAs(
  { solid = "auto", wall }: { solid?: Solidity["solid"]; wall?: number },
  ...meshes: (Mesh | [Mesh, number])[]
): { body: MassProperties; warnings: string[] } {
  const listed = meshes.map((entry): [Mesh, number] => (Array.isArray(entry) ? entry : [entry, 1000]));
  return massOfSurfaces(
    listed.map(([mesh], owner) => welded(mesh, owner)),
    listed.map(([, density], i) => ({ density, label: `surface ${i}` })),
    { solid, wall: wall ?? 0.002, isWallStated: wall !== undefined },
  );
}

/** Greatest difference of two bodies: mass relative, centre to `size`, inertia to the greatest principal moment. */
export function difference(a: MassProperties, b: MassProperties, size = 0.5): number {
  const greatest = eigenSymmetric(b.inertia).values[2];
  return Math.max(
    Math.abs(a.mass - b.mass) / b.mass,
    a.volume === b.volume ? 0 : Math.abs(a.volume - b.volume) / b.volume,
    ...a.centerOfMass.map((value, i) => Math.abs(value - b.centerOfMass[i]) / size),
    ...a.inertia.flatMap((row, i) => row.map((value, j) => Math.abs(value - b.inertia[i][j]) / greatest)),
  );
}
