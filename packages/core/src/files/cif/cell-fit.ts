import { type Assumption, KvaneError, type Problem, problem } from "../../errors/index.js";
import { roundNumber, toNumber } from "../../numbers/index.js";
import {
  type Cell,
  checkCellAgainstGroup,
  directMetric,
  rotationOf,
  type SpaceGroup,
} from "../../spacegroups/index.js";
import { type CifCell, cellParameters } from "./cell.js";

/** A cell held against its group. */
export interface FittedCell {
  readonly cell: Cell;
  readonly assumed: readonly Assumption[];
  readonly warnings: readonly Problem[];
}

/** Standard uncertainties. A parameter this far from what the group asks for contradicts it by the file's own measure. */
const allowedUncertainties = 3;

/**
 * The cell, held against the metric that the group needs. Within its own uncertainties a cell may break it: then the
 * mean over the group is taken, and that is said. A cell that obeys it within `cellMetricRelative`, but not within its
 * uncertainties, is warned about.
 *
 * @throws `cell-contradicts-group`
 */
export function fitCell(written: CifCell, group: SpaceGroup): FittedCell {
  const { cell, uncertainties, lastDigits, place } = written;
  const mean = cellFromMetric(meanMetric(cell, group));
  const off = cellParameters.filter((name) => {
    const own = Math.max(allowedUncertainties * (uncertainties[name] ?? 0), 0.6 * lastDigits[name], 1e-9 * cell[name]);
    return Math.abs(mean[name] - cell[name]) > own;
  });
  try {
    checkCellAgainstGroup(cell, group);
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    if (off.length > 0)
      throw new KvaneError(error.problems.map((one) => ({ ...one, where: { ...one.where, ...place } })));
    const value = cellParameters.map((name) => roundNumber(mean[name], 1, 7)).join(" ");
    const because = "the cell of the CIF has the symmetry of the group only within its uncertainties";
    return { cell: mean, assumed: [{ what: "unit cell", value, because }], warnings: [] };
  }
  const warnings = off.map((name) =>
    problem("cif-contradiction", `${name} = ${written.written[name]} does not fit the group exactly`, {
      where: place,
      expected: `${roundNumber(mean[name], 1, 7)}`,
      found: written.written[name],
      remedy: "the cell is used as written; check it and the symmetry",
    }),
  );
  return { cell, assumed: [], warnings };
}

/** The mean of RᵀGR over the rotations of the group. */
function meanMetric(cell: Cell, group: SpaceGroup): number[] {
  const metric = directMetric(cell);
  const sum = new Array<number>(9).fill(0);
  for (const operator of group.operators) {
    const rotation = rotationOf(operator).map((row) => row.map(toNumber));
    for (let i = 0; i < 3; i++)
      for (let j = 0; j < 3; j++)
        for (let k = 0; k < 3; k++)
          for (let l = 0; l < 3; l++)
            sum[3 * i + j] =
              (sum[3 * i + j] as number) +
              (rotation[k]?.[i] ?? 0) * (metric[3 * k + l] as number) * (rotation[l]?.[j] ?? 0);
  }
  return sum.map((entry) => entry / group.operators.length);
}

function cellFromMetric(metric: readonly number[]): Cell {
  const at = (row: number, column: number) => metric[3 * row + column] as number;
  const [a, b, c] = [Math.sqrt(at(0, 0)), Math.sqrt(at(1, 1)), Math.sqrt(at(2, 2))];
  const angle = (cosine: number) => roundNumber((Math.acos(Math.max(-1, Math.min(1, cosine))) * 180) / Math.PI);
  return {
    a: roundNumber(a),
    b: roundNumber(b),
    c: roundNumber(c),
    alpha: angle(at(1, 2) / (b * c)),
    beta: angle(at(0, 2) / (a * c)),
    gamma: angle(at(0, 1) / (a * b)),
  };
}
