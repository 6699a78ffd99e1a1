import { type Star, star, type WaveVector } from "../kvectors/index.js";
import { cyclotomicZero, type PhasedNumber, reducePhase, zeroForm } from "../numbers/index.js";
import { composeOperators, invertOperator, type SpaceGroup, type SymmetryOperator } from "../spacegroups/index.js";
import { smallIrrepMatrix } from "./evaluate.js";
import type { SmallIrrep, SmallIrreps } from "./types.js";

/** The irrep of the whole space group that a small irrep induces, partner index (arm, p) with the arm first. */
export interface FullIrrep {
  readonly label: string;
  readonly dimension: number;
  readonly arms: readonly WaveVector[];
  /** Operator (by index) that takes k to each arm. */
  readonly representatives: readonly number[];
  /** One matrix per operator of the group, rows of exact numbers. */
  readonly matrices: readonly (readonly (readonly PhasedNumber[])[])[];
}

const nothing: PhasedNumber = { phase: zeroForm, factor: cyclotomicZero };

/** The full irreps of all small irreps of one k, at the group's coset representatives. */
export function fullIrreps(group: SpaceGroup, irreps: SmallIrreps): readonly FullIrrep[] {
  const arms = star(group, irreps.k);
  return irreps.irreps.map((irrep) => ({
    label: irrep.label,
    dimension: arms.arms.length * irrep.dimension,
    arms: arms.arms,
    representatives: arms.representatives,
    matrices: group.operators.map((operator) => fullIrrepMatrix(group, irreps, irrep, operator, arms)),
  }));
}

/**
 * Induction over the star (Bradley & Cracknell, 1972, chapter 4): with coset representatives s_i, arm i being
 * `k S_i⁻¹`, block (i, j) of g is `D(s_i⁻¹ g s_j)` where that is in the little group, else zero. Any operator of the
 * group may be given, with any lattice translation.
 */
export function fullIrrepMatrix(
  group: SpaceGroup,
  irreps: SmallIrreps,
  irrep: SmallIrrep,
  operator: SymmetryOperator,
  arms: Star = star(group, irreps.k),
): PhasedNumber[][] {
  const { dimension } = irrep;
  const size = arms.arms.length * dimension;
  const matrix = Array.from({ length: size }, () => new Array<PhasedNumber>(size).fill(nothing));
  const little = new Set(
    irreps.littleGroup.operators.map((index) => rotationKey(group.operators[index] as SymmetryOperator)),
  );
  const representatives = arms.representatives.map((index) => group.operators[index] as SymmetryOperator);
  representatives.forEach((from, column) => {
    const moved = composeOperators(operator, from);
    representatives.forEach((to, row) => {
      const inner = composeOperators(invertOperator(to), moved);
      if (!little.has(rotationKey(inner))) return;
      const { phase, matrix: block } = smallIrrepMatrix(group, irreps, irrep, inner);
      block.forEach((entries, p) => {
        entries.forEach((factor, q) => {
          (matrix[row * dimension + p] as PhasedNumber[])[column * dimension + q] = {
            phase: reducePhase(phase),
            factor,
          };
        });
      });
    });
  });
  return matrix;
}

function rotationKey(operator: SymmetryOperator): string {
  return `${operator.rotation.join()}/${operator.rotationDenominator}`;
}
