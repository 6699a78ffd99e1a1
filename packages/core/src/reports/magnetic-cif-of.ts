import { type CifVersion, type MagneticCif, magneticCifText } from "../files/index.js";
import { parseRational, toNumber } from "../numbers/index.js";
import { cifCode } from "./cif-code.js";
import { cifObstacle } from "./cif-obstacle.js";
import type { CellRecord } from "./records/common.js";
import type {
  AnyConfiguration,
  ConfigurationRecord,
  ConfigurationsRecord,
  ModulatedRecord,
} from "./records/configurations.js";
import type { FittedSiteRecord, WeighRecord } from "./records/weigh.js";

/** Moments that were fitted to intensities, for the file of their configuration. */
export interface FittedMoments {
  readonly sites: readonly FittedSiteRecord[];
  /** What the sizes are multiplied with: 1, or where they are relative what makes the largest possible. */
  readonly factor: number;
  /** What the file says of them, a line each. */
  readonly remarks: readonly string[];
}

/**
 * One configuration as a magnetic CIF in its child cell. The irreps leave amplitudes free: without fitted ones the moments are
 * one generic choice of them, and the file says so. Null where something stands in the way (`cifObstacle`).
 */
export function configurationCif(
  record: ConfigurationsRecord,
  one: AnyConfiguration,
  version: CifVersion,
  fitted: FittedMoments | null = null,
): string | null {
  if (cifObstacle(record, one) !== null) return null;
  if ("superspace" in one.magneticGroup) {
    const { cell } = record;
    return cell && magneticCifText(modulatedContent(record, one as ModulatedRecord, cell, fitted), version);
  }
  const own = one as ConfigurationRecord;
  const { cell } = own.magneticGroup;
  return cell && magneticCifText(contentOf(record, own, cell, fitted), version);
}

/** The fit of a configuration as its file has it; null where it was struck out, or sizes have no unit. */
export function fittedMoments(weigh: WeighRecord, id: string): FittedMoments | null {
  const one = weigh.ranking.find((candidate) => candidate.id === id);
  const factor = weigh.relative ? one?.factorToLimit : 1;
  if (one === undefined || factor == null) return null;
  const open = one.amplitudes.some(({ determined }) => !determined);
  return {
    sites: one.sites,
    factor,
    remarks: [
      `Moments in Bohr magnetons are the best fit of kvane weigh to ${weigh.data.file}: a start for a refinement, not its result.`,
      ...(weigh.relative ? ["No nuclear scale was known: the largest moment is set to what its ion can have."] : []),
      ...(open ? ["The intensities do not determine all amplitudes: these moments are one choice of many."] : []),
      ...(one.sameAs.length > 0 ? [`Not told apart by these intensities: ${one.sameAs.join(", ")}.`] : []),
    ],
  };
}

const exampleRemarks = [
  "A hypothesis that symmetry allows, not a refined structure: the moments are one example within the form of the",
  "irreps, in Bohr magnetons. Refine the amplitudes against intensities.",
];

/** A vector of the fit in the place of one of the example. */
function momentOf(
  fitted: FittedMoments | null,
  label: string,
  part: "momentCrystal" | "cosineCrystal" | "sineCrystal",
  example: readonly number[] | null,
): readonly number[] {
  if (fitted === null) return example ?? [];
  const own = fitted.sites.find((site) => site.label === label)?.[part] ?? [0, 0, 0];
  return own.map((entry) => (entry === 0 ? 0 : entry * fitted.factor));
}

/** What both kinds of file say. */
function commonContent(record: ConfigurationsRecord, one: AnyConfiguration, fitted: FittedMoments | null) {
  const parentOf = (label: string) => record.parentSites.find((site) => site.label === label);
  return {
    block: `kvane_${cifCode(one.id)}`,
    remarks: [
      `Written by kvane: configuration ${one.id}, direction ${one.direction}, irreps ${one.irreps.join(" and ")}.`,
      "The numbers of irreps are kvane's own: an irrep is identified by its characters (kvane irreps).",
      `k = (${record.k.components.join(", ")}) of the parent cell${Object.keys(record.k.values).length > 0 ? "" : ", exactly"}.`,
      ...(fitted?.remarks ?? exampleRemarks),
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

function contentOf(
  record: ConfigurationsRecord,
  one: ConfigurationRecord,
  cell: CellRecord,
  fitted: FittedMoments | null,
): MagneticCif {
  const { magneticGroup: group } = one;
  const { block, remarks, waveVectors, typeOf, occupancyOf, place, parent } = commonContent(record, one, fitted);
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
          crystal: momentOf(fitted, site.label, "momentCrystal", site.exampleCrystal),
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
function modulatedContent(
  record: ConfigurationsRecord,
  one: ModulatedRecord,
  cell: CellRecord,
  fitted: FittedMoments | null,
): MagneticCif {
  const { superspace, pointGroup } = one.magneticGroup;
  const { block, remarks, waveVectors, typeOf, occupancyOf, place, parent } = commonContent(record, one, fitted);
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
            cosine: momentOf(fitted, site.label, "cosineCrystal", site.exampleCosineCrystal),
            sine: momentOf(fitted, site.label, "sineCrystal", site.exampleSineCrystal),
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
