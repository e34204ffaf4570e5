import type { CommandTree, CompletedCommand, CompletedOption, Kind } from "./command-tree.js";

/** For zsh's completion system; sourced after compinit, or as a file _tossbake in a folder of fpath. */
export const zshScript = ({ options, commands }: CommandTree): string => `#compdef tossbake
# source <(tossbake completion zsh), after compinit
_tossbake_throws() {
  local word
  for word in $words; do
    if [[ $word == *.(yaml|yml|json) && -f $word ]]; then
      compadd -- \${(f)"$(tossbake completion --names "$word" 2>/dev/null)"}
      return
    fi
  done
}
_tossbake() {
  local curcontext="$curcontext" state line
  local -a commands
  commands=(
${commands.map(({ name, summary }) => `    ${quoted(`${name}:${summary}`)}`).join("\n")}
  )
  _arguments -C \\
${options.map(optionSpec).map(continued).join("\n")}
    '1: :->command' '*:: :->rest'
  case $state in
    command) _describe command commands ;;
    rest)
      case $line[1] in
${commands.map(commandCase).join("\n")}
      esac
      ;;
  esac
}
if [[ $funcstack[1] == _tossbake ]]; then _tossbake "$@"; else compdef _tossbake tossbake; fi
`;

const continued = (spec: string): string => `    ${spec} \\`;

const quoted = (text: string): string => `'${text.replaceAll("'", "'\\''")}'`;

function commandCase(command: CompletedCommand): string {
  const places = command.arguments.map((kind, i) => {
    const isRest = command.isList && i === command.arguments.length - 1;
    return quoted(`${isRest ? "*" : i + 1}: :${action(kind)}`);
  });
  return `        ${command.name}) _arguments ${[...command.options.map(optionSpec), ...places].join(" ")} ;;`;
}

/** One of several ways to write an option shuts the others out. */
function optionSpec(option: CompletedOption): string {
  const { short, long, isList } = option;
  const rest = `[${option.description.replace(/[[\]\\]/g, "\\$&")}]${option.value ? `:${isList ? "*-*:" : ""} :${action(option.value)}` : ""}`;
  return short ? `'(-${short} --${long})'{-${short},--${long}}${quoted(rest)}` : quoted(`--${long}${rest}`);
}

function action(kind: Kind): string {
  if (typeof kind !== "string") return `(${kind.join(" ")})`;
  return { file: "_files", folder: "_files -/", throws: "_tossbake_throws", nothing: " " }[kind];
}
