import type {
  ExactIrrepRecord,
  FullIrrepsRecord,
  IrrepRecord,
  IrrepsRecord,
  MinusKRelationRecord,
} from "../records/irreps.js";
import { fields, flow, numbered, paragraph, section, table, unbroken, wideTable } from "./layout.js";
import { counted, groupText, kForm, kText, minusKText } from "./names.js";
import { littleGroupSection, reducedFields } from "./star-text.js";

export function irrepsText(record: IrrepsRecord): string[] {
  const larger = record.irreps.filter(({ dimension }) => dimension > 1);
  return [
    ...section(
      "Wave vector",
      fields([
        ["Group", groupText(record.group)],
        ["k", kText(record.k)],
        ...reducedFields(record),
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
    ...(record.minusKRelation ? relationSection(record.minusKRelation) : []),
    ...(record.full ? fullSections(record.full) : []),
  ];
}

/** What joins k and −k, irrep by irrep. */
function relationSection(relation: MinusKRelationRecord): string[] {
  return section(
    "Relation between k and −k",
    paragraph(`g₀ = ${relation.operator} takes k to −k; D(g₀⁻¹ g g₀)* = N⁻¹ D'(g) N, D' the partner.`),
    table(
      [{ title: "irrep" }, { title: "partner" }, { title: "N, row | row" }],
      relation.links.map(({ label, partner, exact }) => [label, partner, matrixText(exact)]),
    ),
  );
}

/** The irreps of the whole group: for each operator the blocks that are not zero, from arm to arm. */
function fullSections(full: FullIrrepsRecord): string[] {
  return [
    ...section(
      `Arms of the star (${full.arms.length}), reached from k by`,
      flow(full.arms.map((arm, index) => `${index + 1}  ${kForm(arm)} by ${full.representatives[index] ?? ""}`)),
    ),
    ...section(
      `Operators of the whole group (one per coset of the lattice, ${full.operators.length})`,
      numbered(full.operators),
    ),
    ...full.irreps.flatMap(({ label, dimension, exact }) =>
      section(
        `Full irrep of ${label}: dimension ${dimension}; by the number of the operator, row | row`,
        table(
          [{ title: "", align: "right" }, { title: "arm→arm block" }],
          exact.matrices.map((matrix, index) => [String(index + 1), blocksText(matrix, full.arms.length)]),
        ),
      ),
    ),
  ];
}

/** `1→2 (0, 1 | 1, 0)`: the block in the columns of arm 1 and the rows of arm 2. */
function blocksText(matrix: readonly (readonly string[])[], arms: number): string {
  const size = matrix.length / arms;
  const texts: string[] = [];
  for (let from = 0; from < arms; from++)
    for (let to = 0; to < arms; to++) {
      const rows = matrix.slice(to * size, (to + 1) * size).map((row) => row.slice(from * size, (from + 1) * size));
      if (rows.some((row) => row.some((entry) => entry !== "0")))
        texts.push(`${from + 1}→${to + 1} ${size === 1 ? (rows[0]?.[0] ?? "") : matrixText(rows)}`);
    }
  return texts.join("  ");
}

/** `(0, 1 | 1, 0)`; a single entry stands alone. */
export function matrixText(matrix: readonly (readonly string[])[]): string {
  if (matrix.length === 1 && matrix[0]?.length === 1) return matrix[0][0] ?? "";
  // Lines are broken between rows where that will do.
  return `(${matrix.map((row) => unbroken(row.join(", "))).join(" | ")})`;
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
  return flow(exact.matrices.map((matrix, index) => `${String(index + 1).padStart(places)}  ${matrixText(matrix)}`));
}
