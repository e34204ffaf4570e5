// @ts-expect-error it comes without types
import { validateBytes } from "gltf-validator";
import { describe, expect, it } from "vitest";
import { modelRotation } from "../../src/bake/motion.js";
import { rotate } from "../../src/math/quat.js";
import { add, distance, subtract, type Vec3 } from "../../src/math/vec3.js";
import { babylon } from "./babylon.js";
import { bakeDemo } from "./demo.js";
import { outerPoints } from "./outer-points.js";
import { STEP } from "./player.js";
import { three } from "./three.js";

const demo = await bakeDemo();

/** Off any grid of keys or frames: multiples of the golden ratio, mod 1 (Weyl's equidistribution). */
const moments = Array.from({ length: 40 }, (_, i) => ((i + 0.5) * 0.6180339887498949) % 1);

describe("the validator", () => {
  it.each(demo.files.map((file) => [file.name, file.content] as const))(
    "finds nothing to say about %s",
    async (_, glb) => {
      const report = await validateBytes(new Uint8Array(glb));
      expect(report.issues.messages.filter(({ severity }: { severity: number }) => severity <= 1)).toEqual(
        [],
      );
    },
  );
});

describe.each([three, babylon])("$name", (player) => {
  it.each(demo.files.map((file) => [file.name.replace(".glb", ""), file.content] as const))(
    "shows every take of %s within its stated error of the true flight",
    async (throwName, glb) => {
      const clips = demo.record.clips.filter((clip) => clip.throw === throwName);
      const { prop } = demo.props.get(clips[0].prop)!;
      const points = outerPoints(prop.extremes);
      const opened = await player.open(glb);
      for (const record of clips) {
        const momentAt = demo.moments.get(record.name)!;
        const played = opened.play(record.name);
        let greatest = 0;
        let excess = Number.NEGATIVE_INFINITY;
        for (const moment of moments) {
          const t = moment * Math.fround(record.duration) * (1 - 2 ** -20);
          const shown = played.seek(t);
          const { flight, time } = momentAt(t);
          for (const point of points) {
            const arm = rotate(modelRotation(flight, prop, time), subtract(point, prop.centerOfMass));
            const place = add(flight.centerOfMass(time), arm);
            greatest = Math.max(greatest, ...place.map(Math.abs));
            excess = Math.max(excess, distance(shown(point), place) - record.error);
          }
        }
        played.end();
        // a player computes in float32: 2⁻²³ of the greatest coordinate (IEEE 754)
        expect(excess, record.name).toBeLessThanOrEqual(2 ** -23 * greatest);
      }
    },
  );

  it("stands still through a hold, and is at the true poses at its ends", async () => {
    const opened = await player.open(demo.files.find(({ name }) => name === "crate-cued.glb")!.content);
    const { prop } = demo.props.get("tea-crate")!;
    const [point] = outerPoints(prop.extremes);
    for (const { name, duration, flight } of demo.record.clips.filter(
      (clip) => clip.throw === "crate-cued",
    )) {
      const played = opened.play(name, undefined, false);
      const shown = (t: number) => played.seek(t)(point);
      const { start, time } = flight!;
      const truth = (at: number) => {
        const { flight: true_ } = demo.moments.get(name)!(start + at);
        const arm = rotate(modelRotation(true_, prop, at), subtract(point, prop.centerOfMass));
        return add(true_.centerOfMass(at), arm);
      };
      // 14 frames before, 6 after, at 30 a second
      expect(start).toBe(14 / 30);
      expect(duration - start - time).toBeCloseTo(6 / 30, 12);
      const [first, last] = [shown(0), shown(duration * (1 - 2 ** -20))];
      for (const share of [0.25, 0.5, 0.999]) {
        // still to the last digit of a player's float32 (IEEE 754)
        expect(distance(shown(start * share), first)).toBeLessThan(1e-6);
        expect(distance(shown(start + time + 1e-6 + share * 0.19), last)).toBeLessThan(1e-6);
      }
      expect(distance(first, truth(0))).toBeLessThan(2e-6);
      expect(distance(last, truth(time))).toBeLessThan(2e-6);
      played.end();
    }
  });

  it("shows a loop twice in a row without a jump above the tolerance", async () => {
    const { content } = demo.files.find(({ name }) => name === "spike-round.glb")!;
    const opened = await player.open(content);
    const { prop } = demo.props.get("marlinspike")!;
    const points = outerPoints(prop.extremes);
    for (const { name, duration, tolerance, parts } of demo.record.clips.filter(
      (clip) => clip.throw === "spike-round",
    )) {
      expect(parts).toHaveLength(3);
      const played = opened.play(name);
      let before: Vec3[] | undefined;
      let jump = 0;
      let furthest = 0;
      const rounds = [0, 0, 0];
      for (let step = 1; step * STEP < 2.2 * duration; step++) {
        const shown = played.run();
        const now = points.map((point) => shown(point));
        const moved = before ? Math.max(...now.map((place, i) => distance(place, before![i]))) : 0;
        // It stands still for 3 frames or more before the end and 4 after the start, at 30 a second: whatever moves there is a jump.
        const fromEnd = step * STEP - duration * Math.round((step * STEP) / duration);
        if (Math.abs(fromEnd) < 0.06) jump = Math.max(jump, moved);
        else furthest = Math.max(furthest, moved);
        rounds[Math.floor((step * STEP) / duration)] += moved;
        before = now;
      }
      expect(jump, name).toBeLessThan(tolerance);
      // a pass is over 2 m in under a second, at 60 frames a second
      expect(furthest, name).toBeGreaterThan(0.04);
      expect(furthest, name).toBeLessThan(0.5);
      // both rounds go the same way, sampled at other moments
      expect(Math.abs(rounds[1] / rounds[0] - 1), name).toBeLessThan(0.02);
      played.end();
    }
  });
});
