import { cpSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { assets, THROWS } from "../cli/folder.js";
import type { Program } from "../cli/program.js";
import { installPage } from "../page/installed.js";
import { runCases, SOAK, told } from "./cases.js";
import { commandCase } from "./command-case.js";

// What is expected is what a program must not do to anybody: no outside source.

/** The short version has one for each kind of command line. */
const CASES = SOAK ? 200 : 16;

let program: Program;
const given = mkdtempSync(join(tmpdir(), "tossbake-given-"));

beforeAll(async () => {
  program = await installPage();
  cpSync(assets("starter"), join(program.folder, "assets/starter"), { recursive: true });
  cpSync(assets("props/spanner.glb"), join(given, "spanner.glb"));
  const text = `${THROWS}  back: { like: lob, arrive: { at: [0, 1, 0], facing: release } }\nchains: { both: { throws: [lob, back] } }\n`;
  writeFileSync(join(given, "lob.throws.yaml"), text);
  const bake = (...args: string[]) =>
    expect(program.run(["bake", "lob.throws.yaml", "--jobs", "1", ...args], { cwd: given }).code).toBe(0);
  bake("-o", "clips");
  writeFileSync(join(given, "each.throws.yaml"), text.replace("props:", "bake: { files: per-take }\nprops:"));
  mkdirSync(join(given, "shards"));
  for (const shard of ["1/2", "2/2"])
    expect(
      program.run(["bake", "each.throws.yaml", "--jobs", "1", "-o", "shards", "--shard", shard], {
        cwd: given,
      }).code,
    ).toBe(0);
}, 600_000);
afterAll(() => {
  program?.remove();
  rmSync(given, { recursive: true, force: true });
});

describe("a command line over files changed anyhow", () => {
  it("ends with 0 to 3 and a word of why, and touches nothing but its output folder", async () => {
    const tally = await runCases(CASES, async (number) => commandCase(program, given, number));
    if (SOAK) console.log(`${CASES} command lines: ${told(tally)}`);
    expect(tally.faults).toEqual([]);
    expect(tally.counts["ended with 0"]).toBeGreaterThan(CASES / 10);
    expect(tally.counts["ended with 2"]).toBeGreaterThan(CASES / 10);
  }, 7_200_000);
});
