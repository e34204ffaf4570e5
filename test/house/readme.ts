/** The README's own examples, as a reader would copy them. */

import { copyFileSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { ROOT } from "./sources.js";

const readme = readFileSync(`${ROOT}README.md`, "utf8");

/** The text of a section, from its heading to the next one of its level. */
export function section(heading: string): string {
  const start = readme.indexOf(`\n## ${heading}\n`);
  if (start < 0) throw new Error(`README.md has no section "${heading}"`);
  const end = readme.indexOf("\n## ", start + 1);
  return readme.slice(start, end < 0 ? undefined : end);
}

/** Blocks of code in a language. */
export const blocks = (text: string, language: string): string[] =>
  [...text.matchAll(new RegExp(`^\`\`\`${language}\\n([^]*?)^\`\`\`$`, "gm"))].map(([, code]) => code);

/** Puts the first throw's file and model into a folder, with what the README adds to it further down. */
export function layFirstThrow(folder: string): void {
  const [first] = blocks(section("Your first throw"), "yaml");
  const [caught] = blocks(section("What you can write"), "yaml");
  writeFileSync(join(folder, "first.throws.yaml"), first + caught);
  copyFileSync(`${ROOT}assets/props/spanner.glb`, join(folder, "spanner.glb"));
}

export const examples = blocks(section("From a script"), "js");
