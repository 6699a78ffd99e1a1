import { type Problem, problem } from "@kvane/core/errors";
import { CommanderError } from "commander";

/** A complaint of the parser as a problem, or null when it was no complaint (help and version were asked for). */
export function usageProblem(error: unknown): Problem | null {
  if (!(error instanceof CommanderError)) throw error;
  if (error.exitCode === 0) return null;
  return fromParser(error);
}

const seeHelp = "see `kvane COMMAND --help` for what it takes";

function fromParser({ code, message }: CommanderError): Problem {
  const [text = "", ...more] = message.replace(/^error: /, "").split("\n");
  const suggestion = /Did you mean (.*)\?/.exec(more.join(" "))?.[1] ?? null;
  const remedy = suggestion === null ? seeHelp : `did you mean ${suggestion.replace(/^one of /, "one of: ")}?`;
  const named = /'([^']*)'/.exec(text)?.[1] ?? null;
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
      return problem("invalid-argument", text, {
        expected: "one GROUP or file behind the command",
        remedy: 'put a GROUP with blanks into quotation marks: "P n m a"',
      });
    default:
      return problem("invalid-argument", text, { remedy: seeHelp });
  }
}
