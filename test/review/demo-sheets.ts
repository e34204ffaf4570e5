/** The demo's throws, baked for pictures. */

import { fileURLToPath } from "node:url";
import { type Bake, bake } from "../../src/bake/bake.js";
import { openThrowFile } from "../../src/node/throw-file.js";
import { sheetsInput, sheetsOf } from "../../src/review/sheets.js";
import type { ThrowFile } from "../../src/throwfile/types.js";

export interface DemoSheets {
  file: ThrowFile;
  baked: Bake;
  sheets: Map<string, string>;
}

export async function demoSheets(options: Parameters<typeof bake>[2] = {}): Promise<DemoSheets> {
  const path = fileURLToPath(new URL("../../assets/quay.throws.yaml", import.meta.url));
  const { file, models } = await openThrowFile(path);
  const baked = await bake(file, models, options);
  const sheets = await sheetsOf(sheetsInput(file, baked));
  return { file, baked, sheets: new Map(sheets.map(({ name, content }) => [name, content])) };
}
