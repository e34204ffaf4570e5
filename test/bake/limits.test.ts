import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { run, Workplace } from "../cli/folder.js";
import { baked } from "./baked.js";

const file = (limits: string, more = "", top = "") => `
seed: limits
${top}
props:
  ball: { shape: { sphere: 0.1 } }
  pin: { shape: { box: [0.02, 0.05, 0.3] } }
throws:
  lob:
    prop: ball
    takes: 6
    release: { at: [0, 1, 0] }
    arrive: { at: [0, 1, 4], after: 0.5..1.5 }
    limits: ${limits}
  toss:
    prop: pin
    takes: 6
    release: { at: [0, 1, 0], facing: any }
    arrive: { at: [0, 1, 4], after: 0.9..1.1 }
    spin: { axis: short, turns: 1..4, wobble: 0..60 }
${more}
`;
const clips = async (limits: string, top?: string) =>
  (await baked(file(limits, "", top))).record.clips.filter((clip) => clip.throw === "lob");
const G = 9.80665;

describe("every take holds its limits, and is drawn again until it does", () => {
  it("heights: the ball's lowest and highest points", async () => {
    const free = await clips("{}");
    const held = await clips("{ maxHeight: 2, minHeight: 0.89999999 }");
    expect(Math.max(...free.map((clip) => clip.apex.rise))).toBeGreaterThan(0.9);
    for (const clip of held) expect(clip.apex.rise).toBeLessThanOrEqual(0.9 + 1e-9);
    expect(held.length).toBe(6);
    expect(held.some((clip) => clip.candidate! > 1)).toBe(true);
  });

  it("that all first choices hold change nothing", async () => {
    expect(await clips("{ maxHeight: 5, minHeight: -1, speed: 50, rate: 1, turns: 0..0 }")).toEqual(
      await clips("{}"),
    );
  });

  it("speed: the greatest, which is at an end", async () => {
    for (const { release } of await clips("{ speed: 6 }"))
      expect(Math.hypot(...release.velocity)).toBeLessThanOrEqual(6 + 1e-9);
    expect((await clips("{}")).some(({ release }) => Math.hypot(...release.velocity) > 6.5)).toBe(true);
  });

  it("a box is flown over, turned about its own middle from +Z towards +X", async () => {
    // A wall across the way, 2 m high and at z = 2, thin: the ball has to be 2.1 high there, so the rise g T²/8 is over 1.1 − its sag within 0.1.
    const over = await clips("{ clear: [{ box: [[-1, 0, 1.99], [1, 2, 2.01]] }] }");
    for (const { apex } of over) expect(apex.rise).toBeGreaterThan(1.09);
    // Turned by 90° it stands along the way, from z = 1 to 3: the rise at z = 1, 3/4 of it at the middle, is 1.1 or more.
    for (const { apex } of await clips("{ clear: [{ box: [[-1, 0, 1.99], [1, 2, 2.01]], turn: 90 }] }"))
      expect(0.75 * apex.rise).toBeGreaterThan(1.05);
    // A wall 2 m long beside the way's end, x = 0.7 and z = 4.3 its middle. Turned by 50° from +Z to +X, its end comes to x = 0.7 − sin 50° < 0 at
    // z = 4.3 − cos 50° = 3.66, across the way; turned as much the other way, it is there at z = 4.94, beyond the arrival.
    const beside = (turn: number) =>
      clips(`{ clear: [{ box: [[0.69, 0, 3.3], [0.71, 9, 5.3]], turn: ${turn} }] }`);
    expect(await beside(0)).toEqual(await clips("{}"));
    expect(await beside(-50)).toEqual(await clips("{}"));
    expect(await beside(50)).toEqual([]);
  });

  it("counts in the host's unit, heights along glTF's up", async () => {
    const top = "host: { axes: [x, -y, z], unit: 0.01 }";
    const text = file("{ maxHeight: 200, clear: [{ box: [[-100, -300, 199], [100, -210, 201]] }] }", "", top)
      .replaceAll("[0, 1, 0]", "[0, -100, 0]")
      .replaceAll("[0, 1, 4]", "[0, -100, 400]");
    const { record, bake } = await baked(text);
    const lobs = record.clips.filter((clip) => clip.throw === "lob");
    expect(lobs.length).toBe(6);
    for (const clip of lobs) expect(clip.apex.rise).toBeLessThanOrEqual(90 + 1e-6);
    expect(bake.unheld).toEqual([]);
  });

  it("rate, turns and share of a wobbling pin", async () => {
    const text = file("{}").replace(
      "wobble: 0..60 }",
      "wobble: 0..60 }\n    limits: { turns: 2..3, share: 0.9, rate: 3 }",
    );
    const held = (await baked(text)).record.clips.filter((clip) => clip.throw === "toss");
    const free = (await baked(file("{}"))).record.clips.filter((clip) => clip.throw === "toss");
    expect(held.length).toBe(6);
    for (const clip of held) {
      expect(clip.turns).toBeGreaterThan(2 - 1e-9);
      expect(clip.turns).toBeLessThan(3 + 1e-9);
      expect(clip.share[2]).toBeGreaterThan(0.9 - 1e-9);
      for (const { angularVelocity } of [clip.release, clip.arrival])
        expect(Math.hypot(...angularVelocity)).toBeLessThan(3 * 2 * Math.PI + 1e-9);
    }
    expect(free.some((clip) => clip.share[2] < 0.9)).toBe(true);
    expect(free.some((clip) => clip.turns > 3 || clip.turns < 2)).toBe(true);
  });

  it("touching at arrival is no breach: a ball that lands on the floor it must not go below, or on a crate", async () => {
    const text = (limits: string) => `
props: { ball: { shape: { sphere: 0.1 } } }
throws:
  drop:
    prop: ball
    release: { at: [0, 0.1, 0], velocity: [0, 3, 1] }
    arrive: { floor: 0 }
    limits: ${limits}
`;
    const touching = "{ minHeight: 0, clear: [{ box: [[-9, -1, -9], [9, 0, 9]], turn: 20 }] }";
    const { record, bake } = await baked(text(touching));
    expect(bake.unheld).toEqual([]);
    // 2v/g (throw straight up)
    expect(record.clips[0].duration).toBeCloseTo(6 / G, 11);
    expect((await baked(text("{ minHeight: 1e-8 }"))).bake.unheld.length).toBe(1);
  });
});

describe("limits that no candidate holds", () => {
  it("leave that take out, say which failed how often, and leave the others as they are", async () => {
    const free = await baked(file("{}"));
    const some = await baked(file("{ maxHeight: 1.2 }"));
    // The arrival's drawn time T gives the rise g T²/8: 0.1 where T = 0.286 s, which is never drawn.
    expect(some.record.clips.map((clip) => clip.throw)).toEqual(Array(6).fill("toss"));
    expect(some.glb("toss")).toEqual(free.glb("toss"));
    expect(some.bake.unheld.map(({ name }) => name)).toEqual([1, 2, 3, 4, 5, 6].map((n) => `lob_0${n}`));
    expect(some.bake.unheld[0].reason).toHaveProperty("broken", new Map([["limits.maxHeight", 1000]]));
  });

  it("leave out those takes alone", async () => {
    const each = (limits: string) =>
      baked(file(limits).replace("after: 0.5..1.5", "after: { each: [0.6, 1.4] }"));
    const [free, held] = [await each("{}"), await each("{ maxHeight: 2 }")];
    // rises g T²/8: 0.44 and 2.4
    const names = held.record.clips.map(({ name }) => name).filter((name) => name.startsWith("lob"));
    expect(names).toEqual(["lob_01", "lob_03", "lob_05"]);
    const same = free.record.clips.find(({ name }) => name === "lob_03")!;
    expect(held.record.clips.find(({ name }) => name === "lob_03")).toEqual({
      ...same,
      nearest: expect.anything(),
    });
    expect(held.bake.unheld[0].reason.message).toBe(
      "its one candidate does not hold the limits (broken: limits.maxHeight in 1)",
    );
  });

  it("end the command with 1, the rest written", async () => {
    const place = new Workplace(
      file("{ maxHeight: 1.9, speed: 3.5 }").replace("after: 0.5..1.5", "after: { each: [0.6, 1.2] }"),
    );
    const { code, err } = await run("bake", place.throwFile, "-o", place.out);
    expect(code).toBe(1);
    expect(err).toContain(
      "lob_01 is left out: its one candidate does not hold the limits (broken: limits.speed in 1)\n",
    );
    expect(err).toContain("lob_02 is left out: ");
    const { clips } = JSON.parse(readFileSync(`${place.out}/takes.json`, "utf8"));
    expect(clips.map((clip: { throw: string }) => clip.throw)).toEqual(Array(6).fill("toss"));
  });
});
