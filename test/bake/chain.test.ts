// @ts-expect-error it comes without types
import { validateBytes } from "gltf-validator";
import { describe, expect, it } from "vitest";
import { bake } from "../../src/bake/bake.js";
import { angleBetween } from "../../src/math/quat.js";
import { distance } from "../../src/math/vec3.js";
import { formatRecord } from "../../src/record/format.js";
import { parseRecord } from "../../src/record/parse.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";
import { baked, clipsOf, jsonOf } from "./baked.js";

interface Options {
  bake?: string;
  loop?: boolean;
  takes?: number;
  /** Of the throws. */
  a?: string;
  b?: string;
  c?: string;
  top?: string;
  chains?: string;
}

/** Three hands in a triangle and a stick that is thicker at one end; the release points are off its centre of mass. */
const text = ({
  bake = "{}",
  loop = true,
  takes = 2,
  a = "",
  b = "",
  c = "",
  top = "",
  chains,
}: Options = {}) => `
seed: chains
bake: ${bake}
${top}
props:
  stick:
    shape: { box: [0.04, 0.3, 0.05] }
    weights: [{ at: [0, 0.12, 0], mass: 0.5 }]
    points: { grip: [0, -0.14, 0], head: [0, 0.14, 0] }
throws:
  a:
    prop: stick
    takes: ${takes}
    release: { at: [0, 1.2, 0], point: grip, facing: { rotation: [0.1, 0.2, 0.3, 0.9] } }
    arrive: { at: [2, 1.3, 1], point: head, after: 0.6..0.8, facing: [[y, up], [x, ahead]] }
    spin: { axis: x, turns: 1 }
    hold: { before: 3f, after: 2f }
    ${a}
  b:
    prop: stick
    takes: ${takes}
    release: { at: [9, 9, 9], point: head, facing: any, scatter: 0..90 }
    arrive: { at: [1, 1.1, 2.5], point: grip, after: 0.7..0.9 }
    spin: { axis: left, turns: 0.7 }
    hold: { before: 4f }
    ${b}
  c:
    prop: stick
    takes: ${takes}
    release: { point: grip }
    arrive: { at: [0, 1.2, 0], after: 25f, facing: { rotation: [0.1, 0.2, 0.3, 0.9] } }
    spin: { axis: z, turns: 1 }
    hold: { after: 5f }
    ${c}
chains:
  ${chains ?? `rally: { throws: [a, b, c], loop: ${loop} }`}
`;

const rally = async (options?: Options) => {
  const made = await baked(text(options));
  return { ...made, clips: made.record.clips.filter((clip) => clip.throw === "rally") };
};

describe("a chain", () => {
  it("is one clip a take in a file of its own, beside its throws", async () => {
    const { bake, record, glb } = await rally();
    expect(bake.files.map(({ name }) => name)).toEqual(["a.glb", "b.glb", "c.glb", "rally.glb"]);
    expect(record.clips.map(({ name }) => name)).toEqual([
      "a_01",
      "a_02",
      "b_01",
      "b_02",
      "c_01",
      "c_02",
      "rally_01",
      "rally_02",
    ]);
    expect(Object.keys(clipsOf(glb("rally")))).toEqual(["rally_01", "rally_02"]);
    const report = await validateBytes(glb("rally"));
    expect(report.issues.messages.filter(({ severity }: { severity: number }) => severity <= 1)).toEqual([]);
  });

  it("starts each throw where, and as, the one before arrived, to 1e-9 m and rad; holds lie between", async () => {
    const { clips, record } = await rally();
    for (const clip of clips) {
      const parts = clip.parts!;
      expect(parts.map((part) => part.throw)).toEqual(["a", "b", "c"]);
      for (let i = 1; i < parts.length; i++) {
        const [before, after] = [parts[i - 1].arrival, parts[i].release];
        expect(distance(before.centerOfMass, after.centerOfMass)).toBeLessThanOrEqual(1e-9);
        expect(angleBetween(before.rotation, after.rotation)).toBeLessThanOrEqual(1e-9);
      }
      const [a, b, c] = parts;
      // 3 frames; 2 and 4 frames; none; 5 frames, at 30 a second
      expect(a.start).toBeCloseTo(3 / 30, 12);
      expect(b.start - a.start - a.time).toBeCloseTo(6 / 30, 12);
      expect(c.start - b.start - b.time).toBeCloseTo(0, 12);
      expect(clip.duration).toBeCloseTo(c.start + c.time + 5 / 30, 12);
      expect(clip.turns).toBeCloseTo(a.turns + b.turns + c.turns, 12);
      expect(clip.error).toBeLessThanOrEqual(clip.tolerance);
      // the first is the throw's own; of the others the time that each drew
      const own = (name: string) => record.clips.find((other) => other.name === `${name}_0${clip.take}`)!;
      expect(a).toMatchObject({ time: own("a").flight!.time, release: own("a").release });
      expect(b.time).toBeCloseTo(own("b").flight!.time, 12);
      expect(clip.draws["b.arrive.after"]).toBe(own("b").draws["arrive.after"]);
      expect(Object.keys(clip.draws).filter((key) => key.startsWith("b.release"))).toEqual([]);
    }
  });

  it("ends as it starts, if it loops: the same key, q or −q", async () => {
    for (const bake of [
      "{}",
      "{ keys: cubic }",
      "{ keys: smallest }",
      "{ keys: frames, layout: two-node }",
    ]) {
      const { clips, glb } = await rally({ bake });
      for (const { name, release, arrival } of clips) {
        expect(distance(release.centerOfMass, arrival.centerOfMass)).toBeLessThanOrEqual(1e-9);
        expect(angleBetween(release.rotation, arrival.rotation)).toBeLessThanOrEqual(1e-9);
        const json = jsonOf(glb("rally"));
        const animation = json.animations.find((other: { name: string }) => other.name === name);
        const read = clipsOf(glb("rally"))[name];
        for (const [path, size] of [
          ["translation", 3],
          ["rotation", 4],
        ] as const) {
          const { values, times } = read[path] as { times: number[]; values: number[] };
          const channel = animation.channels.find(
            (other: { target: { path: string } }) => other.target.path === path,
          );
          const cubic = animation.samplers[channel.sampler].interpolation === "CUBICSPLINE";
          const key = (k: number) => {
            const at = size * (cubic ? 3 * k + 1 : k);
            return values.slice(at, at + size);
          };
          const first = key(0);
          const last = key(times.length - 1);
          const same = last.map((x, i) => x - first[i]);
          const opposite = path === "rotation" ? last.map((x, i) => x + first[i]) : same;
          expect([String(same.map(Math.abs)), String(opposite.map(Math.abs))]).toContain(
            String(Array(size).fill(0)),
          );
        }
      }
    }
  });

  it("that does not close says by how much, and what would", async () => {
    await expect(
      rally({ c: "arc: { branch: high }", chains: "rally: { throws: [a, b], loop: true }" }),
    ).rejects.toThrow(
      /chains\.rally\.loop: take 1 ends [\d.]+ m and [\d.]+° from where it starts \(found true\); b would need arrive\.at \[.*\] and arrive\.facing { rotation: \[.*\] }, or loop: false/,
    );
    // 1e-8 m is ten times too much
    const off = text().replace("at: [0, 1.2, 0], after: 25f", "at: [0, 1.20000001, 0], after: 25f");
    await expect(baked(off)).rejects.toThrow(/ends 1e-8 m from where/);
    expect((await rally({ chains: "rally: { throws: [a, b], loop: false }" })).clips).toHaveLength(2);
  });

  it("changes no byte of its throws' files, nor their records", async () => {
    const [with_, without] = [await baked(text()), await baked(text().replace(/chains:[\s\S]*$/, ""))];
    for (const name of ["a", "b", "c"]) expect(with_.glb(name)).toEqual(without.glb(name));
    expect(with_.record.clips.slice(0, 6)).toEqual(without.record.clips);
  });

  it("is left out where a limit fails in it alone; its throws are written", async () => {
    // from 9 m up as b's own release has it, it never comes under 1 m; from a's arrival it does
    const b = "limits: { maxHeight: 30, minHeight: 1.05 }";
    const { bake, clips, record } = await rally({ b });
    expect(record.clips).toHaveLength(6);
    expect(clips).toEqual([]);
    expect(bake.unheld.map(({ name, reason }) => `${name}: ${reason.message}`)).toEqual([
      "rally_01: thrown from where a arrives, b does not hold limits.minHeight",
      "rally_02: thrown from where a arrives, b does not hold limits.minHeight",
    ]);
  });

  it("is left out where one of its throws is", async () => {
    const { bake } = await rally({ takes: 1, b: "limits: { maxHeight: 1 }" });
    expect(bake.unheld.map(({ name }) => name)).toEqual(["b_01", "rally_01"]);
    expect(bake.unheld[1].reason.message).toBe("b_01, a part of it, is left out");
  });

  it("may be asked for alone", async () => {
    const file = parseThrowFile("test.throws.yaml", text());
    const source = async () => {
      throw new Error("no model is read");
    };
    const [all, alone] = [await bake(file, source), await bake(file, source, { only: ["rally"] })];
    expect(alone.files.map(({ name }) => name)).toEqual(["rally.glb"]);
    expect(alone.files[0].content).toEqual(all.files[3].content);
    await expect(bake(file, source, { only: ["raly"] })).rejects.toThrow(
      'there is no throw or chain "raly"; one of a, b, c, rally',
    );
    const second = await bake(file, source, { takes: [2, 2] });
    expect(second.chains[0].takes.map(({ name }) => name)).toEqual(["rally_02"]);
  });

  it("names the throw that has no flight from there", async () => {
    // 1 m/s over 3 m and 1.7 m up: b's own release is near enough
    const slow = text({ loop: false })
      .replace("at: [9, 9, 9]", "at: [1, 1.1, 2.4]")
      .replace("after: 0.7..0.9", "")
      .replace(
        "spin: { axis: left, turns: 0.7 }",
        "spin: { axis: left, rate: 0.1 }\n    arc: { speed: 1.5 }",
      );
    await expect(baked(slow)).rejects.toThrow(
      /throws\.b\.arc\.speed: in the chain rally, take 1, thrown from where a arrives: /,
    );
  });

  it("has a record that is read back as it was written", async () => {
    const { record } = await rally();
    const written = formatRecord(record);
    expect(formatRecord(parseRecord("takes.json", written))).toBe(written);
    const broken = JSON.parse(written);
    delete broken.clips[7].parts;
    expect(() => parseRecord("takes.json", JSON.stringify(broken))).toThrow(/clips\.7\.flight/);
  });
});
