import type { OpsRecord } from "../records/ops.js";
import { fields, numbered, section } from "./layout.js";
import { counted, groupText } from "./names.js";

export function opsText(record: OpsRecord): string[] {
  const points = record.order / record.pointGroupOrder;
  return [
    ...section(
      "Space group",
      fields([
        ["Group", groupText(record.group)],
        ["Point group", `${record.pointGroup}, order ${record.pointGroupOrder}`],
        ["Lattice", `${counted(points, "lattice point")} per cell`],
      ]),
    ),
    ...section(`Operators modulo integer translations (${record.order})`, numbered(record.operators)),
  ];
}
