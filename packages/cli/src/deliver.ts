import { resolve } from "node:path";
import type { Problem } from "@kvane/core/errors";
import { version } from "@kvane/core/job";
import { type Envelope, jsonText, type RunRecord, reportCsv, reportText, resultFolder } from "@kvane/core/reports";
import { writeFolder, writeWhole } from "./output.js";
import type { OutputWishes } from "./request.js";
import type { Surroundings } from "./surroundings.js";

/** An answer, with or without a result. */
export type RefusedAnswer = Envelope<object>;

/** The answer to a command line that could not be understood. */
export function refusedAnswer(command: string, errors: readonly Problem[]): RefusedAnswer {
  return { kvane: version, format: 1, command, input: {}, result: null, errors, warnings: [], assumed: [] };
}

/** Puts an answer where it was wished: the terminal, a file, or for the whole job a folder. */
export function deliver(
  answered: Envelope<object>,
  wishes: OutputWishes,
  { write, writeError, folder }: Surroundings,
): void {
  const text = textOf(answered, wishes);
  if (wishes.out === null) {
    write(text);
    return;
  }
  const path = { shown: wishes.out, full: resolve(folder, wishes.out) };
  if (answered.command === "run") {
    writeFolder(path, resultFolder(answered as Envelope<RunRecord>), wishes.force);
    if (!wishes.quiet || wishes.json) write(text);
  } else writeWhole(path, text, wishes.force);
  if (!wishes.quiet) writeError(`written: ${wishes.out}\n`);
}

function textOf(answered: Envelope<object>, wishes: OutputWishes): string {
  if (wishes.json) return jsonText(answered);
  return (wishes.csv ? reportCsv(answered) : null) ?? reportText(answered);
}
