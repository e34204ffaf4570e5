import { Command } from "commander";
import { apart } from "../bake/apart.js";
import { bake } from "../bake/bake.js";
import type { LoadedProp } from "../bake/props.js";
import { chainMotion, takeMotion } from "../bake/take-motion.js";
import { type OutputFile, writeFiles } from "../node/output-folder.js";
import { spareInputs } from "../node/spare-inputs.js";
import { openThrowFile } from "../node/throw-file.js";
import { takeTable } from "../record/take-table.js";
import { counted } from "./counted.js";
import { ExitCode } from "./exit-code.js";
import { positiveNumber } from "./positive-number.js";
import { progress } from "./progress.js";
import { takeRange } from "./take-range.js";

interface Options {
  output: string;
  rate?: number;
  only?: string[];
  takes?: [number, number];
}

export const csvCommand = (answer: (code: number) => void) =>
  new Command("csv")
    .description("solve every throw of a throw file and write each take as a table, CLIP.csv")
    .argument("<throwfile>", "what is thrown and how (YAML or JSON)")
    .requiredOption("-o, --output <dir>", "folder for the tables")
    .option(
      "--rate <hz>",
      "rows a second (default the throw file's frameRate)",
      positiveNumber("rows a second"),
    )
    .option("--only <name...>", "these throws and chains alone")
    .option("--takes <a-b>", "these takes alone, such as 3-7", takeRange)
    .addHelpText(
      "after",
      `
Columns: time, centre of mass, rotation (x, y, z, w), velocity, angular
velocity, in the units that the header names and the coordinates of takes.json.
The last row is the clip's end exactly.

Example:
  tossbake csv quay.throws.yaml -o tables --rate 120`,
    )
    .action(async (path: string, { output, rate, only, takes }: Options) => {
      const { file, models, inputs } = await openThrowFile(path);
      const shown = progress();
      const baked = await bake(apart(file), models, { only, takes, onTake: shown.update }).finally(shown.end);
      const table = (motion: ReturnType<typeof takeMotion>): OutputFile => {
        const { prop } = baked.props.get(motion.prop) as LoadedProp;
        const options = { rate: rate ?? file.frameRate, axes: prop.principal.axes, host: file.host };
        return { name: `${motion.name}.csv`, content: takeTable(motion, options) };
      };
      const files = [
        ...baked.throws.flatMap((made) => made.takes.map((take) => table(takeMotion(file, made, take)))),
        ...baked.chains.flatMap((made) => made.takes.map((take) => table(chainMotion(file, made, take)))),
      ];
      await spareInputs(
        output,
        files.map(({ name }) => name),
        inputs,
      );
      await writeFiles(output, files);
      for (const { name, reason } of baked.unheld)
        process.stderr.write(`${name} is left out: ${reason.message}\n`);
      process.stdout.write(
        `${counted(files.length, "table")} written to ${output}, ${rate ?? file.frameRate} rows a second\n`,
      );
      if (baked.unheld.length > 0) answer(ExitCode.checkFailed);
    });
