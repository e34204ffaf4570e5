/** Random bodies in random flights, the same on every run. */

import type { FlyingBody } from "../../src/flight/clearance.js";
import { bodyOrientation } from "../../src/flight/clearance.js";
import { fly } from "../../src/flight/flight.js";
import type { Launch } from "../../src/flight/launch.js";
import { IDENTITY, type Quat, rotate } from "../../src/math/quat.js";
import { add, dot, length, type Vec3 } from "../../src/math/vec3.js";
import type { Shape } from "../../src/prop/shape-kind.js";
import { shapeLowest } from "../../src/prop/support.js";
import { pointsSupport } from "../../src/prop/support-points.js";

/** Numbers from 0 to 1: a linear congruential generator (Knuth's MMIX constants would need 64 bits; these are Numerical Recipes'). */
export function random(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
}

export const between = (next: () => number, low: number, high: number): number => low + next() * (high - low);

export function anyDirection(next: () => number): Vec3 {
  for (;;) {
    const v: Vec3 = [between(next, -1, 1), between(next, -1, 1), between(next, -1, 1)];
    if (length(v) > 0.1 && length(v) <= 1) return [v[0] / length(v), v[1] / length(v), v[2] / length(v)];
  }
}

export const anyOrientation = (next: () => number): Quat => {
  const q = [0, 0, 0, 0].map(() => between(next, -1, 1)) as unknown as Quat;
  const l = Math.hypot(...q);
  return [q[0] / l, q[1] / l, q[2] / l, q[3] / l];
};

/** Moments of a body that can be: those of a box of random edges. */
export function anyMoments(next: () => number): Vec3 {
  const [a, b, c] = [between(next, 0.1, 1), between(next, 0.1, 1), between(next, 0.1, 1)];
  return [b * b + c * c, a * a + c * c, a * a + b * b];
}

const SHAPES: Shape[] = [
  { box: [0.2, 0.5, 0.1] },
  { sphere: 0.2 },
  { ellipsoid: [0.1, 0.2, 0.3] },
  { cylinder: { radius: 0.1, length: 0.5 } },
  { cone: { radius: 0.2, length: 0.4 } },
  { capsule: { radius: 0.05, length: 0.6 } },
  { ring: { radius: 0.2, thickness: 0.05 } },
  { disc: { radius: 0.2, thickness: 0.01 } },
  { tube: { outer: 0.05, inner: 0.04, length: 0.8 } },
];

/** A hull of a few random points, or a shape, from a centre of mass that is not its middle. */
export function anySupport(next: () => number): Pick<FlyingBody, "support" | "reach"> {
  const pick = Math.floor(next() * 2 * SHAPES.length);
  if (pick >= SHAPES.length) {
    const points = Float64Array.from({ length: 3 * (4 + Math.floor(next() * 30)) }, () =>
      between(next, -0.4, 0.4),
    );
    let reach = 0;
    for (let i = 0; i < points.length; i += 3)
      reach = Math.max(reach, Math.hypot(...points.subarray(i, i + 3)));
    return { support: pointsSupport(points), reach };
  }
  const lowest = shapeLowest(SHAPES[pick]);
  const off: Vec3 = [between(next, -0.05, 0.05), between(next, -0.05, 0.05), between(next, -0.05, 0.05)];
  return { support: { lowest: (d) => add(lowest(d), off) }, reach: 0.42 + Math.hypot(...off) };
}

export const flyingBody = (
  launch: Partial<Launch>,
  shape: Pick<FlyingBody, "support" | "reach">,
  axes: Quat = IDENTITY,
): FlyingBody => ({
  flight: fly({
    centerOfMass: [0, 0, 0],
    velocity: [0, 0, 0],
    gravity: [0, -9.80665, 0],
    orientation: IDENTITY,
    spin: [0, 0, 0],
    moments: [1, 1, 1],
    duration: 1,
    ...launch,
  }),
  axes,
  ...shape,
});

/** Height of the lowest point along `normal` at a time, by the support function alone. */
export function lowestAlong(body: FlyingBody, normal: Vec3, t: number): number {
  const q = bodyOrientation(body, t);
  const back: Quat = [-q[0], -q[1], -q[2], q[3]];
  const direction = rotate(back, normal);
  return dot(normal, body.flight.centerOfMass(t)) + dot(direction, body.support.lowest(direction));
}
