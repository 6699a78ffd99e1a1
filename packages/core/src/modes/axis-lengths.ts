import { averagedMetric, type Cell, directMetric, type SpaceGroup } from "../spacegroups/index.js";

/** Lengths of a, b, c in Å in the metric averaged over the group. */
export function axisLengths({ operators }: SpaceGroup, cell: Cell): [number, number, number] {
  const metric = averagedMetric(operators, directMetric(cell));
  return [0, 4, 8].map((entry) => Math.sqrt(metric[entry] as number)) as [number, number, number];
}
