import { readdirSync, readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";

/** The repository's folder, with a slash at its end. */
export const ROOT = fileURLToPath(new URL("../../", import.meta.url));

export interface Source {
  /** Path below src, with forward slashes: "math/vec3.ts". */
  path: string;
  text: string;
  /** What it imports, types too, as written. */
  imports: string[];
}

/** Every TypeScript file of src, in the order of their paths. */
export function readSources(): Source[] {
  const paths = readdirSync(`${ROOT}src`, { recursive: true, encoding: "utf8" })
    .map((path) => path.replaceAll("\\", "/"))
    .filter((path) => path.endsWith(".ts"))
    .sort();
  return paths.map((path) => {
    const text = readFileSync(`${ROOT}src/${path}`, "utf8");
    return { path, text, imports: importsOf(text) };
  });
}

/** Module names in import and export statements and in import(…), comments apart. */
export function importsOf(text: string): string[] {
  const code = text.replace(/\/\*[\s\S]*?\*\//g, "").replace(/^\s*\/\/.*$/gm, "");
  return [...code.matchAll(/(?:\bfrom|\bimport)\s*\(?\s*["'`]([^"'`]+)["'`]/g)].map((match) => match[1]);
}
