import { cpSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath, pathToFileURL } from "node:url";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { installPage } from "../page/installed.js";
import { assets, THROWS } from "./folder.js";
import type { Program, RunOptions } from "./program.js";

// What is expected is what the first, ordinary run wrote. What a bake itself writes is looked at in same-bytes.test.ts.

const beside = (name: string) => pathToFileURL(fileURLToPath(new URL(name, import.meta.url))).href;
const imports = (...names: string[]) => names.flatMap((name) => ["--import", beside(name)]);

/** Another day, time zone, language, chance, order of files, and last digits of what engines may round as they like. */
const ELSEWHERE: RunOptions = {
  node: imports("another-time.mjs", "another-order.mjs", "perturb.mjs"),
  env: { LANG: "tr_TR.UTF-8", LC_ALL: "tr_TR.UTF-8", TZ: "Pacific/Kiritimati" },
};

let program: Program;
let folder: string;

beforeAll(async () => {
  program = await installPage();
  folder = mkdtempSync(join(tmpdir(), "tossbake-same-"));
  cpSync(assets("props/spanner.glb"), join(folder, "spanner.glb"));
  const text = `${THROWS}  home: { like: lob, arrive: { at: [0, 1, 0] } }\nchains: { round: { throws: [lob, home] } }\n`;
  writeFileSync(join(folder, "lob.throws.yaml"), text);
  writeFileSync(
    join(folder, "each.throws.yaml"),
    text.replace("props:", "bake: { files: per-take }\nprops:"),
  );
});
afterAll(() => {
  program?.remove();
  rmSync(folder, { recursive: true, force: true });
});

function written(out: string, commands: string[][], options: RunOptions): Record<string, string> {
  for (const command of commands) {
    const { code, err } = program.run(
      command.map((arg) => arg.replace("OUT", out)),
      { cwd: folder, ...options },
    );
    expect(code, err).toBe(0);
  }
  const names = readdirSync(join(folder, out)).sort();
  return Object.fromEntries(names.map((name) => [name, readFileSync(join(folder, out, name), "base64")]));
}

describe("elsewhere, at another time, the same bytes come out", () => {
  it.each<[string, string[][], number]>([
    ["of tables", [["csv", "lob.throws.yaml", "-o", "OUT"]], 11],
    ["of sheets", [["strobe", "lob.throws.yaml", "-o", "OUT"]], 5],
    ["of a sheet of props", [["weigh", "lob.throws.yaml", "--sheet", "OUT/props.svg"]], 1],
    ["of a page in one file", [["preview", "lob.throws.yaml", "--page", "OUT/page.html"]], 1],
    [
      "of a page of what was baked",
      [
        ["bake", "lob.throws.yaml", "-o", "OUT", "--jobs", "2"],
        ["preview", "OUT", "--page", "OUT/page.html"],
      ],
      6,
    ],
    [
      "of shards, and of the whole they make",
      [
        ["bake", "each.throws.yaml", "-o", "OUT", "--shard", "2/2"],
        ["bake", "each.throws.yaml", "-o", "OUT", "--shard", "1/2"],
        ["merge", "OUT", "-o", "OUT"],
      ],
      12,
    ],
  ])("%s", (what, commands, least) => {
    // pages name the folder that they show
    const out = what.replaceAll(" ", "-");
    const here = written(out, commands, {});
    rmSync(join(folder, out), { recursive: true });
    expect(Object.keys(here).length).toBeGreaterThanOrEqual(least);
    const there = written(out, commands, ELSEWHERE);
    expect(Object.keys(there)).toEqual(Object.keys(here));
    const differ = Object.keys(here).filter((file) => there[file] !== here[file]);
    expect(differ).toEqual([]);
  });

  it("and it really was elsewhere", () => {
    const script = `import { readdirSync } from "node:fs"; import { readdir } from "node:fs/promises";
      console.log(JSON.stringify([readdirSync("."), await readdir("."), Math.sin(1), Math.random(), new Date().getFullYear()]))`;
    const [here, there] = [{}, ELSEWHERE].map((options: RunOptions) =>
      JSON.parse(program.evaluate(script, { cwd: folder, ...options })),
    );
    expect(there[0]).toEqual([...here[0]].reverse());
    expect(there[1]).toEqual([...here[1]].reverse());
    for (const i of [2, 3, 4]) expect(there[i]).not.toBe(here[i]);
  });
});
