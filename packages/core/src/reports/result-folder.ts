import { cifCode } from "./cif-code.js";
import { cifObstacle } from "./cif-obstacle.js";
import { configurationsCsv, modesCsv, satellitesCsv, searchCsv } from "./csv/tables.js";
import { fittedMomentsCsv, patternCsv, rankingCsv } from "./csv/weigh-table.js";
import { type DrawnRun, figureNames } from "./document/figure-names.js";
import { jsonText } from "./json-text.js";
import type { Envelope } from "./records/common.js";
import type { AnyConfiguration, ConfigurationsRecord } from "./records/configurations.js";
import type { RunRecord } from "./records/run.js";
import { reportText } from "./text/report-text.js";

/** A file of the result folder. */
export interface ResultFile {
  readonly name: string;
  readonly text: string;
}

/** Names of the files that `resultFolder` gives for such a result, in its order. */
export function resultFileNames(record: DrawnRun): string[] {
  return [
    "report.html",
    "report.txt",
    "report.md",
    "result.json",
    ...(record.search ? ["assignments.csv"] : []),
    ...record.branches.flatMap(({ satellites, configurations, weigh }, index) => [
      `branch-${index + 1}-modes.csv`,
      ...(configurations ? [`branch-${index + 1}-configurations.csv`] : []),
      ...writtenOnes(configurations).map((one) => cifName(one, index)),
      ...(satellites ? [`branch-${index + 1}-satellites.csv`] : []),
      ...(weigh ? [`branch-${index + 1}-weights.csv`] : []),
      ...(weigh ? [`branch-${index + 1}-fitted-moments.csv`] : []),
      ...(weigh?.pattern ? [`branch-${index + 1}-pattern.csv`] : []),
    ]),
    ...figureNames(record),
  ];
}

/** Everything that `kvane run --out` writes, as names and texts. The makers of pages are loaded only here. */
export async function resultFolder(answer: Envelope<RunRecord>): Promise<ResultFile[]> {
  const record = answer.result;
  if (record === null) return [];
  const { documentFiles } = await import("./made-reports.js");
  const { configurationCif, fittedMoments } = await import("./magnetic-cif-of.js");
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
    ["report.txt", reportText(answer, { full: true })],
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

/** Those that a magnetic CIF can be written of. */
function writtenOnes(configurations: ConfigurationsRecord | null): AnyConfiguration[] {
  return (configurations?.configurations ?? []).filter(
    (one) => cifObstacle(configurations as ConfigurationsRecord, one) === null,
  );
}

function cifName({ id }: AnyConfiguration, branch: number): string {
  return `branch-${branch + 1}-${cifCode(id)}.mcif`;
}
