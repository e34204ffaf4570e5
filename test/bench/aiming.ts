import { nearestDirectionWay } from "../../src/aim/direction.js";
import { allWays, nearestWay } from "../../src/aim/ways.js";
import { type Quat, rotate } from "../../src/math/quat.js";
import { normalize, subtract, type Vec3 } from "../../src/math/vec3.js";
import { bruteForce, isSame } from "../aim/brute-force.js";
import { angleApart, extrapolatedEnd } from "../aim/extrapolated-turning.js";
import { leastSquares, type PoseProblem, spinAlong, spread, turnsOfSpin } from "../aim/least-squares.js";
import { randomProblems } from "../aim/problems.js";
import { specialPoses } from "../aim/special-poses.js";
import type { Section } from "./section.js";

export const aiming: Section = {
  name: "aim",
  about: `From pose to pose, eight bodies from needle to sphere; misses are what an integrator finds that shares no code with the solver.
Takes some minutes.`,
  async run() {
    const parts = [fullPose, besideLeastSquares, pointFirst, special, bruteForceFinds];
    return { head: ["what", "measure", "result"], rows: parts.flatMap((part) => part()) };
  },
};

// Every count and seed is the project's own choice.

const share = (part: number, whole: number): string =>
  `${((100 * part) / whole).toFixed(2)} % (${part} of ${whole})`;
const quantile = (values: number[], q: number): number => {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.min(sorted.length - 1, Math.floor(q * sorted.length))];
};
const times = (ms: number[]): string =>
  `${quantile(ms, 0.5).toFixed(1)} ms median, ${quantile(ms, 0.99).toFixed(1)} ms 99th percentile`;
const missOf = ({ moments, start, end, duration }: PoseProblem, spin: Vec3): number =>
  angleApart(extrapolatedEnd(moments, start, spin, duration), end);
const timed = <T>(ms: number[], run: () => T): T => {
  const from = performance.now();
  const result = run();
  ms.push(performance.now() - from);
  return result;
};

function fullPose(): string[][] {
  const problems = randomProblems(2000, "bench");
  const ms: number[] = [];
  const misses: number[] = [];
  let met = 0;
  let warned = 0;
  let wishes = 0;
  let near = 0;
  let nearByTurns = 0;
  problems.forEach((problem, i) => {
    const axis = i % 16 < 8 ? undefined : problem.axis;
    const { way, warnings } = timed(ms, () => nearestWay(problem, { turns: problem.turns, axis }));
    const miss = missOf(problem, way.spin);
    misses.push(miss);
    const isWarned = warnings.some((warning) => warning.includes("rounding"));
    if (isWarned) warned++;
    if (miss <= 1e-9 || (isWarned && miss <= way.predictedRounding)) met++;
    if (axis || problem.turns < 1) return;
    wishes++;
    if (Math.abs(way.turning - problem.turns) <= 0.5) near++;
    if (Math.abs(way.turns - problem.turns) <= 0.5) nearByTurns++;
  });
  return [
    ["full pose", "end within 1e-9 rad or the rounding foretold", share(met, problems.length)],
    ["", "  of which warned of rounding", String(warned)],
    [
      "",
      "miss",
      `${quantile(misses, 0.5).toExponential(1)} rad median, ${quantile(misses, 0.99).toExponential(1)} rad 99th percentile`,
    ],
    ["", "time", times(ms)],
    ["", "within half a turn of the wish, by ∫|ω|dt", share(near, wishes)],
    ["", "the same by turns about the momentum", share(nearByTurns, wishes)],
  ];
}

function besideLeastSquares(): string[][] {
  const problems = randomProblems(160, "beside");
  const ours: number[] = [];
  const theirs: number[] = [];
  let [met, near, theirsMet, theirsNear] = [0, 0, 0, 0];
  for (const problem of problems) {
    const { way } = timed(ours, () => nearestWay(problem, { turns: problem.turns }));
    if (way.miss <= Math.max(1e-9, way.predictedRounding)) {
      met++;
      if (Math.abs(way.turns - problem.turns) <= 0.5) near++;
    }
    const ends = timed(theirs, () =>
      spread(16).map((m) =>
        leastSquares(problem, spinAlong(problem.moments, m, problem.turns, problem.duration)),
      ),
    ).filter(({ miss }) => miss <= 1e-9);
    if (ends.length > 0) theirsMet++;
    const off = ({ spin }: { spin: Vec3 }): number =>
      Math.abs(turnsOfSpin(problem.moments, spin, problem.duration) - problem.turns);
    if (ends.some((end) => off(end) <= 0.5)) theirsNear++;
  }
  const n = problems.length;
  return [
    ["all ways", "met", share(met, n)],
    ["", "met, and within half a turn of the wish", share(near, n)],
    ["", "time", times(ours)],
    ["sixteen-start least squares", "met", share(theirsMet, n)],
    ["", "met, and within half a turn of the wish", share(theirsNear, n)],
    ["", "time", times(theirs)],
    ["", "times ours, median", (quantile(theirs, 0.5) / quantile(ours, 0.5)).toFixed(1)],
  ];
}

function pointFirst(): string[][] {
  const problems = randomProblems(200, "point first");
  const ms: number[] = [];
  let [met, near, wishes] = [0, 0, 0];
  for (const { moments, start, end, duration, turns, axis } of problems) {
    const direction = normalize([axis[1], axis[2], -axis[0]]);
    const target = rotate(end, direction);
    const request = { moments, start, duration, direction, target };
    const { way } = timed(ms, () => nearestDirectionWay(request, { turns }));
    const reached = extrapolatedEnd(moments, start, way.spin, duration) as unknown as Quat;
    const miss = Math.hypot(...subtract(rotate(reached, direction), target));
    if (miss <= Math.max(1e-9, way.predictedRounding)) met++;
    if (turns < 1) continue;
    wishes++;
    if (Math.abs(way.turning - turns) <= 0.5) near++;
  }
  return [
    ["point first", "met", share(met, problems.length)],
    ["", "within half a turn of the wish", share(near, wishes)],
    ["", "time", times(ms)],
  ];
}

function special(): string[][] {
  const poses = specialPoses(330, "special poses");
  const ms: number[] = [];
  const missed: string[] = [];
  let named = 0;
  let families = 0;
  for (const { kind, problem, wish, family } of poses) {
    const { way } = timed(ms, () => nearestWay(problem, wish));
    const miss = missOf(problem, way.spin);
    if (miss > 1e-6)
      missed.push(
        `${problem.body}, ${kind}: ${miss.toExponential(1)} rad, ${way.miss.toExponential(1)} stated`,
      );
    if (!family) continue;
    families++;
    if (way.family && family.test(way.family)) named++;
  }
  return [
    ["special poses", "within 1e-6 rad", share(poses.length - missed.length, poses.length)],
    ["", "families named", share(named, families)],
    ["", "time", `${times(ms)}, longest ${Math.max(...ms).toFixed(0)} ms`],
    ...missed.map((text) => ["", "missed", text]),
  ];
}

function bruteForceFinds(): string[][] {
  const problems = randomProblems(104, "brute force");
  let [found, missing] = [0, 0];
  problems.forEach((problem, i) => {
    // a slim body's flights turn for long about its length and take their time
    const isSlim = problem.body === "needle" || problem.body === "long rod";
    const ways = allWays({ ...problem, mostTurns: 3.001, mostTurning: isSlim ? 40 : undefined });
    for (const spin of bruteForce(problem, 3, isSlim ? 30 : 100, `start ${i}`)) {
      if (isSlim && Math.hypot(...spin) * problem.duration > 60 * Math.PI) continue;
      found++;
      if (!ways.some((way) => isSame(way.spin, spin))) missing++;
    }
  });
  return [
    [
      "brute force",
      `ways under three turns in ${problems.length} problems`,
      `${found}, ${missing} of them missing`,
    ],
  ];
}
