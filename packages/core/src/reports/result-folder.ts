import { modesCsv, satellitesCsv, searchCsv } from "./csv/tables.js";
import { jsonText } from "./json-text.js";
import type { Envelope } from "./records/common.js";
import type { RunRecord } from "./records/run.js";
import { reportText } from "./text/report-text.js";

export interface ResultFile {
  readonly name: string;
  readonly text: string;
}

/** Names of the files that `resultFolder` gives for such a result, in its order. */
export function resultFileNames(record: Pick<RunRecord, "search" | "branches">): string[] {
  return [
    "report.txt",
    "result.json",
    ...(record.search ? ["assignments.csv"] : []),
    ...record.branches.flatMap(({ satellites }, index) => [
      `branch-${index + 1}-modes.csv`,
      ...(satellites ? [`branch-${index + 1}-satellites.csv`] : []),
    ]),
  ];
}

/** Everything that `kvane run --out` writes, as names and texts. */
export function resultFolder(answer: Envelope<RunRecord>): ResultFile[] {
  const record = answer.result;
  if (record === null) return [];
  const texts = [
    reportText(answer, { full: true }),
    jsonText(answer),
    ...(record.search ? [searchCsv(record.search)] : []),
    ...record.branches.flatMap(({ modes, satellites }) => [
      modesCsv(modes),
      ...(satellites ? [satellitesCsv(satellites)] : []),
    ]),
  ];
  return resultFileNames(record).map((name, index) => ({ name, text: texts[index] as string }));
}
