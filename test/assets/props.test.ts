import { execFile } from "node:child_process";
import { mkdtemp, readdir, readFile, rm } from "node:fs/promises";
import { tmpdir } from "node:os";
import path from "node:path";
import { fileURLToPath } from "node:url";
import { promisify } from "node:util";
import { NodeIO } from "@gltf-transform/core";
// @ts-expect-error it comes without types
import { validateBytes } from "gltf-validator";
import { afterAll, beforeAll, describe, expect, it } from "vitest";

const BUILD = fileURLToPath(new URL("../../assets/build-props.js", import.meta.url));
const PROPS = fileURLToPath(new URL("../../assets/props/", import.meta.url));

/**
 * Width, height and depth over all, m, from the sizes that real ones have (from memory): an open-ended spanner 24 × 19 is
 * about 0.26 m long, a skiff's oar a little over 2 m, a deck quoit 0.2 m across, a hand lantern 0.3 m high with its handle
 * up, a marlinspike 0.3 m, a small tea crate 0.45 m over its rope handles. The token is a design of our own.
 */
const SIZES: Record<string, [number, number, number]> = {
  crate: [0.486, 0.26, 0.26],
  lantern: [0.123, 0.294, 0.11],
  marlinspike: [0.0256, 0.298, 0.0256],
  oar: [0.149, 2.106, 0.075],
  quoit: [0.214, 0.031, 0.214],
  spanner: [0.053, 0.0128, 0.265],
  token: [0.044, 0.0036, 0.044],
};

interface Mesh {
  node: string;
  material: string;
  positions: number[][];
  normals: number[][];
  triangles: number[][];
}

async function readMeshes(name: string): Promise<Mesh[]> {
  const root = (await new NodeIO().read(path.join(PROPS, `${name}.glb`))).getRoot();
  return root.listNodes().flatMap((node) =>
    (node.getMesh()?.listPrimitives() ?? []).map((primitive) => ({
      node: node.getName(),
      material: primitive.getMaterial()?.getName() ?? "",
      positions: triples(primitive.getAttribute("POSITION")!.getArray()!),
      normals: triples(primitive.getAttribute("NORMAL")!.getArray()!),
      triangles: triples(primitive.getIndices()!.getArray()!),
    })),
  );
}

function triples(flat: ArrayLike<number>): number[][] {
  return Array.from({ length: flat.length / 3 }, (_, i) => [flat[3 * i], flat[3 * i + 1], flat[3 * i + 2]]);
}

/** Edges, between places rather than vertices, that are not run exactly once each way. */
function openEdges({ positions, triangles }: Mesh): string[] {
  const runs = new Map<string, number>();
  for (const corners of triangles) {
    for (let i = 0; i < 3; i++) {
      const edge = `${positions[corners[i]]} > ${positions[corners[(i + 1) % 3]]}`;
      runs.set(edge, (runs.get(edge) ?? 0) + 1);
    }
  }
  return [...runs].flatMap(([edge, count]) =>
    count === 1 && runs.get(edge.split(" > ").reverse().join(" > ")) === 1 ? [] : [edge],
  );
}

/** Divergence theorem: Σ a·(b×c) / 6 over outward triangles. */
function volume({ positions, triangles }: Pick<Mesh, "positions" | "triangles">): number {
  return triangles.reduce((sum, corners) => {
    const [a, b, c] = corners.map((i) => positions[i]);
    return sum + dot(a, cross(b, c)) / 6;
  }, 0);
}

const dot = (a: number[], b: number[]) => a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
const cross = (a: number[], b: number[]) => [
  a[1] * b[2] - a[2] * b[1],
  a[2] * b[0] - a[0] * b[2],
  a[0] * b[1] - a[1] * b[0],
];
const subtract = (a: number[], b: number[]) => [a[0] - b[0], a[1] - b[1], a[2] - b[2]];

let rebuilt: string;
beforeAll(async () => {
  rebuilt = await mkdtemp(path.join(tmpdir(), "props-"));
  await promisify(execFile)(process.execPath, [BUILD, rebuilt]);
});
afterAll(() => rm(rebuilt, { recursive: true }));

it("every prop has a size to be held to", async () => {
  expect((await readdir(PROPS)).sort()).toEqual(Object.keys(SIZES).map((name) => `${name}.glb`));
});

describe.each(Object.keys(SIZES))("%s", (name) => {
  it("is built again byte for byte", async () => {
    const [kept, built] = await Promise.all(
      [PROPS, rebuilt].map((folder) => readFile(path.join(folder, `${name}.glb`))),
    );
    expect(kept.equals(built)).toBe(true);
  });

  it("leaves the glTF validator nothing to say", async () => {
    const bytes = await readFile(path.join(PROPS, `${name}.glb`));
    expect((await validateBytes(new Uint8Array(bytes))).issues.messages).toEqual([]);
  });

  it("is closed and outward: each edge is run once each way, each part has a volume", async () => {
    for (const mesh of await readMeshes(name)) {
      expect(openEdges(mesh), mesh.node).toEqual([]);
      expect(volume(mesh), mesh.node).toBeGreaterThan(0);
    }
  });

  it("is lit from outside: normals are unit and on their triangle's side", async () => {
    for (const { node, positions, normals, triangles } of await readMeshes(name)) {
      for (const corners of triangles) {
        const [a, b, c] = corners.map((i) => positions[i]);
        const face = cross(subtract(b, a), subtract(c, a));
        for (const corner of corners) {
          expect(dot(normals[corner], normals[corner]), node).toBeCloseTo(1, 4);
          expect(dot(normals[corner], face), node).toBeGreaterThan(0);
        }
      }
    }
  });

  it("has the size of the real thing", async () => {
    const all = (await readMeshes(name)).flatMap((mesh) => mesh.positions);
    const size = [0, 1, 2].map((axis) => {
      const values = all.map((p) => p[axis]);
      return Math.max(...values) - Math.min(...values);
    });
    SIZES[name].forEach((expected, axis) => {
      expect(Math.abs(size[axis] - expected), `axis ${axis}: ${size[axis]}`).toBeLessThan(0.001);
    });
  });

  it("has a node for its material parts, named so that every loader keeps the name, and a socket to hold it by", async () => {
    const root = (await new NodeIO().read(path.join(PROPS, `${name}.glb`))).getRoot();
    const names = root.listNodes().map((node) => node.getName());
    expect(new Set(names).size).toBe(names.length);
    // Loaders that bind by name rewrite spaces and [ ] . : / (reading of their sources, from memory).
    for (const each of names) expect(each).toMatch(/^[a-z_]+$/);
    expect(names.some((each) => each.startsWith("socket_"))).toBe(true);
    expect(root.listMaterials().length).toBeGreaterThan(1);
  });
});

it("the lantern's globe holds air: it has far less glass than its outer shell encloses", async () => {
  const globe = (await readMeshes("lantern")).find(({ node }) => node === "lantern_globe")!;
  const glass = volume(globe);
  // Of two disjoint surfaces the outer one is the one that reaches furthest out.
  const reach = Math.max(...globe.positions.map(([x, , z]) => x * x + z * z));
  const shells = connected(globe).map((triangles) => ({ positions: globe.positions, triangles }));
  expect(shells).toHaveLength(2);
  const outer = shells.find(({ triangles }) =>
    triangles.flat().some((i) => globe.positions[i][0] ** 2 + globe.positions[i][2] ** 2 === reach),
  )!;
  const inner = shells.find((shell) => shell !== outer)!;
  expect(volume(inner)).toBeLessThan(0);
  expect(glass).toBeLessThan(0.25 * volume(outer));
});

/** Triangles in groups that share places. */
function connected({ positions, triangles }: Mesh): number[][][] {
  const groups: { places: Set<string>; triangles: number[][] }[] = [];
  for (const corners of triangles) {
    const places = corners.map((i) => positions[i].join());
    const touching = groups.filter((group) => places.some((place) => group.places.has(place)));
    const merged = {
      places: new Set([...touching.flatMap((group) => [...group.places]), ...places]),
      triangles: [...touching.flatMap((group) => group.triangles), corners],
    };
    groups.push(merged);
    for (const group of touching) groups.splice(groups.indexOf(group), 1);
  }
  return groups.map((group) => group.triangles);
}
