import { littleGroup, numericWaveVector, star, type WaveVector } from "../kvectors/index.js";
import { adjugate, integerDeterminant } from "../numbers/index.js";
import type { SpaceGroup, SymmetryOperator } from "../spacegroups/index.js";
import type { Triple } from "./geometry.js";
import type { ArrangementWave } from "./moment-space.js";

/** Which vectors H + k belong to one satellite line. */
export interface LineMembers {
  readonly k: WaveVector;
  readonly halfLattice: boolean;
  /**
   * The vectors H + k (rows in a*, b*, c*) that symmetry makes equivalent to H + sign·k. Where 2k is not in L* each stands
   * for ±, so that they are half of the line's multiplicity.
   */
  readonly of: (h: Triple, sign: 1 | -1 | 0) => readonly Triple[];
  /** The same vectors carried to another arm `k R⁻¹`. */
  readonly onArm: (members: readonly Triple[], wave: ArrangementWave) => readonly Triple[];
}

/** Throws nothing: k must have values. */
export function lineMembers(group: SpaceGroup, k: WaveVector): LineMembers {
  const { minusK, reversing } = star(group, k);
  const numeric = numericWaveVector(k);
  if (numeric === null) throw new Error("the vectors of a line need values for the letters of k");
  const rotations = group.operators.map(rotationNumbers);
  const keeping = littleGroup(group, k).operators.map((index) => rotations[index] as readonly number[]);
  const turning = reversing.map((index) => (rotations[index] as readonly number[]).map((entry) => 0 - entry));
  const maps = [...keeping, ...turning];
  const halfLattice = minusK === "equivalent";
  return {
    k,
    halfLattice,
    of: (h, sign) => {
      const side = sign === -1 ? -1 : 1;
      // −(H − k) = −H + k
      const start: Triple = [side * h[0] + numeric[0], side * h[1] + numeric[1], side * h[2] + numeric[2]];
      const found = new Map<string, Triple>();
      for (const map of maps) {
        const image = rowTimesNumbers(start, map);
        // Members differ by vectors of L*, which lie no nearer than the grid of their keys.
        const key = image.map((entry, axis) => Math.round(1e4 * (entry - (numeric[axis] as number)))).join();
        if (!found.has(key)) found.set(key, image);
      }
      return [...found.values()];
    },
    onArm: (members, { operator }) => {
      if (operator === 0) return members;
      const back = inverseNumbers(rotations[operator] as readonly number[]);
      return members.map((member) => rowTimesNumbers(member, back));
    },
  };
}

/** The rotation part as nine floats row by row. */
export function rotationNumbers({ rotation, rotationDenominator }: SymmetryOperator): readonly number[] {
  return rotation.map((entry) => entry / rotationDenominator);
}

/** Inverse of a rotation part, in some settings of fractions: its determinant is ±1 but for rounding. */
function inverseNumbers(rotation: readonly number[]): readonly number[] {
  const sign = Math.sign(integerDeterminant(rotation));
  return adjugate(rotation).map((entry) => entry * sign);
}

/** Row times matrix (nine numbers row by row). */
export function rowTimesNumbers(row: Triple, matrix: readonly number[]): Triple {
  const at = (column: number): number =>
    row[0] * (matrix[column] as number) +
    row[1] * (matrix[3 + column] as number) +
    row[2] * (matrix[6 + column] as number);
  return [at(0), at(1), at(2)];
}
