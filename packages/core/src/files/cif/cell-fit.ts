import { type Assumption, KvaneError, type Problem, problem } from "../../errors/index.js";
import { cellMetricRelative, roundNumber } from "../../numbers/index.js";
import { type Cell, checkCellAgainstGroup, type SpaceGroup } from "../../spacegroups/index.js";
import { type CifCell, cellParameters } from "./cell.js";
import { weightedMean } from "./cell-mean.js";

/** A cell held against its group. */
export interface FittedCell {
  readonly cell: Cell;
  readonly assumed: readonly Assumption[];
  readonly warnings: readonly Problem[];
}

/** Standard uncertainties. A parameter this far from what the group asks for contradicts it by the file's own measure. */
const allowedUncertainties = 3;

/** Relative. Less is no difference: 90.03(1) is 3 s.u. off 90 although the floats say a little more. */
const noDifference = 1e-9;

/**
 * The cell, held against the metric that the group needs. Within 3 of its own uncertainties a cell may break it: then
 * the mean over the group is taken, and that is said. A parameter without uncertainty may be off by its last digit, and
 * never by more than `cellMetricRelative`. A cell that obeys the group within `cellMetricRelative`, but not within
 * its uncertainties, is warned about.
 *
 * @throws `cell-contradicts-group`
 */
export function fitCell(written: CifCell, group: SpaceGroup): FittedCell {
  const { cell, place } = written;
  const mean = weightedMean(written, group);
  const differing = (limit: (name: keyof Cell) => number) =>
    cellParameters.filter((name) => Math.abs(mean[name] - cell[name]) > limit(name) + noDifference * cell[name]);
  if (differing(() => 0).length === 0) return { cell, assumed: [], warnings: [] };
  const off = differing((name) => allowed(written, name));
  if (off.length === 0) {
    const value = cellParameters.map((name) => roundNumber(mean[name], 1, 7)).join(" ");
    const because =
      "the cell of the CIF has the symmetry of the group only within 3 s.u. or its last digits: this is the mean, weighted by the s.u.";
    return { cell: mean, assumed: [{ what: "unit cell", value, because }], warnings: [] };
  }
  try {
    checkCellAgainstGroup(cell, group);
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    throw new KvaneError(error.problems.map((one) => ({ ...one, where: { ...one.where, ...place } })));
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

function allowed({ cell, uncertainties, lastDigits }: CifCell, name: keyof Cell): number {
  // Rounding moves a value by half its last digit, and the mean is rounded too.
  const digits = Math.min(0.6 * lastDigits[name], cellMetricRelative * cell[name]);
  return Math.max(allowedUncertainties * (uncertainties[name] ?? 0), digits);
}
