import { Command } from "commander";
import { throwFileSchema } from "../throwfile/schema.js";

export const schemaCommand = () =>
  new Command("schema")
    .description("print the throw file's JSON Schema, by which an editor completes and checks it")
    .addHelpText("after", "\nExample:\n  tossbake schema > throws.schema.json")
    .action(() => {
      process.stdout.write(`${JSON.stringify(throwFileSchema(), null, 2)}\n`);
    });
