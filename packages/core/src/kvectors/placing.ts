import { type Assumption, type Problem, problem } from "../errors/index.js";
import {
  formatRational,
  isConstantForm,
  measuredKSnap,
  measuredKWarning,
  one,
  type Rational,
  type RationalVector,
  roundNumber,
  toNumber,
  zero,
} from "../numbers/index.js";
import { type SpaceGroup, toPrimitiveRow } from "../spacegroups/index.js";
import { type AffineSet, affineForms, type Condition, fixingConditions, solveConditions } from "./affine.js";
import { fromPrimitiveIntegers, rotateRow } from "./integer-form.js";
import { settingRotation } from "./rotations.js";
import type { WaveVector } from "./types.js";
import { formatWaveVector } from "./wave-vector.js";
import type { WrittenWaveVector } from "./written.js";

/** A placed wave vector, with what was read other than written and what should be looked at. */
export interface PlacedWaveVector {
  readonly k: WaveVector;
  readonly assumed: readonly Assumption[];
  readonly warnings: readonly Problem[];
}

/**
 * Decides what a written wave vector stands for. Fractions, integers and letters are exact. A measured decimal goes
 * onto the kind of lowest dimension (under the point group extended by −1) within `tolerance` per component; what
 * moved is listed. Measured values along a line, plane or general position become the letters u, v, w with values.
 *
 * @param options.tolerance reciprocal lattice units per component, default 1e-4
 */
export function placeWaveVector(
  group: SpaceGroup,
  written: WrittenWaveVector,
  options: { readonly tolerance?: number } = {},
): PlacedWaveVector {
  if (!written.measured.some(Boolean)) {
    const exact = written.components.every(isConstantForm);
    return {
      k: { components: written.components, values: exact ? [] : null, uncertainties: exact ? [] : null },
      assumed: [],
      warnings: [],
    };
  }
  const tolerance = options.tolerance ?? measuredKSnap;
  const given = written.components.map((form) => form.constant) as unknown as RationalVector;
  const set = lowestKind(group, given, written.measured, tolerance);
  const k = waveVectorOn(set, given);
  return { k, assumed: movedComponents(set, given, k), warnings: nearMisses(group, written, set, given, tolerance) };
}

/**
 * The kind of lowest dimension within the tolerance, cut down to the components that were written exactly. The
 * operators R (with both signs) that nearly fix k give linear conditions; when all together move k too far, those that
 * fit worst are left out.
 */
function lowestKind(
  group: SpaceGroup,
  given: RationalVector,
  measured: readonly boolean[],
  tolerance: number,
): AffineSet {
  const exact: Condition[] = [0, 1, 2].flatMap((axis) =>
    measured[axis]
      ? []
      : [{ coefficients: [0, 1, 2].map((index) => (index === axis ? one : zero)), value: given[axis] as Rational }],
  );
  const nearly = nearlyFixing(group, given, tolerance);
  for (let count = nearly.length; count > 0; count--) {
    const set = solveConditions([...exact, ...nearly.slice(0, count).flatMap((entry) => entry.conditions)]);
    if (set !== null && distance(set, given) <= tolerance) return set;
  }
  return solveConditions(exact) as AffineSet;
}

/** Operators ±R with `±kR − k` within reach of a vector of L*, best first, as exact conditions. */
function nearlyFixing(
  group: SpaceGroup,
  given: RationalVector,
  tolerance: number,
): { misfit: number; conditions: Condition[] }[] {
  const primitive = toPrimitiveRow(group.lattice, given).map(toNumber);
  const found: { misfit: number; conditions: Condition[] }[] = [];
  group.primitive.rotations.forEach((rotation, index) => {
    const image = rotateRow(primitive, rotation);
    for (const sign of [1, -1] as const) {
      const difference = image.map((entry, axis) => sign * entry - (primitive[axis] as number));
      const shift = difference.map(Math.round);
      const misfit = Math.max(...difference.map((entry, axis) => Math.abs(entry - (shift[axis] as number))));
      // ±R − 1 and the primitive basis stretch a step of one tolerance by a small factor; the exact test comes after.
      if (misfit > 16 * tolerance) continue;
      const row = fromPrimitiveIntegers(group, shift, 1);
      found.push({ misfit, conditions: fixingConditions(settingRotation(group, index), row, sign) });
    }
  });
  return found.sort((a, b) => a.misfit - b.misfit);
}

function waveVectorOn(set: AffineSet, given: RationalVector): WaveVector {
  const values = parameters(set, given);
  return { components: affineForms(set), values, uncertainties: values.map(() => null) };
}

function parameters(set: AffineSet, given: RationalVector): number[] {
  return set.pivots.map(
    (pivot, index) =>
      toNumber(given[pivot as 0 | 1 | 2]) / toNumber((set.directions[index] as RationalVector)[pivot as 0 | 1 | 2]),
  );
}

function pointNumbers(set: AffineSet, given: RationalVector): number[] {
  const values = parameters(set, given);
  return set.base.map((base, axis) =>
    set.directions.reduce(
      (sum, direction, index) => sum + (values[index] as number) * toNumber(direction[axis as 0 | 1 | 2]),
      toNumber(base),
    ),
  );
}

/** Largest move of a component, reciprocal lattice units. Equal moves share rounding, hence the tiny slack. */
function distance(set: AffineSet, given: RationalVector): number {
  return (
    Math.max(...pointNumbers(set, given).map((entry, axis) => Math.abs(entry - toNumber(given[axis as 0 | 1 | 2])))) -
    1e-12
  );
}

function movedComponents(set: AffineSet, given: RationalVector, k: WaveVector): Assumption[] {
  const moved = pointNumbers(set, given).some(
    (entry, axis) => Math.abs(entry - toNumber(given[axis as 0 | 1 | 2])) > 1e-12,
  );
  if (!moved) return [];
  const typed = `(${given.map((entry) => roundNumber(toNumber(entry))).join(", ")})`;
  return [
    {
      what: `wave vector ${typed}`,
      value: formatWaveVector(k, true),
      because: `it lies within ${measuredKSnap} reciprocal lattice units of that ${["point", "line", "plane", "position"][set.directions.length]}`,
    },
  ];
}

/** A decimal such as 0.333 that would be special if it were a little nearer to 1/3: said, never silently moved. */
function nearMisses(
  group: SpaceGroup,
  written: WrittenWaveVector,
  set: AffineSet,
  given: RationalVector,
  tolerance: number,
): Problem[] {
  const wider = lowestKind(group, given, written.measured, Math.max(measuredKWarning, tolerance));
  if (wider.directions.length >= set.directions.length) return [];
  const values = parameters(wider, given);
  const text = `${affineForms(wider)
    .map((form, axis) =>
      isConstantForm(form)
        ? formatRational(form.constant)
        : String(roundNumber(pointNumbers(wider, given)[axis] as number)),
    )
    .join(",")}`;
  return [
    problem(
      "measured-k-ambiguous",
      `\`${written.text}\` was taken as measured, ${["at a point", "on a line", "in a plane", "at a general position"][set.directions.length]}`,
      {
        expected: `${text} if the special value is meant`,
        found: written.text,
        remedy: `write ${text}${values.length === 0 ? "" : " (fractions are exact)"} to mean the special value`,
      },
    ),
  ];
}
