import { parameterValues, type WaveVector } from "../kvectors/index.js";
import { type PhasedNumber, phasedToComplex, type RationalVector } from "../numbers/index.js";
import type { Cell, SpaceGroup } from "../spacegroups/index.js";
import { axisLengths } from "./axis-lengths.js";
import { checkCellGiven, convertComponents } from "./components.js";
import { type ConstraintTexts, constraintTexts, leadingAxis, orderParameterTexts } from "./constraint-forms.js";
import { type FourierConvention, type MomentComponents, ownConvention, toConvention } from "./fourier-conventions.js";
import { type MomentSizes, momentSizes } from "./moment-sizes.js";
import { starModes } from "./star-modes.js";
import type { IrrepModes, Mode, ModeMoment, SiteModes } from "./types.js";

/** How Fourier components are written: the wave, and the axes of the components. */
export interface WritingConvention extends FourierConvention {
  readonly components: MomentComponents;
}

/** kvane's own: `M = S e^{−2πi k·T} + c.c.` in lattice components. */
export const ownWriting: WritingConvention = { ...ownConvention, components: "lattice" };

/** In which convention of Fourier components modes are written, and whether on every arm. */
export interface WritingOptions {
  readonly convention: WritingConvention;
  /** Without a cell what needs one is null; crystal and Cartesian components cannot do without. */
  readonly cell: Cell | null;
  /** The basis vectors on every arm of the star too. */
  readonly star: boolean;
}

/** A basis vector in a convention. */
export interface WrittenMode {
  readonly copy: number;
  readonly partner: number;
  readonly suborbit: number;
  /** Lattice components, one triple per atom. */
  readonly exact: readonly (readonly PhasedNumber[])[];
  /**
   * The components of the convention as `[re, im]`, null while a letter of k is open. In crystal and Cartesian ones each
   * copy is divided by the length of the axis of its leading entry, so that an amplitude in μB is the moment along it.
   */
  readonly numbers: readonly (readonly (readonly [number, number])[])[] | null;
}

/** The modes of one irrep on a site, in the convention asked for. */
export interface WrittenIrrep {
  readonly part: IrrepModes;
  readonly modes: readonly WrittenMode[];
  readonly constraint: ConstraintTexts;
  /** Of one order parameter; null where the relation between k and −k gives none. */
  readonly orderParameter: ConstraintTexts | null;
  /** Null without a cell and while a letter of k is open. */
  readonly sizes: MomentSizes | null;
}

/** The mode vectors of one arm of the star, in the convention asked for. */
export interface WrittenArm {
  readonly arm: WaveVector;
  readonly operator: number;
  readonly irreps: readonly { readonly label: string; readonly modes: readonly WrittenMode[] }[];
}

/** All that there is to say about the modes of one site, in a convention. */
export interface WrittenSite {
  readonly site: SiteModes;
  readonly irreps: readonly WrittenIrrep[];
  readonly arms: readonly WrittenArm[] | null;
}

/**
 * The modes of a site as they are printed: basis vectors and constraint tables in the convention asked for.
 *
 * @throws `k-needs-values` where a convention needs numbers for the letters of k, `missing-argument` where it needs a cell
 */
export function writtenSite(group: SpaceGroup, site: SiteModes, options: WritingOptions): WrittenSite {
  const { convention, cell } = options;
  checkCellGiven(convention.components, cell);
  const lengths = cell && axisLengths(group, cell);
  const write = (arm: WaveVector, part: IrrepModes, mode: Mode): WrittenMode => {
    // The first partner of the copy on the first arm, so that the matrices of the irrep hold for what is written.
    const leading = part.modes.find(({ copy }) => copy === mode.copy) as Mode;
    const unit = lengths === null ? 1 : lengths[leadingAxis(leading)];
    return writtenMode(group, site, arm, mode, convention, cell && { cell, unit });
  };
  const { k } = site.representations;
  return {
    site,
    irreps: site.irreps.map((part) => ({
      part,
      modes: part.modes.map((mode) => write(k, part, mode)),
      constraint: constraintTexts(group, site, part, options),
      orderParameter: orderParameterTexts(group, site, part, options),
      sizes: cell && momentSizes(group, cell, site, part),
    })),
    arms: options.star
      ? starModes(group, site).map(({ arm, operator, irreps }) => ({
          arm,
          operator,
          irreps: irreps.map(({ label, modes }, number) => ({
            label,
            modes: modes.map((mode) => write(arm, site.irreps[number] as IrrepModes, mode)),
          })),
        }))
      : null,
  };
}

function writtenMode(
  group: SpaceGroup,
  { orbit }: SiteModes,
  arm: WaveVector,
  mode: Mode,
  convention: WritingConvention,
  scale: { readonly cell: Cell; readonly unit: number } | null,
): WrittenMode {
  const moments = mode.moments.map((moment, atom): ModeMoment => {
    const position = orbit.positions[atom] as RationalVector;
    return toConvention(group, arm, position, moment, convention);
  });
  const exact = moments.map(({ phase, vector }) => vector.map((factor): PhasedNumber => ({ phase, factor })));
  const values = parameterValues(arm);
  return {
    copy: mode.copy,
    partner: mode.partner,
    suborbit: mode.suborbit,
    exact,
    numbers:
      values &&
      exact.map((vector) => {
        const numbers = vector.map((entry) => phasedToComplex(entry, values) as [number, number]);
        return scale === null || convention.components === "lattice"
          ? numbers
          : inAxes(numbers, scale.cell, scale.unit, convention.components);
      }),
  };
}

function inAxes(
  vector: readonly (readonly [number, number])[],
  cell: Cell,
  unit: number,
  components: MomentComponents,
): [number, number][] {
  const part = (index: 0 | 1): readonly [number, number, number] => {
    const along = vector.map((entry) => entry[index] / unit) as [number, number, number];
    return convertComponents(cell, along, "lattice", components);
  };
  const [real, imaginary] = [part(0), part(1)];
  return ([0, 1, 2] as const).map((axis) => [real[axis], imaginary[axis]]);
}
