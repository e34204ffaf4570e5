// @ts-expect-error it comes without types
import { validateBytes } from "gltf-validator";
import { describe, expect, it } from "vitest";
import { angleBetween, type Quat } from "../../src/math/quat.js";
import { formatRecord } from "../../src/record/format.js";
import { parseRecord } from "../../src/record/parse.js";
import { babylon } from "../players/babylon.js";
import { three } from "../players/three.js";
import { baked, jsonOf } from "./baked.js";

const text = (keys: string, layout = "turn-only", takes = 2, more = "") => `
seed: turn-only
bake: { layout: ${layout} }
props:
  stick: { shape: { box: [0.04, 0.3, 0.05] }, weights: [{ at: [0, 0.12, 0], mass: 0.5 }] }
throws:
  turn:
    prop: stick
    takes: ${takes}
    release: { at: [1, 2, 3], facing: [[y, up], [x, [0, 0, 1]]], scatter: 0..5 }
${keys}
${more}
`;
const ALONE = `    arrive: { after: 0.7..0.9 }
    spin: { axis: x, turns: 1.5 }`;
const TO_MARK = `    arrive: { at: [3, 1, 0.4], after: 0.7..0.9, facing: [[y, ahead], [x, up]] }`;

describe("turn-only", () => {
  it("writes the rotation alone, about the centre of mass, which is where it is as modelled", async () => {
    const { glb, bake, record } = await baked(text(ALONE));
    const report = await validateBytes(glb("turn"));
    expect(report.issues.messages.filter(({ severity }: { severity: number }) => severity <= 1)).toEqual([]);
    const json = jsonOf(glb("turn"));
    for (const { channels } of json.animations)
      expect(channels.map(({ target }: { target: object }) => target)).toEqual([
        { node: json.scenes[0].nodes[0], path: "rotation" },
      ]);
    for (const { keys, error, tolerance } of record.clips) {
      expect(keys.translation).toBe(0);
      expect(error).toBeLessThanOrEqual(tolerance);
    }
    const { centerOfMass } = bake.props.get("stick")!.prop;
    for (const player of [three, babylon]) {
      const played = (await player.open(glb("turn"))).play("turn_01", "stick-centred");
      // float32 (IEEE 754) on a decimetre
      for (const t of [0, 0.2, 0.41, 0.66])
        played
          .seek(t)(centerOfMass)
          .forEach((c, i) => {
            expect(Math.abs(c - centerOfMass[i])).toBeLessThan(1e-7);
          });
      played.end();
    }
  });

  it("turns as the same throw does in flight", async () => {
    const [flown, turned] = [await baked(text(TO_MARK, "one-node")), await baked(text(TO_MARK))];
    flown.record.clips.forEach((clip, i) => {
      const { release, arrival, turns, share, apex, draws } = turned.record.clips[i];
      expect({ release, arrival, turns, share, apex, draws }).toEqual({
        release: clip.release,
        arrival: clip.arrival,
        turns: clip.turns,
        share: clip.share,
        apex: clip.apex,
        draws: clip.draws,
      });
    });
  });

  it("needs no more than its time: velocities and apex are then null, and the record is read back", async () => {
    const { record } = await baked(text(ALONE));
    for (const { release, arrival, apex, turns, miss } of record.clips) {
      expect([release.velocity, arrival.velocity, apex, miss.position]).toEqual([null, null, null, null]);
      expect(release.centerOfMass).toEqual(arrival.centerOfMass);
      expect(turns).toBeCloseTo(1.5, 1);
    }
    const written = formatRecord(record);
    expect(formatRecord(parseRecord("takes.json", written))).toBe(written);
  });

  it("solves the spin for an orientation at the end too, without a place", async () => {
    const facing = `    arrive: { after: 0.8, facing: { rotation: [0.5, 0.5, 0.5, 0.5] } }`;
    const { record } = await baked(text(facing));
    for (const { arrival, miss } of record.clips) {
      expect(angleBetween(arrival.rotation, [0.5, 0.5, 0.5, 0.5] as Quat)).toBeLessThan(1e-9);
      expect(miss.angle).toBeLessThan(1e-9);
    }
  });

  it("rests at its first key where it is alone", async () => {
    const json = jsonOf((await baked(text(ALONE, "turn-only", 1))).glb("turn"));
    const [root] = json.scenes[0].nodes;
    expect(json.nodes[root].name).toBe("stick");
    expect(json.nodes[root].rotation).toHaveLength(4);
  });

  it("holds and chains", async () => {
    const { record } = await baked(
      text(
        `${ALONE}\n    hold: { before: 3f }`,
        "turn-only",
        2,
        `  more: { like: turn }\nchains: { all: { throws: [turn, more] } }`,
      ),
    );
    const [clip] = record.clips.slice(4);
    expect(clip.name).toBe("all_01");
    expect(clip.apex).toBeNull();
    expect(angleBetween(clip.parts![0].arrival.rotation, clip.parts![1].release.rotation)).toBeLessThan(1e-9);
    expect(clip.keys.translation).toBe(0);
  });

  it.each([
    [
      `${ALONE}\n    limits: { maxHeight: 3 }`,
      /limits\.maxHeight: without a flight there is nothing to hold .*drop limits\.maxHeight, or say where it flies/,
    ],
    [`${ALONE}\n    limits: { clear: [{ box: [[0, 0, 0], [1, 1, 1]] }] }`, /limits\.clear: without a flight/],
    [`${ALONE}\n    gravity: free`, /gravity: without a flight there is none to solve/],
    [`    arrive: { floor: 0 }`, /nothing says where it flies; add arrive\.after/],
    [
      `    arrive: { after: 1, facing: [[y, flight]] }`,
      /facing\.0\.1: no such direction here \(found "flight"\)/,
    ],
    [
      `    arrive: { after: 1 }\n    spin: { axis: left, turns: 1 }`,
      /spin\.axis: no such direction here \(found "left"\)/,
    ],
  ])("refuses what needs a flight", async (keys, message) => {
    await expect(baked(text(keys))).rejects.toThrow(message);
  });
});
