/**
 * What one would otherwise write: Levenberg–Marquardt (Marquardt, SIAM J. Appl. Math. 11, 431, 1963) on the rotation from the flight's end to the
 * end pose, derivatives by differences. Knows nothing of the structure of free rotation.
 */
import { fly } from "../../src/flight/flight.js";
import { solve } from "../../src/math/mat3.js";
import { conjugate, multiply, type Quat, toRotationVector } from "../../src/math/quat.js";
import type { Vec3 } from "../../src/math/vec3.js";

export interface PoseProblem {
  moments: Vec3;
  start: Quat;
  end: Quat;
  duration: number;
}

const STILL = { centerOfMass: [0, 0, 0], velocity: [0, 0, 0], gravity: [0, 0, 0] } as const;

function miss({ moments, start, end, duration }: PoseProblem, spin: Vec3): Vec3 {
  const reached = fly({ ...STILL, orientation: start, spin, moments, duration }).orientation(duration);
  return toRotationVector(multiply(conjugate(reached), end));
}

/** The spin and the angle left, rad, after at most so many rounds from one start. */
export function leastSquares(
  problem: PoseProblem,
  from: Vec3,
  rounds = 40,
  goal = 1e-11,
): { spin: Vec3; miss: number } {
  let spin = from;
  let error = miss(problem, spin);
  let damping = 1e-3;
  for (let round = 0; round < rounds && Math.hypot(...error) > goal; round++) {
    const h = 1e-7 / problem.duration;
    const columns = [0, 1, 2].map((a) => {
      const there = miss(problem, spin.map((w, i) => (i === a ? w + h : w)) as unknown as Vec3);
      return there.map((e, i) => (e - error[i]) / h);
    });
    const inner = (a: number[], b: readonly number[]): number => a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
    let moved = false;
    for (let tries = 0; tries < 8 && !moved; tries++) {
      const rows = columns.map((a, i) =>
        columns.map((b, j) => inner(a, b) * (i === j ? 1 + damping : 1)),
      ) as unknown as [Vec3, Vec3, Vec3];
      const step = solve(rows, columns.map((a) => -inner(a, error)) as unknown as Vec3);
      if (!step || !(Math.hypot(...step) * problem.duration < 200)) {
        damping *= 10;
        continue;
      }
      const next = spin.map((w, i) => w + step[i]) as unknown as Vec3;
      const there = miss(problem, next);
      moved = Math.hypot(...there) < Math.hypot(...error);
      if (moved) [spin, error] = [next, there];
      damping = moved ? damping / 10 : damping * 10;
    }
    if (!moved) break;
  }
  return { spin, miss: Math.hypot(...error) };
}

/** 2ET/(2π|L|) by its definition. */
export function turnsOfSpin(moments: readonly number[], spin: readonly number[], duration: number): number {
  const momentum = Math.hypot(...spin.map((w, i) => w * moments[i]));
  const twiceEnergy = spin.reduce((sum, w, i) => sum + w * w * moments[i], 0);
  return momentum === 0 ? 0 : (twiceEnergy * duration) / (2 * Math.PI * momentum);
}

/** The spin with so many turns whose momentum lies along a direction of the principal frame. */
export function spinAlong(
  moments: readonly number[],
  direction: readonly number[],
  turns: number,
  duration: number,
): Vec3 {
  const spin = direction.map((m, i) => m / moments[i]);
  const factor = turns / turnsOfSpin(moments, spin, duration);
  return spin.map((w) => w * factor) as unknown as Vec3;
}

/** Evenly spread unit vectors (a spiral of equal areas: common practice). */
export function spread(count: number): number[][] {
  return Array.from({ length: count }, (_, i) => {
    const z = 1 - (2 * i + 1) / count;
    const turn = i * Math.PI * (3 - Math.sqrt(5));
    const r = Math.sqrt(1 - z * z);
    return [r * Math.cos(turn), r * Math.sin(turn), z];
  });
}
