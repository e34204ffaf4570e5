import { mkdtempSync, readFileSync, writeFileSync } from "node:fs";
import { createRequire } from "node:module";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it, vi } from "vitest";
import type { Program } from "../cli/program.js";
import { DEMO } from "../players/demo.js";
import { launchBrowser, skipsWithoutBrowser } from "./browser.js";
import { HARM, hostileModel } from "./hostile.js";
import { installPage, type Preview, startPreview } from "./installed.js";
import {
  colorsOf,
  expectTrue,
  type HookedWindow,
  type Opened,
  openPage,
  stateOf,
  untilShown,
} from "./opened.js";
import { Workshop, yard } from "./throws.js";

// pictures are drawn without a graphics card
vi.setConfig({ testTimeout: 180_000, hookTimeout: 180_000 });

const AXE = createRequire(import.meta.url).resolve("axe-core/axe.min.js");

let program: Program;
let browser: Browser;
let preview: Preview;
const workshop = new Workshop(yard());
/** Pictures to be looked at. */
const pictures = mkdtempSync(join(tmpdir(), "tossbake-page-"));
let demoPage: string | undefined;

beforeAll(async () => {
  if (skipsWithoutBrowser) return;
  [program, browser] = await Promise.all([installPage(), launchBrowser()]);
  preview = await startPreview(program, [workshop.path]);
});
afterAll(async () => {
  await browser?.close();
  await preview?.stop();
  program?.remove();
  workshop.remove();
});

/** Address of the demo's page as one file, which is made once. */
function demoUrl(): string {
  if (demoPage === undefined) {
    demoPage = join(program.folder, "quay.html");
    const { code, err } = program.run(["preview", DEMO, "--page", demoPage]);
    expect([code, err]).toEqual([0, ""]);
  }
  return pathToFileURL(demoPage).href;
}

/** Opens a page for a test, and has it close without a complaint. */
async function withPage(
  url: string,
  test: (page: Page, opened: Opened) => Promise<void>,
  options: Parameters<typeof openPage>[2] = {},
): Promise<void> {
  const opened = await openPage(browser, url, options);
  try {
    await untilShown(opened.page);
    await test(opened.page, opened);
    expect(opened.complaints).toEqual([]);
  } finally {
    await opened.close();
  }
}

describe.skipIf(skipsWithoutBrowser)("the preview page", () => {
  // a busy machine may be late with a label between two pictures
  it("draws the prop, and another picture at another time", { retry: 2 }, () =>
    withPage(preview.url, async (page) => {
      await page.keyboard.press("Space");
      expect(await colorsOf(page)).toBeGreaterThan(50);
      // a busy machine may leave some out between two pictures
      await page.getByLabel("Other takes").uncheck();
      const canvas = page.locator("canvas").first();
      const pictureAt = async (time: number) => {
        await page.evaluate((time) => {
          (window as unknown as HookedWindow).tossbake.stage.time = time;
        }, time);
        return canvas.screenshot();
      };
      const [early, late, again] = [await pictureAt(0.2), await pictureAt(0.6), await pictureAt(0.2)];
      expect(early.equals(late)).toBe(false);
      expect(early.equals(again)).toBe(true);
    }),
  );

  it("shows each take where its true flight has it", () =>
    withPage(preview.url, async (page) => {
      await page.keyboard.press("Space");
      await expectTrue(page);
      for (const take of [2, 3, 4]) {
        await page.keyboard.press("n");
        expect((await stateOf(page)).take).toBe(take);
        await expectTrue(page);
      }
      await page.keyboard.press("Shift+N");
      expect((await stateOf(page)).throwName).toBe("skim");
      await expectTrue(page);
    }));

  it("goes where the prop is dragged along its arc", () =>
    withPage(preview.url, async (page) => {
      await page.keyboard.press("Space");
      await page.getByLabel("Time in the clip").press("Home");
      const place = (time: number) =>
        page.evaluate((time) => {
          const { stage } = (window as unknown as HookedWindow).tossbake;
          const { x, y } = stage.screenPlace(time);
          const { left, top } = stage.canvas.getBoundingClientRect();
          return { x: left + x, y: top + y };
        }, time);
      const [from, to] = [await place(0), await place(0.7)];
      await page.mouse.move(from.x, from.y);
      await page.mouse.down();
      await page.mouse.move((from.x + to.x) / 2, (from.y + to.y) / 2, { steps: 5 });
      await page.mouse.move(to.x, to.y, { steps: 10 });
      await page.mouse.up();
      const { time, playing } = await page.evaluate(() => {
        const { time, state } = (window as unknown as HookedWindow).tossbake;
        return { time, playing: state.playing };
      });
      // a pixel of the arc is some milliseconds
      expect(time).toBeCloseTo(0.7, 1);
      expect(playing).toBe(false);
    }));

  it("follows a save, says what is wrong in words with its line, and recovers", () =>
    withPage(preview.url, async (page) => {
      const arrival = async () => {
        const { data } = await stateOf(page);
        return data.throws[0].takes[0].record.arrival.centerOfMass[2];
      };
      await page.keyboard.press("Space");
      const before = await arrival();
      workshop.save(yard(4));
      await expect.poll(arrival, { timeout: 20_000 }).toBeGreaterThan(before + 0.5);
      await expectTrue(page);
      const old = await stateOf(page);

      workshop.save(yard(4).replace("turns: 1.5", "turns: often"));
      const banner = page.getByRole("region", { name: "What is wrong" });
      await banner.waitFor();
      expect(await banner.textContent()).toMatch(/line 14\b.*throws\.lob\.spin\.turns: .*often/s);
      expect((await stateOf(page)).data.throws).toEqual(old.data.throws);
      await expectTrue(page);
      expect(await colorsOf(page)).toBeGreaterThan(50);

      workshop.save(yard());
      await banner.waitFor({ state: "hidden" });
      await expect.poll(arrival, { timeout: 20_000 }).toBeCloseTo(before, 6);
      await expectTrue(page);
    }));

  it("says so when the preview has stopped, and goes on when it is there again", async () => {
    const other = await startPreview(program, [workshop.path]);
    const { port } = new URL(other.url);
    const opened = await openPage(browser, other.url);
    const { page } = opened;
    await untilShown(page);
    await other.stop();
    await page.getByText("The preview has stopped").waitFor();
    const again = await startPreview(program, [workshop.path, "--port", port]);
    await page.getByText("The preview has stopped").waitFor({ state: "hidden" });
    await expectTrue(page);
    await opened.close();
    await again.stop();
  });

  it("stands still where motion is not wanted", () =>
    withPage(
      preview.url,
      async (page) => {
        expect((await stateOf(page)).playing).toBe(false);
      },
      { reducedMotion: "reduce" },
    ));

  it("lets everything be reached and seen by Tab, and left again", () =>
    withPage(preview.url, async (page) => {
      await page.keyboard.press("Space");
      const seen: string[] = [];
      for (let i = 0; i < 120; i++) {
        await page.keyboard.press("Tab");
        const focus = await page.evaluate(() => {
          const element = document.activeElement;
          if (!element || element === document.body) return undefined;
          const { outlineStyle, outlineWidth, boxShadow } = getComputedStyle(element);
          const label = element.closest("label");
          const around = label ? getComputedStyle(label) : undefined;
          const isMarked =
            (outlineStyle !== "none" && Number.parseFloat(outlineWidth) >= 1) ||
            boxShadow !== "none" ||
            (around !== undefined && around.outlineStyle !== "none");
          const { width, height } = element.getBoundingClientRect();
          const name = element.getAttribute("aria-label") ?? element.textContent?.trim() ?? "";
          return {
            tag: element.tagName,
            name: name || label?.textContent || "",
            isMarked,
            isThere: width * height > 0,
          };
        });
        if (!focus) break;
        expect(focus, JSON.stringify(focus)).toMatchObject({ isMarked: true, isThere: true });
        seen.push(`${focus.tag} ${focus.name}`);
      }
      expect(seen.length).toBeLessThan(120);
      const all = seen.join("\n");
      for (const part of [
        /Keys/,
        /lob/,
        /Time in the clip/,
        /Pause|Play/,
        /Loop/,
        /Side/,
        /Strobe/,
        /take 1/,
        /Accept/,
        /Reject/,
        /Copy/,
      ])
        expect(all).toMatch(part);
    }));

  it("does by keys what a mouse does", () =>
    withPage(preview.url, async (page) => {
      const state = () => stateOf(page);
      const time = () => page.evaluate(() => (window as unknown as HookedWindow).tossbake.time);
      expect((await state()).playing).toBe(true);
      await page.keyboard.press("Space");
      expect((await state()).playing).toBe(false);
      await page.keyboard.press("]");
      const start = await time();
      await page.keyboard.press("ArrowRight");
      // one frame of 30 a second, from a frame on
      const first = await time();
      await page.keyboard.press("ArrowRight");
      expect((await time()) - first).toBeCloseTo(1 / 30, 6);
      expect(first).toBeGreaterThan(start);
      await page.keyboard.press("2");
      expect((await state()).view).toBe("top");
      await page.keyboard.press("s");
      expect((await state()).slow).toBe(2);
      await page.keyboard.press("r");
      await page.keyboard.press("n");
      await page.keyboard.press("n");
      await page.keyboard.press("r");
      await expect.poll(() => page.getByLabel("List for the throw file").inputValue()).toBe("takes: [2, 4]");
      await page.keyboard.press("?");
      await page.getByRole("dialog").waitFor();
      await page.keyboard.press("Escape");
      await page.getByRole("dialog").waitFor({ state: "hidden" });
    }));

  it("fits light and dark screens from 360 to 1920 px, and is accessible there", () =>
    withPage(
      demoUrl(),
      async (page) => {
        await expectTrue(page);
        await page.evaluate(readFileSync(AXE, "utf8"));
        for (const width of [1920, 900, 360])
          for (const colorScheme of ["light", "dark"] as const) {
            await page.emulateMedia({ colorScheme });
            await page.setViewportSize({ width, height: width === 360 ? 740 : 1000 });
            const name = `${colorScheme}-${width}`;
            await page.screenshot({ path: join(pictures, `${name}.png`) });
            const wide = await page.evaluate(() => document.documentElement.scrollWidth);
            expect(wide, name).toBeLessThanOrEqual(width);
            // dark differs in colours alone
            if (colorScheme === "light" || width === 360)
              expect(await seriousFindings(page), name).toEqual([]);
          }
      },
      { reducedMotion: "reduce" },
    ));

  it("is scrubbed, moved and zoomed by fingers", () =>
    withPage(
      preview.url,
      async (page) => {
        await page.locator("canvas").first().scrollIntoViewIfNeeded();
        const places = () =>
          page.evaluate(() => {
            const { stage, time } = (window as unknown as HookedWindow).tossbake;
            const { left, top, width, height } = stage.canvas.getBoundingClientRect();
            const at = (t: number) => {
              const { x, y } = stage.screenPlace(t);
              return { x: left + x, y: top + y };
            };
            return { time, from: at(time), to: at(0.7), left, bottom: top + height, width };
          });
        const touch = await page.context().newCDPSession(page);
        const fingers = (type: "touchStart" | "touchMove" | "touchEnd", ...at: { x: number; y: number }[]) =>
          touch.send("Input.dispatchTouchEvent", {
            type,
            touchPoints: at.map((place, id) => ({ ...place, id })),
          });
        const { from, to } = await places();
        await fingers("touchStart", from);
        for (let i = 1; i <= 10; i++)
          await fingers("touchMove", {
            x: from.x + ((to.x - from.x) * i) / 10,
            y: from.y + ((to.y - from.y) * i) / 10,
          });
        await fingers("touchEnd");
        const scrubbed = await places();
        // a pixel of the arc is some milliseconds
        expect(scrubbed.time).toBeCloseTo(0.7, 1);

        await page.evaluate(() => {
          (window as unknown as HookedWindow).tossbake.stage.time = 0;
        });
        const width = () =>
          page.evaluate(() => {
            const { stage } = (window as unknown as HookedWindow).tossbake;
            return stage.screenPlace(0.7).x - stage.screenPlace(0).x;
          });
        const before = await width();
        const [x, y] = [scrubbed.left + scrubbed.width / 2, scrubbed.bottom - 40];
        await fingers("touchStart", { x: x - 30, y }, { x: x + 30, y });
        for (let i = 1; i <= 6; i++)
          await fingers("touchMove", { x: x - 30 - 5 * i, y }, { x: x + 30 + 5 * i, y });
        await fingers("touchEnd");
        // twice as far apart
        expect((await width()) / before).toBeCloseTo(2, 1);
      },
      { hasTouch: true, reducedMotion: "reduce", viewport: { width: 360, height: 740 } },
    ));
});

/** What axe-core calls serious or worse. */
async function seriousFindings(page: Page): Promise<string[]> {
  const found = await page.evaluate(async () => {
    // @ts-expect-error put there before
    const { violations } = await axe.run();
    return (violations as { id: string; impact: string; nodes: { html: string }[] }[]).map(
      ({ id, impact, nodes }) => `${impact} ${id}: ${nodes.map(({ html }) => html.slice(0, 200)).join(" ")}`,
    );
  });
  return found.filter((line) => /^(serious|critical)/.test(line));
}

describe.skipIf(skipsWithoutBrowser)("the page as one file", () => {
  it("shows every throw of the demo as it truly flies, opened from disk without any network", () =>
    withPage(
      demoUrl(),
      async (page, { requests }) => {
        const { data } = await stateOf(page);
        expect(data.throws).toHaveLength(28);
        // one of each prop, and the chain
        const firsts = data.throws.filter(
          ({ prop, isChain }, i) => isChain || data.throws.findIndex((other) => other.prop === prop) === i,
        );
        expect(firsts).toHaveLength(8);
        for (const { name } of firsts) {
          await page.getByRole("option", { name: new RegExp(`^${name}\\b(?!-)`) }).click();
          expect((await stateOf(page)).throwName).toBe(name);
          await expectTrue(page);
        }
        // what a page holds itself is asked for as blob: and data:
        expect(requests.filter((url) => !/^(blob|data):/.test(url))).toEqual([demoUrl()]);
      },
      { offline: true, reducedMotion: "reduce", viewport: { width: 1300, height: 600 } },
    ));
});

describe.skipIf(skipsWithoutBrowser)("names that are markup", () => {
  /** Nothing of them ran, or became an element. */
  async function expectHarmless(page: Page): Promise<void> {
    const found = await page.evaluate(() => ({
      hit: (window as unknown as { hit?: string }).hit,
      elements: document.querySelectorAll("img, svg[onload], [onerror], [onmouseover], [onfocus]").length,
    }));
    expect(found).toEqual({ hit: undefined, elements: 0 });
  }

  it("are text in the page, its title and its errors", async () => {
    const name = `${HARM.tag}${HARM.attribute.replaceAll("/", "")}.throws.yaml`;
    const other = new Workshop("", name);
    const model = join(other.folder, "spanner.glb");
    writeFileSync(model, await hostileModel(model));
    const text = yard().replace(
      "density: 5000",
      `density: { ${JSON.stringify(`${HARM.script}1`)}: 3000, default: 5000 }`,
    );
    other.save(text);
    const preview = await startPreview(program, [other.path]);
    try {
      await withPage(preview.url, async (page) => {
        await expectTrue(page);
        expect(await page.title()).toContain(name);
        expect(await page.locator("body").textContent()).toContain(name);
        await expectHarmless(page);
        other.save(
          text.replace("model: spanner.glb", `model: ${JSON.stringify(`${HARM.script}${HARM.tag}.glb`)}`),
        );
        const banner = page.getByRole("region", { name: "What is wrong" });
        await banner.waitFor();
        expect(await banner.textContent()).toContain(HARM.script);
        await expectHarmless(page);
      });
    } finally {
      await preview.stop();
      other.remove();
    }
  });

  it("are text in a baked folder's page too", async () => {
    const out = join(workshop.folder, "out");
    expect(program.run(["bake", workshop.path, "-o", out]).code).toBe(0);
    const path = join(out, "takes.json");
    const record = JSON.parse(readFileSync(path, "utf8"));
    for (const clip of record.clips) {
      if (clip.throw === "lob") clip.throw = HARM.script;
      clip.draws = { [HARM.tag]: HARM.comment, [HARM.style]: HARM.attribute };
    }
    record.props.spanner.warnings = [HARM.tag, HARM.script];
    writeFileSync(path, JSON.stringify(record));
    const page = join(workshop.folder, "out.html");
    expect(program.run(["preview", out, "--page", page]).code).toBe(0);
    const preview = await startPreview(program, [out]);
    try {
      for (const url of [pathToFileURL(page).href, preview.url])
        await withPage(url, async (page) => {
          await expectTrue(page);
          const { data } = await stateOf(page);
          expect(data.throws[0].name).toBe(HARM.script);
          expect(await page.locator("body").textContent()).toContain(HARM.script);
          await expectHarmless(page);
        });
    } finally {
      await preview.stop();
    }
  });
});
