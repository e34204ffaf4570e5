import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { thinning } from "../../src/review/exposures.js";
import { type Label, placeLabels } from "../../src/review/place-labels.js";
import { textWidth } from "../../src/review/text-size.js";

const FRAME = { left: 0, top: 0, right: 400, bottom: 300 };

describe("labels", () => {
  test("never overlap, and stay within the frame, however crowded", () => {
    const label = fc.record({
      text: fc.string({ minLength: 1, maxLength: 12, unit: fc.constantFrom(..."abcdefgh 0123") }),
      x: fc.double({ min: 0, max: 400, noNaN: true }),
      y: fc.double({ min: 0, max: 300, noNaN: true }),
      isNeeded: fc.boolean(),
    });
    fc.assert(
      fc.property(fc.array(label, { maxLength: 30 }), (asked) => {
        const labels = asked.map((one): Label => ({ ...one, kind: "label", size: 11, gap: 4 }));
        const boxes = placeLabels(labels, FRAME, []).map(({ text, at, baseline, anchor }) => {
          const width = textWidth(text, 11);
          const left = anchor === "start" ? at : anchor === "end" ? at - width : at - width / 2;
          return { left, right: left + width, top: baseline - 9, bottom: baseline };
        });
        for (const [i, a] of boxes.entries()) {
          expect(a.left).toBeGreaterThanOrEqual(-1e-9);
          expect(a.right).toBeLessThanOrEqual(400 + 1e-9);
          for (const b of boxes.slice(i + 1))
            expect(a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom).toBe(false);
        }
      }),
    );
  });

  test("one that is needed finds room further off, with a line that leads to it", () => {
    const crowd = Array.from(
      { length: 30 },
      (): Label => ({ text: "there", kind: "label", size: 11, x: 200, y: 150, gap: 4, isNeeded: true }),
    );
    const placed = placeLabels(crowd, FRAME, []);
    expect(placed).toHaveLength(30);
    expect(placed.some(({ lead }) => lead !== undefined)).toBe(true);
  });
});

describe("thinning", () => {
  const row = (count: number, step: number) =>
    Array.from({ length: count + 1 }, (_, i) => [i * step, 0, 0] as const);

  test("leaves as many exposures as keep their distance, the first and the last among them", () => {
    expect(thinning(row(12, 1), 1)).toEqual({ every: 1, crowded: false });
    expect(thinning(row(12, 1), 1.5)).toEqual({ every: 2, crowded: false });
    expect(thinning(row(12, 1), 3.5)).toEqual({ every: 4, crowded: false });
  });

  test("says where even the fewest lie over each other", () => {
    expect(thinning(row(12, 1), 100)).toEqual({ every: 4, crowded: true });
  });
});
