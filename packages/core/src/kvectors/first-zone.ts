import { fail } from "../errors/index.js";
import { addVectors, type RationalVector, rational, roundNumber, toNumber } from "../numbers/index.js";
import {
  type Cell,
  fromPrimitiveRow,
  lengthInMetric,
  reciprocalMetric,
  type SpaceGroup,
} from "../spacegroups/index.js";
import type { WaveVector } from "./types.js";
import { numericWaveVector } from "./wave-vector.js";

/**
 * The equivalent of k in the first Brillouin zone of a cell: the shortest of all k + H, H ∈ L*. Among equally long
 * ones (k on the zone's surface) the one with the lexicographically largest components is taken.
 *
 * Throws `k-needs-values` while a letter is left open.
 */
export function firstZoneRepresentative(group: SpaceGroup, cell: Cell, k: WaveVector): WaveVector {
  const metric = reciprocalMetric(cell);
  const start = numericWaveVector(k);
  if (start === null)
    fail("k-needs-values", "the first-zone representative needs numbers for the open letters of k", {
      remedy: "give k as three numbers",
    });
  const steps = shortSteps(reducedBasis(group, metric));
  let shift: RationalVector = [rational(0), rational(0), rational(0)];
  for (;;) {
    const better = steps.find((step) => shorter(metric, start, addVectors(shift, step), shift));
    if (!better) break;
    shift = addVectors(shift, better);
  }
  const component = (axis: 0 | 1 | 2) => ({
    constant: addVectors([k.components[0].constant, k.components[1].constant, k.components[2].constant], shift)[axis],
    coefficients: k.components[axis].coefficients,
  });
  return { ...k, components: [component(0), component(1), component(2)] };
}

function shorter(metric: readonly number[], start: readonly number[], a: RationalVector, b: RationalVector): boolean {
  const at = (shift: RationalVector): number[] =>
    start.map((entry, axis) => entry + toNumber(shift[axis as 0 | 1 | 2]));
  const difference =
    roundNumber(lengthInMetric(metric, at(a)), 1, 10) - roundNumber(lengthInMetric(metric, at(b)), 1, 10);
  if (difference !== 0) return difference < 0;
  for (const axis of [0, 1, 2] as const) {
    const step = toNumber(a[axis]) - toNumber(b[axis]);
    if (step !== 0) return step > 0;
  }
  return false;
}

/** A basis of L* whose vectors no longer get shorter by adding one another (pairwise Gauss reduction). */
function reducedBasis(group: SpaceGroup, metric: readonly number[]): RationalVector[] {
  const unit = (index: number): RationalVector =>
    fromPrimitiveRow(group.lattice, [
      rational(index === 0 ? 1 : 0),
      rational(index === 1 ? 1 : 0),
      rational(index === 2 ? 1 : 0),
    ]);
  const basis = [unit(0), unit(1), unit(2)];
  const length = (row: RationalVector): number => lengthInMetric(metric, row.map(toNumber));
  for (let changed = true; changed; ) {
    changed = false;
    for (let i = 0; i < 3; i++)
      for (let j = 0; j < 3; j++)
        for (const sign of [1, -1]) {
          if (i === j) continue;
          const other = basis[j] as RationalVector;
          const candidate = addVectors(
            basis[i] as RationalVector,
            sign === 1 ? other : [minus(other[0]), minus(other[1]), minus(other[2])],
          );
          if (length(candidate) < length(basis[i] as RationalVector) * (1 - 1e-9)) {
            basis[i] = candidate;
            changed = true;
          }
        }
  }
  return basis;
}

function minus([numerator, denominator]: readonly [number, number]): readonly [number, number] {
  return [0 - numerator, denominator];
}

/** All combinations of the reduced basis with coefficients −2 … 2: the faces of the zone are among them. */
function shortSteps(basis: readonly RationalVector[]): RationalVector[] {
  const steps: RationalVector[] = [];
  const scaled = (row: RationalVector, n: number): RationalVector => [
    rational(row[0][0] * n, row[0][1]),
    rational(row[1][0] * n, row[1][1]),
    rational(row[2][0] * n, row[2][1]),
  ];
  for (let a = -2; a <= 2; a++)
    for (let b = -2; b <= 2; b++)
      for (let c = -2; c <= 2; c++) {
        if (a === 0 && b === 0 && c === 0) continue;
        const [p, q, r] = basis as [RationalVector, RationalVector, RationalVector];
        steps.push(addVectors(addVectors(scaled(p, a), scaled(q, b)), scaled(r, c)));
      }
  return steps;
}
