/** What a shell has to know of the commands to complete them, read off commander's own tree. */

import type { Argument, Command, Option } from "commander";

/** What stands in a place: a file, a folder, names of throws and chains, one of these words, or what nobody can foresee. */
export type Kind = "file" | "folder" | "throws" | "nothing" | readonly string[];

export interface CompletedOption {
  /** Without the dash. */
  readonly short?: string;
  /** Without the dashes. */
  readonly long: string;
  readonly description: string;
  /** Of its value; none: it takes none. */
  readonly value?: Kind;
  /** It takes as many values as there are. */
  readonly isList: boolean;
}

export interface CompletedCommand {
  readonly name: string;
  readonly summary: string;
  readonly options: readonly CompletedOption[];
  readonly arguments: readonly Kind[];
  /** The last argument stands for as many as there are. */
  readonly isList: boolean;
}

export interface CommandTree {
  readonly options: readonly CompletedOption[];
  readonly commands: readonly CompletedCommand[];
}

export function commandTree(program: Command): CommandTree {
  return { options: optionsOf(program), commands: program.commands.map(commandOf) };
}

const commandOf = (command: Command): CompletedCommand => ({
  name: command.name(),
  summary: command.summary() || command.description(),
  options: optionsOf(command),
  arguments: command.registeredArguments.map(kindOf),
  isList: command.registeredArguments.at(-1)?.variadic ?? false,
});

function optionsOf(command: Command): CompletedOption[] {
  // visibleOptions knows of --help too, which is no option of the command's own
  return command.createHelp().visibleOptions(command).map(optionOf);
}

function optionOf(option: Option): CompletedOption {
  const { description, variadic } = option;
  const short = option.short?.slice(1);
  const long = option.long?.slice(2) as string;
  const takesValue = option.required || option.optional;
  return { short, long, description, isList: variadic, ...(takesValue && { value: valueKind(option) }) };
}

function valueKind({ flags, long, argChoices }: Option): Kind {
  if (argChoices) return argChoices;
  if (long === "--only") return "throws";
  return named(/[<[](.*)[>\]]/.exec(flags)?.[1] ?? "");
}

function kindOf(argument: Argument): Kind {
  return argument.argChoices ?? named(argument.name());
}

/** By the word that help has for it. */
function named(word: string): Kind {
  if (/dir/i.test(word)) return /file/i.test(word) ? "file" : "folder";
  return /file|model|baked/i.test(word) ? "file" : "nothing";
}
