import { Command } from "commander";
import { Interrupted, watchForStop } from "../node/interrupted.js";
import { mergeShards } from "../node/merge-shards.js";
import { bakeReport } from "./bake-report.js";
import { ExitCode } from "./exit-code.js";

export const mergeCommand = (answer: (code: number) => void) =>
  new Command("merge")
    .description("put the shards of one batch together: their clips, and the takes.json of the whole")
    .argument("<dir...>", "folders that bake --shard has written to, all shards in one or each in its own")
    .requiredOption("-o, --output <dir>", "folder for the whole; it may be the shards' own")
    .addHelpText(
      "after",
      `
What it writes is, byte for byte, what one bake of all takes writes. Shards in
another folder are left as they are; in the output folder itself their records
go when takes.json is there.

Example:
  tossbake merge shard-1 shard-2 shard-3 -o clips`,
    )
    .action(async (folders: string[], { output }: { output: string }) => {
      const stop = watchForStop();
      try {
        const report = await mergeShards(folders, output, stop.signal);
        process.stdout.write(bakeReport({ ...report, warnings: [] }, ` in ${output}, with takes.json`));
        for (const { name, reason } of report.left) process.stderr.write(`${name} is left out: ${reason}\n`);
        if (report.throws.some(({ missed }) => missed.length > 0) || report.left.length > 0)
          answer(ExitCode.checkFailed);
      } catch (error) {
        if (error instanceof Interrupted) throw new Interrupted("stopped; the shards are as they were");
        throw error;
      } finally {
        stop.end();
      }
    });
