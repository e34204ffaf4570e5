/** Poses on which general solvers fail: the same pose, half turns, tiny rotations, rotations about a principal axis; symmetric bodies. */
import type { WayWish } from "../../src/aim/ways.js";
import { fromAxisAngle, IDENTITY, multiply, type Quat } from "../../src/math/quat.js";
import type { Vec3 } from "../../src/math/vec3.js";
import { BODIES, type RandomProblem, randomProblems } from "./problems.js";

const SPECIAL_BODIES: Record<string, Vec3> = {
  ...BODIES,
  oblate: [1, 1, 1.6],
  wheel: [1, 1, 2],
  rod: [0.3, 1, 1],
};
const AXES: Vec3[] = [
  [1, 0, 0],
  [0, 1, 0],
  [0, 0, 1],
];

export interface SpecialPose {
  kind: string;
  problem: RandomProblem;
  wish: WayWish;
  /** What the family's name must say, for a family of every body. */
  family?: RegExp;
}

/** Kinds run through all bodies in turn; a third each without a wish, with one for turns, and with one for turns about a principal axis. */
export function specialPoses(count: number, seed: string): SpecialPose[] {
  const names = Object.keys(SPECIAL_BODIES);
  return randomProblems(count, seed).map((random, i) => {
    const body = names[i % names.length];
    const [kind, rotation, family] = rotationOf(Math.floor(i / names.length) % 8, i, random);
    const problem = { ...random, body, moments: SPECIAL_BODIES[body], end: multiply(random.start, rotation) };
    const wish = [{}, { turns: random.turns }, { turns: random.turns, axis: AXES[i % 3] }][(i * 7) % 3];
    return { kind, problem, wish, family };
  });
}

function rotationOf(kind: number, i: number, { axis, turns }: RandomProblem): [string, Quat, RegExp?] {
  const principal = AXES[(i * 5) % 3];
  // 1e-9 to 0.1 rad, evenly by powers
  const tiny = 10 ** (-9 + (8 * (turns - 0.5)) / 7.5);
  switch (kind) {
    case 0:
      return ["same pose", IDENTITY, /same pose|sphere/];
    case 1:
    case 2:
      return ["half turn", fromAxisAngle(principal, Math.PI), /half turn|symmetry|end for end|sphere/];
    case 3:
    case 4:
      return ["tiny rotation", fromAxisAngle(axis, tiny)];
    case 5:
      return ["nearly a half turn", multiply(fromAxisAngle(principal, Math.PI), fromAxisAngle(axis, tiny))];
    default:
      return ["about a principal axis", fromAxisAngle(principal, turns)];
  }
}
