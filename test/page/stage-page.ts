/** The page's scene alone in a browser, with baked files to play: nothing of the page is round it. */

import { fileURLToPath } from "node:url";
import { build } from "esbuild";
import type { Browser, Page } from "playwright-core";
import type { NamedFile } from "../../src/gltf/splice.js";
import type { StageProp, StageThrow } from "../../src/review/page/stage.js";

const ENTRY = fileURLToPath(new URL("../../src/review/page/stage.ts", import.meta.url));
/** Answered by this file alone: nothing leaves the machine. */
const ORIGIN = "http://stage.invalid/";

/** As strict as the preview's own. */
const POLICY =
  "default-src 'none'; script-src 'self' 'unsafe-inline' 'wasm-unsafe-eval'; style-src 'unsafe-inline'; img-src blob: data:; connect-src 'self' blob: data:";

const HTML = `<!doctype html><meta charset="utf-8"><style>html,body{margin:0;height:100%}canvas{display:block;width:100%;height:100%}</style><canvas id="c"></canvas>
<script type="module">
import { Stage } from "./stage.js";
const query = new URLSearchParams(location.search);
window.stage = new Stage(document.getElementById("c"), { reducedMotion: true, dark: query.has("dark") });
window.file = async (name) => {
  const answer = await fetch("files/" + encodeURIComponent(name));
  if (!answer.ok) throw new Error(name + " is missing");
  return answer.arrayBuffer();
};
window.drawn = () => new Promise((done) => requestAnimationFrame(() => requestAnimationFrame(done)));
addEventListener("resize", () => window.stage.resize());
</script>`;

export interface StagePage {
  page: Page;
  /** Of the browser's console. */
  errors: string[];
  show(data: StageThrow, prop: StageProp, files: readonly NamedFile[]): Promise<void>;
  close(): Promise<void>;
}

export async function openStage(
  browser: Browser,
  { width = 900, height = 600, dark = false } = {},
): Promise<StagePage> {
  const bundled = await build({
    entryPoints: [ENTRY],
    bundle: true,
    minify: true,
    format: "esm",
    write: false,
    logLevel: "silent",
  });
  const context = await browser.newContext({ viewport: { width, height } });
  const page = await context.newPage();
  const errors: string[] = [];
  page.on("pageerror", (error) => errors.push(String(error)));
  page.on("console", (message) => {
    if (message.type() === "error" || message.type() === "warning") errors.push(message.text());
  });
  const files = new Map<string, Uint8Array>();
  await page.route("**/*", async (route) => {
    const path = decodeURIComponent(new URL(route.request().url()).pathname.slice(1));
    const headers = { "content-security-policy": POLICY };
    if (path === "") return route.fulfill({ contentType: "text/html", body: HTML, headers });
    if (path === "stage.js")
      return route.fulfill({ contentType: "text/javascript", body: bundled.outputFiles[0].text, headers });
    const content = files.get(path.replace("files/", ""));
    return content ? route.fulfill({ body: Buffer.from(content) }) : route.fulfill({ status: 404, body: "" });
  });
  await page.goto(ORIGIN + (dark ? "?dark" : ""));
  await page.waitForFunction("window.stage");
  return {
    page,
    errors,
    async show(data, prop, named) {
      files.clear();
      for (const { name, content } of named) files.set(name, content);
      await page.evaluate(
        ([data, prop]) => {
          const { stage, file, drawn } = window as unknown as StageWindow;
          return stage.show(data as StageThrow, prop as StageProp, file).then(drawn);
        },
        [data, prop] as const,
      );
    },
    close: () => context.close(),
  };
}

/** What the page puts into its window. */
export interface StageWindow {
  stage: import("../../src/review/page/stage.js").Stage;
  file(name: string): Promise<ArrayBuffer>;
  /** Resolves when what was asked for is in the picture. */
  drawn(): Promise<void>;
}
