// @ts-expect-error it comes without types
import { validateBytes } from "gltf-validator";
import { describe, expect, it } from "vitest";
import { angleBetween, IDENTITY } from "../../src/math/quat.js";
import { distance, length } from "../../src/math/vec3.js";
import { ThrowFileError } from "../../src/throwfile/errors.js";
import { tetrahedron } from "../gltf/models.js";
import { baked, clipsOf, jsonOf, type ReadClip } from "./baked.js";

const BASE = `
seed: quay
props:
  oar: { shape: { cylinder: { radius: 0.04, length: 1.2 } }, points: { grip: [0, 0.5, 0.04] } }
  pin: { shape: { box: [0.05, 0.1, 0.4] } }
throws:
  lob:
    prop: oar
    takes: TAKES
    release: { at: [0 ± 0.1, 1.2, 0], point: grip, facing: any, scatter: 0..9 }
    arrive: { at: [0, 1, 3..4], after: 0.8..1 }
    spin: { axis: any, turns: 1..2 }
`;
const withTakes = (takes: string, more = "") => baked(BASE.replace("TAKES", takes) + more);
const keys = ({ translation, rotation, extras }: ReadClip) => ({ translation, rotation, extras });

describe("what is asked for besides changes no take", () => {
  it("more takes leave the first as they were, keys, extras and records", async () => {
    const [few, many] = [await withTakes("3"), await withTakes("7")];
    expect(many.record.clips.map(({ take }) => take)).toEqual([1, 2, 3, 4, 5, 6, 7]);
    expect(many.record.clips.slice(0, 3)).toEqual(few.record.clips);
    const [before, after] = [clipsOf(few.glb("lob")), clipsOf(many.glb("lob"))];
    for (const name of Object.keys(before)) expect(keys(after[name])).toEqual(keys(before[name]));
    expect(Object.keys(before)).toEqual(["lob_01", "lob_02", "lob_03"]);
  });

  it("a list of takes selects: each is what it is among all, but for the earlier one most like it", async () => {
    const [all, some] = [await withTakes("12"), await withTakes("[3, 7, 12]")];
    expect(some.record.clips.map(({ name }) => name)).toEqual(["lob_03", "lob_07", "lob_12"]);
    for (const clip of some.record.clips) {
      const same = all.record.clips.find(({ name }) => name === clip.name)!;
      expect({ ...clip, nearest: null }).toEqual({ ...same, nearest: null });
      expect(keys(clipsOf(some.glb("lob"))[clip.name])).toEqual(keys(clipsOf(all.glb("lob"))[clip.name]));
    }
    expect(some.record.clips[0].nearest).toBeNull();
    expect(some.record.clips[1].nearest!.take).toBe(3);
  });

  it("another throw leaves this one's file as it was, byte for byte", async () => {
    const more = "  toss: { like: lob, prop: pin, release: { point: null } }\n";
    const [alone, beside] = [await withTakes("3"), await withTakes("3", more)];
    expect(beside.glb("lob")).toEqual(alone.glb("lob"));
    expect(beside.record.clips.slice(0, 3)).toEqual(alone.record.clips);
    expect(beside.record.clips.length).toBe(6);
    expect(Object.keys(beside.record.props)).toEqual(["oar", "pin"]);
  });

  it("takes differ from each other", async () => {
    const { record } = await withTakes("7");
    expect(new Set(record.clips.map(({ release }) => JSON.stringify(release))).size).toBe(7);
    for (const { nearest } of record.clips.slice(1)) expect(nearest!.distance).toBeGreaterThan(0.01);
  });
});

const plain = (takes: number, prop = "") => `
props: { pin: { shape: { cone: { radius: 0.1, length: 0.4 } }, points: { tip: [0, 0.2, 0] }${prop} } }
throws:
  lob:
    prop: pin
    takes: ${takes}
    release: { facing: [[y, ahead]] }
    arrive: { at: [0.3, 1, 2], after: 1 }
    spin: { axis: right, turns: 2 }
`;

describe("the animated node", () => {
  it("rests at the first key where its file holds one clip", async () => {
    const { glb } = await baked(plain(1));
    const { nodes, scenes } = jsonOf(glb("lob"));
    const root = nodes[scenes[0].nodes[0]];
    const { translation, rotation } = clipsOf(glb("lob")).lob_01 as unknown as Record<
      string,
      { values: number[] }
    >;
    expect(root.name).toBe("pin");
    expect(root.translation.map(Math.fround)).toEqual(translation.values.slice(0, 3));
    expect(root.rotation.map(Math.fround)).toEqual(rotation.values.slice(0, 4));
    expect(angleBetween(root.rotation, IDENTITY)).toBeGreaterThan(1);
  });

  it("rests as modelled where it holds several", async () => {
    const { glb } = await baked(plain(2));
    const { nodes, scenes } = jsonOf(glb("lob"));
    const root = nodes[scenes[0].nodes[0]];
    expect(Object.keys(root).sort()).toEqual(["children", "name"]);
  });

  it("carries the prop's scale, and moves in metres all the same", async () => {
    const metres = await baked(plain(1));
    const half = plain(1, ", scale: 0.5").replace("radius: 0.1, length: 0.4", "radius: 0.2, length: 0.8");
    const scaled = await baked(half);
    const root = jsonOf(scaled.glb("lob")).nodes.at(-1);
    expect(root.scale).toEqual([0.5, 0.5, 0.5]);
    expect(jsonOf(metres.glb("lob")).nodes.at(-1).scale).toBeUndefined();
    // twice the shape at half the scale is the same prop
    const [a, b] = [metres.record.clips[0], scaled.record.clips[0]];
    expect(distance(a.release.centerOfMass, b.release.centerOfMass)).toBeLessThan(1e-12);
    expect(b.keys).toEqual(a.keys);
    expect(scaled.record.props.pin.mass).toBeCloseTo(metres.record.props.pin.mass, 10);
  });
});

describe("a release without a place", () => {
  it("is where the model stands: the node does not move from there when it is not turned either", async () => {
    const { glb, record } = await baked(plain(1).replace("release: { facing: [[y, ahead]] }", "release: {}"));
    const { translation } = clipsOf(glb("lob")).lob_01 as unknown as Record<string, { values: number[] }>;
    expect(length(translation.values.slice(0, 3) as [number, number, number])).toBeLessThan(1e-7);
    // a cone's centre of mass lies a quarter of its height above the base (any handbook of solids), which is at -0.2 here
    expect(record.clips[0].release.centerOfMass[1]).toBeCloseTo(-0.1, 3);
  });

  it("holds the release point where it is modelled, however the prop is turned about it", async () => {
    const { glb } = await baked(plain(1).replace("release: {", "release: { point: tip,"));
    const { nodes, scenes } = jsonOf(glb("lob"));
    const { translation, rotation } = nodes[scenes[0].nodes[0]];
    // y lies ahead, along [0.3, 0, 2], so that the tip is the node's place and 0.2 m along it
    const off = Math.hypot(0.3, 2);
    const tip = [translation[0] + (0.2 * 0.3) / off, translation[1], translation[2] + (0.2 * 2) / off];
    expect(distance(tip as [number, number, number], [0, 0.2, 0])).toBeLessThan(1e-6);
    expect(rotation).toBeDefined();
  });
});

describe("a clip's extras", () => {
  it("have a cue at the apex and at each whole turn the body has made, the last one too", async () => {
    const { glb, bake } = await baked(plain(1));
    const { extras } = clipsOf(glb("lob")).lob_01;
    const { flight } = bake.throws[0].takes[0].take;
    // v/g with v = g T/2 + rise/T: the parabola through both ends; the mark is the cone's centre, which starts at -0.1
    expect(extras.cues.apex).toBeCloseTo(flight.velocity(0)[1] / 9.80665, 9);
    expect(extras.cues.turns).toEqual([0.5, 1]);
    // right is square to the cone's axis, a principal axis: a clean spin, which has the same pose after each whole turn
    for (const t of extras.cues.turns)
      expect(angleBetween(flight.orientation(t), flight.orientation(0))).toBeLessThan(1e-12);
  });

  it.each([1, 2, 3, 5, 6, 7, 9, 10])("count %i turns where so many were asked for", async (turns) => {
    for (const after of [0.6, 0.7, 0.9, 1.1]) {
      const text = plain(1).replace("turns: 2", `turns: ${turns}`).replace("after: 1", `after: ${after}`);
      const { cues } = clipsOf((await baked(text)).glb("lob")).lob_01.extras;
      expect(cues.turns.length).toBe(turns);
      expect(cues.turns.at(-1)).toBeLessThanOrEqual(after);
    }
  });

  it("have no turn for a body that makes none", async () => {
    const { glb } = await baked(plain(1).replace("spin: { axis: right, turns: 2 }", ""));
    expect(clipsOf(glb("lob")).lob_01.extras.cues.turns).toEqual([]);
    const half = await baked(plain(1).replace("turns: 2", "turns: -0.999"));
    expect(clipsOf(half.glb("lob")).lob_01.extras.cues.turns).toEqual([]);
  });

  it("say which throw and take it is, what was drawn, and how it starts and ends, as the record does", async () => {
    const { glb, record } = await withTakes("2");
    const { extras } = clipsOf(glb("lob")).lob_02;
    const clip = record.clips[1];
    expect(extras).toMatchObject({ throw: "lob", take: 2 });
    expect(Object.keys(extras.draws)).toEqual(Object.keys(clip.draws));
    expect(extras.release.velocity[2]).toBeCloseTo(clip.release.velocity[2], 10);
    expect(extras.arrival.angularVelocity[0]).toBeCloseTo(clip.arrival.angularVelocity[0], 10);
  });
});

describe("a file of takes", () => {
  it("of a shape is a whole glTF with a mesh, without a fault", async () => {
    const { glb, record } = await withTakes("2");
    const report = await validateBytes(glb("lob"), { maxIssues: 0 });
    expect([report.issues.numErrors, report.issues.numWarnings]).toEqual([0, 0]);
    expect(report.info.totalTriangleCount).toBeGreaterThan(10);
    expect(record.props.oar.source).toBe('{"cylinder":{"radius":0.04,"length":1.2}}');
    // m = ρ π r² l with water's density, which is the default
    expect(record.props.oar.mass).toBeCloseTo(1000 * Math.PI * 0.04 * 0.04 * 1.2, 2);
  });

  it("names clips with two digits, or as many as the number has", async () => {
    const { record } = await withTakes("[9, 10, 123]");
    expect(record.clips.map(({ name }) => name)).toEqual(["lob_09", "lob_10", "lob_123"]);
  });

  it("of a model has its scene under a new node", async () => {
    const text = `
props: { solid: { model: t.glb } }
throws: { lob: { prop: solid, arrive: { at: [0, 1, 2], after: 1 } } }
`;
    const json = jsonOf((await baked(text, { "t.glb": tetrahedron() })).glb("lob"));
    expect(json.scenes[0].nodes).toEqual([1]);
    expect(json.nodes[1]).toMatchObject({ name: "solid", children: [0] });
    expect(json.animations[0].channels.map(({ target }: { target: object }) => target)).toEqual([
      { node: 1, path: "translation" },
      { node: 1, path: "rotation" },
    ]);
  });
});

describe("a throw that cannot be", () => {
  const faultOf = async (text: string): Promise<string> => {
    try {
      await baked(text);
    } catch (error) {
      if (error instanceof ThrowFileError) return error.message;
      throw error;
    }
    throw new Error("was baked");
  };

  it("is told with its line, column and key", async () => {
    const text = plain(1).replace(", after: 1", "").replace("spin:", "arc: { speed: 1 }\n    spin:");
    // the line and column of the key; √(g (rise + √(rise² + way²))) is the least speed (projectile motion, any textbook), the rise 1.1 m
    expect(await faultOf(text)).toMatch(
      /^test\.throws\.yaml:9:12 throws\.lob\.arc\.speed: .* 1 m\/s .*; needs at least 5\.777 m\/s$/,
    );
  });

  it("says how many draws were tried where none has a flight", async () => {
    const text = plain(1).replace(", after: 1", "").replace("spin:", "arc: { speed: 1..1.1 }\n    spin:");
    expect(await faultOf(text)).toMatch(/throws\.lob\.arc\.speed: take 1: none of 1000 draws has a flight/);
  });

  it("does not count draws where all run into the same", async () => {
    // the wobble is left open here, and has no bearing on the arc
    const text = plain(1)
      .replace(", after: 1", "")
      .replace(/spin: .*/, "arc: { speed: 1 }\n    spin: { axis: x, turns: 1, wobble: 1..2 }");
    expect(await faultOf(text)).toMatch(/arc\.speed: a launch at 1 m\/s/);
  });

  it("names the word that has no meaning in it", async () => {
    const text = plain(1).replace("[0.3, 1, 2]", "[0, 1, 0]");
    expect(await faultOf(text)).toMatch(/throws\.lob\.release\.facing.*"ahead" has no meaning/);
  });
});
