/** The page as one file, of a throw file or of a folder that was baked into. */

import { join } from "node:path";
import { type BakeOptions, bake } from "../bake/bake.js";
import { recordOf } from "../record/record-of.js";
import { pageData, shownFile } from "../review/page-data.js";
import { onePage, type PageParts } from "../review/page-shell.js";
import { plainGlb, readPlainGlb } from "./plain-glb.js";
import { filesOf, readPageData } from "./preview-folder.js";
import { openThrowFile } from "./throw-file.js";

export interface PageFile {
  html: string;
  /** Paths of the files that it is made of. */
  inputs: Iterable<string>;
  /** Takes that are left out. */
  unheld: { name: string; reason: string }[];
}

/** @throws as `openThrowFile` and `bake` do */
export async function pageOfThrowFile(
  path: string,
  parts: PageParts,
  options: Pick<BakeOptions, "onTake"> = {},
): Promise<PageFile> {
  const { file, text, models, inputs } = await openThrowFile(path);
  const shown = shownFile(file);
  const baked = await bake(shown, models, options);
  const data = pageData(file, baked, await recordOf(shown, text, baked));
  const files: { name: string; content: Uint8Array }[] = [];
  for (const { name, content } of baked.files) files.push({ name, content: await plainGlb(content) });
  const unheld = data.throws.flatMap((shown) => shown.unheld);
  return { html: await onePage(parts, data, files), inputs, unheld };
}

/** @throws as `readPageData` does, ModelError for a file of the folder that is none */
export async function pageOfFolder(folder: string, parts: PageParts): Promise<PageFile> {
  const data = await readPageData(folder);
  const names = filesOf(data);
  const files: { name: string; content: Uint8Array }[] = [];
  for (const name of names) files.push({ name, content: await readPlainGlb(folder, name) });
  const inputs = ["takes.json", ...names].map((name) => join(folder, name));
  return { html: await onePage(parts, data, files), inputs, unheld: [] };
}
