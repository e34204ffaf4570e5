import { Command } from "commander";
import { apart } from "../bake/apart.js";
import { bake } from "../bake/bake.js";
import { RequestError } from "../math/request-error.js";
import { openThrowFile } from "../node/throw-file.js";
import { sheetsInput, sheetsOf } from "../review/sheets.js";
import { ExitCode } from "./exit-code.js";
import { progress } from "./progress.js";
import { isBaked, strobeBaked } from "./strobe-baked.js";
import { takeRange } from "./take-range.js";
import { writeSheets } from "./write-sheets.js";

interface Options {
  output: string;
  only?: string[];
  takes?: [number, number];
}

export const strobeCommand = (answer: (code: number) => void) =>
  new Command("strobe")
    .description("draw throws as stroboscopic sheets: THROW.svg of each throw's first take, takes.svg of all")
    .argument(
      "<throwfile|baked>",
      "a throw file, which is solved for this; or a .glb or .gltf file, or a folder baked into",
    )
    .requiredOption("-o, --output <dir>", "folder for the sheets")
    .option("--only <name...>", "these throws and chains alone")
    .option(
      "--takes <a-b>",
      "these takes alone, such as 3-7; the first of them has the throw's sheet",
      takeRange,
    )
    .addHelpText(
      "after",
      "\nExamples:\n  tossbake strobe quay.throws.yaml -o sheets\n  tossbake strobe quay.throws.yaml --only oar-blade-rolls --takes 3-3 -o sheets\n  tossbake strobe clips/oar-blade-rolls.glb -o sheets",
    )
    .action(async (path: string, options: Options) => {
      answer((await isBaked(path)) ? await strobeClips(path, options) : await strobeThrows(path, options));
    });

function strobeClips(path: string, { output, only, takes }: Options): Promise<number> {
  if (only || takes)
    throw new RequestError(
      [only ? "--only" : "--takes"],
      `${path} is baked already, and all its clips are drawn`,
      "leave it out, or name the throw file",
    );
  return strobeBaked(path, output);
}

async function strobeThrows(path: string, { output, only, takes }: Options): Promise<number> {
  const { file, models, inputs } = await openThrowFile(path);
  const shown = progress();
  const baked = await bake(apart(file), models, { only, takes, onTake: shown.update }).finally(shown.end);
  const sheets = await sheetsOf(sheetsInput(file, baked));
  for (const { name, reason } of baked.unheld)
    process.stderr.write(`${name} is left out: ${reason.message}\n`);
  if (sheets.length === 0) return ExitCode.checkFailed;
  await writeSheets(output, sheets, inputs);
  return baked.unheld.length > 0 ? ExitCode.checkFailed : ExitCode.done;
}
