import { readdirSync, readFileSync, writeFileSync } from "node:fs";
import { Resvg } from "@resvg/resvg-js";
import { describe, expect, it } from "vitest";
import { tetrahedron } from "../gltf/models.js";
import { Foreign, HALF, NONE, QUARTER } from "../review/foreign.js";
import { run, THROWS, Workplace } from "./folder.js";

// Names of files, words and exit codes: the project's own choice.

const FLY = [
  { path: "translation", times: [0, 0.5, 1], values: [0, 1, 0, 1, 2, 0, 2, 1, 0] },
  { path: "rotation", times: [0, 0.5, 1], values: [...NONE, ...QUARTER, ...HALF] },
] as const;
const keys = FLY.map((channel) => ({ ...channel, times: [...channel.times], values: [...channel.values] }));

/** A document of another program with a box and these clips of it. */
async function foreign(...names: string[]): Promise<Workplace> {
  const document = new Foreign();
  const box = document.box(document.node("box"), [0, 0, 0], [0.2, 0.4, 0.1]);
  for (const name of names) document.clip(name, [box, ...keys]);
  const place = new Workplace();
  writeFileSync(place.path("box.glb"), await document.glb());
  return place;
}

const descriptionOf = (place: Workplace, name: string): string =>
  /<desc[^>]*>(.*)<\/desc>/.exec(readFileSync(place.path("sheets", name), "utf8"))![1];

const sheetsIn = (place: Workplace) => readdirSync(place.path("sheets")).sort();

describe("tossbake strobe of a glTF file", () => {
  it("draws every clip of another program's file that moves one rigid node", async () => {
    const place = await foreign("hop", "skip");
    const { code, out, err } = await run("strobe", place.path("box.glb"), "-o", place.path("sheets"));
    expect({ code, err }).toEqual({ code: 0, err: "" });
    expect(out).toBe(`3 sheets written to ${place.path("sheets")}\n`);
    expect(sheetsIn(place)).toEqual(["hop.svg", "skip.svg", "takes.svg"]);
    for (const name of sheetsIn(place)) {
      const text = readFileSync(place.path("sheets", name), "utf8");
      // well formed, or the renderer throws; something is drawn
      expect(new Resvg(text).render().pixels.some((value) => value < 100)).toBe(true);
      expect(text.length).toBeLessThan(250_000);
    }
    // 2 m along x in a second, half a turn
    expect(descriptionOf(place, "hop.svg")).toMatch(/^A box flies [\d.]+\sm, .* in 1\.00\ss,.* 180°/);
  });

  it("writes the same bytes twice", async () => {
    const place = await foreign("hop");
    await run("strobe", place.path("box.glb"), "-o", place.path("sheets"));
    await run("strobe", place.path("box.glb"), "-o", place.path("again"));
    expect(place.contents(place.path("again"))).toEqual(place.contents(place.path("sheets")));
  });

  it("lets no name leave the folder, or become markup", async () => {
    const place = await foreign("../../up", "<script>alert(1)</script>", "", "]]>&amp;", "Takes", "a\u0000b");
    const before = readdirSync(place.root);
    const { code } = await run("strobe", place.path("box.glb"), "-o", place.path("sheets"));
    expect(code).toBe(0);
    expect(readdirSync(place.root).sort()).toEqual([...before, "sheets"].sort());
    expect(sheetsIn(place)).toHaveLength(7);
    expect(sheetsIn(place)).toEqual(
      expect.arrayContaining(["up.svg", "animation-3.svg", "Takes-2.svg", "takes.svg"]),
    );
    for (const name of sheetsIn(place)) {
      const text = readFileSync(place.path("sheets", name), "utf8");
      expect(text).not.toMatch(/<script/i);
      new Resvg(text).render();
    }
  });

  it("passes over what is no rigid motion, by name and with the reason", async () => {
    const document = new Foreign();
    const box = document.box(document.node("box"), [0, 0, 0], [0.2, 0.4, 0.1]);
    document.clip("hop", [box, ...keys]);
    document.clip("swell", [box, { path: "scale", times: [0, 1], values: [1, 1, 1, 2, 2, 2] }]);
    const place = new Workplace();
    writeFileSync(place.path("box.glb"), await document.glb());
    const { code, err } = await run("strobe", place.path("box.glb"), "-o", place.path("sheets"));
    expect({ code, err }).toEqual({ code: 0, err: 'swell is passed over: it scales "box"\n' });
    expect(sheetsIn(place)).toEqual(["hop.svg"]);
  });

  it("answers 1 where no clip can be drawn, 2 where there is none or the file is broken, and writes nothing", async () => {
    const place = new Workplace();
    const broken = new Foreign();
    const box = broken.box(broken.node("box"), [0, 0, 0], [1, 1, 1]);
    broken.clip("never", [box, { path: "translation", times: [0, Number.NaN], values: [0, 0, 0, 1, 1, 1] }]);
    const swelling = new Foreign();
    const ball = swelling.box(swelling.node("ball"), [0, 0, 0], [1, 1, 1]);
    swelling.clip("swell", [ball, { path: "scale", times: [0, 1], values: [1, 1, 1, 2, 2, 2] }]);
    const files: [Uint8Array | string, number, RegExp][] = [
      [await swelling.glb(), 1, /^swell is passed over/],
      [tetrahedron(), 2, /has no animation/],
      [await broken.glb(), 2, /has the time NaN s \(key 1\)/],
      ["glTF?", 2, /model\.glb/],
    ];
    for (const [content, code, message] of files) {
      writeFileSync(place.path("model.glb"), content);
      const answer = await run("strobe", place.path("model.glb"), "-o", place.path("sheets"));
      expect(answer).toMatchObject({ code, out: "", err: expect.stringMatching(message) });
      expect(readdirSync(place.root)).not.toContain("sheets");
    }
    expect((await run("strobe", place.path("none.glb"), "-o", place.path("sheets"))).code).toBe(2);
  });

  it("says what it weighed by, and from where it shows a clip that begins late", async () => {
    const document = new Foreign();
    const card = document.node("card");
    document.box(card, [0, 0, 0], [20, 0.4, 0.1]);
    document.clip("late", [card, ...keys.map((channel) => ({ ...channel, times: [1, 1.5, 2] }))]);
    const place = new Workplace();
    writeFileSync(place.path("card.glb"), await document.glb());
    const { code, err } = await run("strobe", place.path("card.glb"), "-o", place.path("sheets"));
    expect(code).toBe(0);
    expect(err).toMatch("late is shown from its first key on, at 1 s\n");
    // 20 m long: more likely in centimetres
    expect(err).toMatch(/^card: reaches 10/m);
  });
});

describe("tossbake strobe of a folder that was baked into", () => {
  for (const layout of ["one-node", "two-node", "turn-only"])
    it(`draws all its clips, ${layout}, with what the record knows`, async () => {
      const place = new Workplace(THROWS.replace("seed: 1", `seed: 1\nbake: { layout: ${layout} }`));
      await run("bake", place.throwFile, "-o", place.out);
      const { code, err } = await run("strobe", place.out, "-o", place.path("sheets"));
      expect({ code, err }).toEqual({ code: 0, err: "" });
      const names = ["lob_01", "lob_02", "lob_03", "takes", "toss_01", "toss_02"];
      expect(sheetsIn(place)).toEqual(names.map((name) => `${name}.svg`));
      const text = descriptionOf(place, "lob_01.svg");
      expect(text).toMatch(layout === "turn-only" ? /the turning alone/ : /^A spanner flies 3\.\d+\sm/);
      expect(text).toMatch(/1\.5\sturns/);
      expect(text).not.toMatch(/stands still/);
    });

  it("draws what is in a host's coordinates too", async () => {
    const place = new Workplace(
      THROWS.replace("seed: 1", "seed: 1\nhost: { axes: [z, x, y], unit: 0.01 }")
        .replace("[0, 1, 0]", "[0, 0, 100]")
        .replace("[0, 1, 3]", "[300, 0, 100]"),
    );
    await run("bake", place.throwFile, "-o", place.out);
    const { code } = await run("strobe", place.out, "-o", place.path("sheets"));
    expect(code).toBe(0);
    expect(descriptionOf(place, "lob_01.svg")).toMatch(/^A spanner flies [23]\.\d+\sm/);
  });

  it("refuses one without a record, and a record that leads out of it", async () => {
    const place = new Workplace();
    const empty = await run("strobe", place.root, "-o", place.path("sheets"));
    expect(empty).toMatchObject({ code: 2, err: expect.stringMatching("has no takes.json") });
    await run("bake", place.throwFile, "-o", place.out);
    place.edit("out/takes.json", /"file": "lob\.glb"/g, '"file": "../spanner.glb"');
    const led = await run("strobe", place.out, "-o", place.path("sheets"));
    expect(led).toMatchObject({ code: 2, err: expect.stringMatching('names the file "../spanner.glb"') });
  });
});
