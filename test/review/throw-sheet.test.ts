// Positions are read off the sheet's own rulers, and pixels off a renderer that is not ours (resvg); where the prop really is comes from the flight,
// and where the middle of its silhouette is from its triangles by brute force.
import { beforeAll, describe, expect, test } from "vitest";
import { motionOf, takeMotion } from "../../src/bake/take-motion.js";
import { readSurfaces } from "../../src/gltf/surfaces.js";
import { multiply, type Quat } from "../../src/math/quat.js";
import { subtract } from "../../src/math/vec3.js";
import { courseOf, inView, sideView } from "../../src/review/view.js";
import { coveredByTriangles } from "./covered.js";
import { type DemoSheets, demoSheets } from "./demo-sheets.js";
import {
  arcOutlines,
  centroid,
  classOf,
  elementsOf,
  pieces,
  rendered,
  rulersOf,
  withClass,
} from "./sheet-reader.js";

const THROWS = [
  "spanner-tumble",
  "oar-blade-rolls",
  "quoit-to-peg",
  "token-flip",
  "lantern-to-deck",
  "spike-to-mast",
  "crate-over-railing",
];

/** px: a sheet is 960 wide, so that a sixth of a percent of it. */
const NEAR = 1.6;

describe("the sheet of a throw", () => {
  let demo: DemoSheets;
  beforeAll(async () => {
    demo = await demoSheets({ only: THROWS, takes: [1, 1] });
  });
  const sheet = (name: string) => demo.sheets.get(`${name}.svg`)!;

  /** Of the exposures that are drawn on the arc: their times, read off the row below by their bold numbers. */
  function timesOf(name: string): number[] {
    const elements = elementsOf(sheet(name));
    const row = elements.findIndex(({ text }) => text.startsWith("The same poses"));
    const end = elements.findIndex(({ text }) => text.startsWith("The same from above"));
    const captions = elements.slice(row, end < 0 ? undefined : end);
    return captions.flatMap((one, i) =>
      classOf(one) === "number" ? [Number(captions[i + 1].text.replace(" s", ""))] : [],
    );
  }

  test.each(THROWS)("%s has every outline where the flight has the prop", async (name) => {
    const svg = sheet(name);
    const baked = demo.baked.throws.find(({ entry }) => entry.name === name)!;
    const { prop, model } = demo.baked.props.get(baked.entry.prop)!;
    const motion = motionOf(takeMotion(demo.file, baked, baked.takes[0]), prop.principal.axes);
    const start = motion.centerOfMass(0);
    const ahead = courseOf([start, motion.centerOfMass(motion.duration)]);
    const view = sideView(ahead);
    const rulers = rulersOf(svg);
    expect(-rulers.y.scale).toBeCloseTo(rulers.x.scale, 1);
    const outlines = arcOutlines(svg);
    const times = timesOf(name);
    expect(outlines).toHaveLength(times.length);
    const { surfaces } = await readSurfaces(model);
    const grid = { points: 300, step: prop.reach / 148 };
    for (const [i, outline] of outlines.entries()) {
      // times on the sheet have two decimals: equal steps from the first to the last
      const t = (motion.duration * i) / (outlines.length - 1);
      expect(Math.abs(t - times[i])).toBeLessThan(0.0051);
      const [along, up] = inView(view, subtract(motion.centerOfMass(t), start));
      const turned: Quat = multiply(view.rotation, motion.rotation(t));
      const covered = coveredByTriangles(surfaces, prop.scale, prop.centerOfMass, turned, grid);
      const [dx, dy] = middleOf(covered, grid);
      const [x, y] = centroid(rendered(withClass(svg, outline, "probe"), { only: "probe" }));
      expect(Math.abs(x - rulers.x.at(along + dx))).toBeLessThan(NEAR);
      expect(Math.abs(y - rulers.y.at(start[1] + up + dy))).toBeLessThan(NEAR);
    }
  });

  test.each(THROWS)("%s loses nothing over its edges", (name) => {
    const margin = 80;
    const { width, height, alpha } = rendered(sheet(name), { margin });
    let outside = 0;
    let inside = 0;
    alpha.forEach((value, i) => {
      const [x, y] = [i % width, Math.floor(i / width)];
      const isOutside = x < margin || y < margin || x >= width - margin || y >= height - margin;
      if (value > 0 && isOutside) outside++;
      if (value > 0 && !isOutside) inside++;
    });
    expect(outside).toBe(0);
    expect(inside).toBeGreaterThan(1000);
  });

  test("outlines that have room are as many pieces as the sheet counts", () => {
    const svg = sheet("quoit-to-peg");
    const outlines = arcOutlines(svg);
    // from the last on, so that places before stay as they were
    const marked = outlines.reduceRight((text, outline) => withClass(text, outline, "probe"), svg);
    expect(pieces(rendered(marked, { only: "probe" }))).toBe(outlines.length);
    expect(svg).toContain(`>${outlines.length} poses`);
  });

  test("crowded exposures are thinned, and the sheet says so", () => {
    const svg = sheet("token-flip");
    const [, every, all] = /every (\d)\w\w of the (\d+) poses/.exec(svg)!.map(Number);
    expect(every).toBeGreaterThan(1);
    expect(arcOutlines(svg)).toHaveLength((all - 1) / every + 1);
  });

  test("marks are where the throw file asks for them, as the rulers have it", () => {
    // assets/quay.throws.yaml: lantern-to-deck is let go at [0, 1.5, 0] and arrives at [0, 2.2, 3], by its handle
    const svg = sheet("lantern-to-deck");
    const rulers = rulersOf(svg);
    const rings = elementsOf(svg).filter((one) => one.tag === "circle" && classOf(one) === "asked");
    const places = rings.map(({ attributes, right, down }) => [
      Number(attributes.cx) + right,
      Number(attributes.cy) + down,
    ]);
    expect(places).toHaveLength(2);
    expect(Math.abs(places[0][1] - rulers.y.at(1.5))).toBeLessThan(1);
    expect(Math.abs(places[1][1] - rulers.y.at(2.2))).toBeLessThan(1);
    expect(Math.abs(places[1][0] - places[0][0] - 3 * rulers.x.scale)).toBeLessThan(1);
  });

  test("floor, limit and railing stand at their heights", () => {
    // assets/quay.throws.yaml: the floor is at 0, no part goes above 3, and the railing is 1.05 high
    const svg = sheet("crate-over-railing");
    const rulers = rulersOf(svg);
    const heightOf = (look: string) => {
      const { attributes, down } = elementsOf(svg).find((one) => classOf(one) === look)!;
      return Number(/^M\S+ ([\d.]+)/.exec(attributes.d)![1]) + down;
    };
    expect(Math.abs(heightOf("floor") - rulers.y.at(0))).toBeLessThan(1);
    expect(Math.abs(heightOf("limit") - rulers.y.at(3))).toBeLessThan(1);
    const box = rendered(withClass(svg, elementsOf(svg).find((one) => classOf(one) === "box")!, "probe"), {
      only: "probe",
    });
    const rows = Array.from({ length: box.height }, (_, y) => y).filter((y) =>
      box.alpha.subarray(y * box.width, (y + 1) * box.width).some((a) => a > 100),
    );
    expect(Math.abs(rows[0] - rulers.y.at(1.05))).toBeLessThan(2);
    expect(Math.abs(rows[rows.length - 1] - rulers.y.at(0))).toBeLessThan(2);
  });
});

/** Of the covered points, from the grid's middle, m. */
function middleOf(covered: Uint8Array, { points, step }: { points: number; step: number }): [number, number] {
  let [count, x, y] = [0, 0, 0];
  covered.forEach((value, i) => {
    if (!value) return;
    count++;
    x += (i % points) - points / 2 + 0.5;
    y += Math.floor(i / points) - points / 2 + 0.5;
  });
  return [(x / count) * step, (y / count) * step];
}
