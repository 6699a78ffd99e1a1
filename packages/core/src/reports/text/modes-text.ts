import type { IrrepModesRecord, ModesRecord, SiteModesRecord } from "../records/modes.js";
import { fields, section, table, wideTable } from "./layout.js";
import { counted, groupText, kText, minusKText, positionText } from "./names.js";
import { littleGroupSection } from "./star-text.js";

export function modesText(record: ModesRecord): string[] {
  return [
    ...section(
      "Wave vector",
      fields([
        ["Group", groupText(record.group)],
        ["k", kText(record.k)],
        ["−k", minusKText(record.minusK)],
        ["Little co-group", `${record.littleGroup.symbol}, order ${record.littleGroup.order}`],
      ]),
    ),
    ...littleGroupSection(record.littleGroup),
    ...record.sites.flatMap((site) => siteText(site)),
  ];
}

/** Everything about one site: orbit, decomposition and, irrep by irrep, what is allowed and the basis vectors. */
export function siteText(site: SiteModesRecord): string[] {
  return [
    ...section(
      `Site ${site.label}`,
      fields([
        ["Position", `${positionText(site.position)}, site symmetry ${site.siteSymmetry}`],
        ["Atoms", `${site.multiplicity} in the cell, ${site.orbit.length} in the primitive cell`],
        ["Little-group orbits", suborbitText(site)],
        ["Decomposition", decompositionText(site)],
      ]),
    ),
    ...site.irreps.filter(({ multiplicity }) => multiplicity > 0).flatMap((irrep) => irrepText(site, irrep)),
  ];
}

/** `3 Γ1 + 2 Γ4`, multiplicities in front as the trade writes them. */
export function decompositionText(site: SiteModesRecord): string {
  const terms = site.irreps
    .filter(({ multiplicity }) => multiplicity > 0)
    .map(({ label, multiplicity }) => (multiplicity === 1 ? label : `${multiplicity} ${label}`));
  return terms.length > 0 ? terms.join(" + ") : "nothing";
}

function suborbitText(site: SiteModesRecord): string {
  return site.suborbits.map((atoms) => atoms.map((atom) => atom + 1).join(" ")).join(" | ");
}

function irrepText(site: SiteModesRecord, irrep: IrrepModesRecord): string[] {
  return [
    ...section(
      `${irrep.label} on ${site.label}: dimension ${irrep.dimension}, ${countText(irrep.multiplicity)}, ${irrep.reality}`,
      fields([["Free real parameters", parameterText(irrep)]]),
      constraintTable(site, irrep),
      [""],
      modeTable(site, irrep),
    ),
  ];
}

/** `once`, `twice`, `3 times`. */
function countText(count: number): string {
  return count === 1 ? "once" : count === 2 ? "twice" : `${count} times`;
}

export function parameterText(irrep: IrrepModesRecord): string {
  const relation = irrep.freeParametersWithMinusK;
  if (relation === null || relation === irrep.freeParameters) return String(irrep.freeParameters);
  return `${irrep.freeParameters}; ${relation} with the relation between k and −k of one order parameter`;
}

/** The allowed Fourier component of each atom, in symbols. */
export function constraintTable(site: SiteModesRecord, irrep: IrrepModesRecord): string[] {
  return table(
    [{ title: "atom", align: "right" }, { title: "position" }, { title: "allowed S along a, b, c" }],
    site.orbit.map((position, atom) => [
      String(atom + 1),
      positionText(position),
      irrep.constraint[atom] ?? "(0, 0, 0)",
    ]),
  );
}

function modeTable(site: SiteModesRecord, irrep: IrrepModesRecord): string[] {
  const partner = irrep.dimension > 1;
  const title = `${counted(irrep.modes.length, "basis vector")}${partner ? ", copy.partner" : ""}`;
  return [
    `  ${title}`,
    ...wideTable(
      [{ title: "atom", align: "right" }],
      irrep.modes.map(({ copy, partner: index }) => ({ title: partner ? `${copy}.${index}` : String(copy) })),
      site.orbit.map((_, atom) => ({
        fixed: [String(atom + 1)],
        cells: irrep.modes.map(({ exact }) => `(${(exact[atom] ?? []).join(", ")})`),
      })),
    ),
  ];
}
