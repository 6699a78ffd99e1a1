import { KvaneError, type Problem } from "@kvane/core/errors";
import { version } from "@kvane/core/job";
import { commandSpecs } from "./commands/index.js";
import type { ParsedLine } from "./parsed-line.js";
import { buildProgram } from "./program.js";
import type { Surroundings } from "./surroundings.js";
import { usageProblem, valueOptions } from "./usage.js";

/**
 * The command with its first word and options; null where there is nothing to do but what the parser has printed. Throws
 * a `KvaneError` for what the parser does not understand.
 */
export function parseLine(words: readonly string[], { write, writeError }: ParserOutputs): ParsedLine | null {
  const found: ParsedLine[] = [];
  const asked = helpOfCommand(words);
  const program = buildProgram(asked[0], version, write, (line) => found.push(line));
  if (words.length === 0) {
    writeError(program.helpInformation());
    throw new KvaneError([nothingAsked]);
  }
  try {
    program.parse(hideGroups(asked), { from: "user" });
  } catch (error) {
    if (error instanceof KvaneError) throw error;
    const problem = usageProblem(error, words);
    if (problem !== null) throw new KvaneError([problem]);
  }
  return found[0] ?? null;
}

type ParserOutputs = Pick<Surroundings, "write" | "writeError">;

const nothingAsked: Problem = {
  code: "missing-argument",
  message: "no command was given",
  where: { file: null, line: null, column: null, path: null, argument: "COMMAND" },
  expected: "a command of the list above",
  found: "nothing",
  remedy: "begin with `kvane run --example`",
};

/** `kvane help ops` is `kvane ops --help`. */
function helpOfCommand(words: readonly string[]): readonly string[] {
  const [first, topic] = words;
  const named = first === "help" && words.length === 2 && commandSpecs.some(({ name }) => name === topic);
  return named ? [topic as string, "--help"] : words;
}

/**
 * Words that begin with `-` and go on with a letter of a Hall symbol or a coordinate are a GROUP, not an option: a blank
 * in front hides them from the parser.
 */
function hideGroups(words: readonly string[]): string[] {
  return words.map((word, index) => {
    const isValue = index > 0 && valueOptions.has(words[index - 1] as string);
    return !isValue && /^-[PABCIRFHxyz]/.test(word) ? ` ${word}` : word;
  });
}
