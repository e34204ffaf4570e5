import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { facingRotation } from "../../src/aim/facing.js";
import { type AimedBody, type AimedLaunch, type LaunchWish, solveLaunch } from "../../src/aim/launch.js";
import { spinAtRelease } from "../../src/aim/spin.js";
import { worldDirection } from "../../src/aim/world-directions.js";
import type { ArcRequest } from "../../src/flight/arc.js";
import { type Flight, fly } from "../../src/flight/flight.js";
import { turnsAboutMomentum } from "../../src/flight/turns.js";
import { conjugate, multiply, type Quat, rotate } from "../../src/math/quat.js";
import { RequestError } from "../../src/math/request-error.js";
import {
  add,
  cross,
  distance,
  dot,
  length,
  normalize,
  subtract,
  type Vec3,
  ZERO,
} from "../../src/math/vec3.js";
import { between, direction, moments, offset, orientation } from "./arbitrary.js";

// Every expectation is a condition that was asked for, worked out again from the motion that came of it.

const FROM: Vec3 = [0.1, 1.3, -0.2];
const TO: Vec3 = [0.5, 1, 3];
const DOWN: Vec3 = [0, -9.80665, 0]; // standard gravity, ISO 80000-3
const FREE = { free: [0, 1, 0] as Vec3 };

interface Case {
  body: AimedBody;
  releaseOffset: Vec3;
  arrivalOffset: Vec3;
  pose: Quat;
  axis: Vec3;
  turns: number;
  wobble: number;
}

const cases = (reach = 0.15) =>
  fc.record<Case>({
    body: fc.record({ moments: moments(), axes: orientation() }),
    releaseOffset: offset(reach),
    arrivalOffset: offset(reach),
    pose: orientation(),
    axis: direction(),
    turns: between(-1.5, 1.5),
    wobble: between(0, 20),
  });

const wishOf = (one: Case, arc: ArcRequest, more: Partial<LaunchWish> = {}): LaunchWish => ({
  arc,
  releaseOffset: one.releaseOffset,
  arrivalOffset: one.arrivalOffset,
  pose: () => one.pose,
  ahead: [0, 0, 1],
  spin: (_, duration) =>
    spinAtRelease(
      { axis: one.axis, turnsPerSecond: one.turns / duration, wobble: one.wobble, phase: 40 },
      one.body.moments,
    ),
  usesTravel: false,
  ...more,
});

/** A point of the body, by its arm from the centre of mass in the model's frame: place and velocity (v + ω × r, any textbook of mechanics). */
function pointAt(flight: Flight, body: AimedBody, arm: Vec3, t: number) {
  const r = rotate(multiply(flight.orientation(t), conjugate(body.axes)), arm);
  return {
    place: add(flight.centerOfMass(t), r),
    velocity: add(flight.velocity(t), cross(flight.angularVelocity(t), r)),
  };
}

const ARC_SETS: [string, Omit<ArcRequest, "from">][] = [
  ["after", { to: TO, gravity: DOWN, after: 0.8 }],
  ["apex", { to: TO, gravity: DOWN, apex: 0.6 }],
  ["through", { to: TO, gravity: DOWN, through: [0.3, 1.9, 1.5] }],
  ["speed, the low arc", { to: TO, gravity: DOWN, speed: 7.5 }],
  ["speed, the high arc", { to: TO, gravity: DOWN, speed: 7.5, branch: "high" }],
  ["elevation", { to: TO, gravity: DOWN, elevation: 40 }],
  ["heading, speed and elevation", { gravity: DOWN, after: 0.7, heading: 20, speed: 5, elevation: 30 }],
  ["heading, speed and apex", { gravity: DOWN, after: 0.7, heading: -120, speed: 5, apex: 0.5 }],
  ["heading, elevation and apex", { gravity: DOWN, after: 0.7, heading: 20, elevation: 50, apex: 0.4 }],
  [
    "heading, elevation and through",
    { gravity: DOWN, after: 0.7, heading: 0, elevation: 35, through: [0, 1.6, 1] },
  ],
  ["gravity free, after and apex", { to: TO, gravity: FREE, after: 1.4, apex: 0.7 }],
  ["gravity free, after and elevation", { to: TO, gravity: FREE, after: 1.4, elevation: 35 }],
  ["gravity free, speed and through", { to: TO, gravity: FREE, speed: 5, through: [0.3, 1.8, 1.6] }],
  [
    "gravity free, heading, speed, elevation and apex",
    { gravity: FREE, after: 1.1, heading: 5, speed: 4, elevation: 45, apex: 0.5 },
  ],
];

/** Whatever of the conditions an arc request states, asked of the flight. */
function expectConditions(arc: ArcRequest, { launch, arc: solved }: AimedLaunch, flight: Flight): void {
  const v = launch.velocity;
  const level = Math.hypot(v[0], v[2]);
  const gravity = -launch.gravity[1];
  if (arc.after !== undefined) expect(flight.duration).toBe(arc.after);
  if (arc.speed !== undefined) expect(length(v)).toBeCloseTo(arc.speed, 9);
  if (arc.elevation !== undefined)
    expect((Math.atan2(v[1], level) * 180) / Math.PI).toBeCloseTo(arc.elevation, 8);
  if (arc.heading !== undefined) {
    const off = Math.atan2(v[0], v[2]) - (arc.heading * Math.PI) / 180;
    expect(Math.cos(off)).toBeCloseTo(1, 12);
  }
  if (arc.apex !== undefined) {
    // v²/2g, reached within the flight
    expect((v[1] * v[1]) / (2 * gravity)).toBeCloseTo(arc.apex, 9);
    expect(v[1] / gravity).toBeLessThanOrEqual(flight.duration);
    expect(solved.apex.rise).toBeCloseTo(arc.apex, 9);
  }
  if (arc.through !== undefined) {
    const along: Vec3 = [v[0] / level, 0, v[2] / level];
    const t = dot(subtract(arc.through, launch.centerOfMass), along) / level;
    expect(t).toBeGreaterThan(0);
    expect(t).toBeLessThan(flight.duration);
    expect(flight.centerOfMass(t)[1]).toBeCloseTo(arc.through[1], 8);
  }
  if ("free" in arc.gravity) expect(gravity).toBeGreaterThan(0);
  else expect(launch.gravity).toEqual(arc.gravity);
}

describe("with points off the centre of mass, a throw fixed by", () => {
  it.each(ARC_SETS)("%s starts and ends on its marks, and keeps what was asked", (_, set) => {
    let solvedOnes = 0;
    fc.assert(
      fc.property(cases(), (one) => {
        const arc: ArcRequest = { ...set, from: FROM };
        let aimed: AimedLaunch;
        try {
          aimed = solveLaunch(wishOf(one, arc), one.body);
        } catch (error) {
          // where the points move the centre of mass out of reach, there is no such flight; a few of the drawn ones
          if (error instanceof RequestError) return;
          throw error;
        }
        solvedOnes++;
        const flight = fly(aimed.launch);
        expect(distance(pointAt(flight, one.body, one.releaseOffset, 0).place, FROM)).toBeLessThan(1e-9);
        if (arc.to) {
          const end = pointAt(flight, one.body, one.arrivalOffset, flight.duration).place;
          expect(distance(end, arc.to)).toBeLessThan(1e-9);
        }
        expect(turnsAboutMomentum(flight)).toBeCloseTo(Math.abs(one.turns), 9);
        expectConditions(arc, aimed, flight);
      }),
      { seed: 1, numRuns: 40 },
    );
    expect(solvedOnes).toBeGreaterThanOrEqual(36);
  });
});

describe("a stated launch", () => {
  it("gives the release point itself the velocity asked for, however the body turns about it", () => {
    fc.assert(
      fc.property(cases(), (one) => {
        const velocity: Vec3 = [0.3, 2, 3];
        const arc: ArcRequest = { from: FROM, gravity: DOWN, velocity, after: 0.6 };
        const flight = fly(solveLaunch(wishOf(one, arc), one.body).launch);
        const start = pointAt(flight, one.body, one.releaseOffset, 0);
        expect(distance(start.place, FROM)).toBeLessThan(1e-9);
        expect(distance(start.velocity, velocity)).toBeLessThan(1e-9);
        expect(flight.duration).toBe(0.6);
      }),
      { seed: 2 },
    );
  });

  it("may leave gravity to an apex", () => {
    fc.assert(
      fc.property(cases(0.1), (one) => {
        const velocity: Vec3 = [0.3, 3, 3];
        const arc: ArcRequest = { from: FROM, gravity: FREE, velocity, after: 1.4, apex: 0.8 };
        // slow enough that the centre of mass still rises
        const slow = { ...one, turns: one.turns / 2 };
        const aimed = solveLaunch(wishOf(slow, arc), one.body);
        const flight = fly(aimed.launch);
        expect(distance(pointAt(flight, one.body, one.releaseOffset, 0).velocity, velocity)).toBeLessThan(
          1e-9,
        );
        expectConditions(arc, aimed, flight);
      }),
      { seed: 3 },
    );
  });
});

describe("a pose that follows the flight", () => {
  const NOSE: Vec3 = [0, 0, 1];
  const following = (one: Case, arc: ArcRequest): LaunchWish =>
    wishOf(one, arc, {
      usesTravel: true,
      pose: (course) => facingRotation({ prop: NOSE, world: worldDirection("flight", course) }),
    });

  it.each([
    ["after", { to: TO, gravity: DOWN, after: 0.8 }],
    ["speed", { to: TO, gravity: DOWN, speed: 8 }],
    ["heading, speed and elevation", { gravity: DOWN, after: 0.7, heading: 20, speed: 6, elevation: 30 }],
    ["velocity", { gravity: DOWN, after: 0.7, velocity: [0.3, 2, 5] as Vec3 }],
  ] satisfies [string, Omit<ArcRequest, "from">][])(
    "points along the velocity of the centre of mass at release, not of the hand: fixed by %s",
    (_, set) => {
      fc.assert(
        fc.property(cases(0.1), (one) => {
          const arc: ArcRequest = { ...set, from: FROM };
          const flight = fly(solveLaunch(following({ ...one, turns: one.turns / 2 }, arc), one.body).launch);
          const nose = rotate(multiply(flight.orientation(0), conjugate(one.body.axes)), NOSE);
          expect(distance(nose, normalize(flight.velocity(0)))).toBeLessThan(1e-9);
          expect(distance(pointAt(flight, one.body, one.releaseOffset, 0).place, FROM)).toBeLessThan(1e-9);
          if (arc.to) {
            const end = pointAt(flight, one.body, one.arrivalOffset, flight.duration).place;
            expect(distance(end, arc.to)).toBeLessThan(1e-9);
          }
        }),
        { seed: 4, numRuns: 40 },
      );
    },
  );
});

describe("the centre of mass thrown itself", () => {
  it("flies the arc as if nothing turned", () => {
    fc.assert(
      fc.property(cases(), (one) => {
        const centred = { ...one, releaseOffset: ZERO, arrivalOffset: ZERO };
        const { launch } = solveLaunch(
          wishOf(centred, { from: FROM, to: TO, gravity: DOWN, after: 0.8 }),
          one.body,
        );
        // Galileo's parabola: v = (to − from)/T − g T/2
        const v = [0, 1, 2].map((i) => (TO[i] - FROM[i]) / 0.8 - (DOWN[i] * 0.8) / 2) as unknown as Vec3;
        expect(distance(launch.velocity, v)).toBeLessThan(1e-13);
        expect(launch.centerOfMass).toEqual(FROM);
      }),
      { seed: 5, numRuns: 20 },
    );
  });

  it("starts a point's solution: as the points move in, the flight becomes that of the centre", () => {
    fc.assert(
      fc.property(cases(), (one) => {
        const arc: ArcRequest = { from: FROM, to: TO, gravity: DOWN, speed: 7.5, branch: "high" };
        const shrunk = (share: number) => {
          const by = (v: Vec3): Vec3 => [v[0] * share, v[1] * share, v[2] * share];
          const near = { ...one, releaseOffset: by(one.releaseOffset), arrivalOffset: by(one.arrivalOffset) };
          return solveLaunch(wishOf(near, arc), one.body).launch.duration;
        };
        // differs by no more than the way the points moved allows: metres through metres a second, with a margin of ten
        expect(Math.abs(shrunk(1e-6) - shrunk(0))).toBeLessThan(1e-5);
      }),
      { seed: 6, numRuns: 20 },
    );
  });
});

describe("a flight that cannot be", () => {
  it("is refused with the key that asks for it", () => {
    const one: Case = {
      body: { moments: [1, 2, 2.5], axes: [0, 0, 0, 1] },
      releaseOffset: [0.1, 0, 0],
      arrivalOffset: [0.1, 0, 0],
      pose: [0, 0, 0, 1],
      axis: [0, 0, 1],
      turns: 1,
      wobble: 0,
    };
    const arc: ArcRequest = { from: FROM, to: TO, gravity: DOWN, speed: 2 };
    expect(() => solveLaunch(wishOf(one, arc), one.body)).toThrow(RequestError);
    expect(() => solveLaunch(wishOf(one, arc), one.body)).toThrow(/arc\.speed/);
  });
});
