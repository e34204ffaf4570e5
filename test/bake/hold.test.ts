import { describe, expect, it } from "vitest";
import type { ClipRecord } from "../../src/record/clip-record.js";
import { baked, clipsOf } from "./baked.js";

const text = (hold: string, bake = "{}") => `
seed: hold
bake: ${bake}
props: { stick: { shape: { box: [0.04, 0.3, 0.05] }, weights: [{ at: [0, 0.12, 0], mass: 0.5 }] } }
throws:
  lob:
    prop: stick
    takes: 4
    release: { at: [0, 1.4, 0], scatter: 0..5 }
    arrive: { at: [2, 1, 0.4], after: 24f }
    spin: { axis: middle, turns: 2.5 }
    hold: ${hold}
`;

describe("a hold", () => {
  it("leaves the flight as it is and moves its times: 14 and 6 frames at 30 a second", async () => {
    const [free, held] = [await baked(text("{}")), await baked(text("{ before: 14f, after: 6f }"))];
    held.record.clips.forEach((clip, i) => {
      const { apex, ...other } = free.record.clips[i];
      expect(clip.flight).toEqual({ start: 14 / 30, time: other.flight!.time });
      // 14 + 24 + 6 frames
      expect(clip.duration).toBeCloseTo(44 / 30, 12);
      expect(clip.apex).toEqual({ time: 14 / 30 + apex.time, rise: apex.rise });
      expect(clip).toMatchObject({ release: other.release, arrival: other.arrival, turns: other.turns });
      expect(clip.error).toBeLessThanOrEqual(clip.tolerance);
    });
  });

  it("moves the cues with it", async () => {
    const [free, held] = await Promise.all(
      ["{}", "{ before: 14f, after: 6f }"].map(
        async (hold) => clipsOf((await baked(text(hold))).glb("lob")).lob_02,
      ),
    );
    const { apex, turns } = free.extras.cues;
    expect(held.extras.cues.apex).toBeCloseTo(14 / 30 + apex, 11);
    expect(turns).toHaveLength(2);
    turns.forEach((turn: number, i: number) => {
      expect(held.extras.cues.turns[i]).toBeCloseTo(14 / 30 + turn, 11);
    });
    expect(held.extras.flight).toEqual({ start: 0.466666666667, time: 0.8 });
    expect((held.rotation as { times: number[] }).times.at(-1)).toBe(Math.fround(44 / 30));
  });

  it("may be drawn: whole frames here, which are in the record", async () => {
    const { record } = await baked(text("{ before: 1..9, after: 3f..8f }"));
    for (const { draws, flight, duration } of record.clips as Required<ClipRecord>[]) {
      expect(flight.start).toBe(draws["hold.before"]);
      const frames = 30 * (draws["hold.after"] as number);
      expect(Math.abs(frames - Math.round(frames))).toBeLessThan(1e-9);
      expect(duration).toBeCloseTo(flight.start + flight.time + frames / 30, 12);
    }
    expect(new Set(record.clips.map(({ flight }) => flight!.start)).size).toBe(4);
  });
});
