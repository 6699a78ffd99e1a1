import { fail } from "@kvane/core/errors";
import { Command, Option } from "commander";
import type { CommandSpec } from "./command-spec.js";
import { commandSpecs } from "./commands/index.js";
import { flagOf, type OptionName, type OptionSpec, optionSpecs, takesValue } from "./options.js";
import type { ParsedLine } from "./parsed-line.js";

/** Fixed, so that help looks the same everywhere. */
const helpWidth = 100;

/**
 * The program; `onCommand` gets what was parsed, `write` all help. Where the first word is a command, the parser is not
 * told of the others: building them costs a twentieth of a quick command's time.
 */
export function buildProgram(
  command: string | undefined,
  version: string,
  write: (text: string) => void,
  onCommand: (line: ParsedLine) => void,
): Command {
  const program = new Command("kvane");
  program
    .description("Magnetic structures from neutron data: from satellite peaks to the propagation vector and the modes.")
    .version(version, "--version", "print the version")
    .helpOption("-h, --help", "show help")
    .helpCommand(false)
    .usage("COMMAND [GROUP | STUDY.yaml] [options]")
    .configureHelp({ helpWidth })
    .configureOutput({ writeOut: write, writeErr: write, outputError: () => {}, getOutHelpWidth: () => helpWidth })
    .exitOverride()
    .addHelpText("after", "\nTo begin with:\n  kvane run --example\n  kvane help topics");
  const named = commandSpecs.filter(({ name }) => name === command);
  for (const spec of named.length > 0 ? named : commandSpecs) addCommand(program, spec, onCommand);
  return program;
}

const argumentTexts = {
  "group or study": ["[GROUP|STUDY]", "space group, study file or CIF (.yaml, .cif, - for standard input)"],
  study: ["[STUDY]", "study file or CIF (.yaml, .cif, - for standard input)"],
  cif: ["[FILE.cif]", "CIF of the nuclear structure (- for standard input)"],
  moments: ["[FILE]", "magnetic CIF (.mcif, .cif) or list of moments, - for standard input"],
  scan: ["[FILE|STUDY]", "temperature scan (- for standard input), or a study that names one (.yaml)"],
  code: ["[CODE]", "code of a problem; without it all are listed"],
  topic: ["[TOPIC]", "topic or command; without it the topics are listed"],
  shell: ["[SHELL]", "bash, zsh or fish"],
  requests: ["[FILE]", "requests, one object of JSON a line (without it, or with -, from standard input)"],
} as const;

function addCommand(program: Command, spec: CommandSpec, onCommand: (line: ParsedLine) => void): void {
  const [argument, about] = argumentTexts[spec.argument];
  const command = program
    .command(spec.name)
    .summary(spec.summary)
    .description(
      [`${spec.summary[0]?.toUpperCase()}${spec.summary.slice(1)}.`, spec.limits].filter(Boolean).join("\n\n"),
    )
    .argument(argument, about)
    .addHelpText(
      "after",
      `\nExample${spec.examples.length > 1 ? "s" : ""}:\n${spec.examples.map((one) => `  ${one}`).join("\n")}${moreText(spec)}`,
    )
    .action((first: string | undefined, options: { [attribute: string]: unknown }) =>
      onCommand({ spec, argument: first ?? null, options }),
    );
  for (const name of spec.options) command.addOption(buildOption(name));
}

function moreText({ topics = [] }: CommandSpec): string {
  return topics.length === 0 ? "" : `\n\nMore:\n${topics.map((one) => `  kvane help ${one}`).join("\n")}`;
}

function buildOption(name: OptionName): Option {
  const spec: OptionSpec = optionSpecs[name];
  const { flags, about, repeatable } = spec;
  const option = new Option(flags, repeatable ? `${about} (repeatable)` : about);
  if (!takesValue(spec)) return option;
  return option.argParser((value: string, previous: unknown) => {
    if (/^--[a-z]/.test(value)) swallowedOption(spec, value);
    if (repeatable) return [...((previous as readonly string[] | undefined) ?? []), value];
    if (previous !== undefined) givenTwice(spec);
    return value;
  });
}

/** An option that takes the next option for its value has lost its own. */
function swallowedOption(option: OptionSpec, found: string): never {
  fail("missing-argument", `${option.flags} came without its value`, {
    where: { argument: flagOf(option) },
    expected: `a value: ${option.flags}`,
    found,
    remedy: "give the value directly behind the option",
  });
}

function givenTwice(option: OptionSpec): never {
  fail("conflicting-arguments", `${option.flags} was given twice`, {
    where: { argument: flagOf(option) },
    expected: "the option once",
    found: "more than once",
    remedy: "leave one of them out",
  });
}
