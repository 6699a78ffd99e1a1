import { cifCode } from "./cif-code.js";
import { cifObstacle } from "./cif-obstacle.js";
import { type DrawnRun, figureNames } from "./document/figure-names.js";
import type { AnyConfiguration, ConfigurationsRecord } from "./records/configurations.js";

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

/** Those that a magnetic CIF can be written of. */
export function writtenOnes(configurations: ConfigurationsRecord | null): AnyConfiguration[] {
  return (configurations?.configurations ?? []).filter(
    (one) => cifObstacle(configurations as ConfigurationsRecord, one) === null,
  );
}

/** The name of its magnetic CIF; branches are counted from 0 here and from 1 in the name. */
export function cifName({ id }: AnyConfiguration, branch: number): string {
  return `branch-${branch + 1}-${cifCode(id)}.mcif`;
}
