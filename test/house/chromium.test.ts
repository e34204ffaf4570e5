import { readFileSync } from "node:fs";
import { build } from "esbuild";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import * as tossbake from "../../src/index.js";
import { launchBrowser, skipsWithoutBrowser } from "../page/browser.js";
import { ROOT } from "./sources.js";

/** Demo throws in which every step has its part: draws, arcs, poses solved, floors, limits, and two props with sockets. */
const ONLY = ["spanner-tumble", "spike-to-mate", "quoit-over-coaming"];
/** Reserved for examples (RFC 2606); nothing is asked of a network, the test answers itself. */
const PAGE = "https://quay.example/";

type Library = typeof tossbake;

/** Runs as it is in Node and, as text, in the page: the files' bytes as base64, and takes.json. */
async function bakeWith(
  library: Library,
  text: string,
  read: (path: string) => Promise<Uint8Array>,
  only: string[],
) {
  const file = library.parseThrowFile("quay.throws.yaml", text);
  const source = async (path: string) => ({
    model: await library.readModel(path, await read(path)),
    sha256: path,
  });
  const baked = await library.bake(file, source, { only });
  const base64 = (bytes: Uint8Array) => {
    let binary = "";
    for (const byte of bytes) binary += String.fromCharCode(byte);
    return btoa(binary);
  };
  return {
    files: baked.files.map(({ name, content }) => [name, base64(content as Uint8Array)]),
    record: library.formatRecord(await library.recordOf(file, text, baked)),
  };
}

describe.skipIf(skipsWithoutBrowser)("in Chromium", () => {
  let browser: Browser;
  let page: Page;

  beforeAll(async () => {
    const { outputFiles } = await build({
      entryPoints: [`${ROOT}src/index.ts`],
      bundle: true,
      platform: "browser",
      format: "iife",
      globalName: "tossbake",
      write: false,
      logLevel: "silent",
      external: ["node:*"],
    });
    browser = await launchBrowser();
    page = await browser.newPage();
    await page.route(`${PAGE}**`, (route) => {
      const { pathname } = new URL(route.request().url());
      if (pathname === "/") return route.fulfill({ contentType: "text/html", body: "<!doctype html>" });
      return route.fulfill({ body: readFileSync(`${ROOT}assets${pathname}`) });
    });
    await page.goto(PAGE);
    await page.addScriptTag({ content: outputFiles[0].text });
  });
  afterAll(() => browser?.close());

  it("the library bakes demo throws to the bytes that Node gets, and their record too", async () => {
    const text = readFileSync(`${ROOT}assets/quay.throws.yaml`, "utf8");
    const here = await bakeWith(
      tossbake,
      text,
      async (path) => new Uint8Array(readFileSync(`${ROOT}assets/${path}`)),
      ONLY,
    );
    expect(here.files.map(([name]) => name)).toEqual(ONLY.map((name) => `${name}.glb`));
    const there = await page.evaluate(
      async ({ code, text, only }) => {
        const bakeThere = new Function(`return ${code}`)() as typeof bakeWith;
        const read = async (path: string) => new Uint8Array(await (await fetch(path)).arrayBuffer());
        return bakeThere((globalThis as unknown as { tossbake: Library }).tossbake, text, read, only);
      },
      { code: bakeWith.toString(), text, only: ONLY },
    );
    expect(there).toEqual(here);
  }, 180_000);

  it("what is wrong in a throw file is told there as well", async () => {
    const message = await page.evaluate(() => {
      const { parseThrowFile } = (globalThis as unknown as { tossbake: Library }).tossbake;
      try {
        parseThrowFile("a.yaml", "props: {}\nthrows: { toss: { porp: peg } }");
        return "";
      } catch (error) {
        return (error as Error).message;
      }
    });
    expect(message).toMatch(/a\.yaml:\d+:\d+ .*porp/);
  });
});
