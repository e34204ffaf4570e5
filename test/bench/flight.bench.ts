import { createRequire } from "node:module";
import { bench, describe } from "vitest";
import { fly } from "../../src/flight/flight.js";
import type { Launch } from "../../src/flight/launch.js";
import { momentRatios } from "../../src/flight/rotation-bounds.js";
import { angleBetween, normalize, type Quat } from "../../src/math/quat.js";
import type { Vec3 } from "../../src/math/vec3.js";
import { exactRotation } from "../flight/exact-rotation.js";

/** A general solver of ordinary differential equations: Hairer and Wanner's extrapolation method. */
interface Solver {
  absoluteTolerance: number;
  relativeTolerance: number;
  maxSteps: number;
  solve(f: (t: number, y: number[]) => number[], from: number, y: number[], to: number): { y: number[] };
}
const { Solver } = createRequire(import.meta.url)("odex") as { Solver: new (n: number) => Solver };

const still: Vec3 = [0, 0, 0];
const throws: { name: string; launch: Launch }[] = (
  [
    ["a wrench end over end, 1 s", [0.02, 0.18, 0.19], [0.4, 0.2, 9], 1],
    ["a body flipping about its middle axis, 2 s", [0.3, 0.8, 1], [0.1, 12, 0.1], 2],
    ["a needle, 5 s", [1e-4, 1, 1.00005], [30, 9, 4], 5],
  ] as [string, Vec3, Vec3, number][]
).map(([name, moments, spin, duration]) => ({
  name,
  launch: {
    centerOfMass: still,
    velocity: still,
    gravity: still,
    orientation: [0, 0, 0, 1],
    spin,
    moments,
    duration,
  },
}));

function solved({ spin, moments, orientation, duration }: Launch, tolerance: number): Quat {
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
    [...spin, ...orientation],
    duration,
  );
  return normalize([y[3], y[4], y[5], y[6]]);
}

const flown = (launch: Launch): Quat => fly(launch).orientation(launch.duration);

// the nearest to equal error that the general solver comes: its tightest useful tolerance
for (const { name, launch } of throws) {
  const { orientation, spin, moments, duration } = launch;
  const [end] = exactRotation([...orientation], [...spin], [...moments], [duration]);
  const error = (q: Quat): string =>
    `misses by ${angleBetween(q, normalize(end.orientation as unknown as Quat)).toExponential(0)} rad`;
  describe(`the orientation at the end of ${name}`, () => {
    bench(`fly: ${error(flown(launch))}`, () => void flown(launch));
    for (const tolerance of [1e-10, 1e-13])
      bench(
        `odex at ${tolerance}: ${error(solved(launch, tolerance))}`,
        () => void solved(launch, tolerance),
      );
  });
}
