import { resolve } from "node:path";
import { fail, KvaneError, problem, problemCodes } from "@kvane/core/errors";
import { answer, exitStatusOf, type JobHost, type Request, refusal } from "@kvane/core/job";
import { type Envelope, type HelpRecord, jsonText } from "@kvane/core/reports";
import { commandSpecs } from "./commands/index.js";
import { checkForm, deliver, packed } from "./deliver.js";
import { problemsText } from "./errors.js";
import { exampleRequests } from "./example-files.js";
import { type CommandHost, commandHost } from "./host.js";
import type { ParsedLine } from "./parsed-line.js";
import { plainLine } from "./plain-line.js";
import { progressLine } from "./progress.js";
import { requestFrom, wishesFrom } from "./request.js";
import type { Surroundings } from "./surroundings.js";

/** Does what the words ask and gives the exit status. */
export async function runCommand(words: readonly string[], surroundings: Surroundings): Promise<number> {
  const [command] = words;
  const asJson = words.includes("--json");
  try {
    const line = plainLine(words) ?? (await import("./parse-line.js")).parseLine(words, surroundings);
    return line === null ? 0 : await execute(line, surroundings);
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    return refuse(refusal(command ?? "", error.problems), null, asJson, null, surroundings);
  }
}

const interrupted = problem("interrupted", "the work was cancelled before it ended", {
  remedy: "start the command again; nothing was written",
});

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
  if (wishes.out !== null) {
    const { checkFree } = await import("./output.js");
    checkFree({ shown: wishes.out, full: resolve(surroundings.folder, wishes.out) }, wishes.force);
  }
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
  await deliver(parcel, wishes, surroundings);
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
