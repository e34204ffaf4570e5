import { bench, describe } from "vitest";
import { nearestDirectionWay } from "../../src/aim/direction.js";
import { allWays, nearestWay } from "../../src/aim/ways.js";
import { type Quat, rotate } from "../../src/math/quat.js";
import { normalize, subtract, type Vec3 } from "../../src/math/vec3.js";
import { bruteForce, isSame } from "../aim/brute-force.js";
import { angleApart, extrapolatedEnd } from "../aim/extrapolated-turning.js";
import { leastSquares, type PoseProblem, spinAlong, spread, turnsOfSpin } from "../aim/least-squares.js";
import { randomProblems } from "../aim/problems.js";
import { specialPoses } from "../aim/special-poses.js";

// Every count and seed is the project's own choice. Misses are those an integrator finds that shares no code with the solver.

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

function fullPose(): void {
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
  console.log(`full pose: ${share(met, problems.length)} end within 1e-9 rad or the rounding foretold (${warned} warned)
  miss ${quantile(misses, 0.5).toExponential(1)} rad median, ${quantile(misses, 0.99).toExponential(1)} rad 99th percentile; ${times(ms)}
  within half a turn of the wish: ${share(near, wishes)} by ∫|ω|dt, ${share(nearByTurns, wishes)} by turns about the momentum`);
}

function besideLeastSquares(): void {
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
  console.log(`beside least squares from sixteen starts:
  all ways        ${share(met, n)} met, ${share(near, n)} within half a turn of the wish; ${times(ours)}
  least squares   ${share(theirsMet, n)} met, ${share(theirsNear, n)} within half a turn of the wish; ${times(theirs)}`);
}

function pointFirst(): void {
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
  console.log(
    `point first: ${share(met, problems.length)} met, ${share(near, wishes)} within half a turn; ${times(ms)}`,
  );
}

function special(): void {
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
  console.log(`special poses: ${share(poses.length - missed.length, poses.length)} within 1e-6 rad, ${share(named, families)} families named, ${times(ms)}, longest ${Math.max(...ms).toFixed(0)} ms
  ${missed.join("\n  ")}`);
}

function bruteForceFinds(): void {
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
  console.log(
    `brute force: ${found} ways under three turns in ${problems.length} problems, ${missing} of them missing`,
  );
}

for (const report of [fullPose, besideLeastSquares, pointFirst, special, bruteForceFinds]) {
  report();
  // minutes in all: what is printed shows as it comes
  await new Promise((resolve) => setTimeout(resolve, 200));
}

describe("from pose to pose, eight bodies", () => {
  const problems = randomProblems(8, "one round");
  bench("the nearest of all ways", () => {
    for (const problem of problems) nearestWay(problem, { turns: problem.turns });
  });

  bench("least squares from sixteen starts", () => {
    for (const problem of problems)
      for (const m of spread(16))
        leastSquares(problem, spinAlong(problem.moments, m, problem.turns, problem.duration));
  });
});
