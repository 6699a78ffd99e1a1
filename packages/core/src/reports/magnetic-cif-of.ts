import { type CifVersion, type MagneticCif, magneticCifText } from "../files/index.js";
import { parseRational, toNumber } from "../numbers/index.js";
import { cifCode } from "./cif-code.js";
import type { CellRecord } from "./records/common.js";
import type { ConfigurationRecord, ConfigurationsRecord } from "./records/configurations.js";

/**
 * One configuration as a magnetic CIF in its child cell. The irreps leave amplitudes free: the moments are one generic
 * choice of them, and the file says so. Null without a cell, which a CIF cannot do without.
 */
export function configurationCif(
  record: ConfigurationsRecord,
  one: ConfigurationRecord,
  version: CifVersion,
): string | null {
  const { cell } = one.magneticGroup;
  return cell === null ? null : magneticCifText(contentOf(record, one, cell), version);
}

function contentOf(record: ConfigurationsRecord, one: ConfigurationRecord, cell: CellRecord): MagneticCif {
  const { magneticGroup: group } = one;
  const parentOf = (label: string) => record.parentSites.find((site) => site.label === label);
  const typeOf = (label: string) => parentOf(label)?.ion ?? elementOf(label);
  const occupancyOf = (label: string) => parentOf(label)?.occupancy ?? null;
  const place = (position: readonly string[]) => position.map((entry) => toNumber(parseRational(entry) ?? [0, 1]));
  return {
    block: `kvane_${cifCode(one.id)}`,
    remarks: [
      `Written by kvane: configuration ${one.id}, direction ${one.direction}, irreps ${one.irreps.join(" and ")}.`,
      `k = (${record.k.components.join(", ")}) of the parent cell, exactly.`,
      "A hypothesis that symmetry allows, not a refined structure: the moments are one example within the form of the",
      "irreps, in Bohr magnetons. Refine the amplitudes against intensities.",
    ],
    cell,
    parent: {
      symbol: record.group.hermannMauguin,
      number: record.parentStandard.number,
      toStandard: record.parentStandard.change,
      toChild: group.cellFromParent,
    },
    waveVectors: one.arms.map((arm, index) => ({
      id: `k${index + 1}`,
      components: record.star[arm]?.numeric ?? [],
    })),
    symmetry: {
      kind: "commensurate",
      bns: group.bns,
      og: group.og,
      pointGroup: group.pointGroup,
      toBns: group.toBns,
      operators: group.operators,
      centrings: group.centrings,
    },
    atoms: [
      ...one.sites.map((site) => ({
        label: site.label,
        type: typeOf(site.parentSite),
        position: place(site.positionLattice),
        occupancy: occupancyOf(site.parentSite),
        moment: {
          crystal: site.exampleCrystal ?? [],
          symmform: site.symmformCrystal?.replace(/[()\s]/g, "") ?? null,
          waves: [],
        },
      })),
      ...one.otherAtoms.map((atom) => ({
        label: atom.label,
        type: typeOf(atom.parentSite),
        position: place(atom.positionLattice),
        occupancy: occupancyOf(atom.parentSite),
        moment: null,
      })),
    ],
  };
}

/** The element that a label begins with: the best guess where no ion is named. */
function elementOf(label: string): string {
  return /^[A-Z][a-z]?/.exec(label)?.[0] ?? "X";
}
