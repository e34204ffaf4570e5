// The whole demo on paper. Boxes of texts are measured by Chromium, with the fonts that this machine has.
import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { beforeAll, describe, expect, test } from "vitest";
import { sheetsInput, sheetsOf } from "../../src/review/sheets.js";
import { launchBrowser, skipsWithoutBrowser } from "../page/browser.js";
import { type DemoSheets, demoSheets } from "./demo-sheets.js";

const COMMITTED = fileURLToPath(new URL("../../assets/sheets", import.meta.url));
const SLOW = 600_000;

interface Box {
  text: string;
  left: number;
  right: number;
  top: number;
  bottom: number;
}

/** px: what two boxes may share, half a pixel of rounding. */
const SHARED = 0.5;

describe("the demo's sheets", () => {
  let demo: DemoSheets;
  beforeAll(async () => {
    demo = await demoSheets();
  }, SLOW);

  test("the committed ones are what the demo makes now", () => {
    expect(readdirSync(COMMITTED).sort()).toEqual([...demo.sheets.keys()].sort());
    const changed = [...demo.sheets].filter(
      ([name, content]) => readFileSync(join(COMMITTED, name), "utf8") !== content,
    );
    // mended by: node bin/tossbake.js strobe assets/quay.throws.yaml -o assets/sheets
    expect(changed.map(([name]) => name)).toEqual([]);
  });

  test(
    "the same bake makes the same bytes again",
    async () => {
      const again = await sheetsOf(sheetsInput(demo.file, demo.baked));
      expect(new Map(again.map(({ name, content }) => [name, content]))).toEqual(demo.sheets);
    },
    SLOW,
  );

  test("there is one for each throw and chain and one for all takes, each below 250 kB", () => {
    const names = [...demo.file.throws.keys(), ...demo.file.chains.keys(), "takes"];
    expect([...demo.sheets.keys()]).toEqual(names.map((name) => `${name}.svg`));
    for (const content of demo.sheets.values()) expect(Buffer.byteLength(content)).toBeLessThan(250_000);
  });

  test("each has a title and a description, and nothing that runs or comes from elsewhere", () => {
    for (const content of demo.sheets.values()) {
      expect(content).toMatch(/<title id="[^"]+">[^<]+<\/title>\n<desc id="[^"]+">[^<]{40,}<\/desc>/);
      expect(content).not.toMatch(/<(script|image|use|foreignObject|a)\b|href|url\(|@import| on\w+=/);
      // the one address is the name of SVG's own namespace
      expect(content.match(/\w+:\/\//g)).toHaveLength(1);
    }
  });

  test("all takes stand on the sheet of all takes, with their time and turns", () => {
    const takes = demo.sheets.get("takes.svg")!;
    const count =
      demo.baked.throws.reduce((sum, one) => sum + one.takes.length, 0) + demo.baked.chains[0].takes.length;
    expect(takes).toContain(`${count} takes of 28 throws`);
    expect(takes.match(/>\d+: [\d.]+ s, [\d.]+\u00a0turns?</g)).toHaveLength(count);
  });

  test.skipIf(skipsWithoutBrowser)(
    "no text overlaps another, and none runs over an edge",
    async () => {
      const browser = await launchBrowser();
      const page = await browser.newPage({ viewport: { width: 960, height: 800 } });
      const faults: string[] = [];
      let count = 0;
      for (const [name, svg] of demo.sheets) {
        await page.setContent(`<!doctype html><style>body{margin:0}svg{display:block}</style>${svg}`);
        const { boxes, width, height } = await page.evaluate(measured);
        count += boxes.length;
        for (const [i, a] of boxes.entries()) {
          if (a.left < 0 || a.top < 0 || a.right > width || a.bottom > height)
            faults.push(`${name}: "${a.text}" runs over an edge`);
          for (const b of boxes.slice(i + 1))
            if (overlap(a, b)) faults.push(`${name}: "${a.text}" and "${b.text}"`);
        }
      }
      await browser.close();
      expect(faults).toEqual([]);
      expect(count).toBeGreaterThan(2000);
    },
    SLOW,
  );
});

/** Runs in the page. */
function measured(): { boxes: Box[]; width: number; height: number } {
  const root = document.querySelector("svg")!.getBoundingClientRect();
  const boxes = Array.from(document.querySelectorAll("svg text"), (element) => {
    const { left, right, top, bottom } = element.getBoundingClientRect();
    return { text: element.textContent ?? "", left, right, top, bottom };
  });
  return { boxes, width: root.width, height: root.height };
}

const overlap = (a: Box, b: Box): boolean =>
  Math.min(a.right, b.right) - Math.max(a.left, b.left) > SHARED &&
  Math.min(a.bottom, b.bottom) - Math.max(a.top, b.top) > SHARED;
