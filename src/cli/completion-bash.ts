import type { CommandTree, CompletedCommand, CompletedOption, Kind } from "./command-tree.js";

/**
 * For bash 3.2 and later. `option` is the last option before the cursor while its values go on, `place` the number of the argument that the cursor
 * is in.
 */
export const bashScript = ({
  options,
  commands,
}: CommandTree): string => `# source <(tossbake completion bash)
_tossbake() {
  local current="\${COMP_WORDS[COMP_CWORD]}" command="" option="" kind="" words="" place=0 i word file=""
  local IFS=$'\\n'
  COMPREPLY=()
  for ((i = 1; i < COMP_CWORD; i++)); do
    word="\${COMP_WORDS[i]}"
    if [[ -z $command ]]; then
      [[ $word != -* ]] && command="$word"
      continue
    fi
    if [[ $word == -* ]]; then
      option=""
      case "$command $word" in
${cases(commands, (option) => option.value !== undefined, "option=$word")}
      esac
    elif [[ -n $option ]]; then
      case "$command $option" in
${cases(commands, (option) => option.value !== undefined && !option.isList, 'option=""')}
      esac
    else
      place=$((place + 1))
    fi
    [[ $word == *.yaml || $word == *.yml || $word == *.json ]] && [[ -z $file && -f $word ]] && file="$word"
  done
  if [[ -z $command ]]; then
    words="${lines(commands.map(({ name }) => name))}"
    [[ $current == -* ]] && words="${lines(options.flatMap(flags))}"
  elif [[ $current == -* ]]; then
    case "$command" in
${commands.map((command) => `      ${command.name}) words="${lines(command.options.flatMap(flags))}" ;;`).join("\n")}
    esac
  elif [[ -n $option ]]; then
    case "$command $option" in
${commands.flatMap((command) => command.options.filter(({ value }) => value).map((option) => `      ${patterns(command, option)}) ${settle(option.value as Kind)} ;;`)).join("\n")}
    esac
  else
    case "$command $place" in
${commands.flatMap(places).join("\n")}
    esac
  fi
  case "$kind" in
    file | folder)
      compopt -o filenames 2>/dev/null
      if [[ $kind == file ]]; then COMPREPLY=($(compgen -f -- "$current")); else COMPREPLY=($(compgen -d -- "$current")); fi
      return
      ;;
    throws) [[ -n $file ]] && words="$("\${COMP_WORDS[0]}" completion --names "$file" 2>/dev/null)" ;;
  esac
  [[ -n $words ]] && COMPREPLY=($(compgen -W "$words" -- "$current"))
}
complete -F _tossbake tossbake
`;

const lines = (words: readonly string[]): string => words.join("\n");

const flags = ({ short, long }: CompletedOption): string[] => [...(short ? [`-${short}`] : []), `--${long}`];

const patterns = ({ name }: CompletedCommand, option: CompletedOption): string =>
  flags(option)
    .map((flag) => `"${name} ${flag}"`)
    .join(" | ");

const cases = (
  commands: readonly CompletedCommand[],
  isOne: (option: CompletedOption) => boolean,
  what: string,
): string =>
  commands
    .flatMap((command) =>
      command.options.filter(isOne).map((option) => `        ${patterns(command, option)}) ${what} ;;`),
    )
    .join("\n");

const settle = (kind: Kind): string => (typeof kind === "string" ? `kind=${kind}` : `words="${lines(kind)}"`);

const places = (command: CompletedCommand): string[] =>
  command.arguments.map((kind, i) => {
    const isRest = command.isList && i === command.arguments.length - 1;
    return `      "${command.name} "${isRest ? "*" : i}) ${settle(kind)} ;;`;
  });
