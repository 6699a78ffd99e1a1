import { KvaneError, type Problem } from "../errors/index.js";
import { integerLattice, latticeFrom, latticeVectors } from "./lattices.js";
import { isTranslation, translationOf } from "./operators.js";
import { parseTriplet } from "./triplets.js";
import type { Lattice, SymmetryOperator } from "./types.js";

/** A list of triplets with the lattice of its pure translations and the integer ones. */
export interface TripletList {
  readonly lattice: Lattice;
  readonly operators: readonly SymmetryOperator[];
  /** Column of each operator. */
  readonly columns: readonly number[];
}

/**
 * Reads triplets separated by `;` or line ends. Pure translations (`x+1/2,y+1/2,z`) become centring vectors.
 *
 * @throws `syntax`, all wrong triplets at once
 */
export function parseTripletList(text: string, column = 1): TripletList {
  const problems: Problem[] = [];
  const operators: SymmetryOperator[] = [];
  const columns: number[] = [];
  let start = column;
  for (const part of text.split(/[;\n]/)) {
    const at = start + (part.length - part.trimStart().length);
    start += part.length + 1;
    if (part.trim() === "") continue;
    try {
      operators.push(parseTriplet(part.trim(), at));
      columns.push(at);
    } catch (error) {
      if (!(error instanceof KvaneError)) throw error;
      problems.push(...error.problems);
    }
  }
  if (problems.length > 0) throw new KvaneError(problems);
  const translations = operators.filter(isTranslation).map(translationOf);
  return { lattice: latticeFrom([...latticeVectors(integerLattice), ...translations]), operators, columns };
}
