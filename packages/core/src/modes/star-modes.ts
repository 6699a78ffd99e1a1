import { star, type WaveVector } from "../kvectors/index.js";
import {
  addForms,
  integerDeterminant,
  matrixFrom,
  multiplyCyclotomicMatrices,
  type Phase,
  reducePhase,
} from "../numbers/index.js";
import type { SpaceGroup, SymmetryOperator } from "../spacegroups/index.js";
import { momentMatrix } from "./intertwiners.js";
import { type OperatorAction, siteAction } from "./site-action.js";
import type { Mode, ModeMoment, SiteModes } from "./types.js";

/** The modes of one site carried to one arm of the star. */
export interface ArmModes {
  readonly arm: WaveVector;
  /** Index of the operator s with `arm = k S⁻¹`. */
  readonly operator: number;
  readonly irreps: readonly { readonly label: string; readonly modes: readonly Mode[] }[];
}

/**
 * The basis vectors on every arm, `e_{(i,c,p)} = Γ(s_i) e_{c,p}`: with the full irreps of `fullIrreps` they obey
 * `Γ(g) e_{(j,c,q)} = Σ D(g)_{(i,p)(j,q)} e_{(i,c,p)}` for every operator of the space group. On arm i the Fourier
 * component of atom j' is `e^{2πi k_i·a} det(S) S · (that of j)`, `s r_j = r_j' + a`.
 */
export function starModes(group: SpaceGroup, modes: SiteModes): readonly ArmModes[] {
  const { arms, representatives } = star(group, modes.representations.k);
  return arms.map((arm, index) => {
    const operator = representatives[index] as number;
    const [action] = siteAction(group, arm, modes.orbit, [operator]) as [OperatorAction];
    const { rotation, rotationDenominator } = group.operators[operator] as SymmetryOperator;
    const determinant = integerDeterminant(group.primitive.rotations[operator] as readonly number[]);
    const matrix = momentMatrix(matrixFrom(rotation, rotationDenominator), modes.axial ? determinant : 1);
    const carry = (moments: readonly ModeMoment[]): ModeMoment[] => {
      const carried = new Array<ModeMoment>(moments.length);
      moments.forEach((moment, atom) => {
        const rotated = multiplyCyclotomicMatrices(
          matrix,
          moment.vector.map((entry) => [entry]),
        );
        carried[action.image[atom] as number] = {
          phase: reducePhase(addForms(moment.phase, action.phase[atom] as Phase)),
          vector: rotated.map((row) => row[0]) as unknown as ModeMoment["vector"],
        };
      });
      return carried;
    };
    return {
      arm,
      operator,
      irreps: modes.irreps.map(({ irrep, modes: own }) => ({
        label: irrep.label,
        modes: own.map((mode) => ({ ...mode, moments: carry(mode.moments) })),
      })),
    };
  });
}
