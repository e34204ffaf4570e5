import { cpSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { Program } from "../cli/program.js";
import { median } from "./measure.js";
import { duration, figure, type Section } from "./section.js";

/** Takes that a process makes before those that count: by then its code is compiled. */
const WARM_UP = 400;
const COUNTS = [200, 2000];
/** With `npm run bench -- batch --all`, which takes some minutes. */
const LARGE = 20_000;
const ROUNDS = 3;

/** The demo's tumbling spanner, whatever its takes. */
const throwFile = (takes: number) => `seed: bench
bake: { tolerance: 0.001, files: per-take }
props:
  spanner:
    model: spanner.glb
    density: { steel: 7850, rubber: 1100 }
    points: { grip: { node: socket_grip } }
throws:
  spanner-tumble:
    prop: spanner
    takes: ${takes}
    vary: chance
    release: { at: [0, 1.3, 0], facing: [[grip, back], [middle, left]], scatter: 0..5 }
    arrive: { at: [0.3, 0.95, 3.2], after: 27f..32f }
    spin: { axis: middle, turns: 2..2.5, phase: { pick: [0, 180] } }
`;

interface Cost {
  /** s, of all threads. */
  processor: number;
  /** s, as the clock on the wall has them. */
  clock: number;
  megabytes: number;
}

export const batch: Section = {
  name: "batch",
  about: `Whole bakes of one throw into files of one take each, "vary: chance", by the program in a process of its own. Time a take is that of the
takes after the first ${WARM_UP} (processor time of all threads; the clock's in brackets is for two threads against one); peak memory is the whole process's.
"npm run bench -- batch --all" makes ${LARGE} takes too.`,
  async run() {
    const program = await Program.install();
    const folder = mkdtempSync(join(tmpdir(), "tossbake-bench-"));
    cpSync("assets/props/spanner.glb", join(folder, "spanner.glb"));
    try {
      const counts = process.argv.includes("--all") ? [...COUNTS, LARGE] : COUNTS;
      const costs = (takes: number, jobs: number, rounds: number) =>
        medianCost(Array.from({ length: rounds }, () => costOf(program, folder, takes, jobs)));
      const rows: string[][] = [];
      const warm = costs(WARM_UP, 1, ROUNDS);
      const one = counts.map((count) => {
        const cost = costs(WARM_UP + count, 1, count < LARGE ? ROUNDS : 1);
        return { count, cost, each: (cost.processor - warm.processor) / count };
      });
      for (const { count, cost, each } of one)
        rows.push([
          String(count),
          "1",
          duration(each),
          `${figure(each / one[0].each)}×`,
          figure(cost.megabytes),
          `${figure(cost.megabytes / one[0].cost.megabytes)}×`,
          duration(cost.clock),
          "",
        ]);
      const large = one[one.length - 1];
      const two = costs(WARM_UP + large.count, 2, large.count < LARGE ? ROUNDS : 1);
      rows.push([
        String(large.count),
        "2",
        "",
        "",
        figure(two.megabytes),
        "",
        duration(two.clock),
        `${figure(large.cost.clock / two.clock)}×`,
      ]);
      return {
        head: ["takes", "threads", "a take", "of fewest", "peak MB", "of fewest", "clock", "one/two"],
        rows,
      };
    } finally {
      program.remove();
      rmSync(folder, { recursive: true, force: true });
    }
  },
};

const medianCost = (costs: readonly Cost[]): Cost => ({
  processor: median(costs.map(({ processor }) => processor)),
  clock: median(costs.map(({ clock }) => clock)),
  megabytes: median(costs.map(({ megabytes }) => megabytes)),
});

function costOf(program: Program, folder: string, takes: number, jobs: number): Cost {
  const [file, out, told] = ["bench.throws.yaml", "out", "cost.json"].map((name) => join(folder, name));
  rmSync(out, { recursive: true, force: true });
  writeFileSync(file, throwFile(takes));
  const start = performance.now();
  const { code, err } = program.run(["bake", file, "-o", out, "--jobs", String(jobs)], {
    node: ["--import", `data:text/javascript,${encodeURIComponent(telling(told))}`],
  });
  const clock = (performance.now() - start) / 1000;
  if (code !== 0) throw new Error(err);
  return { ...JSON.parse(readFileSync(told, "utf8")), clock };
}

/** A module that, as the process ends, writes down what it has cost. */
const telling = (path: string) => `
import { writeFileSync } from "node:fs";
import { isMainThread } from "node:worker_threads";
if (isMainThread) process.on("exit", () => {
  const { userCPUTime, systemCPUTime, maxRSS } = process.resourceUsage();
  writeFileSync(${JSON.stringify(path)}, JSON.stringify({ processor: (userCPUTime + systemCPUTime) / 1e6, megabytes: maxRSS / 1024 }));
});`;
