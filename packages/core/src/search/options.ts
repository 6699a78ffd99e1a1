import { KvaneError, type Problem, problem } from "../errors/index.js";
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

/** Throws `invalid-argument` with every option that makes no sense. */
export function checkOptions(options: SearchOptions): void {
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
    zeroShift >= 0 && zeroShift <= largestZeroShift,
    "--zero-shift",
    `degrees 2θ from 0 to ${largestZeroShift}`,
    zeroShift,
  );
  const { mostBoxes = 1 } = options;
  demand(Number.isSafeInteger(mostBoxes) && mostBoxes > 0, "mostBoxes", "an integer from 1 on", mostBoxes);
  demand(
    cellScale >= 0 && cellScale <= largestCellScale,
    "--cell-scale",
    `a relative change from 0 to ${largestCellScale}`,
    cellScale,
  );
  if (problems.length > 0) throw new KvaneError(problems);
}
