import { KvaneError, problem } from "../errors/index.js";
import {
  add,
  cellMetricRelative,
  equal,
  multiply,
  negate,
  type Rational,
  rational,
  rationalField,
  reducedEchelon,
  roundNumber,
  subtract,
  toNumber,
  zero,
} from "../numbers/index.js";
import { cellNames, directMetric } from "./cells.js";
import { rotationOf } from "./operators.js";
import type { Cell, SpaceGroup } from "./types.js";

/** The six independent entries of a metric as row and column: g11, g22, g33, g23, g13, g12. */
const entries = [
  [0, 0],
  [1, 1],
  [2, 2],
  [1, 2],
  [0, 2],
  [0, 1],
] as const;

const entryNames = ["a²", "b²", "c²", "bc·cos(alpha)", "ac·cos(beta)", "ab·cos(gamma)"] as const;

/** A condition that the group puts on the cell: entry `dependent` of the metric is Σ factors × other entries. */
interface MetricRelation {
  readonly dependent: number;
  readonly factors: readonly Rational[];
}

/**
 * Throws `cell-contradicts-group` unless the metric obeys `RᵀGR = G` for every rotation of the group, within
 * `cellMetricRelative` of the entries' scale. The problem names the conditions that are broken, in words where they
 * are of the usual kind (equal lengths, angles of 90 or 120 degrees), and the values found.
 */
export function checkCellAgainstGroup(cell: Cell, group: SpaceGroup): void {
  const relations = metricRelations(group);
  const metric = directMetric(cell);
  const values = entries.map(([row, column]) => metric[3 * row + column] as number);
  const broken = relations.filter((relation) => !isObeyed(relation, values));
  if (broken.length === 0) return;
  const found = cellNames.map((name) => `${name} = ${roundNumber(cell[name])}`).join(", ");
  throw new KvaneError([
    problem("cell-contradicts-group", `the cell does not have the symmetry of ${nameFor(group)}`, {
      expected: broken.map((relation) => relationInWords(relation, relations)).join(", "),
      found,
      remedy: "correct the cell, or give the group in the setting that the cell is in",
    }),
  ]);
}

function nameFor({ name, pointGroup }: SpaceGroup): string {
  if (name.hermannMauguin === null) return `a group of class ${pointGroup}`;
  return name.basisChange === "a,b,c;0,0,0" ? name.hermannMauguin : `${name.hermannMauguin} (${name.basisChange})`;
}

/** The conditions `RᵀGR = G` of all rotations in reduced form: each dependent entry in terms of free ones. */
function metricRelations(group: SpaceGroup): readonly MetricRelation[] {
  const rows = group.operators.flatMap((operator) => {
    const rotation = rotationOf(operator);
    return entries.map(([i, j], own) =>
      entries.map(([k, l], index) => {
        // Coefficient of g_kl in (RᵀGR)_ij; off-diagonal entries stand for two.
        const straight = multiply(rotation[k][i], rotation[l][j]);
        const coefficient = k === l ? straight : add(straight, multiply(rotation[l][i], rotation[k][j]));
        return index === own ? subtract(coefficient, rational(1)) : coefficient;
      }),
    );
  });
  // Columns reversed, so that angles are expressed by lengths, and later lengths by earlier ones.
  const { rows: reduced, pivots } = reducedEchelon(
    rows.map((row) => [...row].reverse()),
    rationalField,
  );
  return reduced.map((row, index) => {
    const dependent = 5 - (pivots[index] as number);
    const factors = [...row].reverse().map((entry, position) => (position === dependent ? zero : negate(entry)));
    return { dependent, factors };
  });
}

function isObeyed({ dependent, factors }: MetricRelation, values: readonly number[]): boolean {
  const [row, column] = entries[dependent] as readonly [0 | 1 | 2, 0 | 1 | 2];
  const scale = Math.sqrt((values[row] as number) * (values[column] as number));
  const expected = factors.reduce((sum, factor, index) => sum + toNumber(factor) * (values[index] as number), 0);
  return Math.abs((values[dependent] as number) - expected) <= cellMetricRelative * scale;
}

/** A condition as `a = b`, `gamma = 90`, `gamma = 120`, `alpha = beta`, or as a formula. */
function relationInWords(relation: MetricRelation, all: readonly MetricRelation[]): string {
  const { dependent, factors } = relation;
  const terms = factors.flatMap((factor, index) => (factor[0] === 0 ? [] : [{ factor, index }]));
  const only = terms.length === 1 ? terms[0] : undefined;
  if (dependent >= 3 && terms.length === 0) return `${cellNames[dependent]} = 90`;
  if (only && dependent < 3 && only.index < 3 && equal(only.factor, rational(1)))
    return `${cellNames[only.index]} = ${cellNames[dependent]}`;
  if (only && dependent >= 3 && only.index < 3) {
    const [row, column] = entries[dependent] as readonly [number, number];
    // g12 = ∓a²/2 with a = b is an angle of 120 or 60 degrees.
    if (sameLength(row, only.index, all) && sameLength(column, only.index, all)) {
      if (equal(only.factor, rational(-1, 2))) return `${cellNames[dependent]} = 120`;
      if (equal(only.factor, rational(1, 2))) return `${cellNames[dependent]} = 60`;
      if (equal(only.factor, rational(-1, 3))) return `${cellNames[dependent]} = 109.4712`;
    }
  }
  if (only && dependent >= 3 && only.index >= 3 && equal(only.factor, rational(1)))
    return `${cellNames[only.index]} = ${cellNames[dependent]}`;
  const formula = terms.map(({ factor, index }) => `${factor[0]}/${factor[1]}·${entryNames[index]}`).join(" + ");
  return `${entryNames[dependent]} = ${formula === "" ? "0" : formula}`;
}

function sameLength(a: number, b: number, all: readonly MetricRelation[]): boolean {
  if (a === b) return true;
  return all.some(
    ({ dependent, factors }) =>
      dependent === Math.max(a, b) &&
      factors.every((factor, index) => equal(factor, index === Math.min(a, b) ? rational(1) : zero)),
  );
}
