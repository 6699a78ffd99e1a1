import { jsonText } from "./json-text.js";
import type { Envelope } from "./records/common.js";
import type { RunRecord } from "./records/run.js";
import type { ResultFile } from "./result-folder.js";
import { reportText } from "./text/report-text.js";

/** The answer's table as CSV, or null where the command has none or the answer no result. */
export async function reportCsv(answer: Envelope): Promise<string | null> {
  return (await import("./csv/report-csv.js")).csvOf(answer);
}

/**
 * The answer's drawing as an SVG file, or null where the command has none or the answer nothing to draw. What draws is
 * loaded only when it is wanted.
 */
export async function reportSvg(answer: Envelope): Promise<string | null> {
  return (await import("./svg/report-svg.js")).svgOf(answer);
}

/** Everything that `kvane run --out` writes, as names and texts. */
export async function resultFolder(answer: Envelope<RunRecord>): Promise<ResultFile[]> {
  return (await import("./result-folder.js")).folderOf(answer);
}

/** The forms that a report has, by the ending of its file. */
const forms = { ".html": "html", ".htm": "html", ".md": "markdown", ".txt": "text", ".json": "json" } as const;

/** Forms in which an answer can be written. */
export type ReportForm = (typeof forms)[keyof typeof forms];

/** The endings that `reportForm` knows. */
export const reportEndings: readonly string[] = Object.keys(forms);

/** The form that the ending of a file name asks for, or null. */
export function reportForm(name: string): ReportForm | null {
  const ending = /\.[a-z]+$/.exec(name.toLowerCase())?.[0] ?? "";
  return Object.hasOwn(forms, ending) ? forms[ending as keyof typeof forms] : null;
}

/**
 * The report of the whole job in one form. The makers of pages are loaded only when they are wanted. A Markdown file on
 * its own names no drawings.
 *
 * @param file the name of the file that it is for, which the report repeats with the command
 */
export async function reportIn(
  form: ReportForm,
  answer: Envelope<RunRecord>,
  file: string | null = null,
): Promise<string> {
  if (form === "json") return jsonText(answer);
  if (form === "text") return reportText(answer, { full: true });
  const { htmlReport, markdownReport } = await import("./made-reports.js");
  return form === "html" ? htmlReport(answer, file) : markdownReport(answer, "none", file);
}
