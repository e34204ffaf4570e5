import { execFileSync } from "node:child_process";
import {
  chmodSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  symlinkSync,
  writeFileSync,
} from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
// @ts-expect-error it comes without types
import { validateBytes } from "gltf-validator";
import { afterEach, expect, it, vi } from "vitest";
import type { TakesRecord } from "../../src/record/clip-record.js";
import { throwFileSchema } from "../../src/throwfile/schema.js";
import { assets, run, Workplace } from "./folder.js";

// What the starter holds, and the exit codes: the project's own choice.

const NAMES = [".gitattributes", "anchor.glb", "anchor.throws.yaml", "throws.schema.json"];

afterEach(() => vi.unstubAllEnvs());

it("what new makes is baked by the commands it prints, with no warning, and leaves the glTF validator nothing to say", async () => {
  vi.stubEnv("npm_command", "");
  const place = new Workplace();
  const folder = place.path("some", "first throws");
  const { code, out, err } = await run("new", folder);
  expect({ code, err }).toEqual({ code: 0, err: "" });
  expect(readdirSync(folder).sort()).toEqual(NAMES);
  expect(JSON.parse(readFileSync(join(folder, "throws.schema.json"), "utf8"))).toEqual(throwFileSchema());

  expect(out).toContain(`cd "${folder}"\n`);
  const commands = [...out.matchAll(/^ {2}tossbake (.*)$/gm)].map(([, args]) => args.split(" "));
  expect(commands.map(([command]) => command)).toEqual(["weigh", "bake"]);
  for (const [command, ...args] of commands) {
    const there = args.map((arg) => (/^(anchor|clips)/.test(arg) ? join(folder, arg) : arg));
    const answer = await run(command, ...there);
    expect({ code: answer.code, err: answer.err }).toEqual({ code: 0, err: "" });
    expect(answer.out).not.toMatch(/warning|twice|inside out/);
  }
  const record: TakesRecord = JSON.parse(readFileSync(join(folder, "clips", "takes.json"), "utf8"));
  expect(record.props.anchor.warnings).toEqual([]);
  expect(new Set(record.clips.map(({ file }) => file)).size).toBe(3);
  for (const file of new Set(record.clips.map(({ file }) => file))) {
    const { issues } = await validateBytes(new Uint8Array(readFileSync(join(folder, "clips", file))));
    expect(issues.messages).toEqual([]);
  }
});

it("who called it by npx is told to go on by npx", async () => {
  vi.stubEnv("npm_command", "exec");
  const { out } = await run("new", new Workplace().path("first"));
  expect(out).toMatch(/^ {2}npx tossbake bake /m);
});

it("the starter's throws do what their comments say", async () => {
  const { code, out } = await run("bake", assets("starter/anchor.throws.yaml"), "--dry-run", "--json");
  expect(code).toBe(0);
  const { clips, props } = JSON.parse(out) as TakesRecord;
  const shares = (name: string, axis: number) =>
    clips.filter((clip) => clip.throw === name).map(({ share }) => share[axis]);
  // clean about the short axis; about the middle one it strays, but for the one that is solved
  for (const share of shares("anchor-across", 2)) expect(share).toBeGreaterThan(0.9999);
  for (const share of shares("anchor-tumble", 1)) expect(share).toBeLessThan(0.999);
  for (const { miss } of clips.filter((clip) => clip.throw === "anchor-caught")) {
    expect(miss.position).toBeLessThan(1e-6);
    expect(miss.angle).toBeLessThan(1e-6);
  }
  for (const { nearest } of clips) expect(nearest?.distance ?? 1).toBeGreaterThan(0.01);
  // three moments that nobody could take for each other
  const [least, middle, most] = props.anchor.principal.moments;
  expect(middle / least).toBeGreaterThan(1.3);
  expect(most / middle).toBeGreaterThan(1.3);
});

it("the anchor is built again byte for byte", () => {
  const folder = mkdtempSync(join(tmpdir(), "starter-"));
  execFileSync(process.execPath, [assets("build-props.js"), folder]);
  expect(readFileSync(join(folder, "anchor.glb")).equals(readFileSync(assets("starter/anchor.glb")))).toBe(
    true,
  );
});

it.each(NAMES)("a folder that has a %s already is left as it was", async (name) => {
  const place = new Workplace();
  const folder = place.path("mine");
  mkdirSync(folder);
  writeFileSync(join(folder, name), "mine");
  writeFileSync(join(folder, "other.txt"), "other");
  const before = place.contents(folder);
  const { code, out, err } = await run("new", folder);
  expect({ code, out }).toEqual({ code: 2, out: "" });
  expect(err).toMatch(/^[^\n]*: exists already, and nothing is written over; name another folder\n$/);
  expect(err).toContain(name);
  expect(place.contents(folder)).toEqual(before);
});

it("a link that leads nowhere counts as there: nothing is written through it", async () => {
  const place = new Workplace();
  const folder = place.path("mine");
  mkdirSync(folder);
  symlinkSync(place.path("elsewhere.glb"), join(folder, "anchor.glb"));
  expect((await run("new", folder)).code).toBe(2);
  expect(existsSync(place.path("elsewhere.glb"))).toBe(false);
});

it("other files in the folder stay as they are", async () => {
  const place = new Workplace();
  const folder = place.path("mine");
  mkdirSync(folder);
  writeFileSync(join(folder, "notes.txt"), "mine");
  expect((await run("new", folder)).code).toBe(0);
  expect(readdirSync(folder).sort()).toEqual([...NAMES, "notes.txt"].sort());
  expect(readFileSync(join(folder, "notes.txt"), "utf8")).toBe("mine");
});

it("a folder that cannot be made is the machine's fault, and nothing is left of it", async () => {
  const place = new Workplace();
  const { code, out, err } = await run("new", join(place.throwFile, "a", "b"));
  expect({ code, out }).toEqual({ code: 3, out: "" });
  expect(err).toMatch(/cannot be written \(a file stands where a folder should be\); name another folder\n$/);
});

// an administrator may write everywhere
it.skipIf(process.getuid?.() === 0)("a folder without permission keeps nothing", async () => {
  const place = new Workplace();
  const folder = place.path("closed");
  mkdirSync(folder);
  chmodSync(folder, 0o500);
  expect((await run("new", folder)).code).toBe(3);
  expect(readdirSync(folder)).toEqual([]);
});
