import { readdirSync, readFileSync, rmSync } from "node:fs";
import { afterAll, beforeAll, describe, expect, it, vi } from "vitest";
import { run, Workplace } from "./folder.js";
import { Program } from "./program.js";

// What is expected is what one thread of one machine wrote in one go; exit codes and words: the project's own choice.

// many processes, on whatever machine
vi.setConfig({ testTimeout: 240_000 });

let program: Program;
beforeAll(async () => {
  program = await Program.install();
});
afterAll(() => program.remove());

/** Throws of two props with chance, limits that leave a take out, a chain and a host. */
const manyTakes = (bake: string, host = "") => `seed: 1
${host}
bake: { ${bake} }
props:
  spanner: { model: spanner.glb, density: { steel: 7850, default: 1100 } }
  pin: { shape: { box: [0.02, 0.05, 0.3] }, density: 700 }
throws:
  lob:
    prop: spanner
    takes: 70
    vary: chance
    release: { at: [0, 1, 0], scatter: 0..5 }
    arrive: { at: [0, 1, 3], after: 0.9..1.1 }
    spin: { axis: short, turns: 1..2 }
  out: { like: lob, prop: pin, takes: 9, vary: even }
  back: { like: lob, prop: pin, takes: 9, arrive: { at: [0, 1 ± 0.2, 0] } }
  barred: { like: lob, takes: 1, limits: { speed: 0.1 } }
chains:
  both: { throws: [out, back] }
`;

/** In this process, by one thread. */
const bakeHere = (place: Workplace, out: string, ...args: string[]) =>
  run("bake", place.throwFile, "-o", place.path(out), ...args);
const bake = (place: Workplace, out: string, ...args: string[]) => {
  const { code, err } = program.run(["bake", place.throwFile, "-o", place.path(out), ...args]);
  return { code, err };
};
/** All that is in a folder, hidden files and folders too. */
const everythingIn = (place: Workplace, out: string) => {
  expect(readdirSync(place.path(out), { withFileTypes: true }).filter((entry) => !entry.isFile())).toEqual(
    [],
  );
  return place.contents(place.path(out));
};
const namesThatDiffer = (a: Record<string, string>, b: Record<string, string>) =>
  [...new Set([...Object.keys(a), ...Object.keys(b)])].filter((name) => a[name] !== b[name]);

const LEFT_OUT = /^barred_\d\d is left out: .*limits\.speed/m;

/** The same in an engine's axes, up last, and numbers. */
const hosted = (settings: string) =>
  manyTakes(settings, "host: { axes: [z, x, y], unit: 0.01 }")
    .replace("speed: 0.1", "speed: 10")
    .replaceAll("[0, 1, 3]", "[300, 0, 100]");

describe("any number of threads writes the same bytes", () => {
  it.each([
    ["a file a throw", manyTakes("files: per-throw")],
    ["a file a take", manyTakes("files: per-take")],
    ["one file, of two props", manyTakes("files: together")],
    [".gltf and .bin, a file a take, in an engine's numbers", hosted("files: per-take, container: gltf")],
  ])("%s", (_, text) => {
    const place = new Workplace(text);
    const one = bake(place, "one", "--jobs", "1");
    expect(one.code).toBe(1);
    expect(one.err).toMatch(LEFT_OUT);
    const whole = everythingIn(place, "one");
    expect(Object.keys(whole).length).toBeGreaterThan(4);
    for (const jobs of text.includes("per-take") ? ["2", "3"] : ["2"]) {
      expect(bake(place, jobs, "--jobs", jobs)).toEqual(one);
      expect(namesThatDiffer(everythingIn(place, jobs), whole)).toEqual([]);
    }
  });

  it("and prints the same record", () => {
    const place = new Workplace(manyTakes("files: per-throw"));
    const printed = (...args: string[]) =>
      program.run(["bake", place.throwFile, "--dry-run", "--json", ...args]).out;
    const whole = printed("--jobs", "1");
    expect(JSON.parse(whole).clips).toHaveLength(97);
    expect(printed("--jobs", "2")).toBe(whole);
    bake(place, "out");
    expect(readFileSync(place.path("out", "takes.json"), "utf8")).toBe(whole);
  });

  it("and says the same of a take that cannot be, whichever thread finds one first", () => {
    // from the eighth take on there is no flight; the last throws have none at all
    const text = manyTakes("files: per-take").replace(
      "after: 0.9..1.1",
      `after: { each: [${"1, ".repeat(66)}0.1] }`,
    );
    const place = new Workplace(text.replace("takes: 1, ", "takes: 1, arc: { apex: 3 }, "));
    const one = bake(place, "one", "--jobs", "1");
    expect(one.code).toBe(2);
    expect(bake(place, "two", "--jobs", "2")).toEqual(one);
    expect(readdirSync(place.root).sort()).toEqual(["lob.throws.yaml", "spanner.glb"]);
  });
});

describe("shards, merged, are the whole", () => {
  it.each([
    ["a file a take, each shard in a folder of its own", manyTakes("files: per-take"), ["s1", "s2", "s3"]],
    [".gltf and .bin, all shards in one folder", manyTakes("files: per-take, container: gltf"), ["m"]],
    ["a file a take, in an engine's numbers", hosted("files: per-take"), ["s1", "m", "m"]],
  ])("%s", async (_, text, folders) => {
    const place = new Workplace(text);
    await bakeHere(place, "whole", "--no-strobe");
    const whole = everythingIn(place, "whole");
    for (const i of [2, 3, 1]) {
      const { err } = await bakeHere(place, folders[i - 1] ?? folders[0], "--shard", `${i}/3`);
      expect(err).toMatch(i === 3 ? LEFT_OUT : /^$/);
    }
    const merged = await run("merge", ...folders.map((name) => place.path(name)), "-o", place.path("m"));
    expect(merged.err).toMatch(LEFT_OUT);
    expect(merged.code).toBe(1);
    expect(namesThatDiffer(everythingIn(place, "m"), whole)).toEqual([]);
  });

  const place = async () => {
    const made = new Workplace(
      manyTakes("files: per-take")
        .replace("takes: 70", "takes: 4")
        .replace(/ {2}barred.*\n/, ""),
    );
    for (const i of [1, 2]) expect((await bakeHere(made, `s${i}`, "--shard", `${i}/2`)).code).toBe(0);
    return made;
  };
  const merge = async (made: Workplace, ...folders: string[]) => {
    const merged = await run("merge", ...folders.map((name) => made.path(name)), "-o", made.path("m"));
    expect(readdirSync(made.root)).not.toContain("m");
    return merged;
  };

  it("are refused where one is missing, there twice, of another throw file, cut off or without its clips", async () => {
    const made = await place();
    expect(await merge(made, "s2")).toMatchObject({
      code: 2,
      err: expect.stringMatching(/shard 1 of 2 is missing/),
    });
    expect((await bakeHere(made, "again", "--shard", "2/2")).code).toBe(0);
    expect((await merge(made, "s1", "s2", "again")).err).toMatch(/shard 2 of 2 is there twice/);
    expect((await merge(made, "s1", "none")).err).toMatch(/none: holds no shard/);

    made.edit("again/takes.2-of-2.jsonl", /\n[^\n]*\n$/, "\n");
    expect((await merge(made, "s1", "again")).err).toMatch(/takes\.2-of-2\.jsonl: is cut off/);
    made.edit("lob.throws.yaml", "seed: 1", "seed: 2");
    expect((await bakeHere(made, "other", "--shard", "2/2")).code).toBe(0);
    const foreign = await merge(made, "s1", "other");
    expect(foreign.err).toMatch(/other.*is of another batch than .*s1.*\(throw file\)/);
    expect(foreign.code).toBe(2);

    rmSync(made.path("s2", "lob_04.glb"));
    expect((await merge(made, "s1", "s2")).err).toMatch(
      /lob_04\.glb: is missing, and .*takes\.2-of-2\.jsonl names it/,
    );
  });

  it("are refused for files of many takes, and for shares that are none", async () => {
    const made = new Workplace();
    const shard = (share: string) => bakeHere(made, "out", "--shard", share);
    expect(await shard("1/2")).toMatchObject({
      code: 2,
      err: expect.stringMatching(/--shard: .*files: per-take/),
    });
    for (const share of ["0/2", "3/2", "1", "1/0", "a/b"]) expect((await shard(share)).code).toBe(2);
    expect(readdirSync(made.root)).not.toContain("out");
  });
});

describe("batches that are too large", () => {
  it("are refused at once where they would be one file, and pointed to files of one take", async () => {
    for (const files of ["per-throw", "together"]) {
      const made = new Workplace(manyTakes(`files: ${files}`).replace("takes: 70", "takes: 1000000"));
      const { code, err } = await bakeHere(made, "out");
      expect(code).toBe(2);
      expect(err).toMatch(/lob\.throws\.yaml:\d+:\d+ bake\.files: the \d+ takes .*; per-take/);
      expect(readdirSync(made.root)).not.toContain("out");
    }
  });
});
