import { describe, expect, it } from "vitest";
import { type Flight, fly } from "../../src/flight/flight.js";
import type { Launch } from "../../src/flight/launch.js";
import { turnsAboutMomentum } from "../../src/flight/turns.js";
import { angleBetween, fromAxisAngle, rotate } from "../../src/math/quat.js";
import {
  cross,
  distance,
  dot,
  length,
  normalize,
  perpendicular,
  subtract,
  type Vec3,
} from "../../src/math/vec3.js";

const WRENCH: Vec3 = [0.3, 0.8, 1];
const AXES: Vec3[] = [
  [1, 0, 0],
  [0, 1, 0],
  [0, 0, 1],
];

const launch = (more: Partial<Launch>): Launch => ({
  centerOfMass: [0.5, 1.4, -2],
  velocity: [2, 5, 0.5],
  gravity: [0, -9.80665, 0],
  orientation: [0.1, 0.2, -0.3, 0.9],
  spin: [0, 0, 0],
  moments: WRENCH,
  duration: 1,
  ...more,
});

/** Degrees between the body's axis and where that axis pointed at release. */
function leaning(flight: Flight, axis: Vec3, t: number): number {
  const cosine = dot(rotate(flight.orientation(t), axis), rotate(flight.orientation(0), axis));
  return (Math.acos(Math.max(-1, Math.min(1, cosine))) * 180) / Math.PI;
}

/** How many times `axis` of the body goes round the angular momentum. */
function rounds(flight: Flight, axis: Vec3): number {
  const pole = normalize(flight.angularMomentum);
  const zero = perpendicular(pole);
  const quarter = cross(pole, zero);
  let angle = 0;
  let last = 0;
  for (let i = 0; i <= 5000; i++) {
    const n = rotate(flight.orientation((flight.duration * i) / 5000), axis);
    const azimuth = Math.atan2(dot(n, quarter), dot(n, zero));
    if (i > 0) angle += Math.atan2(Math.sin(azimuth - last), Math.cos(azimuth - last));
    last = azimuth;
  }
  return angle / (2 * Math.PI);
}

describe("facts of the trade (common practice, no source)", () => {
  it("a clean spin turns by the same angle in every frame", () => {
    for (const axis of AXES) {
      const spin: Vec3 = [axis[0] * 9, axis[1] * 9, axis[2] * 9];
      const flight = fly(launch({ spin, duration: 2 }));
      for (let frame = 0; frame < 60; frame++) {
        const turned = angleBetween(flight.orientation(frame / 30), flight.orientation((frame + 1) / 30));
        expect(Math.abs(turned - 9 / 30)).toBeLessThan(1e-13);
      }
    }
  });

  it("the centre of mass keeps to its parabola while the body tumbles", () => {
    const tumbling = fly(launch({ spin: [1, 12, 0.5] }));
    for (const t of [0, 0.25, 0.5, 1]) {
      // x = x₀ + v t + g t²/2
      const expected: Vec3 = [0.5 + 2 * t, 1.4 + 5 * t - (9.80665 * t * t) / 2, -2 + 0.5 * t];
      expect(distance(tumbling.centerOfMass(t), expected)).toBeLessThan(1e-15);
      expect(distance(tumbling.velocity(t), [2, 5 - 9.80665 * t, 0.5])).toBeLessThan(1e-15);
    }
  });

  it("a thin flat disc wobbles twice a turn, whatever the rate and the wobble, if it is small", () => {
    for (const rate of [3, 14])
      for (const wobble of [0.002, 0.03]) {
        const duration = (10 * 2 * Math.PI) / rate;
        const disc = fly(launch({ moments: [1, 1, 2], spin: [wobble * rate, 0, rate], duration }));
        expect(Math.abs(turnsAboutMomentum(disc) - 10)).toBeLessThan(0.01);
        expect(Math.abs(rounds(disc, [0, 0, 1]) - 20)).toBeLessThan(0.01);
      }
  });

  it("it has made one whole wobble after half a turn", () => {
    const rate = 8;
    const half = Math.PI / rate;
    const disc = fly(launch({ moments: [1, 1, 2], spin: [0.02 * rate, 0, rate], duration: half }));
    const widest = leaning(disc, [0, 0, 1], half / 2);
    expect(widest).toBeGreaterThan(1);
    expect(leaning(disc, [0, 0, 1], half)).toBeLessThan(0.001 * widest);
  });

  it("thrown about its middle axis with an error of 1° it flips over, about the others it does not", () => {
    const degree = Math.PI / 180;
    AXES.forEach((axis, i) => {
      const off = rotate(fromAxisAngle(perpendicular(axis), degree), axis);
      const flight = fly(launch({ spin: [off[0] * 12, off[1] * 12, off[2] * 12], duration: 4 }));
      let furthest = 0;
      for (let t = 0; t <= 4; t += 0.01) furthest = Math.max(furthest, leaning(flight, axis, t));
      if (i === 1) expect(furthest).toBeGreaterThan(175);
      else expect(furthest).toBeLessThan(6);
    });
  });
});

describe("the bounds of the spin", () => {
  const bodies: [Vec3, Vec3][] = [
    [WRENCH, [0.2, 9, -0.1]],
    [WRENCH, [6, 0.5, 0.3]],
    [
      [0.02, 0.18, 0.19],
      [3, 4, 12],
    ],
    [
      [1e-4, 1, 1.00005],
      [1, 12, 5],
    ],
    [
      [2, 2, 1],
      [1, 2, 3],
    ],
    [
      [0.2, 0.7, 0.5],
      [3, -2, 2],
    ],
  ];
  it("are never exceeded, and touched within a thousandth", () => {
    for (const [moments, spin] of bodies) {
      const flight = fly(launch({ moments, spin, duration: 10 }));
      let rate = 0;
      let acceleration = 0;
      const h = 1e-5;
      for (let t = h; t <= 10 - h; t += 0.0031) {
        rate = Math.max(rate, length(flight.spin(t)));
        const change = subtract(flight.angularVelocity(t + h), flight.angularVelocity(t - h));
        acceleration = Math.max(acceleration, length(change) / (2 * h));
      }
      expect(rate).toBeLessThanOrEqual(flight.greatestRate);
      expect(rate).toBeGreaterThan(0.999 * flight.greatestRate);
      // a central difference, good to about 1e-7 here
      expect(acceleration).toBeLessThanOrEqual(flight.greatestAngularAcceleration * (1 + 1e-6));
      expect(acceleration).toBeGreaterThan(0.999 * flight.greatestAngularAcceleration);
    }
  });

  it("of a clean spin are the rate itself and no angular acceleration", () => {
    const flight = fly(launch({ spin: [0, 0, 7] }));
    expect(flight.greatestRate).toBeCloseTo(7, 9);
    expect(flight.greatestAngularAcceleration).toBe(0);
  });
});

describe("times and launches that cannot be", () => {
  const flight = fly(launch({ spin: [1, 2, 3], duration: 0.9 }));

  it("a time outside the flight is refused, rounding is not", () => {
    for (const t of [-1e-6, 0.9 + 1e-6, Number.NaN]) {
      expect(() => flight.orientation(t)).toThrow(RangeError);
      expect(() => flight.centerOfMass(t)).toThrow(/outside the flight/);
    }
    expect(flight.orientation(0.9 + 1e-12)).toEqual(flight.orientation(0.9));
    expect(flight.spin(-1e-12)).toEqual([1, 2, 3]);
  });

  it("a flight of no duration has its start", () => {
    const none = fly(launch({ spin: [1, 2, 3], duration: 0 }));
    expect(none.spin(0)).toEqual([1, 2, 3]);
  });

  it("a launch that no body can have is named", () => {
    expect(() => fly(launch({ moments: [0, 1, 1] }))).toThrow(/moments.*greater than 0/);
    expect(() => fly(launch({ moments: [1, 1, 2.1] }))).toThrow(/moments.*sum of the others/);
    expect(() => fly(launch({ spin: [Number.NaN, 0, 0] }))).toThrow(/spin.*finite/);
    expect(() => fly(launch({ duration: -1 }))).toThrow(/duration/);
    expect(() => fly(launch({ orientation: [0, 0, 0, 0] }))).toThrow(/orientation/);
    expect(() => fly(launch({ spin: [0, 0, 1e7] }))).toThrow(/spin.*too much/);
  });
});
