import { constantRoot, type MinusKLink, type MinusKRelation, type SmallIrrep } from "../irreps/index.js";
import type { WaveVector } from "../kvectors/index.js";
import {
  addCyclotomic,
  addForms,
  type Cyclotomic,
  type CyclotomicMatrix,
  conjugateCyclotomic,
  cyclotomicNumbers,
  cyclotomicOne,
  cyclotomicZero,
  isCyclotomicZero,
  multiplyCyclotomic,
  type Phase,
  type PhasedNumber,
  reducedEchelon,
  reduceOrder,
  rootOfUnity,
  scaleForm,
  subtractForms,
  zeroForm,
} from "../numbers/index.js";
import { withPlainPhase } from "./common-phase.js";
import { letterOf, type Term, type TermMoment, termTable } from "./constraint-table.js";
import type { OperatorAction } from "./site-action.js";
import type { MinusKOnModes, Mode, ModeMoment } from "./types.js";

/** How g₀ acts on the atoms and on one moment. */
export interface ReversingAction extends OperatorAction {
  /** det(R₀) R₀ in lattice components. */
  readonly matrix: CyclotomicMatrix;
}

/** The modes of one copy: one per partner. */
type Copy = readonly Mode[];

/**
 * B of every copy, read off at the leading entries of the partner's copies, which are 1 there and 0 in other copies.
 */
export function minusKOnModes(
  k: WaveVector,
  irrep: SmallIrrep,
  link: MinusKLink,
  relation: MinusKRelation,
  action: ReversingAction,
  suborbits: readonly (readonly number[])[],
  modes: readonly Mode[],
  partnerModes: readonly Mode[],
): MinusKOnModes {
  const copies = groupCopies(modes);
  const partners = groupCopies(partnerModes);
  const pivots = partners.map(leadingEntry);
  const source = action.image.map((_, atom) => action.image.indexOf(atom));
  // Modes without a moment on the atom have no phase there.
  const phaseAt = (copy: Copy, atom: number): Phase =>
    subtractForms(
      action.phase[atom] as Phase,
      copy.map((mode) => momentOf(mode, atom)).find(hasSize)?.phase ?? zeroForm,
    );
  const [linked] = link.matrix as readonly [readonly Cyclotomic[]];
  const matrix = pivots.map(({ atom, axis }) =>
    copies.map((copy): PhasedNumber => {
      const from = source[atom] as number;
      const factor = copy.reduce((sum, mode, partner) => {
        const { vector } = momentOf(mode, from);
        const rotated = rowTimesConjugate(action.matrix[axis] as readonly Cyclotomic[], vector);
        return addCyclotomic(sum, multiplyCyclotomic(rotated, conjugateCyclotomic(linked[partner] as Cyclotomic)));
      }, cyclotomicZero);
      return { phase: phaseAt(copy, from), factor: reduceOrder(factor) };
    }),
  );
  const suborbitImages = suborbits.map((atoms) =>
    suborbits.findIndex((others) => others.includes(action.image[atoms[0] as number] as number)),
  );
  return {
    operator: relation.operator,
    partner: link.partner,
    suborbitImages,
    matrix,
    constraint:
      irrep.reality === "real" ? termTable(k, lockedTerms(copies, matrix, suborbitImages), action.image.length) : null,
  };
}

/** The amplitudes of the arrangement of one order parameter, and what each puts on the atoms; real irreps only. */
export function orderParameterTerms({ matrix, suborbitImages }: MinusKOnModes, modes: readonly Mode[]): Term[] {
  return lockedTerms(groupCopies(modes), matrix, suborbitImages);
}

function groupCopies(modes: readonly Mode[]): Copy[] {
  const copies: Mode[][] = [];
  for (const mode of modes) {
    const copy = copies[mode.copy - 1] ?? [];
    copies[mode.copy - 1] = [...copy, mode];
  }
  return copies;
}

function leadingEntry(copy: Copy): { atom: number; axis: number } {
  const [mode] = copy as readonly [Mode];
  const atom = mode.moments.findIndex(hasSize);
  return { atom, axis: momentOf(mode, atom).vector.findIndex((entry) => !isCyclotomicZero(entry)) };
}

function momentOf(mode: Mode, atom: number): ModeMoment {
  return mode.moments[atom] as ModeMoment;
}

function hasSize({ vector }: ModeMoment): boolean {
  return !vector.every(isCyclotomicZero);
}

function rowTimesConjugate(row: readonly Cyclotomic[], vector: readonly Cyclotomic[]): Cyclotomic {
  return row.reduce(
    (sum, entry, index) =>
      addCyclotomic(sum, multiplyCyclotomic(entry, conjugateCyclotomic(vector[index] as Cyclotomic))),
    cyclotomicZero,
  );
}

/**
 * One order parameter drives all copies with amplitudes that obey `a = B a*` up to a common phase (B B* = 1 for a real
 * irrep). On a suborbit that g₀ maps to itself they are real behind half the phase of B's diagonal; on two suborbits
 * that it exchanges they are one complex letter and its conjugate.
 */
function lockedTerms(
  copies: readonly Copy[],
  matrix: readonly (readonly PhasedNumber[])[],
  suborbitImages: readonly number[],
): Term[] {
  const terms: Term[] = [];
  suborbitImages.forEach((image, suborbit) => {
    const here = numbersOn(copies, suborbit);
    const used = terms.length / (copies[0] as Copy).length;
    if (image === suborbit) terms.push(...selfTerms(copies, matrix, here, used));
    else if (image > suborbit) terms.push(...pairTerms(copies, matrix, here, numbersOn(copies, image), used));
  });
  return withPlainPhase(terms);
}

function numbersOn(copies: readonly Copy[], suborbit: number): number[] {
  return copies.flatMap((copy, number) => (suborbitOf(copy) === suborbit ? [number] : []));
}

function suborbitOf([mode]: Copy): number {
  return (mode as Mode).suborbit;
}

function entryOf(matrix: readonly (readonly PhasedNumber[])[], row: number, column: number): PhasedNumber {
  return (matrix[row] as readonly PhasedNumber[])[column] as PhasedNumber;
}

/** Real letters: the fixed space of `a → b a*`, b being B without the half phases of its diagonal. */
function selfTerms(
  copies: readonly Copy[],
  matrix: readonly (readonly PhasedNumber[])[],
  here: readonly number[],
  used: number,
): Term[] {
  const half = new Map(here.map((number) => [number, scaleForm([1, 2], entryOf(matrix, number, number).phase)]));
  const b = here.map((row) =>
    here.map((column) => {
      const { phase, factor } = entryOf(matrix, row, column);
      const rest = subtractForms(phase, addForms(half.get(row) as Phase, half.get(column) as Phase));
      return multiplyCyclotomic(constantRoot(rest), factor);
    }),
  );
  const i = rootOfUnity([1, 4]);
  const fixed = here.flatMap((_, column) =>
    [
      cyclotomicOneAt(here.length, column),
      cyclotomicOneAt(here.length, column).map((entry) => multiplyCyclotomic(i, entry)),
    ].map((v) => v.map((entry, row) => addCyclotomic(entry, rowTimesConjugate(b[row] as readonly Cyclotomic[], v)))),
  );
  return realBasis(fixed).flatMap((weights, index) =>
    partnersOf(copies).map(
      (partner): Term => ({
        letter: letterOf(used + index),
        component: componentFor(copies, partner),
        moments: combined(copies, here, weights, partner, half),
      }),
    ),
  );
}

function cyclotomicOneAt(length: number, position: number): Cyclotomic[] {
  return Array.from({ length }, (_, index) => (index === position ? cyclotomicOne : cyclotomicZero));
}

/** A basis with real coefficients of the real span of complex rows: echelon form of (real part, imaginary part). */
function realBasis(rows: readonly (readonly Cyclotomic[])[]): Cyclotomic[][] {
  const i = rootOfUnity([1, 4]);
  const twice = (entry: Cyclotomic): Cyclotomic => addCyclotomic(entry, conjugateCyclotomic(entry));
  // 2 Re z and 2 Im z = 2 Re(−i z): the common factor 2 does not change the span.
  const split = rows.map((row) => [
    ...row.map(twice),
    ...row.map((entry) => twice(multiplyCyclotomic(conjugateCyclotomic(i), entry))),
  ]);
  return reducedEchelon(split, cyclotomicNumbers).rows.map((row) => {
    const width = row.length / 2;
    return row
      .slice(width)
      .map((imaginary, index) =>
        reduceOrder(addCyclotomic(row[index] as Cyclotomic, multiplyCyclotomic(i, imaginary))),
      );
  });
}

/** Complex letters on the first suborbit, their conjugates behind B on the second. */
function pairTerms(
  copies: readonly Copy[],
  matrix: readonly (readonly PhasedNumber[])[],
  here: readonly number[],
  there: readonly number[],
  used: number,
): Term[] {
  return here.flatMap((column, index) =>
    partnersOf(copies).map((partner): Term => {
      const own = combined(copies, [column], [cyclotomicOne], partner, new Map([[column, zeroForm]]));
      const phases = new Map(there.map((row) => [row, entryOf(matrix, row, column).phase]));
      const weights = there.map((row) => entryOf(matrix, row, column).factor);
      const other = combined(copies, there, weights, partner, phases);
      return {
        letter: letterOf(used + index),
        component: componentFor(copies, partner),
        suborbit: suborbitOf(copies[column] as Copy),
        moments: own.map((moment, atom) =>
          moment.vector.every(isCyclotomicZero) ? { ...(other[atom] as TermMoment), conjugate: true } : moment,
        ),
      };
    }),
  );
}

/** All copies have as many partners. */
function partnersOf([first]: readonly Copy[]): number[] {
  return (first as Copy).map((_, partner) => partner);
}

/** Nothing for one-dimensional irreps; `ξ2` for the second component of an order parameter ξ of several. */
function componentFor(copies: readonly Copy[], partner: number): string {
  return (copies[0] as Copy).length === 1 ? "" : `ξ${partner + 1}`;
}

/** Σ weight_c e^{2πi·phase_c} E_c for one partner; on one suborbit all terms of an atom have one phase. */
function combined(
  copies: readonly Copy[],
  numbers: readonly number[],
  weights: readonly Cyclotomic[],
  partner: number,
  phases: ReadonlyMap<number, Phase>,
): { phase: Phase; vector: Cyclotomic[] }[] {
  const [[{ moments }]] = copies as readonly [readonly [Mode]];
  return moments.map((_, atom) => {
    let phase: Phase | null = null;
    const vector: Cyclotomic[] = [cyclotomicZero, cyclotomicZero, cyclotomicZero];
    numbers.forEach((number, index) => {
      const moment = momentOf((copies[number] as Copy)[partner] as Mode, atom);
      const weight = weights[index] as Cyclotomic;
      if (isCyclotomicZero(weight) || !hasSize(moment)) return;
      const total = addForms(moment.phase, phases.get(number) as Phase);
      phase ??= total;
      const factor = multiplyCyclotomic(constantRoot(subtractForms(total, phase)), weight);
      moment.vector.forEach((entry, axis) => {
        vector[axis] = addCyclotomic(vector[axis] as Cyclotomic, multiplyCyclotomic(factor, entry));
      });
    });
    return { phase: phase ?? zeroForm, vector: vector.map(reduceOrder) };
  });
}
