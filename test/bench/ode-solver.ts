/** Free rotation by a general solver of ordinary differential equations: Hairer and Wanner's extrapolation method (ODEX). */

import { createRequire } from "node:module";
import type { Launch } from "../../src/flight/launch.js";
import { momentRatios } from "../../src/flight/rotation-bounds.js";
import { normalize, type Quat } from "../../src/math/quat.js";

interface Solver {
  absoluteTolerance: number;
  relativeTolerance: number;
  maxSteps: number;
  solve(f: (t: number, y: number[]) => number[], from: number, y: number[], to: number): { y: number[] };
}
const { Solver } = createRequire(import.meta.url)("odex") as { Solver: new (n: number) => Solver };

/** The orientation at the end of the flight, from Euler's equations and q' = ½ q ⊗ ω. */
export function solvedOrientation(launch: Launch, tolerance: number): Quat {
  const { spin, moments, orientation, duration } = launch;
  const k = momentRatios(moments);
  const solver = new Solver(7);
  solver.absoluteTolerance = solver.relativeTolerance = tolerance;
  solver.maxSteps = 1e6;
  const { y } = solver.solve(
    (_, [a, b, c, x, y, z, w]) => [
      k[0] * b * c,
      k[1] * c * a,
      k[2] * a * b,
      0.5 * (w * a + y * c - z * b),
      0.5 * (w * b + z * a - x * c),
      0.5 * (w * c + x * b - y * a),
      -0.5 * (x * a + y * b + z * c),
    ],
    0,
    [...spin, ...normalize(orientation)],
    duration,
  );
  return normalize([y[3], y[4], y[5], y[6]]);
}
