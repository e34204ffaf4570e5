import seedrandom from "seedrandom";
import { describe, expect, it } from "vitest";
import { type Arc, type ArcRequest, arcPosition, solveArc } from "../../src/flight/arc.js";
import { endArc } from "../../src/flight/arc-end.js";
import {
  addScaled,
  cross,
  distance,
  dot,
  length,
  normalize,
  scale,
  subtract,
  type Vec3,
} from "../../src/math/vec3.js";

/** Any arc gives back itself when it is asked for by conditions read off it: no outside numbers, the arc is its own reference. */

interface Sample {
  from: Vec3;
  velocity: Vec3;
  up: Vec3;
  strength: number;
  duration: number;
  share: number;
}

/** Arcs of everyday throws that go some way ahead, so that heading and elevation mean something. */
function samples(count: number, tilted: boolean, wanted: (s: Sample) => boolean = () => true): Sample[] {
  const random = seedrandom("round trip");
  const number = (min: number, max: number) => min + (max - min) * random();
  const vector = (size: number): Vec3 => [number(-size, size), number(-size, size), number(-size, size)];
  const found: Sample[] = [];
  while (found.length < count) {
    const s: Sample = {
      from: vector(5),
      velocity: vector(12),
      up: tilted ? normalize(vector(1)) : [0, 1, 0],
      strength: number(0.5, 25),
      duration: number(0.1, 2.5),
      share: number(0.1, 0.9),
    };
    if (length(addScaled(s.velocity, s.up, -dot(s.velocity, s.up))) > 0.5 && wanted(s)) found.push(s);
  }
  return found;
}

/** Everything that can be said of a sample, by the definitions of the conditions, with the standard library's own functions. */
function conditionsOf(s: Sample) {
  const gravity = scale(s.up, -s.strength);
  const climb = dot(s.velocity, s.up);
  const speed = length(s.velocity);
  const level = subtract(s.velocity, scale(s.up, climb));
  const place = (t: number): Vec3 => addScaled(addScaled(s.from, s.velocity, t), gravity, (t * t) / 2);
  const topTime = Math.min(s.duration, Math.max(0, climb / s.strength));
  return {
    gravity,
    to: place(s.duration),
    after: s.duration,
    apex: climb * topTime - (s.strength * topTime * topTime) / 2,
    topWithin: climb > 0.05 && climb / s.strength < s.duration * 0.999,
    // beside the arc, at the height it has when it is abreast: any point of the level line across the flight
    through: addScaled(place(s.duration * s.share), cross(s.up, normalize(level)), 1.7),
    speed,
    elevation: (Math.atan2(climb, length(level)) * 180) / Math.PI,
    heading: (Math.atan2(level[0], level[2]) * 180) / Math.PI,
    velocity: s.velocity,
  };
}
type Key = "to" | "after" | "apex" | "through" | "speed" | "elevation" | "heading" | "velocity";

/** How far the nearer of the two branches is from the sample, relative. */
function miss(s: Sample, request: Omit<ArcRequest, "branch">): number {
  const off = (arc: Arc): number =>
    Math.max(
      distance(arc.velocity, s.velocity) / length(s.velocity),
      request.openEnd ? 0 : Math.abs(arc.duration / s.duration - 1),
      Math.abs(length(arc.gravity) / s.strength - 1),
    );
  const tried = (["low", "high"] as const).map((branch) => off(solveArc({ ...request, branch })));
  return Math.min(...tried);
}

/**
 * Rounding of a condition grows without bound where two solutions meet (an arc at the least speed, a point at the top), as its square root at
 * the worst: nine of ten random arcs have to come back to 1e-12, all to 1e-7.
 */
function expectBack(keys: Key[], free: boolean, arcs: Sample[], openEnd?: true): void {
  const misses = arcs.map((s) => {
    const c = conditionsOf(s);
    const gravity = free ? { free: s.up } : c.gravity;
    return miss(s, {
      from: s.from,
      gravity,
      ...Object.fromEntries(keys.map((key) => [key, c[key]])),
      openEnd,
    });
  });
  misses.sort((a, b) => a - b);
  expect(misses[Math.floor(misses.length * 0.9)]).toBeLessThan(1e-12);
  expect(misses[misses.length - 1]).toBeLessThan(1e-7);
}

const topWithin = (s: Sample): boolean => conditionsOf(s).topWithin;
const rises = (s: Sample): boolean => conditionsOf(s).apex > 0.01;
const named = (keys: (Key | undefined)[]): Key[] => keys.filter((key) => key !== undefined);

const toMark: [Key[], boolean][] = [
  ...(["after", "apex", "through", "speed", "elevation"] as const).map((key): [Key[], boolean] => [
    ["to", key],
    false,
  ]),
  ...(["apex", "through", "elevation", "speed"] as const).map((key): [Key[], boolean] => [
    ["to", "after", key],
    true,
  ]),
  ...(["apex", "through", "elevation"] as const).map((key): [Key[], boolean] => [["to", "speed", key], true]),
];

describe("an arc to a mark comes back from its own conditions", () => {
  it.each(toMark)("%j, gravity free: %s", (keys, free) => {
    const wanted = keys.includes("apex") ? topWithin : undefined;
    expectBack(keys, free, samples(400, false, wanted));
    expectBack(keys, free, samples(400, true, wanted));
  });
});

const pairs: Key[][] = [
  ["speed", "elevation"],
  ["speed", "apex"],
  ["speed", "through"],
  ["elevation", "apex"],
  ["elevation", "through"],
  ["apex", "through"],
];

describe("a launch comes back from its own conditions", () => {
  it.each([["velocity"] as Key[], ...pairs.map((pair): Key[] => ["heading", ...pair])])(
    "%s %s %s",
    (...keys) => {
      expectBack(
        [...named(keys), "after"],
        false,
        samples(400, false, keys.includes("apex") ? rises : undefined),
      );
    },
  );

  it.each([
    ["velocity", "apex"],
    ["velocity", "through"],
    ["heading", "speed", "elevation", "apex"],
    ["heading", "speed", "elevation", "through"],
    ["heading", "speed", "apex", "through"],
  ] as Key[][])("with gravity free: %s %s %s %s", (...keys) => {
    const wanted = !keys.includes("apex") ? undefined : keys.includes("through") ? topWithin : rises;
    expectBack([...named(keys), "after"], true, samples(400, false, wanted));
  });

  it("with gravity free: heading, elevation, apex and point of an arc that ends rising", () => {
    const rising = samples(400, false, (s) => s.velocity[1] > 1.05 * s.strength * s.duration);
    expectBack(["heading", "elevation", "apex", "through", "after"], true, rising);
  });

  it.each([["velocity"], ["heading", "speed", "apex"], ["heading", "apex", "through"]] as Key[][])(
    "with an open end: %s %s %s",
    (...keys) => {
      expectBack(
        named(keys),
        false,
        samples(400, false, keys.includes("apex") ? topWithin : undefined),
        true,
      );
    },
  );

  it("and an open end is where it is told", () => {
    for (const s of samples(100, true)) {
      const c = conditionsOf(s);
      const open: ArcRequest = { from: s.from, gravity: c.gravity, velocity: s.velocity, openEnd: true };
      const ended = endArc(open, solveArc(open), s.duration);
      expect(distance(arcPosition(s.from, ended, ended.duration), c.to)).toBeLessThan(1e-13);
      expect(Math.abs(ended.apex.rise - c.apex)).toBeLessThan(1e-12);
    }
  });
});
