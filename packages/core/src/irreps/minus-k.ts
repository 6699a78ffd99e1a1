import { star } from "../kvectors/index.js";
import {
  addForms,
  type CyclotomicMatrix,
  conjugateCyclotomic,
  negateForm,
  type Phase,
  scaleCyclotomicMatrix,
} from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import { constantRoot } from "./constant-root.js";
import { littleGroupPlaces } from "./evaluate.js";
import { unitaryIntertwiner } from "./intertwiner.js";
import { composePrimitive, invertPrimitive, primitiveOperator } from "./primitive-operators.js";
import type { SmallIrrep, SmallIrreps } from "./types.js";

/**
 * The relation between k and −k: an operator g₀ with `k R₀⁻¹ ≡ −k`, combined with complex conjugation, acts on the
 * Fourier components at k.
 */
export interface MinusKRelation {
  /** Index of g₀ in the group, the first operator that takes k to −k. */
  readonly operator: number;
  /** One per irrep, in order. */
  readonly links: readonly MinusKLink[];
}

/**
 * `D(g₀⁻¹ g g₀)* = N⁻¹ D'(g) N` with the unitary N, D' the irrep `partner`: itself when real or pseudoreal (then
 * `N N* = ±D(g₀²)`), the conjugate irrep when complex.
 */
export interface MinusKLink {
  readonly label: string;
  readonly partner: string;
  readonly matrix: CyclotomicMatrix;
}

/**
 * The antiunitary relation of every irrep (Bradley & Cracknell, 1972, chapter 7, for the co-representations of grey
 * groups; docs/conventions.md, Modes), or null where −k is in no arm of the star.
 */
export function minusKRelation(group: SpaceGroup, irreps: SmallIrreps): MinusKRelation | null {
  const [operator] = star(group, irreps.k).reversing;
  if (operator === undefined) return null;
  const reverse = primitiveOperator(group, operator);
  const back = invertPrimitive(reverse);
  const placed = littleGroupPlaces(group, irreps);
  const images = irreps.littleGroup.operators.map((index) =>
    placed(composePrimitive(composePrimitive(back, primitiveOperator(group, index)), reverse)),
  );
  return {
    operator,
    links: irreps.irreps.map((irrep) => {
      const partner = irreps.irreps.find((other) => other.label === (irrep.conjugateOf ?? irrep.label)) as SmallIrrep;
      const pairs = images.map(({ element, phase }, index): readonly [CyclotomicMatrix, CyclotomicMatrix] => {
        const turns = negateForm(addForms(phase, irreps.phases[index] as Phase));
        return [
          partner.matrices[index] as CyclotomicMatrix,
          scaleCyclotomicMatrix(constantRoot(turns), conjugateMatrix(irrep.matrices[element] as CyclotomicMatrix)),
        ];
      });
      return { label: irrep.label, partner: partner.label, matrix: unitaryIntertwiner(pairs) };
    }),
  };
}

export function conjugateMatrix(matrix: CyclotomicMatrix): CyclotomicMatrix {
  return matrix.map((row) => row.map(conjugateCyclotomic));
}
