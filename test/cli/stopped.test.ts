import { spawnSync } from "node:child_process";
import { once } from "node:events";
import {
  chmodSync,
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  utimesSync,
  writeFileSync,
} from "node:fs";
import { hostname } from "node:os";
import { afterAll, beforeAll, describe, expect, it, vi } from "vitest";
import { run, Workplace } from "./folder.js";
import { Program } from "./program.js";

// What is expected is what a run that nobody stops writes; exit codes and words: the project's own choice.

vi.setConfig({ testTimeout: 600_000 });

/** Runs that are stopped, and how many takes each is to make: a few of a small batch, many of a larger one with SOAK=1. */
const STOPS = process.env.SOAK === "1" ? 40 : 3;
const TAKES: [number, number] = process.env.SOAK === "1" ? [200, 60] : [100, 20];
const STAGING = ".tossbake-part";

const text = (settings: string, [lob, toss] = [200, 60]) => `seed: 1
bake: { ${settings} }
props: { pin: { shape: { box: [0.02, 0.05, 0.3] }, density: 700 } }
throws:
  lob:
    prop: pin
    takes: ${lob}
    vary: chance
    release: { at: [0, 1, 0], scatter: 0..5 }
    arrive: { at: [0, 1, 3], after: 0.9..1.1 }
    spin: { axis: short, turns: 1..2 }
  toss: { like: lob, takes: ${toss} }
`;

let program: Program;
beforeAll(async () => {
  program = await Program.install();
});
afterAll(() => program.remove());

const all = (place: Workplace, out = "out"): Record<string, string> => place.contents(place.path(out));
const hasStaging = (place: Workplace) =>
  existsSync(place.out) && readdirSync(place.out).some((name) => name.startsWith(STAGING));
const different = (a: Record<string, string>, b: Record<string, string>) =>
  [...new Set([...Object.keys(a), ...Object.keys(b)])].filter((name) => a[name] !== b[name]);

/** Starts a bake and stops it after so many ms. */
async function stopped(place: Workplace, ms: number, signal: NodeJS.Signals, ...args: string[]) {
  const child = program.start(["bake", place.throwFile, "-o", place.out, ...args]);
  let err = "";
  child.stderr?.setEncoding("utf8").on("data", (piece) => {
    err += piece;
  });
  const ended = once(child, "close");
  const timer = setTimeout(() => child.kill(signal), ms);
  const [code] = await ended;
  clearTimeout(timer);
  return { code, err };
}

describe("a bake that is stopped", () => {
  // Park & Miller's generator (Communications of the ACM 31, 1192, 1988), so that a failure can be had again
  let state = 20260101;
  const chance = () => {
    state = (state * 48271) % 2147483647;
    return state / 2147483647;
  };

  it.each(["files: per-take", "files: per-throw, container: gltf"])(
    "at any moment leaves whole files alone, and --resume makes of it what was wanted (%s)",
    async (settings) => {
      const whole = new Workplace(text(settings, TAKES));
      const start = performance.now();
      expect(program.run(["bake", whole.throwFile, "-o", whole.out, "--jobs", "2"]).code).toBe(0);
      const time = performance.now() - start;
      const wanted = all(whole);
      for (let i = 0; i < STOPS; i++) {
        const place = new Workplace(text(settings, TAKES));
        const signal = i % 2 === 0 ? "SIGKILL" : "SIGINT";
        const jobs = String(1 + (i % 3));
        const { code, err } = await stopped(place, time * (0.2 + 0.8 * chance()), signal, "--jobs", jobs);
        const found = existsSync(place.out) ? all(place) : {};
        expect(Object.keys(found).filter((name) => found[name] !== wanted[name])).toEqual([]);
        if (signal === "SIGINT" && err !== "") {
          expect(code).toBe(130);
          expect(err).toMatch(new RegExp(`^stopped after \\d+ of ${TAKES[0] + TAKES[1]} takes; .*--resume`));
        }
        const resumed = program.run(["bake", place.throwFile, "-o", place.out, "--resume"]);
        expect(resumed).toMatchObject({ code: 0, err: "" });
        expect(different(all(place), wanted)).toEqual([]);
        expect(hasStaging(place)).toBe(false);
      }
    },
  );

  it("does not begin at the beginning again", async () => {
    const place = new Workplace(text("files: per-take"));
    const folder = place.path("out", STAGING, "parts");
    const parts = () => (existsSync(folder) ? readdirSync(folder).length : 0);
    const child = program.start(["bake", place.throwFile, "-o", place.out, "--jobs", "1"]);
    const ended = once(child, "close");
    while (parts() < 2 && child.exitCode === null) await new Promise((done) => setTimeout(done, 5));
    child.kill("SIGKILL");
    await ended;
    expect(hasStaging(place)).toBe(true);
    // what stands there is taken as it is: a part that says another take was left out is told
    const held = readdirSync(place.path("out", STAGING, "files")).filter((name) => name.startsWith("lob_"));
    expect(held.length).toBeGreaterThanOrEqual(64);
    writeFileSync(place.path("out", STAGING, "files", "lob_01.glb"), "as it was found");
    expect((await run("bake", place.throwFile, "-o", place.out, "--resume")).code).toBe(0);
    expect(readFileSync(place.path("out", "lob_01.glb"), "utf8")).toBe("as it was found");
  });

  it("is not gone on from with another throw file, and started anew without --resume, which is said", async () => {
    const place = new Workplace(text("files: per-take"));
    await stopped(place, 1e9, "SIGKILL", "--takes", "1-3");
    const before = all(place);
    const killed = await killedInside(place);
    place.edit("lob.throws.yaml", "seed: 1", "seed: 2");
    const { code, err } = await run("bake", place.throwFile, "-o", place.out, "--resume");
    expect(code).toBe(2);
    expect(err).toMatch(
      /--resume: what was stopped in .* was another bake \(throw file: .*\); .*leave --resume out/,
    );
    expect(all(place)).toEqual(before);
    expect(killed).toBe(true);
    const anew = await run("bake", place.throwFile, "-o", place.out, "--takes", "1-2");
    expect(anew.code).toBe(0);
    expect(anew.err).toMatch(/what a stopped bake had made in .* is thrown away: --resume/);
    expect(hasStaging(place)).toBe(false);
  });

  /** Kills a bake as soon as it has made a part. */
  async function killedInside(place: Workplace): Promise<boolean> {
    const child = program.start(["bake", place.throwFile, "-o", place.out, "--jobs", "1"]);
    const ended = once(child, "close");
    const parts = place.path("out", STAGING, "parts");
    while (child.exitCode === null && !(existsSync(parts) && readdirSync(parts).length > 0))
      await new Promise((done) => setTimeout(done, 5));
    child.kill("SIGKILL");
    await ended;
    return hasStaging(place);
  }
});

describe("two bakes into one folder", () => {
  it("are not made at once: the second is told who is at work, and changes nothing", async () => {
    const place = new Workplace(text("files: per-take").replace("takes: 200", "takes: 2000"));
    const child = program.start(["bake", place.throwFile, "-o", place.out, "--jobs", "1"]);
    const ended = once(child, "close");
    const lock = place.path("out", STAGING, "lock-1");
    while (!existsSync(lock)) await new Promise((done) => setTimeout(done, 5));
    const { code, err } = await run("bake", place.throwFile, "-o", place.out);
    expect(code).toBe(3);
    expect(err).toMatch(`another bake is at work in it (process ${child.pid} on ${hostname()})`);
    expect(child.exitCode).toBeNull();
    child.kill("SIGKILL");
    await ended;
    // the dead hold nothing
    expect((await run("bake", place.throwFile, "-o", place.out, "--takes", "1-2")).code).toBe(0);
    expect(hasStaging(place)).toBe(false);
  });

  it("are not made at once from two machines either, unless one of them has been silent for long", async () => {
    const place = new Workplace();
    mkdirSync(place.path("out", STAGING), { recursive: true });
    writeFileSync(place.path("out", STAGING, "lock-3"), '{"host":"far-away","process":1}');
    const { code, err } = await run("bake", place.throwFile, "-o", place.out);
    expect(code).toBe(3);
    expect(err).toMatch("process 1 on far-away");
    // a minute without a sign of life
    const past = new Date(Date.now() - 61_000);
    utimesSync(place.path("out", STAGING, "lock-3"), past, past);
    expect((await run("bake", place.throwFile, "-o", place.out)).code).toBe(0);
    expect(hasStaging(place)).toBe(false);
  });
});

describe("a machine that will not", () => {
  it("take files in a folder that cannot be written leaves nothing", async () => {
    const place = new Workplace();
    mkdirSync(place.out);
    chmodSync(place.out, 0o555);
    // an administrator may write anywhere; the kernel's own folder takes nothing from anybody
    const out = process.getuid?.() === 0 ? "/proc" : place.out;
    const { code, err, out: said } = await run("bake", place.throwFile, "-o", out);
    expect({ code, said }).toEqual({ code: 3, said: "" });
    expect(err).toMatch(/^.*: cannot be written \(.+\); .+\n$/);
    chmodSync(place.out, 0o755);
    expect(readdirSync(place.out)).toEqual([]);
  });

  it("has a full disk says so, and goes on when there is room", async (context) => {
    const place = new Workplace(text("files: per-take"));
    mkdirSync(place.out);
    const mounted = spawnSync("mount", ["-t", "tmpfs", "-o", "size=3m", "tmpfs", place.out]);
    context.skip(mounted.status !== 0, "no file system can be mounted here");
    try {
      const full = program.run(["bake", place.throwFile, "-o", place.out, "--jobs", "1"]);
      expect(full.code).toBe(3);
      expect(full.err).toMatch(/cannot be written \(the disk is full\); .*--resume/);
      expect(all(place)).toEqual({});
      spawnSync("mount", ["-o", "remount,size=64m", place.out]);
      expect(program.run(["bake", place.throwFile, "-o", place.out, "--resume"]).code).toBe(0);
      expect(hasStaging(place)).toBe(false);
      const whole = new Workplace(text("files: per-take"));
      expect((await run("bake", whole.throwFile, "-o", whole.out)).code).toBe(0);
      expect(different(all(place), all(whole))).toEqual([]);
    } finally {
      spawnSync("umount", [place.out]);
    }
  });
});

describe("what is not tossbake's", () => {
  it.each([
    ["lob.glb", "my own"],
    ["takes.json", '{ "my": "own" }'],
  ])("is not written over: %s", async (name, content) => {
    const place = new Workplace();
    mkdirSync(place.out);
    writeFileSync(place.path("out", name), content);
    const { code, err } = await run("bake", place.throwFile, "-o", place.out);
    expect(code).toBe(2);
    expect(err).toMatch(new RegExp(`${name}: stands there already and is not tossbake's: .*move it away`));
    expect(readdirSync(place.out)).toEqual([name]);
    expect(readFileSync(place.path("out", name), "utf8")).toBe(content);
  });

  it("is told from what it wrote, with and without its record", async () => {
    const place = new Workplace(
      `${text("files: per-take, container: gltf").replace(/takes: \d+/g, "takes: 2")}`,
    );
    expect((await run("bake", place.throwFile, "-o", place.out)).code).toBe(0);
    writeFileSync(place.path("out", "takes.json"), '{ "tossbake": "0.1.0", cut off');
    expect((await run("bake", place.throwFile, "-o", place.out)).code).toBe(0);
  });
});
