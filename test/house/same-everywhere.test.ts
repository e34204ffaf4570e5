import { spawnSync } from "node:child_process";
import { cpSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { dirname, join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { ROOT } from "./sources.js";

// What a conforming engine may compute differently: ECMA-262, 21.3.2 ("implementation-approximated") for Math and the power
// operator; ECMA-402 for Intl and toLocale….

const BAD = [
  "2 ** n",
  "n ** 0.5",
  "Math.floor(\n  2 ** n,\n)",
  "(m **= 2)",
  "Math.sin(n)",
  "Math.hypot(n, 1)",
  "Math.abs(Math.cos(n))",
  "Math.absolute(n)",
  "Math.pow(n, 2)",
  "Math.random()",
  "Math?.exp(n)",
  "Math\n  .log(n)",
  'Math["tan"](n)',
  'Math["abs"](n)',
  "[n].map(Math.cbrt)",
  "((M = Math) => M.sin(n))()",
  "(({ sin }) => sin(n))(Math)",
  "globalThis.Math.sin(n)",
  'globalThis["Math"].sin(n)',
  '"a".localeCompare("b")',
  '"a"["localeCompare"]("b")',
  "n.toLocaleString()",
  '"A".toLocaleLowerCase()',
  "new Intl.NumberFormat().format(n)",
];
const GOOD = [
  ...["abs", "floor", "ceil", "round", "trunc", "sqrt", "fround", "sign"].map((name) => `Math.${name}(n)`),
  ...["min", "max", "imul"].map((name) => `Math.${name}(n, 1)`),
  ...["E", "LN10", "LN2", "LOG10E", "LOG2E", "PI", "SQRT1_2", "SQRT2"].map((name) => `Math.${name}`),
  "[n].map(Math.sqrt)",
  "n * n",
  '"2 ** n, Math.sin(n)"',
  "n // 2 ** n, Math.sin(n)",
  "String(n)",
];

const file = (expression: string): string =>
  `export function f(n: number, m: number): unknown {\n  return [m, ${expression}\n];\n}\n`;

/** Number of findings of the rule by file, from the project's own configuration. */
const found = new Map<string, number>();
const folder = mkdtempSync(join(tmpdir(), "tossbake-lint-"));

beforeAll(() => {
  cpSync(`${ROOT}biome.json`, join(folder, "biome.json"));
  cpSync(`${ROOT}.biome`, join(folder, ".biome"), { recursive: true });
  const write = (path: string, text: string): void => {
    mkdirSync(join(folder, dirname(path)), { recursive: true });
    writeFileSync(join(folder, path), text);
  };
  BAD.forEach((expression, i) => {
    write(`src/bad/${i}.ts`, file(expression));
  });
  GOOD.forEach((expression, i) => {
    write(`src/good/${i}.ts`, file(expression));
  });
  write("src/review/page/free.ts", file("Math.sin(n)"));
  write("test/free.ts", file("Math.sin(n)"));
  const biome = `${ROOT}node_modules/@biomejs/biome/bin/biome`;
  const args = [biome, "lint", "--reporter=json", "--max-diagnostics=none", "."];
  const { stdout } = spawnSync(process.execPath, args, { cwd: folder, encoding: "utf8" });
  const report: { diagnostics: { category: string; location: { path: string } }[] } = JSON.parse(stdout);
  for (const { category, location } of report.diagnostics)
    if (category === "plugin") found.set(location.path, (found.get(location.path) ?? 0) + 1);
});

afterAll(() => rmSync(folder, { recursive: true }));

describe("the linter", () => {
  it.each(BAD.map((expression, i) => [expression, i] as const))("refuses %s", (_, i) => {
    expect(found.get(`src/bad/${i}.ts`)).toBeGreaterThan(0);
  });

  it.each(GOOD.map((expression, i) => [expression, i] as const))("allows %s", (_, i) => {
    expect(found.get(`src/good/${i}.ts`)).toBeUndefined();
  });

  it("leaves tests and the page's own scripts alone", () => {
    expect(found.get("src/review/page/free.ts")).toBeUndefined();
    expect(found.get("test/free.ts")).toBeUndefined();
  });
});
