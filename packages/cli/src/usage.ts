import { type Problem, problem } from "@kvane/core/errors";
import { CommanderError } from "commander";
import type { ArgumentKind } from "./command-spec.js";
import { commandSpecs } from "./commands/index.js";
import { flagOf, type OptionSpec, optionSpecs, takesValue } from "./options.js";

/**
 * A complaint of the parser as a problem, or null when it was no complaint (help and version were asked for).
 *
 * @param words the command line, from the command on
 */
export function usageProblem(error: unknown, words: readonly string[]): Problem | null {
  if (!(error instanceof CommanderError)) throw error;
  if (error.exitCode === 0) return null;
  return fromParser(error, words);
}

function fromParser({ code, message }: CommanderError, words: readonly string[]): Problem {
  // A word of the line may have line ends of its own, so that only the last line can be told to be a suggestion.
  const [whole, suggestion = null] = /\n\(Did you mean (.*)\?\)$/.exec(message) ?? [""];
  const text = message
    .slice(0, message.length - whole.length)
    .replace(/^error: /, "")
    .replace(/\s+/g, " ");
  const command = /^[a-z]/.test(words[0] ?? "") ? ` ${words[0]}` : "";
  const seeHelp = `see \`kvane${code === "commander.unknownCommand" ? "" : command} --help\` for what it takes`;
  const remedy = suggestion === null ? seeHelp : `did you mean ${suggestion.replace(/^one of /, "one of: ")}?`;
  const named = /'(.*)'/.exec(text)?.[1] ?? null;
  const found = named === null ? {} : { found: named };
  switch (code) {
    case "commander.unknownOption":
      return problem("unknown-option", text, {
        where: { argument: named },
        expected: "an option of the command",
        ...found,
        remedy,
      });
    case "commander.unknownCommand":
      return problem("unknown-command", text, {
        where: { argument: "COMMAND" },
        expected: "a command",
        ...found,
        remedy,
      });
    case "commander.optionMissingArgument":
      return problem("missing-argument", text, {
        where: { argument: named?.split(" ")[0] ?? null },
        expected: named === null ? "a value" : `a value: ${named}`,
        found: "nothing",
        remedy: "give the value directly behind the option",
      });
    case "commander.excessArguments":
      return excessProblem(words) ?? problem("invalid-argument", text, behindDashes(words) ?? { remedy: seeHelp });
    default:
      return problem("invalid-argument", text, { remedy: seeHelp });
  }
}

/** Options that take a value, as written: what follows them is no GROUP. */
export const valueOptions: ReadonlySet<string> = new Set(Object.values(optionSpecs).filter(takesValue).map(flagOf));

/** Options that may be given more than once. */
const repeatable: ReadonlySet<string> = new Set(
  Object.values<OptionSpec>(optionSpecs)
    .filter((option) => option.repeatable === true)
    .map(flagOf),
);

/** What the first word behind a command is; null for no command. */
function argumentOf(command: string): ArgumentKind | null {
  return commandSpecs.find(({ name }) => name === command)?.argument ?? null;
}

/** What is wrong where `--` stands alone, behind which options are none. */
function behindDashes(words: readonly string[]) {
  if (!words.includes("--")) return null;
  return {
    where: { argument: "--" },
    expected: "one word behind `--`: options there count as words",
    found: words.slice(words.indexOf("--") + 1).join(" "),
    remedy: "leave `--` out",
  };
}

/** Words that belong to nothing: mostly a value with blanks that was not put into quotation marks. */
function excessProblem(words: readonly string[]): Problem | null {
  const [command = ""] = words;
  // The runs of words that are neither options nor their first value, with what stands before them.
  const runs: { readonly option: string | null; readonly texts: string[] }[] = [];
  let open: (typeof runs)[number] | null = null;
  for (let index = 1; index < words.length; index++) {
    const word = words[index] as string;
    if (/^--/.test(word)) {
      open = null;
      if (!valueOptions.has(word) || index + 1 >= words.length) continue;
      open = { option: word, texts: [words[index + 1] as string] };
      runs.push(open);
      index += 1;
    } else if (open === null) {
      open = { option: null, texts: [word] };
      runs.push(open);
    } else open.texts.push(word);
  }
  const stray = runs.find(({ texts }) => texts.length > 1) ?? runs.filter(({ option }) => option === null)[1];
  if (stray === undefined) return null;
  const { option, texts } = stray;
  // Values that hold blanks were in quotation marks already: there are several of them.
  if (option !== null && repeatable.has(option) && texts.every((text) => /\s/.test(text.trim())))
    return problem("invalid-argument", `${option} takes one value at a time`, {
      where: { argument: option },
      expected: "the option once for each value",
      found: `${texts.length} values`,
      remedy: `give ${texts.map((text) => `${option} "${text}"`).join(" ")}`,
    });
  if (option !== null)
    return problem("invalid-argument", `the value of ${option} breaks off at a blank`, {
      where: { argument: option },
      expected: "one word, or words in quotation marks",
      found: texts.join(" "),
      remedy: `put it into quotation marks: ${option} "${texts.join(" ")}"`,
    });
  const excess = { found: texts.slice(1).join(" ") || (texts[0] ?? "") };
  if (["topic", "code"].includes(argumentOf(command) ?? ""))
    return problem("invalid-argument", `\`kvane ${command}\` takes one word`, {
      where: { argument: command === "help" ? "TOPIC" : "CODE" },
      expected: command === "help" ? "one topic or command" : "one code",
      ...excess,
      remedy: `ask for one at a time: kvane ${command} ${texts[0] ?? ""}`,
    });
  if (argumentOf(command) === "requests")
    return problem("invalid-argument", "`kvane batch` takes one file of requests", {
      where: { argument: "FILE" },
      expected: "one file, or none for standard input",
      ...excess,
      remedy: "give one file after the other, or all through standard input: cat FILES | kvane batch",
    });
  const files = texts.some((text) => /\.(ya?ml|cif)$/i.test(text)) || argumentOf(command) === "study";
  return files
    ? problem("invalid-argument", `\`kvane ${command}\` takes one study`, {
        where: { argument: "STUDY" },
        expected: "one study file",
        ...excess,
        remedy: "do one study after the other",
      })
    : problem("invalid-argument", "the group breaks off at a blank", {
        where: { argument: "GROUP" },
        expected: "one word, or words in quotation marks",
        found: texts.join(" "),
        remedy: `put it into quotation marks: kvane ${command} "${texts.join(" ")}"`,
      });
}
