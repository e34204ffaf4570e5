import { spawnSync } from "node:child_process";
import { chmodSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it, vi } from "vitest";
import { blocks, layFirstThrow, section } from "../house/readme.js";
import { Workplace } from "./folder.js";
import { Program } from "./program.js";

// What is expected is what one bake of all takes writes.

vi.setConfig({ testTimeout: 240_000 });

let program: Program;
beforeAll(async () => {
  program = await Program.install();
});
afterAll(() => program.remove());

/** The README's first throws with a file a take, and a shell in which `npx tossbake` is this program. */
function place() {
  const made = new Workplace();
  layFirstThrow(made.root);
  const file = made.path("first.throws.yaml");
  writeFileSync(file, `bake: { files: per-take }\n${readFileSync(file, "utf8")}`);
  mkdirSync(made.path("path"));
  const npx = made.path("path", "npx");
  writeFileSync(
    npx,
    `#!/bin/sh\n[ "$1" = tossbake ] && shift\nexec "${process.execPath}" "${join(program.folder, "bin/tossbake.js")}" "$@"\n`,
  );
  chmodSync(npx, 0o755);
  const shell = (command: string, env: Record<string, string> = {}) => {
    const { status, stderr } = spawnSync("sh", ["-c", command], {
      cwd: made.root,
      env: { ...process.env, ...env, PATH: `${made.path("path")}:${process.env.PATH}` },
      encoding: "utf8",
    });
    expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
  };
  // shares draw no sheets
  shell("npx tossbake bake first.throws.yaml -o whole --no-strobe");
  return { made, shell };
}

/** Names and contents of all files. */
const expectWhole = (made: Workplace, out: string) => {
  expect(readdirSync(made.path(out)).sort()).toEqual(readdirSync(made.path("whole")).sort());
  expect(made.contents(made.path(out))).toEqual(made.contents(made.path("whole")));
};

describe("the README's ways to share a batch", () => {
  it("as a build matrix come to the bytes of one bake", () => {
    const [yaml] = blocks(section("Many takes"), "yaml");
    const [bake, merge] = Array.from(yaml.matchAll(/^ {2}run: (.*)$/gm), ([, command]) => command);
    const shards = /SHARD: \[(.*)\]/.exec(yaml)![1].split(", ");
    const { made, shell } = place();
    for (const SHARD of shards) shell(bake, { SHARD });
    shell(merge);
    expectWhole(made, "clips");
  });

  it("as a cluster's indexed jobs come to the bytes of one bake", () => {
    const text = section("Many takes");
    const [script] = blocks(text, "sh");
    const merge = /`(npx tossbake merge \/shared.*?)`/.exec(text)![1];
    const { made, shell } = place();
    const shared = made.path("shared");
    writeFileSync(made.path("job.sh"), script.replace("/shared", shared));
    for (let index = 0; index < 8; index++) shell("sh job.sh", { JOB_INDEX: String(index) });
    shell(merge.replace("/shared", shared));
    expectWhole(made, "clips");
  });
});
