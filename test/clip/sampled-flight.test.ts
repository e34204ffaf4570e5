import { describe, expect, it } from "vitest";
import { sampleFlight } from "../../src/clip/sampled-flight.js";
import { angleBetween, conjugate, multiply, normalize, type Quat } from "../../src/math/quat.js";
import { thrown } from "./flights.js";

const body = { centerOfMass: [0, 0.1, 0], axes: normalize([0.1, 0.2, -0.4, 0.7]), reach: 0.15 } as const;

describe("a sampled flight", () => {
  const flight = thrown({ spin: [1, 12, 4], duration: 0.7 });
  const sampled = sampleFlight(flight, body, 0.001);

  it("has times that float32 holds exactly, the last one the duration's", () => {
    for (let i = 0; i <= sampled.last; i++) expect(Math.fround(sampled.time(i))).toBe(sampled.time(i));
    expect(sampled.time(sampled.last)).toBe(Math.fround(0.7));
    const lastStep = sampled.time(sampled.last) - sampled.time(sampled.last - 1);
    expect(lastStep).toBeGreaterThanOrEqual(0.5 * sampled.step);
    expect(lastStep).toBeLessThanOrEqual(1.5 * sampled.step);
  });

  it("holds the flight's own poses, turned back from the principal axes", () => {
    const pose = new Float64Array(7);
    for (let k = 0; k < sampled.samples; k++) {
      const i = sampled.sampleIndex(k);
      const t = i === sampled.last ? flight.duration : sampled.time(i);
      const rotation = Array.from(sampled.rotations.subarray(4 * k, 4 * k + 4)) as unknown as Quat;
      const expected = multiply(flight.orientation(t), conjugate(body.axes));
      // Rounding of doubles.
      expect(angleBetween(rotation, expected)).toBeLessThan(1e-14);
      expect(Array.from(sampled.positions.subarray(3 * k, 3 * k + 3))).toEqual(flight.centerOfMass(t));
      sampled.poseInto(i, pose);
      expect(Array.from(pose)).toEqual([...flight.centerOfMass(t), ...rotation]);
    }
    expect(sampled.sampleIndex(sampled.samples - 1)).toBe(sampled.last);
  });

  it("is looked at no more than a million times", () => {
    const fast = thrown({ spin: [0, 3000, 1], gravity: [0, 0, 0], duration: 30 });
    expect(sampleFlight(fast, body, 1e-5).samples).toBeLessThanOrEqual((1 << 20) + 2);
  });
});
