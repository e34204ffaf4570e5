import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { type Cue, cuesOf, holdsOf, nextCue, placeCues } from "../../src/review/page/cues.js";
import { bakedPage } from "./page-fixture.js";

const data = await bakedPage();
const motionOf = (name: string) => data.throws.find((shown) => shown.name === name)!.takes[0].motion;

describe("the cues of a clip", () => {
  it("are release, apex, each whole turn and arrival in order of time", () => {
    const cues = cuesOf(motionOf("lob"));
    // asked for: two and a half turns, so two whole ones, over a mark 3 m off and nearly as high
    expect(cues.map(({ kind }) => kind).sort()).toEqual(["apex", "arrival", "release", "turn", "turn"]);
    const times = cues.map(({ time }) => time);
    expect(times).toEqual([...times].sort((a, b) => a - b));
    expect(cues[0].kind).toBe("release");
    expect(cues.at(-1)!.kind).toBe("arrival");
  });

  it("begin after the hold that the throw file asks for", () => {
    const motion = motionOf("lob");
    // 6 and 3 frames at 30 a second, as the throw file says
    expect(cuesOf(motion)[0].time).toBeCloseTo(0.2, 12);
    const [before, after] = holdsOf(motion);
    expect([before.from, before.to]).toEqual([0, expect.closeTo(0.2, 12)]);
    expect([after.to - after.from, after.to]).toEqual([expect.closeTo(0.1, 12), motion.duration]);
  });

  it("of a prop that is dropped have no apex and no hold", () => {
    expect(cuesOf(motionOf("drop")).map(({ kind }) => kind)).toEqual(["release", "arrival"]);
    expect(holdsOf(motionOf("drop"))).toEqual([]);
  });

  it("of a chain name its throws", () => {
    const texts = cuesOf(motionOf("pair")).map(({ text }) => text);
    expect(texts).toContain("release of lob");
    expect(texts).toContain("arrival of back");
    // the hold after the first throw parts the two
    expect(holdsOf(motionOf("pair"))).toHaveLength(2);
  });

  it("are gone along in both directions, and end at the ends", () => {
    const cues = cuesOf(motionOf("lob"));
    expect(nextCue(cues, 0, 1)).toBe(cues[0]);
    expect(nextCue(cues, cues[0].time, 1)).toBe(cues[1]);
    expect(nextCue(cues, cues[1].time, -1)).toBe(cues[0]);
    expect(nextCue(cues, cues.at(-1)!.time, 1)).toBeUndefined();
  });
});

describe("words along the time line", () => {
  const kinds = ["release", "apex", "turn", "arrival"] as const;
  const cue = fc.record({
    kind: fc.constantFrom(...kinds),
    time: fc.double({ min: 0, max: 1, noNaN: true }),
    short: fc.constantFrom("release", "apex", "12", "arrival 2"),
  });
  const widthOf = (text: string) => 7 * text.length;

  it("never cover each other and never stick out", () => {
    fc.assert(
      fc.property(fc.array(cue, { maxLength: 30 }), fc.integer({ min: 80, max: 900 }), (found, width) => {
        const cues: Cue[] = found.map((each) => ({ ...each, text: "" }));
        const placed = placeCues(cues, 1, width, widthOf);
        for (const a of placed) {
          expect(a.left).toBeGreaterThanOrEqual(0);
          expect(a.left + widthOf(a.cue.short)).toBeLessThanOrEqual(width);
          for (const b of placed)
            if (a !== b && a.row === b.row)
              expect(a.left >= b.left + widthOf(b.cue.short) || a.left + widthOf(a.cue.short) <= b.left).toBe(
                true,
              );
        }
      }),
    );
  });

  it("keep release and arrival where turns find no room", () => {
    const cues: Cue[] = [
      { kind: "release", time: 0, text: "", short: "release" },
      ...Array.from({ length: 40 }, (_, i): Cue => ({ kind: "turn", time: i / 40, text: "", short: `${i}` })),
      { kind: "arrival", time: 1, text: "", short: "arrival" },
    ];
    const placed = placeCues(cues, 1, 150, widthOf).map((each) => each.cue.kind);
    expect(placed).toContain("release");
    expect(placed).toContain("arrival");
    expect(placed.length).toBeLessThan(cues.length);
  });

  it("stand in the clip's start where it takes no time", () => {
    expect(placeCues([{ kind: "release", time: 0, text: "", short: "x" }], 0, 100, widthOf)[0].left).toBe(0);
  });
});
