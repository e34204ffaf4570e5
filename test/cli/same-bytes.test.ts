import { cpSync, mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath, pathToFileURL } from "node:url";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { assets } from "./folder.js";
// @ts-expect-error a script without types
import { NAMES } from "./perturb-names.mjs";
import { Program, type RunOptions } from "./program.js";

// What is expected is what the first, ordinary run wrote.

const beside = (name: string) => pathToFileURL(fileURLToPath(new URL(name, import.meta.url))).href;
const PERTURB = ["--import", beside("perturb.mjs")];

let program: Program;
let folder: string;
let first: Record<string, string>;
let runs = 0;

beforeAll(async () => {
  program = await Program.install();
  folder = mkdtempSync(join(tmpdir(), "tossbake-same-"));
  // every throw of the demo; of each, two takes are enough
  const text = readFileSync(assets("quay.throws.yaml"), "utf8").replace(/takes: \d+/g, "takes: 2");
  writeFileSync(join(folder, "quay.throws.yaml"), text);
  cpSync(assets("props"), join(folder, "props"), { recursive: true });
  first = bake().files;
});

afterAll(() => {
  program.remove();
  rmSync(folder, { recursive: true, force: true });
});

/** Bakes the throw file of the folder it runs in; the names and contents of all that was written. */
function bake({ cwd = folder, file = "quay.throws.yaml", out = `out-${++runs}`, ...how }: Place = {}) {
  const { code, err } = program.run(["bake", file, "-o", out], { cwd, ...how });
  expect(code).toBe(0);
  const names = readdirSync(join(cwd, out)).sort();
  const files = names.map((name) => [name, readFileSync(join(cwd, out, name), "base64")]);
  return { err, files: Object.fromEntries(files) as Record<string, string> };
}

interface Place extends RunOptions {
  file?: string;
  /** Within `cwd`. */
  out?: string;
}

/** Names of the files that differ: a shorter message than their contents. */
function expectSame({ files }: { files: Record<string, string> }): void {
  expect(Object.keys(files)).toEqual(Object.keys(first));
  expect(Object.keys(files).filter((name) => files[name] !== first[name])).toEqual([]);
}

describe("the same throw file is baked to the same bytes", () => {
  it("a second time", () => {
    expect(Object.keys(first).length).toBeGreaterThan(10);
    expectSame(bake());
  });

  it("over what the first run wrote", () => {
    expectSame(bake({ out: "out-1" }));
  });

  it("from another place, by another path, in a folder of another name", () => {
    const cwd = join(folder, "elsewhere");
    mkdirSync(join(cwd, "a copy"), { recursive: true });
    for (const name of ["quay.throws.yaml", "props"])
      cpSync(join(folder, name), join(cwd, "a copy", name), { recursive: true });
    expectSame(bake({ cwd, file: "./a copy/../a copy/quay.throws.yaml", out: "baked" }));
  });

  it("whatever the language and the time zone", () => {
    for (const [LANG, TZ] of [
      ["C", "UTC"],
      ["tr_TR.UTF-8", "Pacific/Kiritimati"],
      ["de_DE.UTF-8", "America/St_Johns"],
    ])
      expectSame(bake({ env: { LANG, LC_ALL: LANG, LANGUAGE: LANG, TZ } }));
  });

  it("on another day and with other chance about", () => {
    const baked = bake({ node: ["--import", beside("another-time.mjs")] });
    // the clock really was another: 3.7e11 ms are over eleven years
    expect(Number(baked.err)).toBeGreaterThan(new Date().getFullYear() + 10);
    expectSame(baked);
  });

  it("by an engine that compiles nothing", () => {
    expectSame(bake({ node: ["--jitless"] }));
  }, 400_000);

  it("by an engine whose approximations are all another last digit", () => {
    const script = `import { NAMES } from ${JSON.stringify(beside("perturb-names.mjs"))};
      console.log(JSON.stringify(NAMES.map((name) => Math[name](1.5, 2) || Math[name](0.5))))`;
    const answers = (options: RunOptions) => JSON.parse(program.evaluate(script, options));
    const [perturbed, usual] = [answers({ node: PERTURB }), answers({})];
    NAMES.forEach((name: string, i: number) => {
      expect(perturbed[i], name).not.toBe(usual[i]);
      expect(Math.abs(perturbed[i] / usual[i] - 1), name).toBeLessThan(2.3e-16);
    });

    const baked = bake({ node: PERTURB });
    expect(baked.err).toBe("perturbed\n");
    expectSame(baked);
  });
});
