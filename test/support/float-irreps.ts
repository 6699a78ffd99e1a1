import type { SmallIrreps } from "@kvane/core/irreps";
import type { SpaceGroup } from "@kvane/core/spacegroups";
import type { ComplexMatrix } from "./complex.js";
import { zeroMatrix } from "./complex.js";
import { componentsOf, type FloatGroup, floatGroup, letterValues } from "./float-group.js";

/** An exact number of the records, as the validators read it. */
interface CyclotomicRecord {
  readonly order: number;
  readonly denominator: number;
  readonly coefficients: readonly number[];
}

interface PhaseRecord {
  readonly constant: readonly [number, number];
  readonly coefficients: readonly (readonly [number, number])[];
}

/** Small irreps read into floats: everything a check needs, in the order of the records. */
export interface FloatIrreps {
  readonly group: FloatGroup;
  readonly k: readonly number[];
  /** Indices into `group.operators`. */
  readonly operators: readonly number[];
  readonly labels: readonly string[];
  readonly dimensions: readonly number[];
  /** `matrices[ν][i]` = D_ν of operator `operators[i]`. */
  readonly matrices: readonly (readonly ComplexMatrix[])[];
  /** `characters[ν][i]` as the record gives them (not the traces). */
  readonly characters: readonly (readonly (readonly [number, number])[])[];
}

/** `(Σ c_e e^{2πi e/N}) / d`, summed plainly. */
export function cyclotomicValue(number: CyclotomicRecord): [number, number] {
  let re = 0;
  let im = 0;
  number.coefficients.forEach((coefficient, exponent) => {
    if (coefficient === 0) return;
    re += coefficient * Math.cos((2 * Math.PI * exponent) / number.order);
    im += coefficient * Math.sin((2 * Math.PI * exponent) / number.order);
  });
  return [re / number.denominator, im / number.denominator];
}

/** A linear form at values of u, v, w. */
export function phaseValue(phase: PhaseRecord, letters: readonly number[]): number {
  return phase.coefficients.reduce(
    (sum, [top, bottom], index) => (top === 0 ? sum : sum + (top / bottom) * (letters[index] as number)),
    phase.constant[0] / phase.constant[1],
  );
}

/** `e^{2πi·phase} · factor`. */
export function phasedValue(
  phase: PhaseRecord,
  factor: CyclotomicRecord,
  letters: readonly number[],
): [number, number] {
  const [re, im] = cyclotomicValue(factor);
  const angle = 2 * Math.PI * phaseValue(phase, letters);
  const [cosine, sine] = [Math.cos(angle), Math.sin(angle)];
  return [re * cosine - im * sine, re * sine + im * cosine];
}

export function floatIrreps(group: SpaceGroup, irreps: SmallIrreps): FloatIrreps {
  return {
    group: floatGroup(group),
    k: componentsOf(irreps.k),
    operators: irreps.littleGroup.operators,
    labels: irreps.irreps.map((irrep) => irrep.label),
    dimensions: irreps.irreps.map((irrep) => irrep.dimension),
    matrices: irreps.irreps.map((irrep) =>
      irrep.matrices.map((rows, index) => floatMatrix(rows, irreps.phases[index] as PhaseRecord)),
    ),
    characters: irreps.irreps.map((irrep) =>
      irrep.characters.map((character) => phasedValue(character.phase, character.factor, letterValues)),
    ),
  };
}

/** The matrix in floats, turned by the phase. */
export function floatMatrix(rows: readonly (readonly CyclotomicRecord[])[], phase: PhaseRecord | null): ComplexMatrix {
  const matrix = zeroMatrix(rows.length, rows.length);
  rows.flat().forEach((entry, index) => {
    const [re, im] = phase === null ? cyclotomicValue(entry) : phasedValue(phase, entry, letterValues);
    matrix.real[index] = re;
    matrix.imaginary[index] = im;
  });
  return matrix;
}
