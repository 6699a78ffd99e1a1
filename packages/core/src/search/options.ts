import { KvaneError, type Problem, problem } from "../errors/index.js";
import { smallestMeasured } from "../numbers/index.js";
import type { SearchOptions } from "./types.js";

/**
 * Matches within 3 standard uncertainties, one peak may stay unmatched (an impurity), every kind of k, no limit of Q,
 * positions and cell as they are.
 */
export const defaultSearchOptions: SearchOptions = {
  tolerance: null,
  unmatched: 1,
  maxDimension: 3,
  qMax: null,
  zeroShift: 0,
  cellScale: 0,
};

/** Beyond these a diffractometer or a cell is wrong in a way that no refinement beside k can mend, and any k fits. */
const largestZeroShift = 1;
const largestCellScale = 0.05;

/** Throws `invalid-argument` with every option of a search that makes no sense, each at the name that it has in the command. */
export function checkSearchOptions(options: SearchOptions): void {
  const problems: Problem[] = [];
  const demand = (holds: boolean, argument: string, expected: string, value: number | null): void => {
    if (!holds)
      problems.push(
        problem("invalid-argument", `${argument} is ${value}`, { where: { argument }, expected, found: String(value) }),
      );
  };
  const { tolerance, unmatched, maxDimension, qMax, zeroShift, cellScale } = options;
  demand(
    tolerance === null || (tolerance > 0 && tolerance < Number.POSITIVE_INFINITY),
    "--tolerance",
    "a number above 0",
    tolerance,
  );
  demand(Number.isSafeInteger(unmatched) && unmatched >= 0, "--unmatched", "an integer from 0 on", unmatched);
  demand([0, 1, 2, 3].includes(maxDimension), "--max-dimension", "0, 1, 2 or 3", maxDimension);
  demand(qMax === null || qMax > 0, "--q-max", "a number above 0 in Å⁻¹", qMax);
  demand(
    isRange(zeroShift, largestZeroShift),
    "--zero-shift",
    `0, or degrees 2θ from ${smallestMeasured} to ${largestZeroShift}`,
    zeroShift,
  );
  const { mostBoxes = 1 } = options;
  demand(Number.isSafeInteger(mostBoxes) && mostBoxes > 0, "mostBoxes", "an integer from 1 on", mostBoxes);
  demand(
    isRange(cellScale, largestCellScale),
    "--cell-scale",
    `0, or a relative change from ${smallestMeasured} to ${largestCellScale}`,
    cellScale,
  );
  if (problems.length > 0) throw new KvaneError(problems);
}

/** Whether a correction may go that far: not at all, or so far that the square of it is a number. */
function isRange(value: number, largest: number): boolean {
  return value === 0 || (value >= smallestMeasured && value <= largest);
}
