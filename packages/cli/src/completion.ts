import { fail } from "@kvane/core/errors";
import type { CommandSpec } from "./command-spec.js";
import { flagOf, type OptionName, type OptionSpec, optionSpecs, takesValue } from "./options.js";

/** Shells that a completion is made for. */
const completionShells = ["bash", "zsh", "fish"] as const;

type Shell = (typeof completionShells)[number];

/** Options whose value is one of a few words. */
const valueWords: { readonly [name in OptionName]?: readonly string[] } = {
  as: ["d", "q", "two-theta", "hkl"],
  exponent: ["minus", "plus"],
  phase: ["lattice", "position"],
  factor: ["one", "half"],
  components: ["lattice", "crystal", "cartesian"],
  maxDimension: ["0", "1", "2", "3"],
};

/** Options whose value is the name of a file or folder. */
const fileValue = /<(?:FILE|DIR)>$/;

/** What a completion knows of one command. */
interface CommandWords {
  readonly name: string;
  readonly summary: string;
  /** Fixed words that may stand first; null where it is a file. */
  readonly first: readonly string[] | null;
  readonly options: readonly {
    readonly flag: string;
    readonly about: string;
    readonly values: readonly string[] | "files" | null;
  }[];
}

/**
 * The completion script of a shell, made from the table of commands: it starts nothing and asks nothing.
 *
 * @param topics words behind `help`, and codes behind `explain`
 */
export function completionScript(
  shell: string | null,
  specs: readonly CommandSpec[],
  words: { readonly topics: readonly string[]; readonly codes: readonly string[] },
): string {
  const commands = specs.map((spec) => wordsOf(spec, words));
  switch (knownShell(shell)) {
    case "bash":
      return bashScript(commands);
    case "zsh":
      return zshScript(commands);
    case "fish":
      return fishScript(commands);
  }
}

function knownShell(shell: string | null): Shell {
  const found = completionShells.find((one) => one === shell);
  if (found !== undefined) return found;
  return fail(shell === null ? "missing-argument" : "invalid-argument", "which shell is the completion for?", {
    where: { argument: "SHELL" },
    expected: completionShells.join(", "),
    found: shell ?? "nothing",
    remedy: 'for bash: put `eval "$(kvane completion bash)"` into ~/.bashrc',
  });
}

function wordsOf(
  { name, summary, argument, options }: CommandSpec,
  { topics, codes }: { readonly topics: readonly string[]; readonly codes: readonly string[] },
): CommandWords {
  const first = { code: codes, topic: topics, shell: completionShells } as const;
  return {
    name,
    summary,
    first: Object.hasOwn(first, argument) ? first[argument as keyof typeof first] : null,
    options: options.map((option) => {
      const spec: OptionSpec = optionSpecs[option];
      const { flags, about } = spec;
      const takesFile = fileValue.test(flags);
      return {
        flag: flagOf(spec),
        about,
        values: valueWords[option] ?? (takesFile ? "files" : takesValue(spec) ? [] : null),
      };
    }),
  };
}

/** Inside single quotes of bash and zsh. */
function quoted(text: string): string {
  return `'${text.replaceAll("'", "'\\''")}'`;
}

/** Values by flag over all commands: a flag means the same everywhere. */
function valuesByFlag(commands: readonly CommandWords[]): ReadonlyMap<string, readonly string[] | "files"> {
  return new Map(
    commands.flatMap(({ options }) =>
      options.flatMap(({ flag, values }) => (values === null ? [] : [[flag, values] as const])),
    ),
  );
}

function bashScript(commands: readonly CommandWords[]): string {
  const values = [...valuesByFlag(commands)].filter(([flag]) => flag !== "--out");
  const cases = values.map(([flag, list]) =>
    list === "files"
      ? `    ${flag}) COMPREPLY=($(compgen -f -- "$word")); return ;;`
      : `    ${flag}) COMPREPLY=($(compgen -W ${quoted(list.join(" "))} -- "$word")); return ;;`,
  );
  const perCommand = commands.map(({ name, first, options }) => {
    const flags = options.map(({ flag }) => flag).join(" ");
    return `    ${name}) options=${quoted(`${flags} --help`)}; first=${quoted((first ?? []).join(" "))} ;;`;
  });
  return `# Completion of kvane for bash: eval "$(kvane completion bash)"
_kvane() {
  local word="\${COMP_WORDS[COMP_CWORD]}" before="\${COMP_WORDS[COMP_CWORD-1]}" options= first=
  COMPREPLY=()
  if [ "$COMP_CWORD" -eq 1 ]; then
    COMPREPLY=($(compgen -W ${quoted(commands.map(({ name }) => name).join(" "))} -- "$word"))
    return
  fi
  case "$before" in
    --out) COMPREPLY=($(compgen -f -- "$word")); return ;;
${cases.join("\n")}
  esac
  case "\${COMP_WORDS[1]}" in
${perCommand.join("\n")}
  esac
  case "$word" in
    -*) COMPREPLY=($(compgen -W "$options" -- "$word")) ;;
    *) if [ -n "$first" ]; then COMPREPLY=($(compgen -W "$first" -- "$word")); else COMPREPLY=($(compgen -f -- "$word")); fi ;;
  esac
}
complete -o filenames -F _kvane kvane
`;
}

function zshScript(commands: readonly CommandWords[]): string {
  // In descriptions of _arguments a colon and brackets are syntax.
  const plain = (text: string) => text.replace(/[[\]:\\]/g, "\\$&");
  const option = ({ flag, about, values }: CommandWords["options"][number]) => {
    const value = values === null ? "" : values === "files" ? ":file:_files" : `:value:(${values.join(" ")})`;
    return quoted(`*${flag}[${plain(about)}]${value}`);
  };
  const perCommand = commands.map(({ name, first, options }) => {
    const start = first === null ? "'*:file:_files'" : quoted(`1:word:(${first.join(" ")})`);
    return `    ${name}) _arguments ${[start, ...options.map(option)].join(" ")} ;;`;
  });
  const names = commands.map(({ name, summary }) => `    ${quoted(`${name}:${summary}`)}`);
  return `#compdef kvane
# Completion of kvane for zsh: eval "$(kvane completion zsh)"
_kvane() {
  local -a commands
  commands=(
${names.join("\n")}
  )
  if (( CURRENT == 2 )); then
    _describe command commands
    return
  fi
  local command="\${words[2]}"
  shift words
  (( CURRENT-- ))
  case "$command" in
${perCommand.join("\n")}
  esac
}
compdef _kvane kvane
`;
}

function fishScript(commands: readonly CommandWords[]): string {
  const text = (words: string) => `'${words.replace(/[\\']/g, "\\$&")}'`;
  const lines = commands.flatMap(({ name, summary, first, options }) => [
    `complete -c kvane -n __fish_use_subcommand -f -a ${name} -d ${text(summary)}`,
    ...(first === null
      ? []
      : [`complete -c kvane -n '__fish_seen_subcommand_from ${name}' -f -a ${text(first.join(" "))}`]),
    ...options.map(({ flag, about, values }) => {
      const value = values === null ? "" : values === "files" ? " -r -F" : ` -x -a ${text(values.join(" "))}`;
      return `complete -c kvane -n '__fish_seen_subcommand_from ${name}' -l ${flag.slice(2)} -d ${text(about)}${value}`;
    }),
  ]);
  return `# Completion of kvane for fish: kvane completion fish | source\n${lines.join("\n")}\n`;
}
