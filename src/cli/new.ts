import { readFile } from "node:fs/promises";
import { Command } from "commander";
import { writeFreshFiles } from "../node/fresh-files.js";
import { throwFileSchema } from "../throwfile/schema.js";

/** As it lies in the package, beside what is built. */
const STARTER = new URL("../../assets/starter/", import.meta.url);

const FILES = [
  ["anchor.throws.yaml", "three throws, with comments: change them, they are yours"],
  ["anchor.glb", "what is thrown"],
  ["throws.schema.json", "by which editors complete and check the throw file as you type"],
  [".gitattributes", "by which Git leaves the clips' bytes alone"],
] as const;

export const newCommand = () =>
  new Command("new")
    .description("make a folder to start from: a throw file that explains itself, and a prop; ready to bake")
    .argument("<dir>", "the folder; made where there is none, and nothing in it is written over")
    .addHelpText("after", "\nExample:\n  tossbake new first-throws")
    .action(async (folder: string) => {
      await writeFreshFiles(folder, await Promise.all(FILES.map(([name]) => starterFile(name))));
      process.stdout.write(report(folder));
    });

async function starterFile(name: string): Promise<{ name: string; content: Uint8Array | string }> {
  const content =
    name === "throws.schema.json"
      ? `${JSON.stringify(throwFileSchema(), null, 2)}\n`
      : await readFile(new URL(name, STARTER));
  return { name, content };
}

function report(folder: string): string {
  const width = Math.max(...FILES.map(([name]) => name.length));
  // as they were called: by npx within a project, or by themselves
  const program = process.env.npm_command === "exec" ? "npx tossbake" : "tossbake";
  return [
    `${folder} has now`,
    ...FILES.map(([name, what]) => `  ${name.padEnd(width)}  ${what}`),
    "",
    "Next, what the prop is like, and then its clips:",
    `  cd ${/^[\w./-]+$/.test(folder) ? folder : `"${folder}"`}`,
    `  ${program} weigh anchor.throws.yaml`,
    `  ${program} bake anchor.throws.yaml -o clips`,
    "",
    "Drag a .glb file of clips into a glTF viewer to see it fly.",
    "",
  ].join("\n");
}
