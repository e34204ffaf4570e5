import seedrandom from "seedrandom";
import type { Vec3 } from "../../src/math/vec3.js";
import { leastSquares, type PoseProblem, spinAlong, turnsOfSpin } from "./least-squares.js";

/** Spins under a number of turns that least squares from random starts come upon; each once. */
export function bruteForce(problem: PoseProblem, mostTurns: number, starts: number, seed: string): Vec3[] {
  const random = seedrandom(seed);
  const found: Vec3[] = [];
  for (let i = 0; i < starts; i++) {
    const z = 2 * random() - 1;
    const angle = 2 * Math.PI * random();
    const r = Math.sqrt(1 - z * z);
    const from = spinAlong(
      problem.moments,
      [r * Math.cos(angle), r * Math.sin(angle), z],
      mostTurns * random(),
      problem.duration,
    );
    const { spin, miss } = leastSquares(problem, from, 25, 1e-10);
    if (miss > 1e-9 || turnsOfSpin(problem.moments, spin, problem.duration) >= mostTurns) continue;
    if (found.every((other) => !isSame(other, spin))) found.push(spin);
  }
  return found;
}

export function isSame(a: readonly number[], b: readonly number[]): boolean {
  return Math.hypot(...a.map((v, i) => v - b[i])) < 1e-5 * Math.hypot(...a);
}
