import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { defaultWobble, type SpinWish, spinAtRelease, wobbleReference } from "../../src/aim/spin.js";
import { type Flight, fly } from "../../src/flight/flight.js";
import { turnsAboutMomentum } from "../../src/flight/turns.js";
import { IDENTITY } from "../../src/math/quat.js";
import { cross, distance, dot, length, normalize, type Vec3, ZERO } from "../../src/math/vec3.js";
import { between, direction, moments } from "./arbitrary.js";

const wishes = (least: number, most: number): fc.Arbitrary<SpinWish> =>
  fc.record({
    axis: direction(),
    turnsPerSecond: between(least, most),
    wobble: between(0, 60),
    phase: between(-360, 720),
  });

const flight = (spin: Vec3, body: Vec3, duration: number): Flight =>
  fly({
    centerOfMass: ZERO,
    velocity: ZERO,
    gravity: ZERO,
    orientation: IDENTITY,
    spin,
    moments: body,
    duration,
  });

const product = (a: Vec3, b: Vec3): Vec3 => [a[0] * b[0], a[1] * b[1], a[2] * b[2]];
/** Direction of the angular momentum in the body: L = I ω in principal axes (any textbook of mechanics). */
const momentum = (spin: Vec3, body: Vec3): Vec3 => normalize(product(body, spin));
const degrees = (a: Vec3, b: Vec3) => (Math.atan2(length(cross(a, b)), dot(a, b)) * 180) / Math.PI;

describe("the turns asked for", () => {
  it("come true in the flight, whatever the body, axis and wobble", () => {
    fc.assert(
      fc.property(wishes(0.1, 5), moments(), between(0.2, 2), (wish, body, duration) => {
        const flown = flight(spinAtRelease(wish, body), body, duration);
        expect(turnsAboutMomentum(flown)).toBeCloseTo(wish.turnsPerSecond * duration, 11);
      }),
      { seed: 1 },
    );
  });

  it("are those that add up along the motion: (1/2π) ∫ ω·L/|L| dt", () => {
    fc.assert(
      fc.property(wishes(0.5, 3), moments(), (wish, body) => {
        const flown = flight(spinAtRelease(wish, body), body, 1);
        const along = normalize(flown.angularMomentum);
        const steps = 200;
        let sum = 0;
        for (let i = 0; i < steps; i++) sum += dot(flown.angularVelocity((i + 0.5) / steps), along) / steps;
        expect(sum / (2 * Math.PI)).toBeCloseTo(wish.turnsPerSecond, 9);
      }),
      { seed: 2, numRuns: 30 },
    );
  });

  it("go the other way when negative: the same wobble, all turned round", () => {
    fc.assert(
      fc.property(wishes(0.1, 5), moments(), (wish, body) => {
        const spin = spinAtRelease(wish, body);
        const back = spinAtRelease({ ...wish, turnsPerSecond: -wish.turnsPerSecond }, body);
        expect(distance(back, [-spin[0], -spin[1], -spin[2]])).toBeLessThan(1e-12);
        expect(dot(product(body, spin), product(body, wish.axis))).toBeGreaterThan(0);
      }),
      { seed: 3 },
    );
  });

  it("are about the axis itself, right-hand rule, when the spin is clean", () => {
    fc.assert(
      fc.property(wishes(-5, 5), moments(), (wish, body) => {
        const spin = spinAtRelease({ ...wish, wobble: 0 }, body);
        const clean = wish.axis.map((c) => c * 2 * Math.PI * wish.turnsPerSecond) as unknown as Vec3;
        // off a principal axis "turns" are about L, so that ω has its own length there, but still the axis's direction
        expect(length(cross(spin, wish.axis))).toBeLessThan(1e-13 * (1 + length(spin)));
        expect(dot(spin, clean)).toBeGreaterThanOrEqual(0);
      }),
      { seed: 4 },
    );
    // about a principal axis ω is plainly 2π times the turns a second
    const wish = { axis: [0, 0, -1] as Vec3, turnsPerSecond: 2, wobble: 0, phase: 0 };
    expect(distance(spinAtRelease(wish, [1, 2, 2.5]), [0, 0, -4 * Math.PI])).toBeLessThan(1e-14);
  });

  it("none is no spin", () => {
    const wish = { axis: [1, 0, 0] as Vec3, turnsPerSecond: 0, wobble: 5, phase: 90 };
    expect(length(spinAtRelease(wish, [1, 2, 2.5]))).toBe(0);
  });
});

describe("the wobble asked for", () => {
  it("is the angle of the angular momentum to that of the clean spin, whatever the phase", () => {
    fc.assert(
      fc.property(wishes(0.1, 5), moments(), (wish, body) => {
        const clean = momentum(spinAtRelease({ ...wish, wobble: 0 }, body), body);
        expect(degrees(clean, momentum(spinAtRelease(wish, body), body))).toBeCloseTo(wish.wobble, 10);
      }),
      { seed: 5 },
    );
  });

  it("lies at phase 0 towards the next of long, middle, short, long", () => {
    const body: Vec3 = [1, 2, 2.5];
    const next: [Vec3, number][] = [
      [[1, 0, 0], 1],
      [[0, 1, 0], 2],
      [[0, 0, 1], 0],
    ];
    for (const [axis, i] of next) {
      const l = momentum(spinAtRelease({ axis, turnsPerSecond: 1, wobble: 30, phase: 0 }, body), body);
      // cos 30° along the axis, sin 30° along the next
      expect(dot(l, axis)).toBeCloseTo(Math.sqrt(3) / 2, 14);
      expect(l[i]).toBeCloseTo(0.5, 14);
    }
  });

  it("goes round the axis with the phase, right-hand rule", () => {
    const body: Vec3 = [1, 2, 2.5];
    const axis: Vec3 = [1, 0, 0];
    const at = (phase: number) =>
      momentum(spinAtRelease({ axis, turnsPerSecond: 1, wobble: 30, phase }, body), body);
    // about long by the right hand: middle, short, -middle, -short
    expect(distance(at(0), [Math.sqrt(3) / 2, 0.5, 0])).toBeLessThan(1e-14);
    expect(distance(at(90), [Math.sqrt(3) / 2, 0, 0.5])).toBeLessThan(1e-14);
    expect(distance(at(180), [Math.sqrt(3) / 2, -0.5, 0])).toBeLessThan(1e-14);
    expect(distance(at(-90), at(270))).toBeLessThan(1e-14);
  });

  it("is counted from the most square principal axis when the spin's axis is none of them", () => {
    expect(wobbleReference(normalize([1, 0.1, 1]))).toEqual([0, 1, 0]);
    expect(wobbleReference(normalize([0.2, 1, -1]))).toEqual([1, 0, 0]);
    // within 1° it still counts as the axis; at 2° the first of the squarest counts
    const off = (angle: number): Vec3 => [
      Math.sin((angle * Math.PI) / 180),
      Math.cos((angle * Math.PI) / 180),
      0,
    ];
    expect(wobbleReference(off(0.9))).toEqual([0, 0, 1]);
    expect(wobbleReference(off(-2))).toEqual([0, 0, 1]);
    expect(wobbleReference([-1, 0, 0])).toEqual([0, 1, 0]);
  });
});

describe("the wobble nobody asks for", () => {
  it("is 3 degrees within 1 degree of the middle axis of a body with three unlike moments, else none", () => {
    const off = (angle: number): Vec3 => [
      0,
      -Math.cos((angle * Math.PI) / 180),
      Math.sin((angle * Math.PI) / 180),
    ];
    expect(defaultWobble(off(0.99), [1, 2, 2.5])).toBe(3);
    expect(defaultWobble(off(1.01), [1, 2, 2.5])).toBe(0);
    expect(defaultWobble([1, 0, 0], [1, 2, 2.5])).toBe(0);
    expect(defaultWobble([0, 1, 0], [1, 1.0099, 1.9])).toBe(0);
    expect(defaultWobble([0, 1, 0], [1, 1.9, 1.918])).toBe(0);
    expect(defaultWobble([0, 1, 0], [1, 1.0101, 1.03])).toBe(3);
  });
});
