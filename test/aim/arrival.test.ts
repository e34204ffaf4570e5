import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { type AimedArrival, type ArrivalWish, solveArrival } from "../../src/aim/arrival.js";
import type { AimedBody } from "../../src/aim/launch.js";
import { worldDirection } from "../../src/aim/world-directions.js";
import type { ArcRequest } from "../../src/flight/arc.js";
import { type Flight, fly } from "../../src/flight/flight.js";
import { angleBetween, conjugate, multiply, type Quat, rotate } from "../../src/math/quat.js";
import { RequestError } from "../../src/math/request-error.js";
import { add, cross, distance, length, normalize, type Vec3 } from "../../src/math/vec3.js";
import { between, direction, moments, offset, orientation } from "./arbitrary.js";
import { extrapolatedEnd } from "./extrapolated-turning.js";

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
  end: Quat;
  nose: Vec3;
  axis: Vec3;
  turns: number;
}

const cases = () =>
  fc.record<Case>({
    body: fc.record({ moments: moments(), axes: orientation() }),
    releaseOffset: offset(0.15),
    arrivalOffset: offset(0.15),
    pose: orientation(),
    end: orientation(),
    nose: direction(),
    axis: direction(),
    turns: between(-2.5, 2.5),
  });

const wishOf = (one: Case, arc: ArcRequest, more: Partial<ArrivalWish> = {}): ArrivalWish => ({
  arc,
  releaseOffset: one.releaseOffset,
  arrivalOffset: one.arrivalOffset,
  pose: () => one.pose,
  ahead: [0, 0, 1],
  usesTravel: false,
  usesTravelAtEnd: false,
  facing: { kind: "pose", pose: () => one.end },
  turning: () => ({ turns: one.turns }),
  ...more,
});

const alongFlight = (one: Case): Partial<ArrivalWish> => ({
  usesTravelAtEnd: true,
  facing: {
    kind: "direction",
    direction: one.nose,
    target: (course) => worldDirection("flight", course),
  },
});

const modelPose = (flight: Flight, { axes }: AimedBody, t: number): Quat =>
  multiply(flight.orientation(t), conjugate(axes));

/** A point of the body, by its arm from the centre of mass in the model's frame: place and velocity (v + ω × r, any textbook of mechanics). */
function pointAt(flight: Flight, body: AimedBody, arm: Vec3, t: number) {
  const r = rotate(modelPose(flight, body, t), arm);
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
  ["a velocity", { gravity: DOWN, after: 0.6, velocity: [0.3, 2, 5] }],
  ["heading, speed and elevation", { gravity: DOWN, after: 0.7, heading: 20, speed: 5, elevation: 30 }],
  ["heading, elevation and apex", { gravity: DOWN, after: 0.7, heading: 20, elevation: 50, apex: 0.4 }],
  ["gravity free, after and apex", { to: TO, gravity: FREE, after: 1.4, apex: 0.7 }],
  ["gravity free, speed and through", { to: TO, gravity: FREE, speed: 5, through: [0.3, 1.8, 1.6] }],
];

/** Solves what has a flight; where points move the centre of mass out of reach there is none. */
function solve(wish: ArrivalWish, body: AimedBody): AimedArrival | undefined {
  try {
    return solveArrival(wish, body);
  } catch (error) {
    if (error instanceof RequestError) return undefined;
    throw error;
  }
}

function expectOnMarks(one: Case, arc: ArcRequest, flight: Flight): void {
  const start = pointAt(flight, one.body, one.releaseOffset, 0);
  expect(distance(start.place, FROM)).toBeLessThan(1e-9);
  if (arc.velocity) expect(distance(start.velocity, arc.velocity)).toBeLessThan(1e-9);
  if (arc.after !== undefined) expect(flight.duration).toBe(arc.after);
  if (arc.speed !== undefined) expect(length(flight.launch.velocity)).toBeCloseTo(arc.speed, 9);
  if (!arc.to) return;
  const end = pointAt(flight, one.body, one.arrivalOffset, flight.duration);
  expect(distance(end.place, arc.to)).toBeLessThan(1e-9);
}

describe("from grip to grip, the points off the centre of mass, a throw fixed by", () => {
  it.each(ARC_SETS)(
    "%s ends on its marks in the pose asked for",
    (_, set) => {
      let solved = 0;
      fc.assert(
        fc.property(cases(), (one) => {
          const arc: ArcRequest = { ...set, from: FROM };
          const aimed = solve(wishOf(one, arc), one.body);
          if (!aimed) return;
          solved++;
          const flight = fly(aimed.launch);
          expectOnMarks(one, arc, flight);
          expect(angleBetween(modelPose(flight, one.body, 0), one.pose)).toBeLessThan(1e-9);
          expect(angleBetween(modelPose(flight, one.body, flight.duration), one.end)).toBeLessThan(1e-9);
          expect(aimed.missAngle).toBeLessThan(1e-9);
          // by an integrator that shares no code with the solver
          const { moments, orientation, spin, duration } = aimed.launch;
          const end = extrapolatedEnd(moments, orientation, spin, duration) as unknown as Quat;
          expect(angleBetween(multiply(end, conjugate(one.body.axes)), one.end)).toBeLessThan(1e-8);
        }),
        { seed: 1, numRuns: 10 },
      );
      expect(solved).toBeGreaterThanOrEqual(8);
    },
    60_000,
  );

  it.each(ARC_SETS)(
    "%s ends on its marks with a direction along its flight",
    (_, set) => {
      let solved = 0;
      fc.assert(
        fc.property(cases(), (one) => {
          const arc: ArcRequest = { ...set, from: FROM };
          const aimed = solve(wishOf(one, arc, alongFlight(one)), one.body);
          if (!aimed) return;
          solved++;
          const flight = fly(aimed.launch);
          expectOnMarks(one, arc, flight);
          const nose = rotate(modelPose(flight, one.body, flight.duration), one.nose);
          expect(distance(nose, normalize(flight.velocity(flight.duration)))).toBeLessThan(1e-9);
        }),
        { seed: 2, numRuns: 4 },
      );
      expect(solved).toBeGreaterThanOrEqual(3);
    },
    60_000,
  );

  it("a pose at release that follows the flight too is met at both ends", () => {
    fc.assert(
      fc.property(cases(), (one) => {
        const arc: ArcRequest = { from: FROM, to: TO, gravity: DOWN, speed: 8 };
        const turned: ArrivalWish["pose"] = ({ travel }) =>
          multiply(facing(one.nose, travel as Vec3), one.pose);
        const wish = wishOf(one, arc, { usesTravel: true, pose: turned });
        const flight = fly(solveArrival(wish, one.body).launch);
        expectOnMarks(one, arc, flight);
        const expected = multiply(facing(one.nose, flight.velocity(0)), one.pose);
        expect(angleBetween(modelPose(flight, one.body, 0), expected)).toBeLessThan(1e-9);
        expect(angleBetween(modelPose(flight, one.body, flight.duration), one.end)).toBeLessThan(1e-9);
      }),
      { seed: 3, numRuns: 8 },
    );
  });
});

/** Half a turn about the bisector takes one unit vector onto the direction of the other. */
function facing(from: Vec3, to: Vec3): Quat {
  const [x, y, z] = normalize(add(from, normalize(to)));
  return [x, y, z, 0];
}

describe("the wish for the turning", () => {
  const BODY: AimedBody = { moments: [1, 2, 2.9], axes: [0, 0, 0, 1] };
  const CENTRED = { releaseOffset: [0, 0, 0] as Vec3, arrivalOffset: [0, 0, 0] as Vec3 };
  const ARC: ArcRequest = { from: FROM, to: TO, gravity: DOWN, after: 0.8 };

  it("is handed the flight's own duration, for a rate", () => {
    fc.assert(
      fc.property(cases(), (one) => {
        const arc: ArcRequest = { from: FROM, to: TO, gravity: DOWN, speed: 7.5 };
        let told = 0;
        const turning: ArrivalWish["turning"] = (_, duration) => {
          told = duration;
          return { turns: 2 * duration };
        };
        const { launch } = solveArrival(wishOf(one, arc, { turning }), one.body);
        expect(told).toBe(launch.duration);
      }),
      { seed: 4, numRuns: 5 },
    );
  });

  it("without any, the body does not turn where it may arrive as it left", () => {
    const one = { ...CENTRED, pose: [0.5, 0.5, 0.5, 0.5] as Quat } as Case;
    const wish = wishOf(one, ARC, {
      facing: { kind: "pose", pose: (_, release) => release },
      turning: () => ({}),
    });
    expect(solveArrival(wish, BODY).launch.spin).toEqual([0, 0, 0]);
  });

  it("that no way meets says so", () => {
    const one = { ...CENTRED, pose: [0, 0, 0, 1] as Quat, end: [0, 0, 1, 0] as Quat } as Case;
    const { warnings } = solveArrival(wishOf(one, ARC, { turning: () => ({ turns: 0.1 }) }), BODY);
    // half a turn about a principal axis needs half a turn: plain kinematics
    expect(warnings.join("\n")).toMatch(/needs 0\.500 turns at least/);
    expect(warnings.join("\n")).toMatch(/half turn about the short axis/);
  });
});
