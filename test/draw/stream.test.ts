import { describe, expect, it } from "vitest";
import { type StreamName, stream } from "../../src/draw/stream.js";
import { CHI_SQUARE_16_CELLS, chanceCorrelation, chiSquare, correlation } from "./statistics.js";

const name: StreamName = {
  seed: "lantern-quay",
  throwName: "lob",
  take: 1,
  candidate: 1,
  path: ["arrive", "after"],
};
const first = (change: Partial<StreamName>): number => stream({ ...name, ...change })();
const N = 4000;
const series = (change: (i: number) => Partial<StreamName>): number[] =>
  Array.from({ length: N }, (_, i) => first(change(i)));

describe("streams", () => {
  it("give the same numbers for the same name", () => {
    const [a, b] = [stream(name), stream(name)];
    expect([a(), a(), a()]).toEqual([b(), b(), b()]);
  });

  it("do not change with a release: every baked throw hangs on them", () => {
    // pinned, no outside source: what this very definition gave first
    expect(first({})).toBe(0.045826542001160764);
  });

  it("are even from take to take, from candidate to candidate and along one stream", () => {
    const along = stream(name);
    expect(
      chiSquare(
        series((i) => ({ take: i + 1 })),
        16,
      ),
    ).toBeLessThan(CHI_SQUARE_16_CELLS);
    expect(
      chiSquare(
        series((i) => ({ candidate: i + 1 })),
        16,
      ),
    ).toBeLessThan(CHI_SQUARE_16_CELLS);
    expect(chiSquare(Array.from({ length: N }, along), 16)).toBeLessThan(CHI_SQUARE_16_CELLS);
  });

  it("of neighbouring names are not correlated", () => {
    const takes = series((i) => ({ take: i + 1 }));
    const others = [
      series((i) => ({ take: i + 2 })),
      series((i) => ({ take: i + 1, candidate: 2 })),
      series((i) => ({ take: i + 1, path: ["arrive", "at", 0] })),
      series((i) => ({ take: i + 1, throwName: "lop" })),
      series((i) => ({ take: i + 1, seed: "lantern-quaz" })),
      series((i) => ({ take: 1, candidate: i + 1 })),
    ];
    for (const other of others)
      expect(Math.abs(correlation(takes, other))).toBeLessThan(chanceCorrelation(N));
  });

  it("tell names apart that differ only in characters of one low byte, or in where a name ends", () => {
    // U+0161 and U+0261 share the low byte of "a", which is all the generator takes of a character
    const seeds = ["a", "\u0161", "\u0261", "\\u0161", "ａ", "🏮", "\ud83c"];
    expect(new Set(seeds.map((seed) => first({ seed }))).size).toBe(seeds.length);
    expect(first({ seed: "a", throwName: "bc" })).not.toBe(first({ seed: "ab", throwName: "c" }));
    expect(first({ take: 11, candidate: 1 })).not.toBe(first({ take: 1, candidate: 11 }));
    expect(first({ path: ["arc", "speed"] })).not.toBe(first({ path: ["arc.speed"] }));
  });

  it("tell long names apart that differ at the very end", () => {
    const long = "quay".repeat(200);
    expect(first({ seed: `${long}1` })).not.toBe(first({ seed: `${long}2` }));
  });
});
