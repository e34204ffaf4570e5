import type { CommandTree, CompletedCommand, CompletedOption, Kind } from "./command-tree.js";

export const fishScript = ({
  options,
  commands,
}: CommandTree): string => `# tossbake completion fish > ~/.config/fish/completions/tossbake.fish
function __tossbake_throws
  for word in (commandline -opc)
    if string match -qr '\\.(ya?ml|json)$' -- $word; and test -f $word
      tossbake completion --names $word 2>/dev/null
      return
    end
  end
end
complete -c tossbake -f
${options.map((option) => line("__fish_use_subcommand", option)).join("\n")}
${commands.map(({ name, summary }) => `complete -c tossbake -n __fish_use_subcommand -a ${name} -d ${quoted(summary)}`).join("\n")}
${commands.flatMap(commandLines).join("\n")}
`;

const quoted = (text: string): string => `'${text.replace(/['\\]/g, "\\$&")}'`;

function commandLines(command: CompletedCommand): string[] {
  const within = `__fish_seen_subcommand_from ${command.name}`;
  // fish does not count the places of arguments: what any of them may be is offered in all
  const places = [...new Set(command.arguments.map(values))].filter((text) => text !== "");
  return [
    ...command.options.map((option) => line(within, option)),
    ...places.map((text) => `complete -c tossbake -n '${within}' ${text}`),
  ];
}

function line(within: string, { short, long, description, value }: CompletedOption): string {
  const flags = `${short ? `-s ${short} ` : ""}-l ${long}`;
  const takes = value ? ` ${value === "file" ? "-r -F" : `-x ${values(value)}`}`.trimEnd() : "";
  return `complete -c tossbake -n '${within}' ${flags} -d ${quoted(description)}${takes}`;
}

function values(kind: Kind): string {
  if (typeof kind !== "string") return `-a ${quoted(kind.join(" "))}`;
  return {
    file: "-F",
    folder: "-a '(__fish_complete_directories)'",
    throws: "-a '(__tossbake_throws)'",
    nothing: "",
  }[kind];
}
