import { describe, expect, it } from "vitest";
import { advance, stepFrame } from "../../src/review/page/clock.js";

describe("the clip's clock", () => {
  it("runs slower by the factor that is asked for", () => {
    expect(advance(0.2, 0.4, { slow: 8, loop: true, duration: 1 })).toEqual({
      time: expect.closeTo(0.25, 12),
      ended: false,
    });
  });

  it("starts anew in a loop, without losing what goes beyond the end", () => {
    expect(advance(0.9, 0.3, { slow: 1, loop: true, duration: 1 }).time).toBeCloseTo(0.2, 12);
    expect(advance(0.9, 5.3, { slow: 1, loop: true, duration: 1 }).time).toBeCloseTo(0.2, 12);
  });

  it("stops exactly at the end when played once", () => {
    expect(advance(0.9, 0.3, { slow: 1, loop: false, duration: 1 })).toEqual({ time: 1, ended: true });
  });

  it("stops at once in a clip that takes no time", () => {
    expect(advance(0, 0.1, { slow: 1, loop: true, duration: 0 })).toEqual({ time: 0, ended: true });
  });
});

describe("a step by frames", () => {
  it("goes from frame to frame, from between two to the next one", () => {
    expect(stepFrame(0.1, 1, 30, 1)).toBeCloseTo(4 / 30, 12);
    expect(stepFrame(0.1, -1, 30, 1)).toBeCloseTo(2 / 30, 12);
    expect(stepFrame(0.11, 1, 30, 1)).toBeCloseTo(4 / 30, 12);
    expect(stepFrame(0.11, -1, 30, 1)).toBeCloseTo(3 / 30, 12);
  });

  it("gets through a whole clip and back, though tenths and thirtieths are rounded", () => {
    let time = 0;
    for (let i = 0; i < 300; i++) time = stepFrame(time, 1, 30, 100);
    expect(time).toBeCloseTo(10, 9);
    for (let i = 0; i < 300; i++) time = stepFrame(time, -1, 30, 100);
    expect(time).toBe(0);
  });

  it("ends at the clip's end, which need be no frame", () => {
    expect(stepFrame(0.98, 1, 30, 0.99)).toBe(0.99);
    expect(stepFrame(0.99, -1, 30, 0.99)).toBeCloseTo(29 / 30, 12);
    expect(stepFrame(0.01, -1, 30, 0.99)).toBe(0);
  });
});
