import { waveTimesColumn } from "../irreps/index.js";
import { isHalfLattice, type WaveVector } from "../kvectors/index.js";
import { addForms, isCyclotomicZero, negateForm, type Phase, zeroForm } from "../numbers/index.js";
import type { Cell, SiteOrbit, SpaceGroup } from "../spacegroups/index.js";
import { axisLengths } from "./axis-lengths.js";
import { withPlainPhase } from "./common-phase.js";
import { constraintTerms, type Term, type TermMoment, termTable } from "./constraint-table.js";
import { type FourierConvention, ownConvention, toConvention } from "./fourier-conventions.js";
import { orderParameterTerms } from "./minus-k-modes.js";
import { modesOf } from "./modes-of.js";
import type { IrrepModes, ModeMoment, SiteModes } from "./types.js";

/** A table of what is allowed, one text per atom. */
export interface ConstraintTexts {
  /** In lattice components. */
  readonly lattice: readonly string[];
  /** In μB along the unit vectors of the axes; null where that is the same text, and where no cell is known. */
  readonly crystal: readonly string[] | null;
}

/** How constraint tables are written: with a cell also along unit vectors, in μB. */
export interface ConstraintOptions {
  readonly convention?: FourierConvention;
  readonly cell?: Cell | null;
}

/**
 * The arrangement that an irrep allows (`IrrepModes.constraint`), written in another Fourier convention and in crystal
 * components. Letters are the components in that convention on the first atom that has them, so the factor 1/2 of a
 * convention never shows; with phases that run with the position a complex letter takes up that of the first atom of
 * its suborbit. Letters are real where 2k ∈ L*.
 */
export function constraintTexts(
  group: SpaceGroup,
  site: SiteModes,
  part: IrrepModes,
  options: ConstraintOptions = {},
): ConstraintTexts {
  const { k } = site.representations;
  if (part.modes.length === 0 || isPlain(options)) return { lattice: part.constraint, crystal: null };
  const half = isHalfLattice(group, k);
  const conjugate = modesOf(site.irreps, part.irrep.conjugateOf);
  const terms = constraintTerms(part.modes, half ? { conjugate } : null);
  return texts(
    group,
    site,
    inConvention(group, k, site, terms, options.convention, () => !half),
    options,
  );
}

/** The same for the arrangement of one order parameter (`MinusKOnModes.constraint`); null where there is none. */
export function orderParameterTexts(
  group: SpaceGroup,
  site: SiteModes,
  part: IrrepModes,
  options: ConstraintOptions = {},
): ConstraintTexts | null {
  if (part.minusK === null || part.minusK.constraint === null) return null;
  if (isPlain(options)) return { lattice: part.minusK.constraint, crystal: null };
  const terms = orderParameterTerms(part.minusK, part.modes);
  // Letters that meet their conjugate are complex, the others real.
  const isComplex = ({ moments }: Term): boolean => moments.some(({ conjugate }) => conjugate);
  const moved = inConvention(group, site.representations.k, site, terms, options.convention, isComplex);
  return texts(group, site, options.convention?.phase === "position" ? withPlainPhase(moved) : moved, options);
}

/** `constraintTexts` in crystal components alone: null where they are the lattice components' text. */
export function constraintCrystal(
  group: SpaceGroup,
  cell: Cell,
  site: SiteModes,
  part: IrrepModes,
): readonly string[] | null {
  return constraintTexts(group, site, part, { cell }).crystal;
}

function texts(
  group: SpaceGroup,
  site: SiteModes,
  terms: readonly Term[],
  { cell }: ConstraintOptions,
): ConstraintTexts {
  const { k } = site.representations;
  const atoms = site.orbit.positions.length;
  const crystal = cell ? crystalTerms(axisLengths(group, cell), terms) : null;
  return { lattice: termTable(k, terms, atoms), crystal: crystal && termTable(k, crystal, atoms) };
}

/** Without a cell kvane's own convention asks for nothing but what is there. */
function isPlain({ convention = ownConvention, cell }: ConstraintOptions): boolean {
  const { exponent, phase } = convention;
  return !cell && exponent === ownConvention.exponent && phase === ownConvention.phase;
}

/** The terms in a convention; partners (`u1`, `u2`) live on one suborbit, so they take up the same phase. */
function inConvention(
  group: SpaceGroup,
  k: WaveVector,
  { orbit: { positions }, suborbits }: SiteModes,
  terms: readonly Term[],
  convention: FourierConvention = ownConvention,
  takesPhase: (term: Term) => boolean,
): Term[] {
  // Letters absorb a common factor.
  const plain: FourierConvention = { ...convention, factor: "one" };
  const firstPhase = ({ suborbit }: Term): Phase => {
    const [start] = suborbits[suborbit as number] as readonly [number];
    const turns = waveTimesColumn(k, positions[start] as SiteOrbit["position"]);
    return convention.exponent === "plus" ? turns : negateForm(turns);
  };
  return terms.map((term) => {
    const taken = convention.phase === "position" && takesPhase(term) ? firstPhase(term) : zeroForm;
    return {
      ...term,
      moments: term.moments.map((moment, atom) => {
        if (moment.vector.every(isCyclotomicZero)) return moment;
        const own = moment as ModeMoment;
        const { phase, vector } = toConvention(group, k, positions[atom] as SiteOrbit["position"], own, plain);
        return { ...moment, phase: addForms(phase, moment.conjugate ? negateForm(taken) : taken), vector };
      }),
    };
  });
}

/**
 * Terms for moments along the unit vectors of the axes, `m_i(crystal) = L_i m_i(lattice)`: each entry is multiplied by
 * L_i over the length of the axis of the letter's leading entry, so that a letter in μB is the moment along that axis.
 * Null where no entry changes.
 */
function crystalTerms(lengths: readonly [number, number, number], terms: readonly Term[]): Term[] | null {
  const leading = new Map<string, number>();
  for (const term of terms) if (!leading.has(copyOf(term))) leading.set(copyOf(term), leadingAxis(term));
  let changed = false;
  const result = terms.map((term) => {
    const unit = lengths[leading.get(copyOf(term)) as 0 | 1 | 2];
    const ratios = lengths.map((length) => plainRatio(length / unit)) as [number, number, number];
    changed ||= term.moments.some(({ vector }) =>
      vector.some((entry, axis) => ratios[axis] !== 1 && !isCyclotomicZero(entry)),
    );
    return { ...term, ratios };
  });
  return changed ? result : null;
}

/** The letter without the digit of its partner. */
function copyOf({ letter }: Term): string {
  return letter.replace(/\d+$/, "");
}

/** Axis of the first entry that is not zero. */
export function leadingAxis({ moments }: Pick<Term, "moments">): 0 | 1 | 2 {
  const { vector } = moments.find((moment) => !moment.vector.every(isCyclotomicZero)) as TermMoment;
  return vector.findIndex((entry) => !isCyclotomicZero(entry)) as 0 | 1 | 2;
}

/** Lengths that symmetry makes equal differ by rounding only. */
function plainRatio(ratio: number): number {
  return Math.abs(ratio - 1) < 1e-9 ? 1 : ratio;
}
