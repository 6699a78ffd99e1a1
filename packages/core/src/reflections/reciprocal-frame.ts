import { identityMatrix, overCommonDenominator } from "../numbers/index.js";
import { type Cell, fromPrimitiveRow, type SpaceGroup } from "../spacegroups/index.js";
import { averagedReciprocalMetric, transformMetric } from "./averaged-metric.js";

/**
 * Reciprocal space of a group with a cell, in the dual of the primitive basis, where L* is Z³ and symmetry is integer
 * matrices: `H = η · dual`, `|η|² = η · metric · ηᵀ` in Å⁻² without 2π.
 */
export interface ReciprocalFrame {
  /** The basis of L* in a*, b*, c*: three integer rows over `dualDenominator`. */
  readonly dual: readonly (readonly [number, number, number])[];
  readonly dualDenominator: number;
  /** Metric of that basis, nine numbers, averaged over the point group. */
  readonly metric: readonly number[];
}

type Nine = [number, number, number, number, number, number, number, number, number];

/** Throws `invalid-cell` and `cell-contradicts-group`. */
export function reciprocalFrame(group: SpaceGroup, cell: Cell): ReciprocalFrame {
  const rows = identityMatrix.map((unit) => fromPrimitiveRow(group.lattice, unit));
  const { numerators, denominator } = overCommonDenominator(rows.flat());
  const [a, b, c, d, e, f, g, h, i] = numerators as Nine;
  const dual = [
    [a, b, c],
    [d, e, f],
    [g, h, i],
  ] as const;
  return {
    dual,
    dualDenominator: denominator,
    metric: transformMetric(averagedReciprocalMetric(group, cell), dual, denominator),
  };
}

/** `η` in a*, b*, c*: integers wherever all integer vectors belong to L. */
export function toSettingIndices(frame: ReciprocalFrame, eta: readonly number[]): [number, number, number] {
  const [first, second, third] = frame.dual as [Row, Row, Row];
  const [n1, n2, n3] = eta as [number, number, number];
  const at = (axis: 0 | 1 | 2): number =>
    (n1 * first[axis] + n2 * second[axis] + n3 * third[axis]) / frame.dualDenominator + 0;
  return [at(0), at(1), at(2)];
}

type Row = readonly [number, number, number];
