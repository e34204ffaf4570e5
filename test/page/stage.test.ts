import { readFile } from "node:fs/promises";
import { fileURLToPath } from "node:url";
import type { Browser } from "playwright-core";
import { afterAll, afterEach, beforeAll, describe, expect, it } from "vitest";
import { bake } from "../../src/bake/bake.js";
import type { ModelSource } from "../../src/bake/props.js";
import { motionOf } from "../../src/bake/take-motion.js";
import { readModel } from "../../src/gltf/read.js";
import { rotate } from "../../src/math/quat.js";
import { add, distance, subtract, type Vec3 } from "../../src/math/vec3.js";
import { DECODERS } from "../../src/node/draco.js";
import { recordOf } from "../../src/record/record-of.js";
import { type PageData, type PageThrow, pageData } from "../../src/review/page-data.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";
import { dracoGlb, meshoptGlb, open } from "../gltf/compressed.js";
import { tetrahedron } from "../gltf/models.js";
import { launchBrowser, skipsWithoutBrowser } from "./browser.js";
import { openStage, type StagePage, type StageWindow } from "./stage-page.js";

const SPANNER = fileURLToPath(new URL("../../assets/props/spanner.glb", import.meta.url));

const CLUB = fileURLToPath(new URL("../data/props/club.glb", import.meta.url));

/** Two throws of a spanner that is not balanced at its origin, passed on and back; `settings` are of the bake. */
const yard = (settings: string, prop = "model: spanner.glb, density: 5000", takes = 3): string => `seed: stage
bake: { ${settings} }
props: { tool: { ${prop}, points: { grip: [0, 0, -0.1] } } }
chains: { round: { throws: [away, back] } }
throws:
  away:
    prop: tool
    takes: ${takes}
    release: { at: [0, 1.2, 0], facing: [[long, ahead], [short, up]], scatter: 0..5 }
    arrive: { at: [0.3, 1, 3], after: 0.8..0.9 }
    spin: { axis: middle, turns: 1.5 }
    hold: { before: 0.1, after: 0.2 }
    limits: { maxHeight: 4, clear: [{ box: [[-1, 0, 1], [1, 0.5, 1.1]] }] }
  back:
    prop: tool
    takes: ${takes}
    release: { at: [0.3, 1, 3] }
    arrive: { at: [0, 1, 0], after: 0.8 }
    spin: { axis: short, turns: 1 }
`;

/** A prop in a stand: under a turned root in centimetres, beside a part that stays. */
const STAND = tetrahedron((json) => {
  json.nodes = [
    {
      name: "root",
      children: [1, 3],
      translation: [0.4, -1, 2],
      rotation: [0.6, 0, 0, 0.8],
      scale: [0.01, 0.01, 0.01],
    },
    { name: "stand", children: [2], rotation: [0, 0.6, 0, 0.8], translation: [5, 6, 7] },
    { name: "part", mesh: 0, translation: [10, 20, -5], rotation: [0, 0.28, 0, 0.96], scale: [9, 9, 9] },
    { name: "stays", mesh: 0 },
  ];
});

async function bakedYard(text: string, model: Uint8Array, only?: string[]) {
  const file = parseThrowFile("stage.throws.yaml", text);
  const source: ModelSource = async (path) => ({
    model: await readModel(path, model, undefined, DECODERS),
    sha256: "",
  });
  const baked = await bake(file, source, { only });
  return { data: pageData(file, baked, await recordOf(file, text, baked)), files: baked.files, baked };
}

type Yard = Awaited<ReturnType<typeof bakedYard>>;

const throwOf = ({ data }: Pick<Yard, "data">, name: string): PageThrow => {
  const found = data.throws.find((each) => each.name === name);
  if (!found) throw new Error(`no throw ${name}`);
  return found;
};

describe.skipIf(skipsWithoutBrowser)("the page's scene", () => {
  let browser: Browser;
  let stage: StagePage;
  let spanner: Uint8Array;

  beforeAll(async () => {
    browser = await launchBrowser();
    stage = await openStage(browser);
    spanner = await readFile(SPANNER);
  }, 120_000);
  afterAll(() => browser?.close());
  afterEach(() => {
    expect(stage.errors.splice(0)).toEqual([]);
  });

  const show = (yard: Yard, name: string) => {
    const shown = throwOf(yard, name);
    return stage.show(shown, propOf(yard.data, shown), yard.files);
  };

  /** Greatest distance of the prop's corners between the scene graph and the flight, less the proved error, m. */
  async function excess(yard: Yard, name: string, staysAt?: Vec3): Promise<number> {
    const shown = throwOf(yard, name);
    const { prop } = yard.baked.props.get(shown.prop!)!;
    let greatest = Number.NEGATIVE_INFINITY;
    for (const [i, { motion, record }] of shown.takes.entries()) {
      const truth = motionOf(motion, prop.principal.axes);
      // off any grid of keys or frames, and both ends
      const times = [0, 0.13, 0.29, 0.437, 0.611, 0.83, 1].map((share) => share * motion.duration);
      const poses = await stage.page.evaluate(
        async ([i, times]) => {
          const { stage } = window as unknown as StageWindow;
          await stage.select(i);
          return times.map((t) => {
            stage.time = t;
            return stage.pose();
          });
        },
        [i, times] as const,
      );
      poses.forEach((pose, k) => {
        for (let p = 0; p < prop.extremes.length; p += 3 * 50) {
          const arm = subtract(
            [prop.extremes[p], prop.extremes[p + 1], prop.extremes[p + 2]],
            prop.centerOfMass,
          );
          const played = add(pose.centerOfMass, rotate(pose.rotation, arm));
          const wanted = add(staysAt ?? truth.centerOfMass(times[k]), rotate(truth.rotation(times[k]), arm));
          greatest = Math.max(greatest, distance(played, wanted) - record.error);
        }
      });
    }
    return greatest;
  }

  /** m: float32 keys and matrices of a scene some metres wide (IEEE 754: 2⁻²³ of the greatest coordinate, a few times over). */
  const ROUNDING = 5e-6;

  it.each([
    ["on one node", ""],
    ["on two nodes", "layout: two-node"],
    ["in a file a take", "files: per-take"],
    ["in one file together", "files: together"],
    ["as .gltf and .bin", "container: gltf"],
    ["with cubic keys", "keys: cubic"],
    ["in 16 bits", "keys: linear, pack: int16"],
    ["without a mesh", "mesh: false"],
  ])(
    "plays clips %s as they truly fly, holds and chains too",
    async (_, settings) => {
      const baked = await bakedYard(yard(settings), spanner);
      for (const name of ["away", "round"]) {
        await show(baked, name);
        expect(await excess(baked, name)).toBeLessThan(ROUNDING);
      }
    },
    120_000,
  );

  it("turns clips of the turning alone where the model stands", async () => {
    const baked = await bakedYard(yard("layout: turn-only"), spanner);
    await show(baked, "away");
    const { centerOfMass } = propOf(baked.data, throwOf(baked, "away"));
    expect(await excess(baked, "away", centerOfMass)).toBeLessThan(ROUNDING);
  }, 120_000);

  it.each([3, 1])(
    "plays a node of a model in a file of %d clips",
    async (takes) => {
      const text = yard("mesh: true", "model: stand.glb, node: part, scale: 2, density: 500", takes);
      const baked = await bakedYard(text.replace("points: { grip: [0, 0, -0.1] }", "points: {}"), STAND, [
        "away",
      ]);
      await show(baked, "away");
      // its keys are in centimetres of its parents
      expect(await excess(baked, "away")).toBeLessThan(takes > 1 ? ROUNDING : 2e-3);
    },
    120_000,
  );

  it("plays a model that is compressed with meshopt, and draws it", async () => {
    const club = await meshoptGlb(await open(new Uint8Array(await readFile(CLUB))));
    const baked = await bakedYard(yard(""), club, ["away"]);
    await show(baked, "away");
    expect(await excess(baked, "away")).toBeLessThan(ROUNDING);
    expect(await ask((stage) => stage.thinned)).toBe("");
  }, 120_000);

  it("says that it has no decoder for Draco, and moves a box in the prop's place", async () => {
    const club = await dracoGlb(await open(new Uint8Array(await readFile(CLUB))), "EDGEBREAKER", 14);
    const baked = await bakedYard(yard(""), club, ["away"]);
    await show(baked, "away");
    expect(await excess(baked, "away")).toBeLessThan(ROUNDING);
    expect(await ask((stage) => stage.thinned)).toContain("Draco");
  }, 120_000);

  it("measures what a clip is off by as the record proves it", async () => {
    const baked = await bakedYard(yard("tolerance: 0.004"), spanner, ["away"]);
    await show(baked, "away");
    const { times, millimetres } = await ask((stage) => stage.differences(400));
    const [{ record }] = throwOf(baked, "away").takes;
    expect(times.at(-1)).toBeCloseTo(record.duration, 5);
    expect(Math.max(...millimetres)).toBeLessThan(1000 * record.error + 1e-3);
    // few keys: the tolerance is used, and by the outermost points
    expect(Math.max(...millimetres)).toBeGreaterThan(500 * record.error);
  }, 120_000);

  it("keeps what it shows where the next throw cannot be shown, and says why", async () => {
    const baked = await bakedYard(yard(""), spanner);
    await show(baked, "away");
    const shown = throwOf(baked, "back");
    await expect(stage.show(shown, propOf(baked.data, shown), [])).rejects.toThrow("back.glb is missing");
    expect(stage.errors.splice(0).join()).toContain("404");
    const duration = throwOf(baked, "away").takes[0].motion.duration;
    expect(await ask((stage) => stage.duration)).toBe(duration);
  }, 120_000);

  it("is dragged along its arc by mouse and by finger", async () => {
    const baked = await bakedYard(yard(""), spanner);
    await show(baked, "away");
    const [from, to] = await ask((stage) => {
      stage.setView("side");
      stage.time = 0.2;
      return [stage.screenPlace(0.2), stage.screenPlace(0.7)];
    });
    await ask((stage) => {
      const told: unknown[] = [];
      stage.onScrub = (t) => told.push(t);
      stage.onScrubEnd = () => told.push("end");
      (window as unknown as { told: unknown[] }).told = told;
    });
    const { mouse } = stage.page;
    await mouse.move(from.x, from.y);
    await mouse.down();
    await mouse.move(to.x, to.y, { steps: 12 });
    // a pixel is a few milliseconds of the way
    expect(Math.abs((await ask((stage) => stage.time)) - 0.7)).toBeLessThan(0.01);
    await mouse.up();
    const told = await stage.page.evaluate(() => (window as unknown as { told: unknown[] }).told);
    expect(told.length).toBeGreaterThan(4);
    expect(told.at(-1)).toBe("end");

    const touch = (type: string, { x, y }: { x: number; y: number }) =>
      stage.page.dispatchEvent("canvas", type, {
        pointerId: 1,
        pointerType: "mouse",
        button: 0,
        clientX: x,
        clientY: y,
        isPrimary: true,
        bubbles: true,
      });
    await touch("pointerdown", to);
    await touch("pointermove", { x: to.x + 500, y: to.y + 500 });
    await touch("pointerup", to);
    expect(await ask((stage) => stage.time)).toBeGreaterThan(0.7);
  }, 120_000);

  it("draws every view, alone and with all that explains it, and nothing while it rests", async () => {
    const baked = await bakedYard(yard(""), spanner);
    await show(baked, "away");
    const pictures = new Set<string>();
    for (const view of ["side", "top", "along", "free", "follow"] as const)
      for (const on of [false, true]) {
        await stage.page.evaluate(
          async ([view, on]) => {
            const { stage, drawn } = window as unknown as StageWindow;
            for (const layer of ["siblings", "strobe", "paths", "arrows", "surroundings", "truth"] as const)
              stage.setLayer(layer, on);
            await stage.select(0, on ? 2 : undefined);
            stage.setView(view);
            stage.time = 0.5;
            await drawn();
          },
          [view, on] as const,
        );
        pictures.add((await stage.page.screenshot()).toString("base64"));
      }
    expect(pictures.size).toBe(10);
    const asked = await stage.page.evaluate(async () => {
      const { drawn } = window as unknown as StageWindow;
      let count = 0;
      const own = window.requestAnimationFrame;
      window.requestAnimationFrame = (told) => {
        count++;
        return own(told);
      };
      await new Promise((done) => setTimeout(done, 300));
      window.requestAnimationFrame = own;
      await drawn();
      return count;
    });
    expect(asked).toBe(0);
  }, 120_000);

  it("holds no more after a hundred changes of the take than after a few", async () => {
    const baked = await bakedYard(yard("", undefined, 6), spanner);
    await show(baked, "away");
    const held = () =>
      stage.page.evaluate(async () => {
        const { stage, drawn } = window as unknown as StageWindow;
        for (let i = 0; i < 50; i++) {
          await stage.select(i % 6, i % 3 === 0 ? (i + 1) % 6 : undefined);
          stage.time = 0.01 * i;
          if (i % 5 === 0) stage.setDark(i % 10 === 0);
          if (i % 10 === 0) await drawn();
        }
        await stage.select(0);
        stage.setDark(false);
        await drawn();
        return stage.memory;
      });
    const before = await held();
    await held();
    expect(await held()).toEqual(before);
    await show(baked, "back");
    await show(baked, "away");
    expect(await held()).toEqual(before);
  }, 240_000);

  it("shows two hundred siblings, or says how many it leaves out", async () => {
    const baked = await bakedYard(yard("", undefined, 201), spanner, ["away"]);
    await show(baked, "away");
    const { perSecond, thinned } = await stage.page.evaluate(async () => {
      const { stage } = window as unknown as StageWindow;
      for (const layer of ["strobe", "arrows", "truth"] as const) stage.setLayer(layer, false);
      stage.setLayer("siblings", true);
      stage.setView("side");
      const next = () => new Promise((done) => requestAnimationFrame(done));
      const pictures = 90;
      const start = performance.now();
      for (let i = 0; i < pictures; i++) {
        stage.time = (stage.duration * i) / pictures;
        await next();
      }
      return { perSecond: (1000 * pictures) / (performance.now() - start), thinned: stage.thinned };
    });
    console.info(
      `200 siblings: ${perSecond.toFixed(1)} pictures a second; ${thinned || "all drawn in full"}`,
    );
    const drawn = await ask((stage) => stage.siblingsDrawn);
    if (drawn < 200) expect(thinned).toContain(`${drawn} of 200 siblings shown`);
    else expect(thinned).not.toContain("siblings shown");
  }, 240_000);

  /** What the scene answers. */
  const ask = <T>(question: (stage: StageWindow["stage"]) => T): Promise<T> =>
    stage.page.evaluate(`(${question})(window.stage)`) as Promise<T>;
});

const propOf = ({ props }: PageData, { prop }: PageThrow) => props[prop!];
