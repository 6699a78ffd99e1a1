import type { Envelope } from "../records/common.js";
import type { ExportRecord } from "../records/export.js";
import type { StudyRecord } from "../records/study.js";
import { assumedLines, cautionLines, conventionLines, warningLines } from "./closing-text.js";
import { onPage, plainBlanks } from "./layout.js";

/**
 * The answer as text of at most 100 columns, ended by a line feed: the result, then warnings, what was assumed, the
 * conventions and the cautions, each once. Empty when the answer has no result.
 *
 * @param options.full for `run` everything that was computed, not only the page that fits a terminal
 * @param options.width columns of a terminal that has fewer than 100; not below 60
 */
export async function reportText(
  answer: Envelope,
  options: { readonly full?: boolean; readonly width?: number | null } = {},
): Promise<string> {
  const { command, result } = answer;
  if (result === null) return "";
  // The text is a file of its own; what was assumed stands in it as comments.
  if (command === "study") return (result as StudyRecord).study;
  if (command === "export") return (result as ExportRecord).cif;
  const body = await bodyOf(command, options.full ?? false);
  return onPage(options.width ?? null, () => writtenReport(answer, body(result as never)));
}

function writtenReport(answer: Envelope, body: readonly string[]): string {
  const lines = [
    ...body,
    ...warningLines(answer.warnings),
    ...assumedLines(answer.assumed),
    ...conventionLines(answer),
    ...cautionLines(answer.command),
  ];
  while (lines.at(-1) === "") lines.pop();
  return `${plainBlanks(lines.join("\n"))}\n`;
}

/** What makes the lines of a command's result, whose shape the command names. Loaded when it is wanted. */
type Body = (result: never) => string[];

async function bodyOf(command: string, full: boolean): Promise<Body> {
  const load = Object.hasOwn(bodies, command) ? bodies[command] : undefined;
  return load === undefined ? () => [] : load(full);
}

const bodies: { readonly [command: string]: (full: boolean) => Promise<Body> } = {
  ops: async () => (await import("./ops-text.js")).opsText,
  atlas: async () => (await import("./atlas-text.js")).atlasText,
  star: async () => (await import("./star-text.js")).starText,
  irreps: async () => (await import("./irreps-text.js")).irrepsText,
  compatibility: async () => (await import("./compatibility-text.js")).compatibilityText,
  modes: async () => (await import("./modes-text.js")).modesText,
  configurations: async () => (await import("./configurations-text.js")).configurationsText,
  decompose: async () => (await import("./decompose-text.js")).decomposeText,
  satellites: async () => (await import("./satellites-text.js")).satellitesText,
  index: async () => (await import("./search-text.js")).indexText,
  locate: async () => (await import("./search-text.js")).locateText,
  weigh: async () => (await import("./weigh-text.js")).weighText,
  exchange: async () => (await import("./exchange-text.js")).exchangeText,
  onset: async () => (await import("./onset-text.js")).onsetText,
  check: async () => (await import("./check-text.js")).checkText,
  run: async (full) => {
    const { runFullText, runShortText } = await import("./run-text.js");
    return full ? runFullText : runShortText;
  },
  report: async () => (await import("./run-text.js")).runFullText,
  explain: async () => (await import("./simple-text.js")).explainText,
  help: async () => (await import("./simple-text.js")).helpText,
};
