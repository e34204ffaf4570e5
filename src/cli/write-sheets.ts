import { type OutputFile, writeFiles } from "../node/output-folder.js";
import { spareInputs } from "../node/spare-inputs.js";
import { counted } from "./counted.js";

/** Writes sheets over none of the files that they were drawn from, and says how many there are. */
export async function writeSheets(
  folder: string,
  sheets: readonly OutputFile[],
  inputs: Iterable<string>,
): Promise<void> {
  await spareInputs(
    folder,
    sheets.map(({ name }) => name),
    inputs,
  );
  await writeFiles(folder, sheets);
  process.stdout.write(`${counted(sheets.length, "sheet")} written to ${folder}\n`);
}
