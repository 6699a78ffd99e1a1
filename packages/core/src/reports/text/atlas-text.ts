import type { AtlasRecord, KindRecord, PlacedKRecord } from "../records/atlas.js";
import { fields, paragraph, section, table } from "./layout.js";
import { cellText, decimals, dimensionText, groupText, kForm, kText } from "./names.js";

export function atlasText(record: AtlasRecord): string[] {
  const { kinds, kindsPM } = record;
  const same =
    kinds.length === kindsPM.length &&
    kinds.every((kind, index) => kForm(kind.k) === kForm((kindsPM[index] as KindRecord).k));
  return [
    ...section(
      "Space group",
      fields([["Group", groupText(record.group)], ...(record.cell ? [["Cell", cellText(record.cell)] as const] : [])]),
    ),
    ...section(
      `Kinds of k (${kinds.length})`,
      kindTable(kinds, "dimension"),
      same ? ["", ...paragraph("With k and −k taken as one the kinds are the same.")] : [],
    ),
    ...(same
      ? []
      : section(`Kinds of k with k and −k taken as one (${kindsPM.length})`, kindTable(kindsPM, "dimensionPM"))),
    ...(record.given ? givenSections(record, record.given, same) : []),
  ];
}

function kindTable(kinds: readonly KindRecord[], dimension: "dimension" | "dimensionPM"): string[] {
  return table(
    [
      { title: "kind", align: "right" },
      { title: "k" },
      { title: "is a" },
      { title: "little co-group" },
      { title: "order", align: "right" },
      { title: "arms", align: "right" },
      { title: "−k" },
      { title: "2k a reciprocal lattice vector at" },
    ],
    kinds.map((kind, index) => [
      String(index + 1),
      kForm(kind.k),
      shortDimension(kind[dimension]),
      kind.littleCoGroup.symbol,
      String(kind.littleCoGroup.order),
      String(kind.arms),
      kind.minusK,
      kind.halfLattice.map(kForm).join(" ") || "–",
    ]),
  );
}

function shortDimension(dimension: number): string {
  return dimension === 3 ? "general" : dimensionText(dimension);
}

function givenSections(record: AtlasRecord, given: PlacedKRecord, same: boolean): string[] {
  const belongs = (kinds: readonly KindRecord[], index: number, dimension: "dimension" | "dimensionPM") => {
    const kind = kinds[index] as KindRecord;
    const where = `kind ${index + 1}, ${dimensionText(kind[dimension])} ${kForm(kind.k)}`;
    return kind.arms > 1 ? `${where}, on this or an equivalent arm` : where;
  };
  return [
    ...section(
      `k = ${kText(given.k)}`,
      fields([
        ["Belongs to", belongs(record.kinds, given.kind, "dimension")],
        ...(same
          ? []
          : [["With −k", `${belongs(record.kindsPM, given.kindPM, "dimensionPM")} of the second table`] as const]),
        ...(given.nearby === null ? [["Special kinds nearby", notSearched(record)] as const] : []),
      ]),
    ),
    ...nearbySection(record, given, same),
  ];
}

function notSearched(record: AtlasRecord): string {
  return record.cell === null ? "distances need a cell (--cell)" : "distances need a number for every letter of k";
}

function nearbySection(record: AtlasRecord, { nearby, within }: PlacedKRecord, same: boolean): string[] {
  if (nearby === null) return [];
  return section(
    `Kinds of lower dimension within ${within} Å⁻¹${same ? "" : " (numbers of the second table)"}`,
    nearby.length === 0
      ? paragraph("none")
      : table(
          [
            { title: "kind", align: "right" },
            { title: "k" },
            { title: "is a" },
            { title: "distance/Å⁻¹", align: "right" },
            { title: "nearest k of it" },
          ],
          nearby.map(({ kindPM, nearest, distance }) => {
            const kind = record.kindsPM[kindPM] as KindRecord;
            return [
              String(kindPM + 1),
              kForm(kind.k),
              shortDimension(kind.dimensionPM),
              decimals(distance, 5),
              kText(nearest),
            ];
          }),
        ),
  );
}
