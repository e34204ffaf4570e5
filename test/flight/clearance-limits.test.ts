import { describe, expect, it } from "vitest";
import { bodyOrientation, type FlyingBody } from "../../src/flight/clearance.js";
import { type Box, keepsOutOf, keepsTo } from "../../src/flight/clearance-limits.js";
import { IDENTITY, rotate, rotateBack } from "../../src/math/quat.js";
import { add, cross, dot, length, normalize, scale, subtract, type Vec3 } from "../../src/math/vec3.js";
import { shapeLowest } from "../../src/prop/support.js";
import { pointsSupport } from "../../src/prop/support-points.js";
import {
  anyDirection,
  anyMoments,
  anyOrientation,
  anySupport,
  between,
  flyingBody,
  lowestAlong,
  random,
} from "./tumbling.js";

const AXES: Vec3[] = [
  [1, 0, 0],
  [0, 1, 0],
  [0, 0, 1],
];
const ball = (radius: number) => ({ support: { lowest: shapeLowest({ sphere: radius }) }, reach: radius });

/** Least of a function over a scan, sharpened by golden-section search round the lowest looks (Kiefer 1953). */
function least(f: (t: number) => number, duration: number, looks: number): number {
  const values = Array.from({ length: looks + 1 }, (_, i) => f((duration * i) / looks));
  const order = values.map((_, i) => i).sort((a, b) => values[a] - values[b]);
  let found = values[order[0]];
  for (const i of order.slice(0, 4)) {
    let [low, high] = [Math.max(0, i - 1), Math.min(looks, i + 1)].map((k) => (duration * k) / looks);
    for (let round = 0; round < 60; round++) {
      const [a, b] = [low + 0.381966 * (high - low), low + 0.618034 * (high - low)];
      if (f(a) < f(b)) high = b;
      else low = a;
    }
    found = Math.min(found, f((low + high) / 2));
  }
  return found;
}

/** Separation of points and a box: the greatest over all axes two polytopes can need (separating axis theorem; Ericson 2005, section 5.2.1). */
function separationOf(points: readonly Vec3[], { center, half, rotation }: Box): number {
  const own = points.map((p) => rotateBack(rotation, subtract(p, center)));
  const axes: Vec3[] = [...AXES];
  for (let i = 0; i < own.length; i++)
    for (let j = i + 1; j < own.length; j++) {
      const side = subtract(own[j], own[i]);
      for (const axis of AXES) axes.push(cross(side, axis));
      for (let k = j + 1; k < own.length; k++) axes.push(cross(side, subtract(own[k], own[i])));
    }
  let greatest = Number.NEGATIVE_INFINITY;
  for (const axis of axes) {
    if (length(axis) < 1e-9) continue;
    const n = normalize(axis);
    const extent = half.reduce((sum, h, a) => sum + h * Math.abs(n[a]), 0);
    const heights = own.map((p) => dot(n, p));
    greatest = Math.max(greatest, Math.min(...heights) - extent, -Math.max(...heights) - extent);
  }
  return greatest;
}

const yaw = (degrees: number) =>
  [0, Math.sin((degrees * Math.PI) / 360), 0, Math.cos((degrees * Math.PI) / 360)] as const;

describe("limits of height", () => {
  it("in 200 random scenes hold exactly where a sharpened scan says so", () => {
    const next = random(5);
    const counts = { held: 0, broken: 0 };
    for (let i = 0; i < 200; i++) {
      const body = flyingBody(
        {
          velocity: [between(next, -2, 2), between(next, -2, 6), 0],
          orientation: anyOrientation(next),
          spin: scale(anyDirection(next), between(next, 0, 25)),
          moments: anyMoments(next),
          duration: between(next, 0.3, 1.2),
        },
        anySupport(next),
        anyOrientation(next),
      );
      const normal: Vec3 = next() < 0.5 ? [0, 1, 0] : [0, -1, 0];
      const lowest = least((t) => lowestAlong(body, normal, t), body.flight.duration, 1500);
      // A billionth of a metre to either side decides; at the very height it holds.
      for (const [offset, holds] of [
        [lowest - 1e-9, true],
        [lowest, true],
        [lowest + 1e-9, false],
        [lowest + between(next, -1, 1), undefined],
      ] as const) {
        const expected = holds ?? offset <= lowest;
        expect(keepsTo(body, { normal, offset }), `scene ${i}: ${offset - lowest}`).toBe(expected);
        counts[expected ? "held" : "broken"]++;
      }
    }
    expect(Math.min(counts.held, counts.broken)).toBeGreaterThan(200);
  });

  it("do not count standing on them at release and touching them at arrival", () => {
    // Thrown up from the floor at v and back after 2v/g (throw straight up).
    const body = flyingBody(
      { centerOfMass: [0, 0.1, 0], velocity: [0, 3, 0], duration: (2 * 3) / 9.80665 },
      ball(0.1),
    );
    expect(keepsTo(body, { normal: [0, 1, 0], offset: 0 })).toBe(true);
    expect(keepsTo(body, { normal: [0, 1, 0], offset: 2e-9 })).toBe(false);
  });
});

/** Flights that pass near a box. */
function anyScene(next: () => number): { launch: Parameters<typeof flyingBody>[0]; box: Box } {
  const duration = between(next, 0.4, 1);
  const velocity: Vec3 = [between(next, -1, 1), between(next, 1, 5), between(next, 2, 5)];
  const share = between(next, 0.2, 0.8) * duration;
  const passing = add(scale(velocity, share), [0, -0.5 * 9.80665 * share * share, 0]);
  return {
    launch: {
      velocity,
      orientation: anyOrientation(next),
      spin: scale(anyDirection(next), between(next, 0, 25)),
      moments: anyMoments(next),
      duration,
    },
    box: {
      center: add(passing, [between(next, -0.8, 0.8), between(next, -0.8, 0.8), between(next, -0.8, 0.8)]),
      half: [between(next, 0.01, 0.5), between(next, 0.01, 0.5), between(next, 0.01, 0.5)],
      rotation: yaw(between(next, -180, 180)),
    },
  };
}

describe("boxes to keep clear of", () => {
  it("in 200 random scenes of tumbling hulls are kept exactly where a sharpened scan of all separating axes says so", () => {
    const next = random(6);
    const counts = { held: 0, broken: 0 };
    for (let i = 0; i < 200; i++) {
      const { launch, box } = anyScene(next);
      const points = Array.from(
        { length: 5 },
        (): Vec3 => [0, 0, 0].map(() => between(next, -0.3, 0.3)) as unknown as Vec3,
      );
      const shape = {
        support: pointsSupport(Float64Array.from(points.flat())),
        reach: Math.max(...points.map(length)),
      };
      const body = flyingBody(launch, shape);
      const gap = (to: Box) =>
        least(
          (t) => {
            const q = bodyOrientation(body, t);
            const c = body.flight.centerOfMass(t);
            return separationOf(
              points.map((p) => add(c, rotate(q, p))),
              to,
            );
          },
          body.flight.duration,
          160,
        );
      const apart = gap(box);
      const holds = keepsOutOf(body, box);
      counts[holds ? "held" : "broken"]++;
      if (holds) expect(apart, `scene ${i}`).toBeGreaterThan(-1e-9);
      else expect(apart, `scene ${i}`).toBeLessThan(0);
    }
    expect(Math.min(counts.held, counts.broken)).toBeGreaterThan(30);
  });

  it("decide to a billionth of a metre for a ball, whose distance from a box is known", () => {
    const next = random(7);
    for (let i = 0; i < 200; i++) {
      const { launch, box } = anyScene(next);
      // Distance from a point to a box: its overhang beyond each face (Ericson 2005, section 5.1.4).
      const flight = flyingBody(launch, ball(1)).flight;
      const distance = least(
        (t) =>
          Math.hypot(
            ...rotateBack(box.rotation, subtract(flight.centerOfMass(t), box.center)).map((x, a) =>
              Math.max(0, Math.abs(x) - box.half[a]),
            ),
          ),
        launch.duration!,
        400,
      );
      if (distance < 0.01) continue;
      expect(keepsOutOf(flyingBody(launch, ball(distance)), box), `scene ${i}, touching`).toBe(true);
      expect(keepsOutOf(flyingBody(launch, ball(distance + 1e-9)), box), `scene ${i}, inside`).toBe(false);
    }
  });

  it("may be touched: a box that arrives flat on another, slides along it, or leans on its edge", () => {
    const crate: Box = { center: [0, -0.5, 0], half: [0.5, 0.5, 0.5], rotation: IDENTITY };
    const box = { support: { lowest: shapeLowest({ box: [0.4, 0.2, 0.3] }) }, reach: 0.3 };
    const fall = Math.sqrt((2 * 0.3) / 9.80665);
    const dropped = (height: number, more: Parameters<typeof flyingBody>[0] = {}): FlyingBody =>
      flyingBody({ centerOfMass: [0, height, 0], duration: fall, ...more }, box);
    expect(keepsOutOf(dropped(0.4), crate)).toBe(true);
    expect(keepsOutOf(dropped(0.4 - 1.1e-9), crate)).toBe(false);
    const gravity: Vec3 = [0, 0, 0];
    const sliding = { gravity, velocity: [1, 0, 0.3] as Vec3, spin: [0, 7, 0] as Vec3, duration: 1 };
    expect(keepsOutOf(dropped(0.1, sliding), crate)).toBe(true);
    expect(keepsOutOf(dropped(0.1 - 1.1e-9, sliding), crate)).toBe(false);
    // Turned by 45° about z, its lowest edge is (0.4 + 0.2)/(2√2) below the middle.
    const leaning = {
      ...sliding,
      spin: [0, 0, 0] as Vec3,
      orientation: [0, 0, Math.sin(Math.PI / 8), Math.cos(Math.PI / 8)] as const,
    };
    expect(keepsOutOf(dropped(0.3 / Math.SQRT2, leaning), crate)).toBe(true);
    expect(keepsOutOf(dropped(0.3 / Math.SQRT2 - 1.1e-9, leaning), crate)).toBe(false);
  });

  it("are not slipped through however fast and thin", () => {
    const wall: Box = { center: [5, 0, 0], half: [1e-6, 1, 1], rotation: yaw(20) };
    const shot = (y: number) =>
      flyingBody(
        { centerOfMass: [0, y, 0], velocity: [1000, 0, 0], gravity: [0, 0, 0], duration: 0.1 },
        ball(1e-3),
      );
    expect(keepsOutOf(shot(0.9), wall)).toBe(false);
    expect(keepsOutOf(shot(1.01), wall)).toBe(true);
  });
});
