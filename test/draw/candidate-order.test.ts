import { describe, expect, it } from "vitest";
import { candidateOrder } from "../../src/draw/candidate-order.js";
import { drawDistance, type Features } from "../../src/draw/distance.js";
import { drawCandidate, drawThrow } from "../../src/draw/draw-throw.js";
import type { ThrowEntry } from "../../src/throwfile/types.js";
import { entry } from "./entry.js";

const spreads: Parameters<typeof entry>[0][] = [
  { arrive: { after: { range: [1, 2] } } },
  { arrive: { after: { range: [1, 2] }, at: [{ range: [-1, 1] }, 0, 0] } },
  { arrive: { after: { range: [1, 2] }, at: [{ range: [-1, 1] }, 0, { normal: [3, 0.2] }] } },
  {
    arrive: { after: { range: [1, 2] }, at: [{ range: [-1, 1] }, 0, { normal: [3, 0.2] }] },
    spin: { axis: "long", turns: { range: [1, 4] } },
  },
];
const order = (e: ThrowEntry, take: number, seed = "quay") => [
  ...candidateOrder(e, { seed, throwName: "lob", take }),
];
const first = (e: ThrowEntry, take: number, seed = "quay"): number => {
  for (const candidate of candidateOrder(e, { seed, throwName: "lob", take })) return candidate;
  throw new Error("no candidate");
};

describe("the order of a take's candidates", () => {
  const even = entry(spreads[1]);
  const chance = entry({ ...spreads[1], vary: "chance" });

  it("by chance is 1, 2, 3, … to 1,000", () => {
    expect(order(chance, 5)).toEqual(Array.from({ length: 1000 }, (_, i) => i + 1));
  });

  it("when even, ranks the first 32 and goes on with 33 to 1,000", () => {
    const all = order(even, 5);
    expect([...all.slice(0, 32)].sort((a, b) => a - b)).toEqual(Array.from({ length: 32 }, (_, i) => i + 1));
    expect(all.slice(32)).toEqual(Array.from({ length: 968 }, (_, i) => i + 33));
    expect(all.slice(0, 32)).not.toEqual(Array.from({ length: 32 }, (_, i) => i + 1));
  });

  it("prefers what lies furthest from the first choices of all earlier takes, worked out anew here", () => {
    const features = (take: number, candidate: number) =>
      drawCandidate(even, { seed: "quay", throwName: "lob", take, candidate }).features;
    const chosen = [features(1, 1)];
    for (let take = 2; take <= 20; take++) {
      const clearance = Array.from({ length: 32 }, (_, i) =>
        Math.min(...chosen.map((c) => drawDistance(c, features(take, i + 1)))),
      );
      const best = clearance.indexOf(Math.max(...clearance)) + 1;
      expect(first(even, take)).toBe(best);
      const ranks = order(even, take)
        .slice(0, 32)
        .map((candidate) => clearance[candidate - 1]);
      expect(ranks).toEqual([...ranks].sort((a, b) => b - a));
      chosen.push(features(take, best));
    }
  });

  it("does not hang on which takes were asked before, nor on how many are wanted", () => {
    const wanted = [19, 3, 7, 260, 300];
    const together = wanted.map((take) => first(even, take));
    const alone = wanted.map((take) => first(entry({ ...spreads[1], takes: [take] }), take));
    expect(alone).toEqual(together);
    expect(first(entry({ ...spreads[1], takes: 5000 }), 19)).toBe(together[0]);
  });

  it("starts a new block after 256 takes: the first of a block has its candidates in turn", () => {
    for (const take of [1, 257, 513]) expect(order(even, take).slice(0, 4)).toEqual([1, 2, 3, 4]);
    expect(order(even, 256).slice(0, 4)).not.toEqual([1, 2, 3, 4]);
  });

  it("is candidate 1 alone where nothing is left to chance", () => {
    expect(order(entry({ arc: { speed: { each: [3, 4] } } }), 2)).toEqual([1]);
    expect(order(entry({ vary: "chance" }), 2)).toEqual([1]);
  });
});

describe("even takes keep clear of one another", () => {
  const COUNTS = [8, 24, 64];
  const median = (values: number[]): number => [...values].sort((a, b) => a - b)[values.length >> 1];

  /** Smallest distance among the first 8, 24 and 64 takes. */
  function smallest(e: ThrowEntry, seed: string): number[] {
    const chosen: Features[] = [];
    let least = Number.POSITIVE_INFINITY;
    const found: number[] = [];
    for (let take = 1; take <= 64; take++) {
      const { features } = drawCandidate(e, {
        seed,
        throwName: "lob",
        take,
        candidate: first(e, take, seed),
      });
      for (const other of chosen) least = Math.min(least, drawDistance(features, other));
      chosen.push(features);
      if (COUNTS.includes(take)) found.push(least);
    }
    return found;
  }

  // the bar is the project's own, no outside source
  it.each([1, 2, 3, 4])(
    "%i spread(s): the two most alike of 8, 24 and 64 takes are over 1.5 times as far apart as by chance",
    (count) => {
      const seeds = Array.from({ length: 15 }, (_, i) => `seed ${i}`);
      const parts = spreads[count - 1];
      const even = seeds.map((seed) => smallest(entry(parts), seed));
      const chance = seeds.map((seed) => smallest(entry({ ...parts, vary: "chance" }), seed));
      COUNTS.forEach((_, i) => {
        expect(median(even.map((f) => f[i])) / median(chance.map((f) => f[i]))).toBeGreaterThan(1.5);
      });
    },
    60000,
  );

  it("of two words, the second take draws the other", () => {
    const e = entry({ arc: { branch: { pick: ["low", "high"] } } });
    const words = Array.from(
      { length: 2 },
      (_, i) =>
        drawThrow(e, { seed: "quay", throwName: "lob", take: i + 1, candidate: first(e, i + 1) }).arc.branch,
    );
    expect(new Set(words).size).toBe(2);
  });
});
