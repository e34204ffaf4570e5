import { describe, expect, it } from "vitest";
import { runCases } from "./cases.js";
import { Chance } from "./chance.js";

// What is expected is what is put in: no outside source.

describe("running cases", () => {
  it("counts what comes of them, and tells of a fault by the case's number", async () => {
    const tally = await runCases(5, async (number) => {
      if (number === 3) throw new TypeError("of a fault");
      return number === 0 ? "refused" : "baked";
    });
    expect(tally.counts).toEqual({ refused: 1, baked: 3, "a fault": 1 });
    expect(tally.faults).toEqual([expect.stringMatching(/^case 3: TypeError: of a fault\n/)]);
  });

  it("tells of a case that takes too long of the processor, and not of one that waits", async () => {
    const busy = () => {
      const before = process.cpuUsage();
      while (process.cpuUsage(before).user < 200_000);
    };
    const tally = await runCases(
      2,
      async (number) => {
        if (number === 1) busy();
        else await new Promise((done) => setTimeout(done, 500));
        return "done";
      },
      0,
      0.12,
    );
    expect(tally.faults).toEqual([expect.stringMatching(/^case 1: took 0\.\d s$/)]);
  });
});

describe("chance", () => {
  it("is the same from the same seeds, and another from others", () => {
    const of = (...seeds: number[]) => {
      const chance = new Chance(...seeds);
      return Array.from({ length: 20 }, chance.part);
    };
    expect(of(1, 2)).toEqual(of(1, 2));
    expect(of(1, 3)).not.toEqual(of(1, 2));
    expect(of(2, 2)).not.toEqual(of(1, 2));
  });

  it("falls evenly", () => {
    const chance = new Chance(7);
    const counts = new Array<number>(10).fill(0);
    for (let i = 0; i < 10_000; i++) counts[chance.below(10)]++;
    // five standard deviations of a binomial count, √(10,000 · 0.1 · 0.9) = 30 (any handbook of statistics)
    for (const count of counts) expect(Math.abs(count - 1000)).toBeLessThan(150);
  });
});
