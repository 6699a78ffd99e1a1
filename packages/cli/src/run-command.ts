import { resolve } from "node:path";
import { fail, KvaneError, type Problem, problem, problemCodes } from "@kvane/core/errors";
import { answer, exitStatusOf, type JobHost, type Request, refusal, version } from "@kvane/core/job";
import { type Envelope, type HelpRecord, jsonText } from "@kvane/core/reports";
import { commandSpecs } from "./commands/index.js";
import { checkForm, deliver, packed } from "./deliver.js";
import { problemsText } from "./errors.js";
import { type CommandHost, commandHost, exampleRequests } from "./host.js";
import { checkFree } from "./output.js";
import { buildProgram, type ParsedLine } from "./program.js";
import { progressLine } from "./progress.js";
import { hideGroups, requestFrom, wishesFrom } from "./request.js";
import type { Surroundings } from "./surroundings.js";
import { usageProblem } from "./usage.js";

/** Does what the words ask and gives the exit status. */
export async function runCommand(words: readonly string[], surroundings: Surroundings): Promise<number> {
  const [command] = words;
  const asJson = words.includes("--json");
  try {
    const line = parse(words, surroundings);
    return line === null ? 0 : await execute(line, surroundings);
  } catch (error) {
    const problems = problemsOf(error, words);
    return problems.length === 0 ? 0 : refuse(refusal(command ?? "", problems), null, asJson, null, surroundings);
  }
}

/** Problems of the usage and of the output; none where the parser has only shown help. */
function problemsOf(error: unknown, words: readonly string[]): readonly Problem[] {
  if (error instanceof KvaneError) return error.problems;
  const problem = usageProblem(error, words);
  return problem === null ? [] : [problem];
}

/** The command with its first word and options; null where there is nothing to do but what the parser has printed. */
function parse(words: readonly string[], { write, writeError }: Surroundings): ParsedLine | null {
  const found: ParsedLine[] = [];
  const asked = helpOfCommand(words);
  const program = buildProgram(asked[0], version, write, (line) => found.push(line));
  if (words.length === 0) {
    writeError(program.helpInformation());
    throw new KvaneError([nothingAsked]);
  }
  program.parse(hideGroups(asked), { from: "user" });
  return found[0] ?? null;
}

const nothingAsked: Problem = {
  code: "missing-argument",
  message: "no command was given",
  where: { file: null, line: null, column: null, path: null, argument: "COMMAND" },
  expected: "a command of the list above",
  found: "nothing",
  remedy: "begin with `kvane run --example`",
};

const interrupted = problem("interrupted", "the work was cancelled before it ended", {
  remedy: "start the command again; nothing was written",
});

/** `kvane help ops` is `kvane ops --help`. */
function helpOfCommand(words: readonly string[]): readonly string[] {
  const [first, topic] = words;
  const named = first === "help" && words.length === 2 && commandSpecs.some(({ name }) => name === topic);
  return named ? [topic as string, "--help"] : words;
}

/** Prints the script of a shell, made from the table of commands. */
async function writeCompletion(shell: string | null, host: JobHost, write: Surroundings["write"]): Promise<number> {
  const { completionScript } = await import("./completion.js");
  const { topics } = ((await answer({ command: "help" }, host)).result ?? { topics: [] }) as HelpRecord;
  const words = { topics: [...topics, ...commandSpecs.map(({ name }) => name)], codes: Object.keys(problemCodes) };
  write(completionScript(shell, commandSpecs, words));
  return 0;
}

/** Requests come from a file, from the bundled example or from standard input. */
async function startBatch({ argument, options }: ParsedLine, surroundings: Surroundings): Promise<number> {
  const example = options["example"] === true;
  if (example && argument !== null)
    fail("conflicting-arguments", "a file of requests and --example are both given", {
      where: { argument: "--example" },
      expected: "one of the two",
      found: argument,
      remedy: "leave one of them out",
    });
  const { runBatch } = await import("./batch/run-batch.js");
  return runBatch(example ? exampleRequests : (argument?.trim() ?? "-"), surroundings, options["quiet"] === true);
}

async function execute(line: ParsedLine, surroundings: Surroundings): Promise<number> {
  if (line.spec.name === "completion")
    return writeCompletion(line.argument, commandHost(surroundings, undefined), surroundings.write);
  if (line.spec.name === "batch") return startBatch(line, surroundings);
  const request = requestFrom(line);
  const wishes = wishesFrom(line);
  checkForm(line.spec.name, wishes);
  if (wishes.out !== null)
    checkFree({ shown: wishes.out, full: resolve(surroundings.folder, wishes.out) }, wishes.force);
  const progress = progressLine(surroundings, wishes.quiet);
  const host = commandHost(surroundings, progress.show);
  const answered = await answer(request, host);
  progress.clear();
  if (answered.errors.length > 0) return refuse(answered, request, wishes.json, host, surroundings);
  const parcel = await packed(answered, wishes, surroundings);
  // A cancel that came during the last step is heard only after a turn of the event loop.
  await new Promise((resolve) => setImmediate(resolve));
  if (surroundings.signal.aborted) {
    const cancelled = refusal(line.spec.name, [interrupted]);
    return refuse(cancelled, request, wishes.json, host, surroundings);
  }
  deliver(parcel, wishes, surroundings);
  // A table or a drawing has no room for warnings, nor has a drafted study; the report and the JSON hold them.
  const bare = wishes.csv || wishes.svg || (line.spec.name === "study" && !wishes.json);
  if (bare && !wishes.quiet && answered.warnings.length > 0)
    surroundings.writeError(problemsText(answered.warnings, "warning", (place) => host.sourceLine(request, place)));
  return 0;
}

/** Says all that is wrong; with `--json` the answer without a result goes to the output too. */
function refuse(
  answered: Envelope<object>,
  request: Request | null,
  asJson: boolean,
  host: CommandHost | null,
  surroundings: Surroundings,
): number {
  if (asJson) surroundings.write(jsonText(answered));
  surroundings.writeError(problemsText(answered.errors, "error", (place) => host?.sourceLine(request, place) ?? null));
  // A code that is mostly a warning is no success where it stands among the errors.
  return exitStatusOf(answered.errors[0]?.code ?? "internal-fault") || 2;
}
