import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { Resvg } from "@resvg/resvg-js";
import { describe, expect, it } from "vitest";
import { run, THROWS, Workplace } from "./folder.js";

// Options, words and exit codes: the project's own choice. What drifts is what each test changes.

/** Bakes, moves the mark of all throws, and draws the drift. */
async function moved(text = THROWS) {
  const place = new Workplace(text);
  await run("bake", place.throwFile, "-o", place.out);
  place.edit("lob.throws.yaml", "[0, 1, 3]", "[0, 1, 3.2]");
  const before = place.contents();
  const verified = await run("verify", place.throwFile, "-o", place.out, "--sheets", place.path("drift"));
  expect(place.contents()).toEqual(before);
  const sheet = (name: string) => readFileSync(place.path("drift", name), "utf8");
  return { place, ...verified, sheet };
}

describe("verify --sheets", () => {
  it("draws each take that drifted, in the words that verify prints, and writes nothing else", async () => {
    const { place, code, out, err, sheet } = await moved();
    expect([code, err]).toEqual([1, ""]);
    const names = ["lob_01", "lob_02", "lob_03", "toss_01", "toss_02"];
    expect(readdirSync(place.path("drift")).sort()).toEqual(names.map((name) => `${name}.svg`));
    expect(out).toMatch(`5 pictures of drift written to ${place.path("drift")}\n`);
    for (const name of names) {
      const [words] = out.split("\n").filter((line) => line.startsWith(name));
      expect(words).toMatch("arrives 200 mm further");
      const text = sheet(`${name}.svg`);
      expect(text).toContain(`<desc id="sheet-desc">${words}. Dashed`);
      expect(text.length).toBeLessThan(250_000);
      expect(text).not.toMatch(/<script|href|url\(|@import/);
      // well formed, or the renderer throws; something is drawn
      expect(new Resvg(text).render().pixels.some((value) => value < 100)).toBe(true);
    }
    expect(readdirSync(place.root).sort()).toEqual(["drift", "lob.throws.yaml", "out", "spanner.glb"]);
  });

  it("draws the same bytes twice", async () => {
    const { place, sheet } = await moved();
    const first = sheet("lob_02.svg");
    await run("verify", place.throwFile, "-o", place.out, "--sheets", place.path("drift"));
    expect(sheet("lob_02.svg")).toBe(first);
  });

  it("draws the mark 0.2 m further in the picture's own scale, filled beside dashed", async () => {
    const { sheet } = await moved();
    const text = sheet("lob_01.svg");
    const spots = (name: string) =>
      [...text.matchAll(new RegExp(`<circle class="${name}" cx="([\\d.]+)" cy="([\\d.]+)"`, "g"))].map(
        ([, x, y]) => [Number(x), Number(y)],
      );
    // the arc's nine or thirteen poses come first, then the enlarged ones
    const [now, before] = [spots("spot"), spots("spot-before")];
    const count = text.includes(">13<") ? 13 : 9;
    const [release, arrival] = [now[0], now[count - 1]];
    const scale = (arrival[0] - release[0]) / 3.2;
    expect((arrival[0] - before[count - 1][0]) / scale).toBeCloseTo(0.2, 2);
    expect(Math.abs(release[0] - before[0][0])).toBeLessThan(0.02);
    expect(text.match(/class="body-before"/g)!.length).toBe(text.match(/class="body"/g)!.length);
  });

  it("draws two folders against each other, as their files have the props", async () => {
    const { place } = await moved();
    await run("bake", place.throwFile, "-o", place.path("after"));
    const folders = ["-o", place.path("after"), "--against", place.out, "--sheets", place.path("two")];
    const { code, out } = await run("verify", ...folders);
    expect(code).toBe(1);
    expect(out).toMatch("5 pictures of drift");
    expect(readFileSync(place.path("two", "lob_01.svg"), "utf8")).toMatch("before: out<");
    expect(readFileSync(place.path("two", "lob_01.svg"), "utf8")).toMatch("now: after<");
  });

  it("keeps --json apart from what it says of the pictures", async () => {
    const place = new Workplace();
    await run("bake", place.throwFile, "-o", place.out);
    place.edit("lob.throws.yaml", "[0, 1, 3]", "[0, 1, 3.2]");
    const args = [place.throwFile, "-o", place.out, "--json", "--sheets", place.path("drift")];
    const { out, err } = await run("verify", ...args);
    expect(JSON.parse(out)).toMatchObject({ drift: true });
    expect(err).toMatch("5 pictures of drift written to");
  });

  it("draws in the metres of the world where the numbers are a host's", async () => {
    // the engine's x, y, z are glTF's z, x, y; centimetres
    const hosted = THROWS.replace("seed: 1", "seed: 1\nhost: { axes: [z, x, y], unit: 0.01 }")
      .replace("[0, 1, 0]", "[0, 0, 100]")
      .replace("[0, 1, 3]", "[300, 0, 100]");
    const place = new Workplace(hosted);
    await run("bake", place.throwFile, "-o", place.out);
    place.edit("lob.throws.yaml", "[300, 0, 100]", "[320, 0, 100]");
    await run("verify", place.throwFile, "-o", place.out, "--sheets", place.path("drift"));
    const plain = await moved();
    // but for names, the same picture as of the same throws in glTF's axes: to float32 and the twelve digits of the record
    const shape = (text: string) => text.match(/<(path|circle)/g)!.length;
    expect(shape(readFileSync(place.path("drift", "lob_01.svg"), "utf8"))).toBe(
      shape(plain.sheet("lob_01.svg")),
    );
  });

  it("says what it does not draw: what drifted in no motion", async () => {
    const place = new Workplace();
    await run("bake", place.throwFile, "-o", place.out);
    place.edit("lob.throws.yaml", "props:", "bake: { tolerance: 0.0001 }\nprops:");
    const args = [place.throwFile, "-o", place.out, "--sheets", place.path("drift")];
    const { out } = await run("verify", ...args);
    expect(out).toMatch("no pictures of drift to draw\n5 drifted in no motion: not drawn\n");
    expect(existsSync(place.path("drift"))).toBe(false);
  });

  it("draws the 40 that drifted furthest, and says how many it does not", async () => {
    const { place, out } = await moved(THROWS.replace("takes: 3", "takes: 45").replace(/ {2}toss.*\n/, ""));
    expect(readdirSync(place.path("drift"))).toHaveLength(40);
    expect(out).toMatch("the 40 that drifted furthest are drawn, 5 are not");
  });

  it("writes nothing where nothing drifted, and never into what it compares", async () => {
    const place = new Workplace();
    await run("bake", place.throwFile, "-o", place.out);
    const same = await run("verify", place.throwFile, "-o", place.out, "--sheets", place.path("drift"));
    expect(same.code).toBe(0);
    expect(existsSync(place.path("drift"))).toBe(false);
    const own = await run("verify", place.throwFile, "-o", place.out, "--sheets", `${place.out}/../out`);
    expect(own.code).toBe(2);
    expect(own.err).toMatch(/^--sheets:? .* is a folder that is compared/);
  });
});

describe("sheets beside the clips", () => {
  async function drawn() {
    const place = new Workplace();
    await run("bake", place.throwFile, "-o", place.out);
    await run("strobe", place.throwFile, "-o", place.out);
    return place;
  }
  const rowsOf = async (place: Workplace) => {
    const { out } = await run("verify", place.throwFile, "-o", place.out, "--json");
    return (JSON.parse(out).rows as { kind: string; text: string }[])
      .filter(({ kind }) => kind !== "throwFile")
      .map(({ text }) => text);
  };

  it("are no drift as they were drawn, nor where they are not there", async () => {
    const place = await drawn();
    expect(await rowsOf(place)).toEqual([]);
    rmSync(place.path("out/lob.svg"));
    expect(await rowsOf(place)).toEqual([]);
  });

  it("are drift where they are drawn otherwise now", async () => {
    const place = await drawn();
    place.edit("out/lob.svg", "spanner", "oar");
    writeFileSync(place.path("out/takes.svg"), "");
    expect(await rowsOf(place)).toEqual([
      "lob.svg is not as it is drawn now: bake again",
      "takes.svg is not as it is drawn now: bake again",
    ]);
  });

  it("are explained by takes that drifted, and left over from throws that are gone", async () => {
    const place = await drawn();
    place.edit("lob.throws.yaml", / {2}toss.*\n/, "");
    const rows = await rowsOf(place);
    expect(rows).toContain("toss.svg is left over from a throw that is gone");
    expect(rows.filter((text) => text.includes("takes.svg"))).toEqual([]);
  });
});

describe("verify of clips that lie in a file each, with their bytes beside them", () => {
  const apart = THROWS.replace("seed: 1", "seed: 1\nbake: { files: per-take, container: gltf }");

  it("finds no drift right after a bake", async () => {
    const place = new Workplace(apart);
    await run("bake", place.throwFile, "-o", place.out);
    expect(await run("verify", place.throwFile, "-o", place.out)).toMatchObject({ code: 0 });
  });

  it("names each take that drifted once, and no file besides", async () => {
    const place = new Workplace(apart);
    await run("bake", place.throwFile, "-o", place.out);
    place.edit("lob.throws.yaml", "[0, 1, 3]", "[0, 1, 3.2]");
    const { out } = await run("verify", place.throwFile, "-o", place.out);
    const rows = out.split("\n\n")[0].split("\n");
    expect(rows.map((row) => row.split(" ")[0])).toEqual([
      "lob.throws.yaml",
      ...["lob_01", "lob_02", "lob_03", "toss_01", "toss_02"],
    ]);
  });

  it("finds bytes that were changed by other hands, and files that are missing", async () => {
    const place = new Workplace(apart);
    await run("bake", place.throwFile, "-o", place.out);
    const bytes = readFileSync(place.path("out/lob_02.bin"));
    bytes[bytes.length - 1] ^= 1;
    writeFileSync(place.path("out/lob_02.bin"), bytes);
    rmSync(place.path("out/toss_01.bin"));
    const { out } = await run("verify", place.throwFile, "-o", place.out);
    expect(out.split("\n").slice(0, 2)).toEqual([
      "lob_02.bin was changed after it was baked: the record is the same, the file is not",
      "toss_01.bin is missing",
    ]);
  });
});

describe("verify after a bake that was stopped while its files got their places", () => {
  it("says so beside what it finds, and says nothing where nothing drifted", async () => {
    const place = new Workplace();
    await run("bake", place.throwFile, "-o", place.out);
    mkdirSync(place.path("out/.tossbake-part"));
    const same = await run("verify", place.throwFile, "-o", place.out);
    expect(same).toMatchObject({ code: 0, err: "" });
    const record = readFileSync(place.path("out/takes.json"));
    place.edit("lob.throws.yaml", "[0, 1, 3]", "[0, 1, 3.2]");
    rmSync(place.path("out/.tossbake-part"), { recursive: true });
    await run("bake", place.throwFile, "-o", place.out);
    // the record is the last to get its place
    writeFileSync(place.path("out/takes.json"), record);
    mkdirSync(place.path("out/.tossbake-part"));
    const { code, err } = await run("verify", place.throwFile, "-o", place.out);
    expect(code).toBe(1);
    expect(err).toMatch(`a bake into ${place.out} is at work, or was stopped`);
  });
});
