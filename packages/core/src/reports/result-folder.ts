import { configurationsCsv, modesCsv, satellitesCsv, searchCsv } from "./csv/tables.js";
import { fittedMomentsCsv, patternCsv, rankingCsv } from "./csv/weigh-table.js";
import { jsonText } from "./json-text.js";
import { documentFiles } from "./made-reports.js";
import { configurationCif, fittedMoments } from "./magnetic-cif-of.js";
import type { Envelope } from "./records/common.js";
import type { ConfigurationsRecord } from "./records/configurations.js";
import type { RunRecord } from "./records/run.js";
import { cifName, resultFileNames, writtenOnes } from "./result-file-names.js";
import { reportText } from "./text/report-text.js";

/** A file of the result folder. */
export interface ResultFile {
  readonly name: string;
  readonly text: string;
}

/** The files, in the order of `resultFileNames`. */
export async function folderOf(answer: Envelope<RunRecord>): Promise<ResultFile[]> {
  const record = answer.result;
  if (record === null) return [];
  // With the moments of the fit where there is one.
  const cifFiles = (
    { configurations, weigh }: RunRecord["branches"][number],
    branch: number,
  ): (readonly [string, string])[] =>
    writtenOnes(configurations).map((one): readonly [string, string] => {
      const all = configurations as ConfigurationsRecord;
      const text = configurationCif(all, one, "2.0", weigh && fittedMoments(weigh, one.id));
      return [cifName(one, branch), text ?? ""];
    });
  const texts = new Map([
    ...documentFiles(answer),
    ["report.txt", await reportText(answer, { full: true })],
    ["result.json", jsonText(answer)],
    ...(record.search ? [["assignments.csv", searchCsv(record.search)] as const] : []),
    ...record.branches.flatMap((branch, index) => {
      const { modes, satellites, configurations, weigh } = branch;
      return [
        [`branch-${index + 1}-modes.csv`, modesCsv(modes)] as const,
        ...(configurations
          ? [[`branch-${index + 1}-configurations.csv`, configurationsCsv(configurations)] as const]
          : []),
        ...cifFiles(branch, index),
        ...(satellites ? [[`branch-${index + 1}-satellites.csv`, satellitesCsv(satellites)] as const] : []),
        ...(weigh ? [[`branch-${index + 1}-weights.csv`, rankingCsv(weigh)] as const] : []),
        ...(weigh ? [[`branch-${index + 1}-fitted-moments.csv`, fittedMomentsCsv(weigh)] as const] : []),
        ...(weigh?.pattern ? [[`branch-${index + 1}-pattern.csv`, patternCsv(weigh.pattern)] as const] : []),
      ];
    }),
  ]);
  return resultFileNames(record).map((name) => {
    const text = texts.get(name);
    if (text === undefined) throw new TypeError(`nothing was made for ${name}`);
    return { name, text };
  });
}
