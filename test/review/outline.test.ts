import { readdirSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { describe, expect, test } from "vitest";
import type { Model } from "../../src/gltf/model.js";
import { readSurfaces } from "../../src/gltf/surfaces.js";
import { fromAxisAngle, IDENTITY, normalize, type Quat, rotate } from "../../src/math/quat.js";
import { subtract, type Vec3 } from "../../src/math/vec3.js";
import { readModelFile } from "../../src/node/model-files.js";
import { type Prop, weigh } from "../../src/prop/prop.js";
import { type Shape, shapeModel } from "../../src/prop/shape.js";
import { outlineOf, solidOf } from "../../src/review/outline.js";
import { coveredByRings, coveredByTriangles, type Grid, overlap, within } from "./covered.js";
import { card, meshModel } from "./meshes.js";

const assets = (name: string) => fileURLToPath(new URL(`../../assets/${name}`, import.meta.url));

const SHAPES: Shape[] = [
  { box: [0.1, 0.2, 0.3] },
  { sphere: 0.2 },
  { ellipsoid: [0.1, 0.15, 0.3] },
  { cylinder: { radius: 0.1, length: 0.4 } },
  { cone: { radius: 0.1, length: 0.3 } },
  { capsule: { radius: 0.05, length: 0.3 } },
  { ring: { radius: 0.15, thickness: 0.03 } },
  { disc: { radius: 0.15, thickness: 0.02 } },
  { tube: { outer: 0.1, inner: 0.08, length: 0.15 } },
];

/** Along the model's axes, and from all round. */
const VIEWS: Quat[] = [
  IDENTITY,
  fromAxisAngle([1, 0, 0], Math.PI / 2),
  fromAxisAngle([0, 1, 0], -Math.PI / 2),
  ...[1, 2, 3, 4, 5].map((i) => normalize([Math.sin(i), Math.cos(2 * i), Math.sin(3 * i), Math.cos(5 * i)])),
];

const AT_ORIGIN = { scale: 1, centerOfMass: [0, 0, 0] as Vec3 };

const props = readdirSync(assets("props")).map((file): [string, () => Promise<[Model, Model | Shape]>] => [
  file,
  async () => {
    const { model } = await readModelFile(assets(`props/${file}`), file);
    return [model, model];
  },
]);
const shapes = SHAPES.map((shape): [string, () => Promise<[Model, Model | Shape]>] => [
  JSON.stringify(shape),
  async () => [shapeModel("shape", shape), shape],
]);

describe("the outline", () => {
  test.each([...props, ...shapes])("of %s covers what its triangles cover", async (name, open) => {
    const [model, source] = await open();
    const prop = await weigh(name, source);
    const { surfaces } = await readSurfaces(model);
    const solid = await solidOf(model, prop);
    const detail = prop.reach / 200;
    for (const view of VIEWS) {
      const grid = gridOver(prop, view, 260);
      const { rings } = outlineOf(solid, view, detail);
      const covered = coveredByTriangles(surfaces, 1, prop.centerOfMass, view, grid);
      expect(overlap(covered, coveredByRings(rings, grid))).toBeGreaterThan(0.98);
    }
  });

  test("leaves the true one by no more than the detail asked for, be it fine or coarse", async () => {
    const { model } = await readModelFile(assets("props/lantern.glb"), "lantern.glb");
    const prop = await weigh("lantern", model);
    const { surfaces } = await readSurfaces(model);
    const solid = await solidOf(model, prop);
    const grid: Grid = { points: 200, step: (2.05 * prop.reach) / 200 };
    for (const detail of [3 * grid.step, 8 * grid.step])
      for (const view of VIEWS) {
        const truth = coveredByTriangles(surfaces, 1, prop.centerOfMass, view, grid);
        const drawn = coveredByRings(outlineOf(solid, view, detail).rings, grid);
        // Rounded up: points of the grid stand for what lies half a step off.
        const near = Math.ceil(detail / grid.step) + 1;
        expect(strays(truth, drawn, grid, near)).toBe(0);
      }
  });

  test("of a ring is two circles, the hole the other way round", async () => {
    const model = shapeModel("ring", { ring: { radius: 0.15, thickness: 0.03 } });
    const along = fromAxisAngle([1, 0, 0], Math.PI / 2);
    const { rings } = outlineOf(await solidOf(model, AT_ORIGIN), along, 0.0005);
    // π r² at the radii 0.165 and 0.135 m; the mesh's and the outline's corners lie on or inside the circles.
    const areas = rings.map(area).sort((a, b) => b - a);
    expect(areas).toHaveLength(2);
    expect(Math.abs(areas[0] / (Math.PI * 0.165 * 0.165) - 1)).toBeLessThan(0.01);
    expect(Math.abs(areas[1] / (Math.PI * 0.135 * 0.135) + 1)).toBeLessThan(0.01);
  });

  test("of a box seen along an axis is its four corners", async () => {
    const model = shapeModel("box", { box: [0.5, 0.25, 1] });
    const { rings } = outlineOf(await solidOf(model, AT_ORIGIN), IDENTITY, 0.01);
    expect(rings).toHaveLength(1);
    const corners = pairs(rings[0]).sort((a, b) => a[0] - b[0] || a[1] - b[1]);
    const expected = [
      [-0.25, -0.125],
      [-0.25, 0.125],
      [0.25, -0.125],
      [0.25, 0.125],
    ];
    expect(corners).toHaveLength(4);
    expect(furthest(corners, expected)).toBeLessThan(1e-9);
  });

  test("of a card is the card, and seen edge on a line no thicker than the detail", async () => {
    const solid = await solidOf(await card(0.5, 0.25), AT_ORIGIN);
    expect(area(outlineOf(solid, IDENTITY, 0.01).rings[0])).toBeCloseTo(0.125, 9);
    for (const angle of [Math.PI / 2, 1.57, 1.5]) {
      const { rings } = outlineOf(solid, fromAxisAngle([0, 1, 0], angle), 0.01);
      expect(rings).toHaveLength(1);
      const xs = pairs(rings[0]).map(([x]) => x);
      const ys = pairs(rings[0]).map(([, y]) => y);
      expect(Math.max(...xs) - Math.min(...xs)).toBeGreaterThan(0.002);
      expect(Math.max(...xs) - Math.min(...xs)).toBeLessThan(0.5 * Math.cos(angle) + 0.01);
      expect(Math.abs(Math.max(...ys) - Math.min(...ys) - 0.25)).toBeLessThan(0.01);
    }
  });

  test("does not ask which way round triangles are, nor that they meet at corners", async () => {
    // A pyramid over a square: a face turned round, a side that meets two halves, and a floor without the pyramid's corners.
    const places: Vec3[] = [
      [-1, -1, 0],
      [1, -1, 0],
      [1, 1, 0],
      [-1, 1, 0],
      [0, 0, 0.5],
      [0, -1, 0],
    ];
    const mixed = await meshModel(places, [
      [0, 5, 4],
      [5, 4, 1],
      [1, 2, 4],
      [3, 2, 4],
      [3, 0, 4],
      [0, 1, 3],
      [1, 3, 2],
    ]);
    const { rings } = outlineOf(await solidOf(mixed, AT_ORIGIN), IDENTITY, 0.05);
    expect(rings).toHaveLength(1);
    expect(area(rings[0])).toBeCloseTo(4, 9);
  });

  test("is in metres about the centre of mass, after the prop's scale, of its node alone", async () => {
    const model = await card(1, 0.5);
    model.json.nodes!.push({ name: "other", mesh: 0, translation: [5, 0, 0] });
    model.json.scenes![0].nodes!.push(1);
    const prop = { scale: 0.5, centerOfMass: [0.25, 0.5, 9] as Vec3, node: { index: 1 } as never };
    const { rings } = outlineOf(await solidOf(model, prop), IDENTITY, 0.01);
    const corners = pairs(rings[0]).sort((a, b) => a[0] - b[0] || a[1] - b[1]);
    // (p + [5, 0, 0]) · 0.5 − [0.25, 0.5]
    const expected = [
      [2, -0.625],
      [2, -0.375],
      [2.5, -0.625],
      [2.5, -0.375],
    ];
    expect(furthest(corners, expected)).toBeLessThan(1e-9);
  });

  test("has few points, and is the same each time", async () => {
    const { model } = await readModelFile(assets("props/quoit.glb"), "quoit.glb");
    const prop = await weigh("quoit", model);
    const solid = await solidOf(model, prop);
    const again = await solidOf(model, prop);
    for (const view of VIEWS) {
      const outline = outlineOf(solid, view, prop.reach / 100);
      expect(outline.rings.reduce((sum, ring) => sum + ring.length / 2, 0)).toBeLessThan(250);
      expect(outlineOf(again, view, prop.reach / 100)).toEqual(outline);
    }
  });
});

/** A grid that the prop just fills. */
function gridOver({ extremes, centerOfMass }: Prop, view: Quat, points: number): Grid {
  let most = 0;
  for (let i = 0; i < extremes.length; i += 3) {
    const [x, y] = rotate(view, subtract([extremes[i], extremes[i + 1], extremes[i + 2]], centerOfMass));
    most = Math.max(most, Math.abs(x), Math.abs(y));
  }
  return { points, step: (2.05 * most) / points };
}

const area = (ring: Float64Array): number =>
  pairs(ring).reduce((sum, [x, y], i, all) => {
    const [nextX, nextY] = all[(i + 1) % all.length];
    return sum + (x * nextY - y * nextX) / 2;
  }, 0);

const pairs = (ring: Float64Array): [number, number][] =>
  Array.from({ length: ring.length / 2 }, (_, i) => [ring[2 * i], ring[2 * i + 1]]);

/** Greatest difference of a coordinate; infinite where there are not as many points. */
const furthest = (points: number[][], expected: number[][]): number =>
  points.length === expected.length
    ? Math.max(...points.flatMap((point, i) => point.map((value, k) => Math.abs(value - expected[i][k]))))
    : Infinity;

/** Points that are drawn though nothing is covered nearby, or not drawn though all is. */
function strays(truth: Uint8Array, drawn: Uint8Array, grid: Grid, near: number): number {
  let count = 0;
  for (let i = 0; i < truth.length; i++)
    if (drawn[i] !== truth[i] && !within(truth, grid, i, near, drawn[i])) count++;
  return count;
}
