/** The command line: each command is a file of its own; here are the exit codes and what every command shares. */

import { Command, CommanderError } from "commander";
import { ModelError } from "../gltf/model.js";
import { RequestError } from "../math/request-error.js";
import { MachineError } from "../node/machine-error.js";
import { VERSION } from "../record/version.js";
import { ThrowFileError } from "../throwfile/errors.js";
import { bakeCommand } from "./bake.js";
import { csvCommand } from "./csv.js";
import { ExitCode } from "./exit-code.js";
import { newCommand } from "./new.js";
import { schemaCommand } from "./schema.js";
import { verifyCommand } from "./verify.js";
import { waysCommand } from "./ways.js";
import { weighCommand } from "./weigh.js";

/** Runs one command line (without node and script) and answers its exit code; prints, but never ends the process. */
export async function main(args: readonly string[]): Promise<number> {
  let code: number = ExitCode.done;
  const answer = (value: number) => {
    code = value;
  };
  const program = new Command("tossbake")
    .description(
      "Turns a written description of a throw into glTF animation clips that move as the real prop would.",
    )
    .version(VERSION, "--version", "print the version")
    .helpOption("--help", "say how a command is used")
    .helpCommand(false)
    .showHelpAfterError("(tossbake --help lists the commands)")
    .exitOverride();
  const commands = [
    newCommand(),
    weighCommand(),
    waysCommand(answer),
    bakeCommand(answer),
    verifyCommand(answer),
    csvCommand(answer),
    schemaCommand(),
  ];
  for (const command of commands) program.addCommand(command.copyInheritedSettings(program));
  try {
    await program.parseAsync(args, { from: "user" });
    return code;
  } catch (error) {
    return explain(error);
  }
}

/** Prints what went wrong in one message and says whose fault it is; anything unforeseen is ours and keeps its stack. */
function explain(error: unknown): number {
  if (error instanceof CommanderError) return error.exitCode === 0 ? ExitCode.done : ExitCode.wrongRequest;
  if (error instanceof ThrowFileError || error instanceof ModelError || error instanceof RequestError) {
    process.stderr.write(`${error.message}\n`);
    return ExitCode.wrongRequest;
  }
  if (error instanceof MachineError) {
    process.stderr.write(`${error.message}\n`);
    return ExitCode.machine;
  }
  throw error;
}
