import type { Model } from "../../src/gltf/model.js";
import { readModel } from "../../src/gltf/read.js";
import { normalize, type Quat, toMatrix } from "../../src/math/quat.js";
import { readModelFile } from "../../src/node/model-files.js";
import { weigh } from "../../src/prop/prop.js";
import { outlineOf, type Solid, solidOf } from "../../src/review/outline.js";
import { secondsEach } from "./measure.js";
import { duration, figure, type Section } from "./section.js";
import { ball } from "./weighing.js";

/** Points a side of the picture; the outline may leave the silhouette by one of 200 parts of its width. */
const POINTS = 200;

export const outlines: Section = {
  name: "outlines",
  about: `The silhouette of a prop as rings, from directions all round, to 1/${POINTS} of its width. Ratios are to a plain rasterisation of
all its triangles on ${POINTS} × ${POINTS} points in the same run, which draws no rings yet.`,
  async run() {
    const lantern = (await readModelFile("assets/props/lantern.glb", "lantern.glb")).model;
    const rows: string[][] = [];
    for (const [name, model] of [
      ["lantern.glb", lantern],
      ["dented ball", await readModel("ball", ball())],
    ] as const)
      rows.push(await compare(name, model));
    return { head: ["", "triangles", "made ready", "an outline", "rasterised", "ratio"], rows };
  },
};

async function compare(name: string, model: Model): Promise<string[]> {
  const prop = await weigh(name, model);
  const start = process.cpuUsage();
  const solid = await solidOf(model, prop);
  const { user, system } = process.cpuUsage(start);
  const step = (2 * prop.reach) / POINTS;
  let turn = 0;
  const view = (): Quat => {
    turn++;
    return normalize([Math.sin(turn), Math.cos(2 * turn), Math.sin(3 * turn), Math.cos(5 * turn)]);
  };
  const [outline, raster] = await secondsEach([
    { run: () => outlineOf(solid, view(), step) },
    { run: () => rasterised(solid, view(), step) },
  ]);
  return [
    name,
    String(solid.triangles.length / 3),
    duration((user + system) / 1e6),
    duration(outline),
    duration(raster),
    figure(outline / raster),
  ];
}

/** Every triangle's bounding box, point by point. */
function rasterised({ positions, triangles }: Solid, rotation: Quat, step: number): Uint8Array {
  const [right, up] = toMatrix(rotation);
  const flat = new Float64Array((2 * positions.length) / 3);
  for (let v = 0, at = 0; v < positions.length; v += 3, at += 2) {
    const [x, y, z] = [positions[v], positions[v + 1], positions[v + 2]];
    flat[at] = (right[0] * x + right[1] * y + right[2] * z) / step + POINTS / 2;
    flat[at + 1] = (up[0] * x + up[1] * y + up[2] * z) / step + POINTS / 2;
  }
  const covered = new Uint8Array((POINTS + 1) * (POINTS + 1));
  for (let t = 0; t < triangles.length; t += 3) {
    const [a, b, c] = [2 * triangles[t], 2 * triangles[t + 1], 2 * triangles[t + 2]];
    const [ax, ay, bx, by, cx, cy] = [flat[a], flat[a + 1], flat[b], flat[b + 1], flat[c], flat[c + 1]];
    const sign = (bx - ax) * (cy - ay) - (by - ay) * (cx - ax) < 0 ? -1 : 1;
    const toX = Math.floor(Math.max(ax, bx, cx));
    const toY = Math.floor(Math.max(ay, by, cy));
    for (let y = Math.ceil(Math.min(ay, by, cy)); y <= toY; y++)
      for (let x = Math.ceil(Math.min(ax, bx, cx)); x <= toX; x++)
        if (
          sign * ((bx - ax) * (y - ay) - (by - ay) * (x - ax)) >= 0 &&
          sign * ((cx - bx) * (y - by) - (cy - by) * (x - bx)) >= 0 &&
          sign * ((ax - cx) * (y - cy) - (ay - cy) * (x - cx)) >= 0
        )
          covered[y * (POINTS + 1) + x] = 1;
  }
  return covered;
}
