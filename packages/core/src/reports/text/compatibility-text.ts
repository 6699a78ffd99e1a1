import type { CompatibilityRecord, NamedIrrepRecord, PartRecord } from "../records/compatibility.js";
import { fields, numbered, section, table, wideTable } from "./layout.js";
import { dimensionText, groupText, kForm, kText } from "./names.js";

export function compatibilityText(record: CompatibilityRecord): string[] {
  const { from, to } = record;
  const values = Object.entries(to.values).map(([letter, value]) => `${letter} = ${value}`);
  const line = dimensionText(to.dimension);
  return [
    ...section(
      "Wave vectors",
      fields([
        ["Group", groupText(record.group)],
        ["From", `${kText(from.k)}, little co-group ${from.littleGroup.symbol}, order ${from.littleGroup.order}`],
        ["To", `${line} ${kForm(to.k)}, little co-group ${to.littleGroup.symbol}, order ${to.littleGroup.order}`],
        ["Arm on it", `${kForm(from.arm)}, by ${from.operator}`],
        ["Letters there", values.length > 0 ? values.join(", ") : "none"],
      ]),
    ),
    ...section(
      `How irreps at ${kForm(from.arm)} split`,
      table(
        [{ title: "irrep" }, { title: "dimension", align: "right" }, { title: "splits into" }, { title: "dimensions" }],
        record.splitting.map(({ label, dimension, dimensionOfParts, parts }) => [
          label,
          String(dimension),
          partsText(parts),
          `${parts.map((part) => dimensionsOf(part, to.irreps)).join(" + ")} = ${dimensionOfParts}`,
        ]),
      ),
    ),
    ...section(
      `Where irreps of the ${line} ${kForm(to.k)} end`,
      table(
        [{ title: "irrep" }, { title: "dimension", align: "right" }, { title: "is in" }],
        record.joining.map(({ label, ends }, index) => [
          label,
          String(to.irreps[index]?.dimension ?? ""),
          partsText(ends),
        ]),
      ),
    ),
    ...characterSection(`Characters at ${kForm(from.arm)}`, from),
    ...characterSection(`Characters on the ${line} ${kForm(to.k)}`, to),
  ];
}

function partsText(parts: readonly PartRecord[]): string {
  return parts.map(({ label, multiplicity }) => (multiplicity === 1 ? label : `${multiplicity} ${label}`)).join(" + ");
}

function dimensionsOf({ label, multiplicity }: PartRecord, irreps: readonly NamedIrrepRecord[]): string {
  const dimension = irreps.find((irrep) => irrep.label === label)?.dimension ?? 0;
  return multiplicity === 1 ? String(dimension) : `${multiplicity}·${dimension}`;
}

/** What identifies the irreps: the numbers in their labels are kvane's own. */
function characterSection(
  title: string,
  { littleGroup, irreps }: Pick<CompatibilityRecord["from"], "littleGroup" | "irreps">,
): string[] {
  return section(
    title,
    numbered(littleGroup.operators),
    wideTable(
      [{ title: "" }],
      littleGroup.operators.map((_, index) => ({ title: String(index + 1), align: "right" as const })),
      irreps.map(({ label, exact }) => ({ fixed: [label], cells: exact.characters })),
    ),
  );
}
