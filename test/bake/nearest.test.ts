import { describe, expect, it, vi } from "vitest";
import { type Course, compared, type Nearest, nearestFinder } from "../../src/bake/nearest.js";
import { fly } from "../../src/flight/flight.js";
import type { Launch } from "../../src/flight/launch.js";

// counted
vi.mock("../../src/flight/flight.js", async (original) => {
  const flight = await original<typeof import("../../src/flight/flight.js")>();
  return { ...flight, fly: vi.fn(flight.fly) };
});

const LAUNCH: Launch = {
  centerOfMass: [0, 1, 0],
  velocity: [0, 2, 3],
  gravity: [0, -9.80665, 0],
  orientation: [0, 0, 0, 1],
  spin: [1, 4, 0.5],
  moments: [1, 2, 2.5],
  duration: 0.8,
};
const flight = (change: Partial<Launch> = {}): Course => {
  const launch = { ...LAUNCH, ...change };
  return { duration: launch.duration, parts: [{ start: 0, launch }] };
};

describe("the earlier take that moves most like a take", () => {
  it("is none for the first", () => {
    expect(nearestFinder(0.2)(7, flight())).toBeNull();
  });

  it("is its twin at no distance, the earliest of several", () => {
    const nearest = nearestFinder(0.2);
    nearest(1, flight());
    nearest(2, flight());
    expect(nearest(5, flight())).toEqual({ take: 1, distance: 0 });
  });

  it("is as far off as the whole motion is moved", () => {
    const nearest = nearestFinder(0.2);
    nearest(1, flight());
    expect(nearest(2, flight({ centerOfMass: [0.3, 1, 0.4] }))?.distance).toBeCloseTo(0.5, 14);
  });

  it("is two reaches away when it starts half a turn round: 2·reach·sin(θ/2) (chord of a circle)", () => {
    const still = { spin: [0, 0, 0] as const };
    const nearest = nearestFinder(0.2);
    nearest(1, flight(still));
    expect(nearest(2, flight({ ...still, orientation: [0, 1, 0, 0] }))?.distance).toBeCloseTo(0.4, 14);
    // a quarter turn, and the other sign of the same orientation
    const quarter = [0, -Math.SQRT1_2, 0, -Math.SQRT1_2] as const;
    const other = nearestFinder(0.2);
    other(1, flight(still));
    expect(other(2, flight({ ...still, orientation: quarter }))?.distance).toBeCloseTo(
      0.4 * Math.SQRT1_2,
      14,
    );
  });

  it("counts the moment at which they are furthest apart", () => {
    const nearest = nearestFinder(0.2);
    nearest(1, flight());
    // 0.5 m/s more for 0.8 s
    expect(nearest(2, flight({ velocity: [0.5, 2, 3] }))?.distance).toBeCloseTo(0.4, 14);
  });

  it("holds the one that ends first at its last pose", () => {
    const still = { spin: [0, 0, 0] as const, gravity: [0, 0, 0] as const, velocity: [0, 0, 1] as const };
    const nearest = nearestFinder(0.2);
    nearest(1, flight({ ...still, duration: 0.5 }));
    expect(nearest(2, flight({ ...still, duration: 0.8 }))?.distance).toBeCloseTo(0.3, 14);
  });

  it("is the nearest of all, whichever came first", () => {
    const nearest = nearestFinder(0.2);
    nearest(1, flight({ centerOfMass: [0.1, 1, 0] }));
    nearest(2, flight({ centerOfMass: [0.02, 1, 0] }));
    nearest(3, flight({ centerOfMass: [-0.5, 1, 0] }));
    expect(nearest(4, flight())).toEqual({ take: 2, distance: expect.closeTo(0.02, 14) });
  });
});

describe("the earlier take that moves most like each of many", () => {
  const REACH = 0.2;
  // Park & Miller's generator (Communications of the ACM 31, 1192, 1988)
  const chance = (seed: number) => {
    let state = seed;
    return () => {
      state = (state * 48271) % 2147483647;
      return state / 2147483647;
    };
  };
  const manyTakes = (count: number, seed: number): Course[] => {
    const next = chance(seed);
    const about = (value: number, spread: number) => value + spread * (next() - 0.5);
    return Array.from({ length: count }, () =>
      flight({
        velocity: [about(0, 0.6), about(2, 1), about(3, 1)],
        spin: [about(1, 4), about(4, 2), about(0.5, 1)],
        duration: about(0.8, 0.4),
      }),
    );
  };
  /** As its docstring says it: every take held against every earlier one, at every 60th of a second. */
  const bruteForce = (courses: readonly Course[]): (Nearest | null)[] => {
    const moments = courses.map(({ duration, parts: [{ launch }] }) => {
      const flown = fly(launch);
      return Array.from({ length: Math.ceil(duration * 60) + 1 }, (_, i) => {
        const t = Math.min(duration, i / 60);
        return { place: flown.centerOfMass(t), turn: flown.orientation(t) };
      });
    });
    const apart = (a: (typeof moments)[0], b: (typeof moments)[0]): number => {
      let greatest = 0;
      for (let i = 0; i < Math.max(a.length, b.length); i++) {
        const [p, q] = [a[Math.min(i, a.length - 1)], b[Math.min(i, b.length - 1)]];
        const moved = Math.hypot(...p.place.map((x, k) => x - q.place[k]));
        const cosine = Math.abs(p.turn.reduce((sum, x, k) => sum + x * q.turn[k], 0));
        greatest = Math.max(greatest, moved + 2 * REACH * Math.sqrt(Math.max(0, 1 - cosine * cosine)));
      }
      return greatest;
    };
    return moments.map((own, i) => {
      let nearest: Nearest | null = null;
      for (let j = 0; j < i; j++) {
        const distance = apart(own, moments[j]);
        if (!nearest || distance < nearest.distance) nearest = { take: j + 1, distance };
      }
      return nearest;
    });
  };

  it("is the one that holding each against all finds", () => {
    const courses = manyTakes(400, 7);
    const nearest = nearestFinder(REACH);
    const found = courses.map((course, i) => nearest(i + 1, course));
    const expected = bruteForce(courses);
    expect(found.map((near) => near?.take)).toEqual(expected.map((near) => near?.take));
    expected.forEach((near, i) => {
      if (near) expect(found[i]?.distance).toBeCloseTo(near.distance, 10);
    });
  });

  it("is the same to the last digit whether flights are flown again or not", () => {
    const courses = manyTakes(80, 3);
    const [again, asFlown] = [nearestFinder(REACH), nearestFinder(REACH)];
    courses.forEach((course, i) => {
      const { samples } = compared(course.duration, [{ start: 0, flight: fly(course.parts[0].launch) }]);
      expect(again(i, course)).toEqual(asFlown(i, course, samples));
    });
  });

  it("is found without flying most of them again", () => {
    const courses = manyTakes(3000, 11);
    const nearest = nearestFinder(REACH);
    const before = vi.mocked(fly).mock.calls.length;
    courses.forEach((course, i) => {
      const { samples } = compared(course.duration, [{ start: 0, flight: fly(course.parts[0].launch) }]);
      nearest(i, course, samples);
    });
    // one each is the test's own
    const flown = vi.mocked(fly).mock.calls.length - before - courses.length;
    expect(flown).toBeGreaterThan(0);
    // holding each against all would fly 4.5 million
    expect(flown).toBeLessThan(10 * courses.length);
  });

  it("is the first of those that move the same, and these cost no more than one", () => {
    const nearest = nearestFinder(REACH);
    const others = manyTakes(40, 5);
    for (const [i, course] of others.entries()) nearest(i + 1, course);
    for (let take = 41; take < 2000; take++)
      expect(nearest(take, flight())).toEqual(take === 41 ? expect.anything() : { take: 41, distance: 0 });
  });
});
