import { spawnSync } from "node:child_process";
import {
  existsSync,
  mkdirSync,
  mkdtempSync,
  readFileSync,
  rmSync,
  symlinkSync,
  writeFileSync,
} from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { NodeIO } from "@gltf-transform/core";
import { build } from "esbuild";
// @ts-expect-error it comes without types
import { validateBytes } from "gltf-validator";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { VERSION } from "../../src/record/version.js";
import { examples, layFirstThrow } from "./readme.js";
import { ROOT } from "./sources.js";

let folder: string;

/** The library as a package beside the first throw, and what it depends on. */
beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), "tossbake-readme-"));
  const home = join(folder, "node_modules", "tossbake");
  mkdirSync(home, { recursive: true });
  writeFileSync(
    join(home, "package.json"),
    JSON.stringify({ name: "tossbake", version: VERSION, type: "module", exports: "./index.js" }),
  );
  await build({
    entryPoints: [`${ROOT}src/index.ts`],
    outfile: join(home, "index.js"),
    bundle: true,
    platform: "node",
    format: "esm",
    packages: "external",
    logLevel: "silent",
  });
  symlinkSync(`${ROOT}node_modules`, join(home, "node_modules"));
  symlinkSync(`${ROOT}node_modules/@gltf-transform`, join(folder, "node_modules", "@gltf-transform"));
  layFirstThrow(folder);
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

function runs(code: string): string {
  writeFileSync(join(folder, "example.mjs"), code);
  const { status, stdout, stderr } = spawnSync(process.execPath, ["example.mjs"], {
    cwd: folder,
    encoding: "utf8",
  });
  expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
  return stdout;
}

async function clipsOf(name: string): Promise<string[]> {
  const bytes = new Uint8Array(readFileSync(join(folder, name)));
  expect((await validateBytes(bytes)).issues.numErrors).toBe(0);
  return (await new NodeIO().readBinary(bytes))
    .getRoot()
    .listAnimations()
    .map((clip) => clip.getName());
}

describe("the README's examples", () => {
  it("are four", () => expect(examples).toHaveLength(4));

  it("bake a throw file", () => {
    const out = runs(examples[0]);
    expect(out).toMatch(/^lob-to-bench\.glb \d+$/m);
    expect(out).toMatch(/centerOfMass/);
  });

  it("do every step of the line by itself, and come to the clip that bake comes to", async () => {
    const out = runs(`${examples[1]}
      const { bake } = await import("tossbake");
      const { throws } = await bake(file, async () => ({ model, sha256: "" }), { only: ["lob-to-bench"] });
      const [baked] = throws[0].takes;
      const same = ["translation", "rotation"].every((channel) =>
        Buffer.from(baked.track[channel].values.buffer).equals(Buffer.from(track[channel].values.buffer)));
      console.log(same, baked.take.candidate === take.candidate);`);
    expect(out).toMatch(/tumbles/);
    expect(out).toMatch(/true true\n$/);
    expect(await clipsOf("lob.glb")).toEqual(["lob"]);
  });

  it("throw a body without a throw file", () => {
    // the balance point after half of 0.9 s: 1 + 9.80665·0.45²/2 up (Galileo's parabola, apex halfway), 1.5 along; the box is centred
    const out = runs(`${examples[2]}
      console.log(JSON.stringify(playTrack(track, 0.45).translation));`);
    const [x, y, z] = JSON.parse(out.trim().split("\n").at(-1) as string);
    expect(Math.hypot(x, y - (1 + (9.80665 * 0.45 ** 2) / 2), z - 1.5)).toBeLessThan(0.001);
  });

  it("add clips to a document, and cut them again", async () => {
    const out = runs(examples[3]);
    expect([...out.matchAll(/clip: 'lob-to-bench_0\d'/g)]).toHaveLength(6);
    expect(await clipsOf("lobs.glb")).toEqual([1, 2, 3, 4, 5, 6].map((n) => `lob-to-bench_0${n}`));
    expect(existsSync(join(folder, "lobs.glb"))).toBe(true);
  });
});
