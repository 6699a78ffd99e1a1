import { type Rational, type RationalMatrix, roundNumber, toNumber } from "../numbers/index.js";
import { averagedMetric, type Cell, directMetric, metricOfAxes, type SpaceGroup } from "../spacegroups/index.js";
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
 * The metric of the parent's cell averaged over the point group, in the axes `(a,b,c) P`. Without a cell the lengths are
 * compared by what the operators alone make equal.
 */
export function cellMetric(group: SpaceGroup, cell: Cell | null, matrix: RationalMatrix): CellMetric {
  const start = cell === null ? [1, 0, 0, 0, 1, 0, 0, 0, 1] : directMetric(cell);
  const metric = changed(averagedMetric(group.operators, start), matrix);
  // A second, generic metric tells which equalities hold for every cell of the group.
  const other = changed(averagedMetric(group.operators, [1, 0.13, -0.21, 0.13, 1.37, 0.29, -0.21, 0.29, 1.71]), matrix);
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

function changed(metric: readonly number[], matrix: RationalMatrix): number[] {
  return metricOfAxes(
    metric,
    matrix.flatMap((row) => row.map(toNumber)),
  );
}
