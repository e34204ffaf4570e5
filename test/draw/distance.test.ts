import { describe, expect, it } from "vitest";
import { drawDistance, type Feature } from "../../src/draw/distance.js";

const of = (feature: Feature) => new Map([["key", feature]]);
const half = Math.SQRT1_2;

describe("the distance of draws", () => {
  it.each<[string, Feature, Feature, number]>([
    ["a number by its quantile", { kind: "quantile", value: 0.2 }, { kind: "quantile", value: 0.9 }, 0.7],
    ["the same word", { kind: "word", value: "low" }, { kind: "word", value: "low" }, 0],
    ["another word", { kind: "word", value: "low" }, { kind: "word", value: "high" }, 1],
    [
      "sides square to each other",
      { kind: "direction", value: [1, 0, 0] },
      { kind: "direction", value: [0, 1, 0] },
      0.5,
    ],
    ["opposite sides", { kind: "direction", value: [1, 0, 0] }, { kind: "direction", value: [-1, 0, 0] }, 1],
    [
      "sides across the start of the circle",
      { kind: "phase", value: 0.05 },
      { kind: "phase", value: 0.95 },
      0.2,
    ],
    [
      "a quarter turn",
      { kind: "orientation", value: [0, 0, 0, 1] },
      { kind: "orientation", value: [half, 0, 0, half] },
      0.5,
    ],
    [
      "q and −q",
      { kind: "orientation", value: [0, 0, 0, 1] },
      { kind: "orientation", value: [0, 0, 0, -1] },
      0,
    ],
  ])("%s", (_, a, b, expected) => {
    // by the definition in the throw file's grammar
    expect(drawDistance(of(a), of(b))).toBeCloseTo(expected, 14);
  });

  it("is Euclidean over all that was drawn for both", () => {
    const a = new Map<string, Feature>([
      ["x", { kind: "quantile", value: 0 }],
      ["y", { kind: "quantile", value: 0.1 }],
      ["z", { kind: "word", value: "q" }],
    ]);
    const b = new Map<string, Feature>([
      ["x", { kind: "quantile", value: 0.3 }],
      ["y", { kind: "quantile", value: 0.5 }],
    ]);
    expect(drawDistance(a, b)).toBeCloseTo(0.5, 14);
  });
});
