// @ts-expect-error it comes without types
import { validateBytes } from "gltf-validator";
import { describe, expect, it } from "vitest";
import { ThrowFileError } from "../../src/throwfile/errors.js";
import { baked, jsonOf } from "./baked.js";

/** A stick weighed down at one end, so that the model's origin is not its centre of mass. */
const text = (bake: string, takes = 2) => `
seed: styles
bake: ${bake}
props:
  stick:
    shape: { box: [0.04, 0.3, 0.05] }
    weights: [{ at: [0, 0.12, 0], mass: 0.5 }]
throws:
  lob:
    prop: stick
    takes: ${takes}
    release: { at: [0, 1.4, 0], scatter: 0..5 }
    arrive: { at: [2, 1, 0.4], after: 24f }
    spin: { axis: middle, turns: 1.5 }
`;

describe.each([
  "{ keys: cubic }",
  "{ keys: smallest }",
  "{ keys: frames }",
  "{ pack: int16 }",
  "{ keys: smallest, pack: int16 }",
  "{ keys: frames, pack: int16, layout: two-node }",
  "{ layout: two-node }",
  "{ keys: cubic, layout: two-node }",
])("bake: %s", (bake) => {
  it("writes clips that the validator finds nothing to say about, and what they take", async () => {
    const { glb, record } = await baked(text(bake));
    const report = await validateBytes(glb("lob"));
    expect(report.issues.messages.filter(({ severity }: { severity: number }) => severity <= 1)).toEqual([]);
    for (const clip of record.clips) {
      if (!bake.includes("frames")) expect(clip.error).toBeLessThanOrEqual(clip.tolerance);
      else expect(clip.keys).toEqual({ translation: 25, rotation: 25 });
      const json = jsonOf(glb("lob"));
      const { samplers } = json.animations.find(({ name }: { name: string }) => name === clip.name);
      // glTF 2.0, 3.11: a cubic spline has three values a key.
      const counts = samplers.map((s: { input: number; output: number; interpolation: string }) => [
        json.accessors[s.input].count,
        json.accessors[s.output].count / (s.interpolation === "CUBICSPLINE" ? 3 : 1),
      ]);
      expect(counts).toEqual([
        [clip.keys.translation, clip.keys.translation],
        [clip.keys.rotation, clip.keys.rotation],
      ]);
    }
  });
});

describe("two nodes", () => {
  it("are an outer one that moves, an inner one that turns, and a still one that holds the model", async () => {
    const { glb, bake } = await baked(text("{ keys: cubic, layout: two-node }"));
    const json = jsonOf(glb("lob"));
    const { prop } = bake.props.get("stick")!;
    const [outer] = json.scenes[json.scene].nodes;
    const [inner] = json.nodes[outer].children;
    const [still] = json.nodes[inner].children;
    expect(json.nodes[outer].name).toBe("stick");
    // As modelled, with several clips: the two translations undo each other.
    expect(json.nodes[outer].translation).toEqual([...prop.centerOfMass]);
    expect(json.nodes[still].translation).toEqual(prop.centerOfMass.map((c) => (c === 0 ? 0 : -c)));
    expect(json.nodes[inner].rotation).toBeUndefined();
    for (const { channels } of json.animations)
      expect(channels.map(({ target }: { target: object }) => target)).toEqual([
        { node: outer, path: "translation" },
        { node: inner, path: "rotation" },
      ]);
  });

  it("rest at the first key of a single clip", async () => {
    const { glb, record } = await baked(text("{ pack: int16, layout: two-node }", 1));
    const json = jsonOf(glb("lob"));
    const [outer] = json.scenes[json.scene].nodes;
    const inner = json.nodes[json.nodes[outer].children[0]];
    const { centerOfMass, rotation } = record.clips[0].release;
    centerOfMass.forEach((c, i) => {
      expect(json.nodes[outer].translation[i]).toBeCloseTo(c, 6);
    });
    const sign = Math.sign(rotation[3] * inner.rotation[3]);
    // 16 bits: half a step of 1/32767, and as much again for the length.
    rotation.forEach((c, i) => {
      expect(Math.abs(sign * inner.rotation[i] - c)).toBeLessThan(1 / 32767);
    });
  });

  it("are none over a node that is itself the prop", async () => {
    const model = `
props: { club: { model: club.glb, node: club } }
bake: { layout: two-node }
throws: { lob: { prop: club, arrive: { at: [2, 1, 0.4], after: 1 } } }
`;
    const { readFileSync } = await import("node:fs");
    const club = readFileSync(new URL("../data/props/club.glb", import.meta.url));
    const name = jsonOf(club).nodes[0].name;
    await expect(baked(model.replace("node: club", `node: ${name}`), { "club.glb": club })).rejects.toThrow(
      ThrowFileError,
    );
  });
});

it("frames of another rate, and int16 with cubic keys, are what they say", async () => {
  const { record } = await baked(
    text("{ keys: frames }").replace("seed: styles", "seed: styles\nframeRate: 60"),
  );
  expect(record.clips[0].keys).toEqual({ translation: 25, rotation: 25 });
  expect(record.clips[0].duration).toBeCloseTo(24 / 60, 12);
  await expect(baked(text("{ keys: cubic, pack: int16 }"))).rejects.toThrow(ThrowFileError);
});
