/** A page in the browser, and what it says of itself. */

import type { Browser, BrowserContextOptions, Page } from "playwright-core";
import { expect } from "vitest";
import { motionOf } from "../../src/bake/take-motion.js";
import { type Quat, rotate } from "../../src/math/quat.js";
import { add, distance, normalize, scale, type Vec3 } from "../../src/math/vec3.js";
import type { Stage } from "../../src/review/page/stage.js";
import type { State } from "../../src/review/page/state.js";
import type { PageProp, PageTake } from "../../src/review/page-data.js";

/** What the page shows of itself for tests and for the curious. */
interface Hook {
  stage: Stage;
  state: State;
  time: number;
}
export interface HookedWindow {
  tossbake: Hook;
}

export interface Opened {
  page: Page;
  /** Errors and warnings of the console, errors that nobody caught, and what the policy refused. */
  complaints: string[];
  /** Addresses of all that was asked for. */
  requests: string[];
  close(): Promise<void>;
}

/** The browser's own, about the machine and not about the page. */
const OWN = /GPU stall due to ReadPixels|GL Driver Message/;

export async function openPage(
  browser: Browser,
  url: string,
  options: BrowserContextOptions = {},
): Promise<Opened> {
  const context = await browser.newContext({ viewport: { width: 1000, height: 700 }, ...options });
  const page = await context.newPage();
  const complaints: string[] = [];
  const requests: string[] = [];
  page.on("console", (message) => {
    if (["error", "warning"].includes(message.type()) && !OWN.test(message.text()))
      complaints.push(`${message.type()}: ${message.text()}`);
  });
  page.on("pageerror", (error) => complaints.push(`uncaught: ${error.stack ?? error}`));
  page.on("dialog", (dialog) => {
    complaints.push(`dialog: ${dialog.message()}`);
    void dialog.dismiss();
  });
  page.on("request", (request) => requests.push(request.url()));
  await page.goto(url);
  return { page, complaints, requests, close: () => context.close() };
}

export const stateOf = (page: Page): Promise<State> =>
  page.evaluate(() => (window as unknown as HookedWindow).tossbake.state);

/** Waits until a clip plays on the stage. */
export async function untilShown(page: Page): Promise<void> {
  await page.waitForFunction(
    () => ((window as unknown as Partial<HookedWindow>).tossbake?.stage.duration ?? 0) > 0,
    undefined,
    { timeout: 30_000, polling: 50 },
  );
}

/** What the scene graph says at these times of the clip. */
export const posesAt = (
  page: Page,
  times: readonly number[],
): Promise<{ centerOfMass: Vec3; rotation: Quat }[]> =>
  page.evaluate((times) => {
    const { stage } = (window as unknown as HookedWindow).tossbake;
    return times.map((time) => {
      stage.time = time;
      return stage.pose();
    });
  }, times);

/** Furthest that a point at the prop's reach is from where the true flight has it, m, of eight directions and nine times. */
export async function furthestOff(page: Page, { motion }: PageTake, prop: PageProp): Promise<number> {
  const times = Array.from({ length: 9 }, (_, i) => (motion.duration * i) / 8);
  const truth = motionOf(motion, prop.axes);
  const poses = await posesAt(page, times);
  return Math.max(
    ...times.map((time, i) => {
      const { centerOfMass, rotation } = poses[i];
      const [center, turn] = [truth.centerOfMass(time), truth.rotation(time)];
      return Math.max(
        ...DIRECTIONS.map((direction) => {
          const arm = scale(direction, prop.reach);
          return distance(add(centerOfMass, rotate(rotation, arm)), add(center, rotate(turn, arm)));
        }),
      );
    }),
  );
}

const DIRECTIONS: Vec3[] = [
  [1, 0, 0],
  [-1, 0, 0],
  [0, 1, 0],
  [0, -1, 0],
  [0, 0, 1],
  [0, 0, -1],
  normalize([1, 1, 1]),
  normalize([-1, 1, -1]),
];

/** The proved error, and what float32 adds to coordinates of a few metres. */
export const allowed = ({ record }: PageTake): number => record.error + 4e-6;

/** The take that is looked at is on the stage, and flies as it truly does. */
export async function expectTrue(page: Page): Promise<void> {
  await expect
    .poll(
      async () => {
        const { data, throwName, take } = await stateOf(page);
        const shown = data.throws.find(({ name }) => name === throwName);
        const looked = shown?.takes.find(({ motion }) => motion.take === take);
        if (!looked) return `nothing of ${throwName}, take ${take}`;
        const off = await furthestOff(page, looked, data.props[looked.motion.prop]);
        return off <= allowed(looked)
          ? "true"
          : `${looked.clip} is ${off} m off, ${allowed(looked)} m are allowed`;
      },
      { timeout: 20_000, interval: 50 },
    )
    .toBe("true");
}

/** How many colours a picture of the canvas has. */
export async function colorsOf(page: Page): Promise<number> {
  const png = await page.locator("canvas").first().screenshot();
  // the page's own policy allows data: images
  return page.evaluate(async (base64) => {
    const image = new Image();
    image.src = `data:image/png;base64,${base64}`;
    await image.decode();
    const canvas = document.createElement("canvas");
    Object.assign(canvas, { width: image.width, height: image.height });
    const context = canvas.getContext("2d") as CanvasRenderingContext2D;
    context.drawImage(image, 0, 0);
    const { data } = context.getImageData(0, 0, canvas.width, canvas.height);
    return new Set(new Uint32Array(data.buffer)).size;
  }, png.toString("base64"));
}
