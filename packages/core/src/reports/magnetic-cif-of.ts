import { type CifVersion, type MagneticCif, magneticCifText } from "../files/index.js";
import { parseRational, toNumber } from "../numbers/index.js";
import { cifCode } from "./cif-code.js";
import type { CellRecord } from "./records/common.js";
import type {
  AnyConfiguration,
  ConfigurationRecord,
  ConfigurationsRecord,
  ModulatedRecord,
} from "./records/configurations.js";

/**
 * One configuration as a magnetic CIF in its child cell. The irreps leave amplitudes free: the moments are one generic
 * choice of them, and the file says so. Null without a cell, which a CIF cannot do without.
 */
export function configurationCif(
  record: ConfigurationsRecord,
  one: AnyConfiguration,
  version: CifVersion,
): string | null {
  if ("superspace" in one.magneticGroup) {
    const { cell } = record;
    return cell === null ? null : magneticCifText(modulatedContent(record, one as ModulatedRecord, cell), version);
  }
  const own = one as ConfigurationRecord;
  const { cell } = own.magneticGroup;
  return cell === null || own.notWritten !== null ? null : magneticCifText(contentOf(record, own, cell), version);
}

/** What both kinds of file say. */
function commonContent(record: ConfigurationsRecord, one: AnyConfiguration) {
  const parentOf = (label: string) => record.parentSites.find((site) => site.label === label);
  return {
    block: `kvane_${cifCode(one.id)}`,
    remarks: [
      `Written by kvane: configuration ${one.id}, direction ${one.direction}, irreps ${one.irreps.join(" and ")}.`,
      `k = (${record.k.components.join(", ")}) of the parent cell${Object.keys(record.k.values).length > 0 ? "" : ", exactly"}.`,
      "A hypothesis that symmetry allows, not a refined structure: the moments are one example within the form of the",
      "irreps, in Bohr magnetons. Refine the amplitudes against intensities.",
    ],
    waveVectors: one.arms.map((arm, index) => ({
      id: `k${index + 1}`,
      components: record.star[arm]?.numeric ?? [],
    })),
    typeOf: (label: string) => parentOf(label)?.ion ?? elementOf(label),
    occupancyOf: (label: string) => parentOf(label)?.occupancy ?? null,
    place: (position: readonly string[]) => position.map((entry) => toNumber(parseRational(entry) ?? [0, 1])),
    parent: (toChild: string) => ({
      symbol: record.group.hermannMauguin,
      number: record.parentStandard.number,
      toStandard: record.parentStandard.change,
      toChild,
    }),
  };
}

function contentOf(record: ConfigurationsRecord, one: ConfigurationRecord, cell: CellRecord): MagneticCif {
  const { magneticGroup: group } = one;
  const { block, remarks, waveVectors, typeOf, occupancyOf, place, parent } = commonContent(record, one);
  return {
    block,
    remarks,
    cell,
    parent: parent(group.cellFromParent),
    waveVectors,
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

/** In the axes of the parent; the position of the atom is inside the phase, as the dictionary of modulated structures has it. */
function modulatedContent(record: ConfigurationsRecord, one: ModulatedRecord, cell: CellRecord): MagneticCif {
  const { superspace, pointGroup } = one.magneticGroup;
  const { block, remarks, waveVectors, typeOf, occupancyOf, place, parent } = commonContent(record, one);
  return {
    block,
    remarks,
    cell,
    parent: parent("a,b,c;0,0,0"),
    waveVectors,
    symmetry: {
      kind: "modulated",
      pointGroup,
      waveVector: superspace.k.numeric ?? [],
      operators: superspace.operators,
      centrings: superspace.centrings,
    },
    atoms: one.sites.map((site) => ({
      label: site.label,
      type: typeOf(site.parentSite),
      position: place(site.positionLattice),
      occupancy: occupancyOf(site.parentSite),
      moment: {
        crystal: [0, 0, 0],
        symmform: null,
        waves: [
          {
            order: 1,
            cosine: site.exampleCosineCrystal ?? [],
            sine: site.exampleSineCrystal ?? [],
            cosineForms: waveForms(site.symmformCosine),
            sineForms: waveForms(site.symmformSine),
          },
        ],
      },
    })),
  };
}

/** `(mxcos, 2mxcos, 0)` in the letters of the dictionary of modulated structures: `mxc1`, `2*mxc1`, `0`. */
function waveForms(form: string): readonly string[] {
  return form
    .replace(/[()\s]/g, "")
    .split(",")
    .map((entry) =>
      entry
        .replace(/m([xyz])cos/g, "m$1c1")
        .replace(/m([xyz])sin/g, "m$1s1")
        .replace(/(\d)(?=m)/g, "$1*"),
    );
}

/** The element that a label begins with: the best guess where no ion is named. */
function elementOf(label: string): string {
  return /^[A-Z][a-z]?/.exec(label)?.[0] ?? "X";
}
