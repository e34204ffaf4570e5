/** Bundles the preview page: the same sources make the same bytes. */

import { mkdir, readFile, writeFile } from "node:fs/promises";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { build } from "esbuild";

const ROOT = fileURLToPath(new URL("../", import.meta.url));
const SOURCE = join(ROOT, "src/review/page");

/**
 * Writes page.js, page.css and body.html into the folder.
 *
 * @param {string} folder
 */
export async function bundlePage(folder) {
  await mkdir(folder, { recursive: true });
  await build({
    absWorkingDir: ROOT,
    entryPoints: { page: join(SOURCE, "main.ts") },
    outdir: folder,
    bundle: true,
    minify: true,
    format: "esm",
    platform: "browser",
    target: "es2022",
    // glTF-Transform names them in a class for Node alone
    external: ["node:*"],
    charset: "utf8",
    legalComments: "inline",
    logLevel: "warning",
  });
  await build({
    absWorkingDir: ROOT,
    entryPoints: { page: join(SOURCE, "page.css") },
    outdir: folder,
    bundle: true,
    minify: true,
    charset: "utf8",
    logLevel: "warning",
  });
  await writeFile(join(folder, "body.html"), await readFile(join(SOURCE, "body.html"), "utf8"));
}

if (process.argv[1] === fileURLToPath(import.meta.url)) await bundlePage(join(ROOT, "dist/page"));
