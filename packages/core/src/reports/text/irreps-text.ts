import type { ExactIrrepRecord, IrrepRecord, IrrepsRecord } from "../records/irreps.js";
import { fields, flow, section, table, wideTable } from "./layout.js";
import { counted, groupText, kText, minusKText } from "./names.js";
import { littleGroupSection } from "./star-text.js";

export function irrepsText(record: IrrepsRecord): string[] {
  const larger = record.irreps.filter(({ dimension }) => dimension > 1);
  return [
    ...section(
      "Wave vector",
      fields([
        ["Group", groupText(record.group)],
        ["k", kText(record.k)],
        ["−k", minusKText(record.minusK)],
        [
          "Little co-group",
          `${record.littleGroup.symbol}, order ${record.littleGroup.order}; ${counted(record.arms, "arm")} in the star`,
        ],
      ]),
    ),
    ...littleGroupSection(record.littleGroup),
    ...section(`Small irreducible representations (${record.irreps.length})`, irrepTable(record.irreps)),
    ...section("Characters, by the number of the operator", characterTable(record.irreps)),
    ...larger.flatMap(({ label, exact }) => section(`Matrices of ${label}, row | row`, matrixLines(exact))),
  ];
}

export function irrepTable(irreps: readonly Omit<IrrepRecord, "characters" | "matrices" | "exact">[]): string[] {
  return table(
    [
      { title: "label" },
      { title: "dimension", align: "right" },
      { title: "reality" },
      { title: "conjugate" },
      { title: "physical dimension", align: "right" },
    ],
    irreps.map((irrep) => [
      irrep.label,
      String(irrep.dimension),
      irrep.reality,
      irrep.conjugateOf ?? "–",
      String(irrep.physicalDimension),
    ]),
  );
}

function characterTable(irreps: readonly IrrepRecord[]): string[] {
  const count = irreps[0]?.exact.characters.length ?? 0;
  return wideTable(
    [{ title: "" }],
    Array.from({ length: count }, (_, index) => ({ title: String(index + 1), align: "right" as const })),
    irreps.map(({ label, exact }) => ({ fixed: [label], cells: exact.characters })),
  );
}

/** `3  (0, 1 | 1, 0)`: number of the operator and the rows of its matrix. */
export function matrixLines(exact: ExactIrrepRecord): string[] {
  const places = String(exact.matrices.length).length;
  return flow(
    exact.matrices.map(
      (matrix, index) => `${String(index + 1).padStart(places)}  (${matrix.map((row) => row.join(", ")).join(" | ")})`,
    ),
  );
}
