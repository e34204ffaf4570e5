/** The page as it was bundled when the program was built. */

import { readFile } from "node:fs/promises";
import type { PageParts } from "../review/page-shell.js";

/** @param folder its URL, with a slash at the end */
export async function readPageParts(folder: URL): Promise<PageParts> {
  const [script, style, body] = await Promise.all(
    ["page.js", "page.css", "body.html"].map((name) => readFile(new URL(name, folder), "utf8")),
  );
  return { script, style, body };
}
