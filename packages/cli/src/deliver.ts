import { resolve } from "node:path";
import { fail } from "@kvane/core/errors";
import {
  type Envelope,
  jsonText,
  type ResultFile,
  type RunRecord,
  reportCsv,
  reportEndings,
  reportForm,
  reportIn,
  reportSvg,
  reportText,
  resultFolder,
} from "@kvane/core/reports";
import { failUndrawn, type OutputWishes } from "./request.js";
import type { Surroundings } from "./surroundings.js";

/** An answer made ready: what is printed or written to one file, and the files of a folder where one was wished. */
export interface Parcel {
  readonly text: string;
  readonly files: readonly ResultFile[] | null;
}

/** Throws unless the ending of the file says which form of a report is wished: asked before the work, not after it. */
export function checkForm(command: string, { out, json }: OutputWishes): void {
  if (command !== "report" || out === null || json || reportForm(out) !== null) return;
  fail("invalid-argument", `the ending of \`${out}\` names no form of a report`, {
    where: { argument: "--out" },
    expected: `a name that ends in ${reportEndings.join(", ")}`,
    found: out,
    remedy: "write --out report.html for a page to look at",
  });
}

/** Makes everything that was wished; nothing is written yet. */
export async function packed(
  answered: Envelope<object>,
  wishes: OutputWishes,
  { columns = null }: Pick<Surroundings, "columns">,
): Promise<Parcel> {
  const { command } = answered;
  const whole = answered as Envelope<RunRecord>;
  const drawing = wishes.svg ? await reportSvg(answered) : null;
  if (drawing !== null) return { text: drawing, files: null };
  if (wishes.svg && command === "exchange") failUndrawn(true);
  if (wishes.out === null) return { text: await textOf(answered, wishes, columns), files: null };
  if (command === "run") return { text: await textOf(answered, wishes, columns), files: await resultFolder(whole) };
  const form = command === "report" && !wishes.json ? reportForm(wishes.out) : null;
  const text = form === null ? await textOf(answered, wishes, null) : await reportIn(form, whole, wishes.out);
  return { text, files: null };
}

/** Puts it where it was wished: the terminal, a file, or for the whole job a folder. */
export async function deliver(
  { text, files }: Parcel,
  wishes: OutputWishes,
  { write, finish = write, writeError, folder }: Surroundings,
): Promise<void> {
  if (wishes.out === null) {
    finish(text);
    return;
  }
  const { writeFolder, writeWhole } = await import("./output.js");
  const path = { shown: wishes.out, full: resolve(folder, wishes.out) };
  if (files !== null) {
    writeFolder(path, files, wishes.force);
    if (!wishes.quiet || wishes.json) write(text);
  } else writeWhole(path, text, wishes.force);
  if (!wishes.quiet) writeError(`written: ${wishes.out}\n`);
}

/** A file has the usual width, a terminal its own. */
async function textOf(answered: Envelope<object>, wishes: OutputWishes, width: number | null): Promise<string> {
  if (wishes.json) return jsonText(answered);
  return (wishes.csv ? await reportCsv(answered) : null) ?? reportText(answered, { width });
}
