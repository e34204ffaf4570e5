import { fileURLToPath } from "node:url";
import { Resvg } from "@resvg/resvg-js";
import { describe, expect, test } from "vitest";
import { fromMatrix } from "../../src/math/quat.js";
import type { Vec3 } from "../../src/math/vec3.js";
import { readModelFile } from "../../src/node/model-files.js";
import { weigh } from "../../src/prop/prop.js";
import { shapeModel } from "../../src/prop/shape.js";
import { outlineOf, solidOf } from "../../src/review/outline.js";
import { weighSheet } from "../../src/review/weigh-sheet.js";
import { allOf, parseXml } from "./xml.js";

const assets = (name: string) => fileURLToPath(new URL(`../../assets/${name}`, import.meta.url));

const BOX = { box: [0.1, 0.2, 0.4] as Vec3 };

async function boxSheet(points: Record<string, Vec3> = {}) {
  const prop = await weigh("box", BOX, { points });
  return weighSheet("Props", [{ prop, solid: await solidOf(shapeModel("box", BOX), prop) }]);
}

/** Pixels of that colour: how many, and their bounding boxes' sizes, one for each connected piece. */
function pieces(svg: string, [r, g, b]: Vec3): { width: number; height: number }[] {
  const { pixels, width, height } = new Resvg(svg, { font: { loadSystemFonts: false } }).render();
  const isIt = (i: number) =>
    Math.abs(pixels[4 * i] - r) + Math.abs(pixels[4 * i + 1] - g) + Math.abs(pixels[4 * i + 2] - b) < 6;
  const seen = new Uint8Array(width * height);
  const found: { width: number; height: number }[] = [];
  for (let start = 0; start < seen.length; start++) {
    if (seen[start] || !isIt(start)) continue;
    const pending = [start];
    seen[start] = 1;
    let [left, right, top, bottom] = [width, 0, height, 0];
    while (pending.length > 0) {
      const at = pending.pop()!;
      const [x, y] = [at % width, Math.floor(at / width)];
      [left, right] = [Math.min(left, x), Math.max(right, x)];
      [top, bottom] = [Math.min(top, y), Math.max(bottom, y)];
      for (const next of [at - 1, at + 1, at - width, at + width])
        if (next >= 0 && next < seen.length && !seen[next] && isIt(next)) {
          seen[next] = 1;
          pending.push(next);
        }
    }
    found.push({ width: right - left + 1, height: bottom - top + 1 });
  }
  return found;
}

/** The sheet without what lies over the outlines. */
const bodiesAlone = (svg: string) =>
  svg.replace(
    /<(path|circle)[^>]* class="(?!body)[^>]*>|<(path|circle) class="(?!body")[^>]*>|<text.*<\/text>/g,
    "",
  );

describe("the sheet of a weighed prop", () => {
  test("shows three outlines in one scale, as high and wide as the prop is", async () => {
    const bodies = pieces(bodiesAlone(await boxSheet()), [0xd8, 0xd0, 0xbf]);
    // Long (the least moment) is along the longest edge: 0.4 × 0.2, 0.1 × 0.2, 0.4 × 0.1 m, in the order of the rows of pixels.
    expect(bodies).toHaveLength(3);
    const scale = bodies[0].width / 0.4;
    const expected = [
      [0.4, 0.2],
      [0.1, 0.2],
      [0.4, 0.1],
    ];
    bodies.forEach(({ width, height }, i) => {
      // the line round each takes half of its width, 0.4 px, of the fill
      expect(Math.abs(width - scale * expected[i][0])).toBeLessThan(2.5);
      expect(Math.abs(height - scale * expected[i][1])).toBeLessThan(2.5);
    });
  });

  test("has a ruler in the pictures' scale", async () => {
    const svg = await boxSheet();
    const [first] = pieces(bodiesAlone(svg), [0xd8, 0xd0, 0xbf]);
    const rule = allOf(parseXml(svg)).find((e) => e.attributes.class === "rule")!;
    const long = Number(/^M0 6l([\d.]+)/.exec(rule.attributes.d)![1]);
    // 0.4 m is as wide as the outline and its line.
    const text = allOf(parseXml(svg)).find((e) => /^\d+ cm$/.test(e.text))!.text;
    expect(Math.abs(long / (Number.parseInt(text, 10) / 100) - (first.width + 0.8) / 0.4)).toBeLessThan(5);
  });

  test("draws the outline that the view shows, a handle's hole in it", async () => {
    const { model } = await readModelFile(assets("props/lantern.glb"), "lantern.glb");
    const prop = await weigh("lantern", model);
    const solid = await solidOf(model, prop);
    const { long, middle, short } = prop.names;
    const rotation = fromMatrix([long, middle, short]);
    const svg = weighSheet("Props", [{ prop, solid }]);
    const body = allOf(parseXml(svg)).find(({ attributes }) => attributes.class === "body")!;
    expect(body.attributes.d.match(/z/g)!.length).toBeGreaterThan(1);
    expect(body.attributes.d.match(/z/g)).toHaveLength(
      outlineOf(solid, rotation, prop.reach / 500).rings.length,
    );
  });

  test("names every point, and tells of what lies too far off to be drawn", async () => {
    const texts = (svg: string) => allOf(parseXml(svg)).map(({ text }) => text);
    const named = texts(await boxSheet({ "<grip>": [0, 0.09, 0.05], far: [0, 0, 9] }));
    expect(named).toContain("<grip>");
    // √(9²) m from a centre of mass in the origin
    expect(named).toContain("The far lies 9 m from the centre of mass, outside the picture.");
    expect(named.filter((text) => text.includes("centre of mass, model’s origin")).length).toBeGreaterThan(0);
  });

  test("is the same each time, well-formed, and small", async () => {
    const svg = await boxSheet();
    expect(await boxSheet()).toBe(svg);
    expect(parseXml(svg).name).toBe("svg");
    expect(svg.length).toBeLessThan(250_000);
  });
});
