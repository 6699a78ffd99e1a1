import { roundNumber } from "../../numbers/index.js";
import { averagedMetric, type Cell, directMetric, type SpaceGroup } from "../../spacegroups/index.js";
import { type CifCell, cellParameters } from "./cell.js";

/** Corrections become this small, relative to the uncertainties, after two or three steps. */
const settled = 1e-10;
const mostSteps = 20;

/**
 * The cell of the group's symmetry that lies nearest to the one written: least squares over the six parameters, each
 * weighted by its s.u.; one without s.u. counts as known to half its last digit. Equal lengths so get the weighted mean.
 */
export function weightedMean({ cell, uncertainties, lastDigits }: CifCell, group: SpaceGroup): Cell {
  const plain = cellFromMetric(averagedMetric(group.operators, directMetric(cell)));
  const near = cellParameters.every((name) => Math.abs(plain[name] - cell[name]) <= 1e-9 * cell[name]);
  if (near) return cell;
  const spread = cellParameters.map((name) => uncertainties[name] || lastDigits[name] / 2);
  const directions = invariantDirections(group);
  const parametersOf = (metric: readonly number[]) => {
    const found = cellFromMetric(metric);
    return cellParameters.map((name, index) => found[name] / (spread[index] as number));
  };
  const target = cellParameters.map((name, index) => cell[name] / (spread[index] as number));
  let metric = averagedMetric(group.operators, directMetric(cell));
  for (let step = 0; step < mostSteps; step++) {
    const now = parametersOf(metric);
    const size = 1e-5 * Math.max(...metric);
    const slopes = directions.map((direction) => {
      const up = parametersOf(metric.map((entry, index) => entry + size * (direction[index] as number)));
      const down = parametersOf(metric.map((entry, index) => entry - size * (direction[index] as number)));
      return up.map((entry, index) => (entry - (down[index] as number)) / (2 * size));
    });
    const rest = target.map((entry, index) => entry - (now[index] as number));
    const shifts = solve(
      slopes.map((one) => slopes.map((other) => dot(one, other))),
      slopes.map((one) => dot(one, rest)),
    );
    const moved = metric.map((entry, index) =>
      directions.reduce((sum, one, k) => sum + (shifts[k] as number) * (one[index] as number), entry),
    );
    if (!isMetric(moved)) return plain;
    const change = parametersOf(moved).reduce((most, entry, index) => {
      return Math.max(most, Math.abs(entry - (now[index] as number)));
    }, 0);
    metric = moved;
    if (change < settled) break;
  }
  return cellFromMetric(metric);
}

/** Independent metrics that every rotation of the group leaves alone: means of the six that have one entry. */
function invariantDirections(group: SpaceGroup): number[][] {
  const kept: { readonly direction: number[]; readonly reduced: number[]; readonly lead: number }[] = [];
  for (const [i, j] of [
    [0, 0],
    [1, 1],
    [2, 2],
    [1, 2],
    [0, 2],
    [0, 1],
  ] as const) {
    const unit = new Array<number>(9).fill(0);
    unit[3 * i + j] = 1;
    unit[3 * j + i] = 1;
    const direction = averagedMetric(group.operators, unit);
    const reduced = kept.reduce((rest, one) => {
      const factor = (rest[one.lead] as number) / (one.reduced[one.lead] as number);
      return rest.map((entry, index) => entry - factor * (one.reduced[index] as number));
    }, direction);
    const lead = reduced.findIndex((entry) => Math.abs(entry) === Math.max(...reduced.map(Math.abs)));
    if (Math.abs(reduced[lead] as number) > 1e-9) kept.push({ direction, reduced, lead });
  }
  return kept.map(({ direction }) => direction);
}

/** Gauss–Jordan elimination of a positive definite system. */
function solve(matrix: readonly (readonly number[])[], right: readonly number[]): number[] {
  const rows = matrix.map((row, index) => [...row, right[index] as number]);
  rows.forEach((pivot, column) => {
    const lead = pivot[column] as number;
    for (const row of rows) {
      if (row === pivot) continue;
      const factor = (row[column] as number) / lead;
      for (let index = column; index < row.length; index++)
        row[index] = (row[index] as number) - factor * (pivot[index] as number);
    }
  });
  return rows.map((row, index) => (row.at(-1) as number) / (row[index] as number));
}

function dot(a: readonly number[], b: readonly number[]): number {
  return a.reduce((sum, entry, index) => sum + entry * (b[index] as number), 0);
}

function isMetric(metric: readonly number[]): boolean {
  const { a, b, c, alpha, beta, gamma } = cellFromMetric(metric);
  return [a, b, c].every((length) => length > 0) && [alpha, beta, gamma].every((angle) => angle > 0 && angle < 180);
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
