/** The command line: each command is a file of its own; here are the exit codes and what every command shares. */

import { Command, CommanderError } from "commander";
import { ModelError } from "../gltf/model.js";
import { RequestError } from "../math/request-error.js";
import { Interrupted } from "../node/interrupted.js";
import { MachineError } from "../node/machine-error.js";
import { VERSION } from "../record/version.js";
import { ThrowFileError } from "../throwfile/errors.js";
import { bakeCommand } from "./bake.js";
import { completionCommand } from "./completion.js";
import { csvCommand } from "./csv.js";
import { ExitCode } from "./exit-code.js";
import { describeCommands, inOrder } from "./help.js";
import { mergeCommand } from "./merge.js";
import { newCommand } from "./new.js";
import { previewCommand } from "./preview.js";
import { schemaCommand } from "./schema.js";
import { strobeCommand } from "./strobe.js";
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
    .usage("COMMAND …")
    .version(VERSION, "--version", "print the version")
    .helpOption("--help", "say how tossbake, or a command, is used")
    .configureHelp({ subcommandTerm: (command) => command.name() })
    .helpCommand(false)
    .showHelpAfterError("(tossbake --help lists the commands)")
    .exitOverride();
  const commands = [
    newCommand(),
    weighCommand(),
    waysCommand(answer),
    bakeCommand(answer),
    mergeCommand(answer),
    previewCommand(answer),
    strobeCommand(answer),
    verifyCommand(answer),
    csvCommand(answer),
    schemaCommand(),
    completionCommand(),
  ];
  for (const command of inOrder(commands)) program.addCommand(command.copyInheritedSettings(program));
  describeCommands(program);
  try {
    await program.parseAsync(args, { from: "user" });
    return code;
  } catch (error) {
    return explain(error);
  }
}

/** What the library calls by the same names without dashes. */
const LIBRARY_OPTIONS = new Set(["only", "takes", "shard", "rate"]);

/** Prints what went wrong in one message and says whose fault it is. */
function explain(error: unknown): number {
  if (error instanceof CommanderError) return error.exitCode === 0 ? ExitCode.done : ExitCode.wrongRequest;
  if (error instanceof ThrowFileError || error instanceof ModelError || error instanceof RequestError) {
    const isOption = error instanceof RequestError && LIBRARY_OPTIONS.has(error.path.join());
    process.stderr.write(`${isOption ? "--" : ""}${error.message}\n`);
    return ExitCode.wrongRequest;
  }
  if (error instanceof Interrupted) {
    process.stderr.write(`${error.message}\n`);
    return ExitCode.interrupted;
  }
  process.stderr.write(error instanceof MachineError ? `${error.message}\n` : ownFault(error));
  return ExitCode.machine;
}

/** Anything unforeseen. It must not look like drift or like a wrong request, and whoever mends it needs the stack. */
export const ownFault = (error: unknown): string =>
  `This is a fault of tossbake ${VERSION} itself, not of what was asked for. Please report it with your command line and these lines:\n${error instanceof Error ? error.stack : String(error)}\n`;
