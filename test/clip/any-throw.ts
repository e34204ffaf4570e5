import fc from "fast-check";
import type { Body } from "../../src/clip/linear.js";
import { normalize, type Quat } from "../../src/math/quat.js";
import { scale } from "../../src/math/vec3.js";
import { thrown } from "./flights.js";

const component = fc.integer({ min: -1_000_000, max: 1_000_000 }).map((n) => n / 1_000_000);
const vector = fc.tuple(component, component, component);
const quaternion = fc
  .tuple(component, component, component, component)
  .filter((q) => Math.hypot(...q) > 0.1)
  .map((q): Quat => normalize(q));

/** Bodies and throws of all sorts, and a tolerance from 0.1 to 50 mm. */
export const anyThrow = fc
  .record({
    logTolerance: fc.double({ min: Math.log(0.0001), max: Math.log(0.05), noNaN: true }),
    reach: fc.double({ min: 0.02, max: 1.5, noNaN: true }),
    center: vector,
    far: fc.constantFrom(0, 0, 1, 30),
    axes: quaternion,
    orientation: quaternion,
    spin: vector,
    rate: fc.constantFrom(0, 3, 12, 40),
    velocity: vector,
    gravity: fc.constantFrom(0, 3, 9.80665),
    logMoments: vector,
    duration: fc.double({ min: 0.05, max: 3, noNaN: true }),
  })
  .map((x) => {
    const body: Body = { centerOfMass: scale(x.center, x.reach), axes: x.axes, reach: x.reach };
    const m = x.logMoments.map(Math.exp);
    const flight = thrown({
      centerOfMass: scale([0.3, 1, -0.5], x.far),
      velocity: scale(x.velocity, 8),
      gravity: [0, -x.gravity, 0],
      orientation: x.orientation,
      spin: scale(x.spin, x.rate),
      // Any body: each moment less than the other two together.
      moments: [m[1] + m[2], m[2] + m[0], m[0] + m[1]],
      duration: x.duration,
    });
    return { body, flight, tolerance: Math.exp(x.logTolerance) };
  });
