import type { SmallIrreps } from "../../irreps/index.js";
import { parameterValues, waveVectorToJson } from "../../kvectors/index.js";
import type {
  ConstraintTexts,
  MinusKOnModes,
  ProjectedComponents,
  WritingOptions,
  WrittenArm,
  WrittenIrrep,
  WrittenMode,
  WrittenSite,
} from "../../modes/index.js";
import { formatPhased, modeSignificantDigits, roundNumber } from "../../numbers/index.js";
import type { SpaceGroup } from "../../spacegroups/index.js";
import type { ComplexRecord } from "../records/common.js";
import type {
  ArmModesRecord,
  IrrepModesRecord,
  MinusKModesRecord,
  ModeRecord,
  ModesRecord,
  ReadComponentsRecord,
  SiteModesRecord,
} from "../records/modes.js";
import { matrixRecords } from "./complex.js";
import { cellRecord, groupRecord, littleGroupRecord, operatorText, positionRecord } from "./names.js";
import { irrepNumbers } from "./symmetry.js";

/** The record of the modes of all sites for JSON and text. */
export function modesRecord(
  group: SpaceGroup,
  found: SmallIrreps,
  sites: readonly (WrittenSite & { readonly read?: ReadFile | null })[],
  options: WritingOptions & { readonly axial: boolean },
): ModesRecord {
  const { exponent, phase, factor, components } = options.convention;
  return {
    group: groupRecord(group),
    k: waveVectorToJson(found.k),
    minusK: found.minusK,
    arms: found.arms,
    axial: options.axial,
    convention: { exponent, phase, factor, components },
    cell: options.cell && cellRecord(options.cell),
    littleGroup: littleGroupRecord(group, found.littleGroup),
    sites: sites.map((site) => ({
      ...siteRecord(group, found, site),
      read: site.read ? readRecord(site, site.read) : null,
    })),
  };
}

/** Fourier components of a site that were read from a file. */
export interface ReadFile {
  readonly file: string;
  readonly projected: ProjectedComponents;
}

function readRecord({ site }: WrittenSite, { file, projected }: ReadFile): ReadComponentsRecord {
  const complex = ([real, imaginary]: readonly [number, number], scale: number): ComplexRecord => [
    roundNumber(real, scale, modeSignificantDigits),
    roundNumber(imaginary, scale, modeSignificantDigits),
  ];
  const scale = Math.max(...projected.components.flat().map((entry) => Math.hypot(...entry)));
  return {
    file,
    components: projected.components.map((vector) => vector.map((entry) => complex(entry, scale))),
    irreps: projected.shares.map(({ label, share, amplitudes }, number) => ({
      label,
      share: roundNumber(share, 1, modeSignificantDigits),
      amplitudes: (site.irreps[number]?.modes ?? []).map(({ copy, partner }, index) => ({
        copy,
        partner,
        value: complex(amplitudes[index] ?? [0, 0], scale),
      })),
    })),
  };
}

function siteRecord(
  group: SpaceGroup,
  found: SmallIrreps,
  { site, irreps, arms }: WrittenSite,
): Omit<SiteModesRecord, "read"> {
  const { orbit, suborbits } = site;
  return {
    label: orbit.label,
    position: positionRecord(orbit.position),
    multiplicity: orbit.multiplicity,
    siteSymmetry: orbit.siteSymmetryClass,
    orbit: orbit.positions.map(positionRecord),
    suborbits: suborbits.map((atoms) => [...atoms]),
    irreps: irreps.map((irrep) => irrepModesRecord(group, found, irrep)),
    starModes: arms?.map((arm) => armRecord(group, arm)) ?? null,
  };
}

function armRecord(group: SpaceGroup, { arm, operator, irreps }: WrittenArm): ArmModesRecord {
  return {
    arm: waveVectorToJson(arm),
    operator: operatorText(group, operator),
    irreps: irreps.map(({ label, modes }) => ({ label, modes: modes.map(modeRecord) })),
  };
}

function irrepModesRecord(group: SpaceGroup, found: SmallIrreps, written: WrittenIrrep): IrrepModesRecord {
  const { part, sizes } = written;
  const { irrep } = part;
  return {
    label: irrep.label,
    dimension: irrep.dimension,
    reality: irrep.reality,
    multiplicity: part.multiplicity,
    ...irrepNumbers(found, irrep),
    modes: written.modes.map(modeRecord),
    constraint: [...written.constraint.lattice],
    constraintCrystal: listOrNull(written.constraint.crystal),
    freeParameters: part.freeParameters,
    freeParametersWithMinusK: part.freeParametersWithMinusK,
    minusK: part.minusK && minusKRecord(group, found, part.minusK, written.orderParameter),
    vanishingAtoms: [...part.vanishingAtoms],
    equalAmplitude: sizes?.equalAmplitude ?? null,
    constantMoment: sizes?.constantMoment ?? null,
    collinear: sizes?.collinear ?? null,
  };
}

function minusKRecord(
  group: SpaceGroup,
  found: SmallIrreps,
  relation: MinusKOnModes,
  texts: ConstraintTexts | null,
): MinusKModesRecord {
  const { numbers, exact } = matrixRecords(relation.matrix, parameterValues(found.k));
  return {
    operator: operatorText(group, relation.operator),
    partner: relation.partner,
    suborbitImages: [...relation.suborbitImages],
    matrix: numbers,
    exact,
    constraint: listOrNull(texts?.lattice ?? null),
    constraintCrystal: listOrNull(texts?.crystal ?? null),
  };
}

function listOrNull(texts: readonly string[] | null): string[] | null {
  return texts && [...texts];
}

function modeRecord({ copy, partner, suborbit, exact, numbers }: WrittenMode): ModeRecord {
  return {
    copy,
    partner,
    suborbit,
    moments: numbers && rounded(numbers),
    exact: exact.map((vector) => vector.map(formatPhased)),
  };
}

/** Rounding noise is judged against the largest component of the whole mode. */
function rounded(numbers: NonNullable<WrittenMode["numbers"]>): ComplexRecord[][] {
  const scale = Math.max(...numbers.flat().map(([real, imaginary]) => Math.hypot(real, imaginary)));
  const round = (value: number) => roundNumber(value, scale, modeSignificantDigits);
  return numbers.map((vector) => vector.map(([real, imaginary]): ComplexRecord => [round(real), round(imaginary)]));
}
