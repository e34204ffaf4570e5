import { describe, expect, it } from "vitest";
import { nearestFinder } from "../../src/bake/nearest.js";
import { fly } from "../../src/flight/flight.js";
import type { Launch } from "../../src/flight/launch.js";

const LAUNCH: Launch = {
  centerOfMass: [0, 1, 0],
  velocity: [0, 2, 3],
  gravity: [0, -9.80665, 0],
  orientation: [0, 0, 0, 1],
  spin: [1, 4, 0.5],
  moments: [1, 2, 2.5],
  duration: 0.8,
};
const flight = (change: Partial<Launch> = {}) => fly({ ...LAUNCH, ...change });

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
