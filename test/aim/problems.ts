/** Seeded random aiming problems over eight bodies, from needle to sphere. */
import seedrandom from "seedrandom";
import type { Quat } from "../../src/math/quat.js";
import type { Vec3 } from "../../src/math/vec3.js";

/** Principal moments; the shapes that have about such moments are the project's own choice. */
export const BODIES: Record<string, Vec3> = {
  wrench: [0.1, 0.9, 0.97],
  book: [1, 2, 2.9],
  "nearly symmetric": [1, 1.001, 1.7],
  "thin disc": [1, 1.02, 2],
  "long rod": [0.01, 1, 1.003],
  sphere: [0.4, 0.4, 0.4],
  needle: [1e-4, 1, 1],
  "edge of the triangle inequality": [1, 1.7, 2.7],
};

export interface RandomProblem {
  body: string;
  moments: Vec3;
  start: Quat;
  end: Quat;
  duration: number;
  /** 0.5 to 8 */
  turns: number;
  axis: Vec3;
}

/** Evenly spread orientations, turns and axes; durations of 0.4 to 2 s. */
export function randomProblems(count: number, seed: string): RandomProblem[] {
  const random = seedrandom(seed);
  const normal = (): number => Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random());
  const unit = (n: number): number[] => {
    const v = Array.from({ length: n }, normal);
    const size = Math.hypot(...v);
    return v.map((c) => c / size);
  };
  const names = Object.keys(BODIES);
  return Array.from({ length: count }, (_, i) => ({
    body: names[i % names.length],
    moments: BODIES[names[i % names.length]],
    start: unit(4) as unknown as Quat,
    end: unit(4) as unknown as Quat,
    duration: 0.4 + 1.6 * random(),
    turns: 0.5 + 7.5 * random(),
    axis: unit(3) as unknown as Vec3,
  }));
}
