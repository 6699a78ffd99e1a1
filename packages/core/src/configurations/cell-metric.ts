import { type Rational, type RationalMatrix, roundNumber, toNumber } from "../numbers/index.js";
import { type Cell, directMetric, type SpaceGroup } from "../spacegroups/index.js";
import { sumText } from "./form-text.js";
import { exactTerm, type FormTerm } from "./split-sites.js";

/** Lengths in a child cell, as far as they are known. */
export interface CellMetric {
  /** Nine numbers, Å²; null without a cell. */
  readonly metric: readonly number[] | null;
  /** A form in lattice components for components along unit vectors; null where it needs lengths that are not known. */
  readonly crystalForm: (forms: readonly (readonly FormTerm[])[]) => string | null;
}

/** Digits of a ratio of cell lengths, which are measured to four or five. */
const ratioDigits = 6;
/** Ratios of lengths that differ from 1 by less are 1: symmetry makes them so and rounding does not. */
const sameLength = 1e-9;

/**
 * The metric of the parent's cell averaged over the point group (`G = (1/n) Σ RᵀGR`: cells are given to four digits, and
 * vectors that symmetry makes equivalent have one length), in the axes `(a,b,c) P`. Without a cell the lengths are
 * compared by what the operators alone make equal.
 */
export function cellMetric(group: SpaceGroup, cell: Cell | null, matrix: RationalMatrix): CellMetric {
  const start = cell === null ? [1, 0, 0, 0, 1, 0, 0, 0, 1] : directMetric(cell);
  const metric = changed(averaged(group, start), matrix);
  // A second, generic metric tells which equalities hold for every cell of the group.
  const other = changed(averaged(group, [1, 0.13, -0.21, 0.13, 1.37, 0.29, -0.21, 0.29, 1.71]), matrix);
  const ratio = (of: readonly number[], i: number, j: number): number =>
    Math.sqrt((of[4 * i] as number) / (of[4 * j] as number));
  return {
    metric: cell === null ? null : metric,
    crystalForm: (forms) => {
      const texts: string[] = [];
      for (const [axis, terms] of forms.entries()) {
        const mixed = terms.some((term) => Math.abs(ratio(other, axis, term.axis) - 1) > sameLength);
        if (!mixed) texts.push(sumText(terms.map(exactTerm)));
        else if (cell === null) return null;
        else texts.push(decimalSum(terms, (term) => ratio(metric, axis, term.axis)));
      }
      return `(${texts.join(", ")})`;
    },
  };
}

function decimalSum(terms: readonly FormTerm[], ratioOf: (term: FormTerm) => number): string {
  let text = "";
  for (const term of terms) {
    const value = roundNumber(toNumber(term.factor as Rational) * ratioOf(term), 1, ratioDigits);
    const size = Math.abs(value) === 1 ? "" : String(Math.abs(value));
    text += `${value < 0 ? "-" : text === "" ? "" : "+"}${size}${["mx", "my", "mz"][term.axis]}`;
  }
  return text === "" ? "0" : text;
}

function averaged(group: SpaceGroup, given: readonly number[]): number[] {
  const metric = new Array<number>(9).fill(0);
  for (const { rotation, rotationDenominator } of group.operators) {
    const scale = rotationDenominator * rotationDenominator * group.operators.length;
    const turned = congruent(given, rotation);
    for (let entry = 0; entry < 9; entry++)
      metric[entry] = (metric[entry] as number) + (turned[entry] as number) / scale;
  }
  return metric;
}

function changed(metric: readonly number[], matrix: RationalMatrix): number[] {
  return congruent(
    metric,
    matrix.flatMap((row) => row.map(toNumber)),
  );
}

/** `MᵀGM`. */
function congruent(metric: readonly number[], matrix: readonly number[]): number[] {
  return Array.from({ length: 9 }, (_, entry) => {
    const [left, right] = [Math.floor(entry / 3), entry % 3];
    let sum = 0;
    for (let i = 0; i < 3; i++)
      for (let j = 0; j < 3; j++)
        sum += (matrix[3 * i + left] as number) * (metric[3 * i + j] as number) * (matrix[3 * j + right] as number);
    return sum;
  });
}
