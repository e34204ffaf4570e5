import { Argument, Command, Option } from "commander";
import { RequestError } from "../math/request-error.js";
import { openThrowFile } from "../node/throw-file.js";
import { commandTree } from "./command-tree.js";
import { bashScript } from "./completion-bash.js";
import { fishScript } from "./completion-fish.js";
import { zshScript } from "./completion-zsh.js";

const SCRIPTS = { bash: bashScript, zsh: zshScript, fish: fishScript };

export const completionCommand = () =>
  new Command("completion")
    .description(
      "print a script by which the shell completes commands, options, files, and throws' names after --only",
    )
    .addArgument(new Argument("[shell]", "which shell").choices(Object.keys(SCRIPTS)))
    // what the scripts ask back
    .addOption(new Option("--names <throwfile>", "print the names of its throws and chains").hideHelp())
    .addHelpText(
      "after",
      `
Examples:
  tossbake completion bash > ~/.tossbake.bash   # and in ~/.bashrc: source ~/.tossbake.bash
  tossbake completion zsh > ~/.tossbake.zsh     # and in ~/.zshrc, after compinit: source ~/.tossbake.zsh
  tossbake completion fish > ~/.config/fish/completions/tossbake.fish

Print it anew after an update, so that it knows what is new.`,
    )
    .action(
      async (shell: keyof typeof SCRIPTS | undefined, { names }: { names?: string }, command: Command) => {
        if (names !== undefined) {
          const { file } = await openThrowFile(names);
          process.stdout.write(
            [...file.throws.keys(), ...file.chains.keys()].map((name) => `${name}\n`).join(""),
          );
          return;
        }
        if (shell === undefined)
          throw new RequestError(
            ["completion"],
            "no shell is named",
            `one of ${Object.keys(SCRIPTS).join(", ")}`,
          );
        process.stdout.write(SCRIPTS[shell](commandTree(command.parent as Command)));
      },
    );
