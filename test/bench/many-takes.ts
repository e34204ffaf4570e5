import { execFile } from "node:child_process";
import { promisify } from "node:util";
import { bake } from "../../src/bake/bake.js";
import { formatRecord } from "../../src/record/format.js";
import { recordOf } from "../../src/record/record-of.js";
import { openDemo, withThrow } from "./demo.js";
import { duration, figure, type Section } from "./section.js";

const THROW = "spanner-tumble";
const WARM_UP = 50;

interface Outcome {
  seconds: number;
  bytes: number;
  peakMegabytes: number;
}

export const manyTakes: Section = {
  name: "many",
  about: `One demo throw (${THROW}) with many takes, each count in a process of its own that first bakes ${WARM_UP} others: from the
throw file to the file of clips and takes.json in memory. Peak memory is the whole process's, garbage not yet collected and all.`,
  async run() {
    const rows: string[][] = [];
    for (const count of [1, 100, 1000, 2000]) {
      const { seconds, bytes, peakMegabytes } = await outcomeOf(count);
      rows.push([
        count.toString(),
        duration(seconds),
        duration(seconds / count),
        Math.round(peakMegabytes).toString(),
        figure(bytes / 1e6),
      ]);
    }
    return { head: ["takes", "time", "per take", "peak MB", "written MB"], rows };
  },
};

/** In a fresh process, so that its peak memory is that of these takes. */
async function outcomeOf(count: number): Promise<Outcome> {
  const { stdout } = await promisify(execFile)(process.execPath, [process.argv[1], "--bake", String(count)]);
  return JSON.parse(stdout);
}

/** What that process does: prints an `Outcome`. */
export async function bakeForTable(count: number): Promise<void> {
  const { file, text, models, throwOf } = await openDemo();
  const { entry } = throwOf(THROW);
  const bytesOf = async (takes: number, seed: string): Promise<number> => {
    const varied = { ...withThrow(file, entry, { takes }), seed };
    const baked = await bake(varied, models);
    const record = formatRecord(await recordOf(varied, text, baked));
    return baked.files[0].content.length + record.length;
  };
  await bytesOf(WARM_UP, "warm-up");
  const start = process.cpuUsage();
  const bytes = await bytesOf(count, "measured");
  const { user, system } = process.cpuUsage(start);
  const outcome: Outcome = {
    seconds: (user + system) / 1e6,
    bytes,
    peakMegabytes: process.resourceUsage().maxRSS / 1024,
  };
  process.stdout.write(JSON.stringify(outcome));
}
