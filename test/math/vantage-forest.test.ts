import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { vantageForest } from "../../src/math/vantage-forest.js";

// What is expected is what looking at each item finds.

type Point = readonly [number, number];
// whole numbers, so that many items are at one distance or in one place
const points = fc.array(fc.tuple(fc.integer({ min: 0, max: 40 }), fc.integer({ min: 0, max: 40 })), {
  minLength: 1,
  maxLength: 300,
});
/** The greatest of the differences: a metric. */
const apart = ([a, b]: Point, [c, d]: Point) => Math.max(Math.abs(a - c), Math.abs(b - d));

const forestOf = (items: readonly Point[]) => {
  const forest = vantageForest((a, b) => apart(items[a], items[b]));
  for (const i of items.keys()) forest.add(i);
  return forest;
};

describe("items in a vantage forest", () => {
  it("are all found that are within a distance, each once, with its distance", () => {
    fc.assert(
      fc.property(points, fc.tuple(fc.nat(40), fc.nat(40)), fc.nat(20), (items, from, within) => {
        const found: [number, number][] = [];
        forestOf(items).search(
          (item) => apart(items[item], from),
          within,
          (item, distance) => {
            found.push([item, distance]);
            return within;
          },
        );
        const each = items.map((item, i) => [i, apart(item, from)]).filter(([, d]) => d <= within);
        expect(found.sort(([a], [b]) => a - b)).toEqual(each);
      }),
    );
  });

  it("lead to the nearest, while more are added", () => {
    fc.assert(
      fc.property(points, (items) => {
        const forest = vantageForest((a, b) => apart(items[a], items[b]));
        for (const [i, item] of items.entries()) {
          let nearest = Number.POSITIVE_INFINITY;
          forest.search(
            (other) => apart(items[other], item),
            Number.POSITIVE_INFINITY,
            (_, distance) => {
              nearest = distance;
              return distance;
            },
          );
          expect(nearest).toBe(Math.min(...items.slice(0, i).map((other) => apart(other, item))));
          forest.add(i);
        }
      }),
    );
  });

  it("are mostly not looked at when the nearest of many is wanted", () => {
    const items = Array.from({ length: 4096 }, (_, i): Point => [(i * 1103) % 4096, (i * 2531) % 4096]);
    let looks = 0;
    forestOf(items).search(
      (item) => {
        looks++;
        return apart(items[item], [2000.5, 2000.5]);
      },
      Number.POSITIVE_INFINITY,
      (_, distance) => distance,
    );
    // logarithms of 4096 items, not half of them; how many exactly is no matter
    expect(looks).toBeLessThan(400);
  });
});
