import type { WaveVector } from "../kvectors/index.js";
import {
  addForms,
  dotIntegers,
  type IntegerMatrix,
  invertUnimodular,
  type LinearForm,
  multiplyIntegerMatrices,
  rational,
  scaleForm,
  zeroForm,
} from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";

/**
 * An operator in the primitive basis, where everything is an integer: the translation is a column of numerators over a
 * denominator that the operators used together share.
 */
export interface PrimitiveOperator {
  readonly rotation: IntegerMatrix;
  readonly translation: readonly number[];
}

/** The operator of that index, its translation over the group's `primitive.denominator`. */
export function primitiveOperator({ primitive }: SpaceGroup, index: number): PrimitiveOperator {
  const rotation = primitive.rotations[index];
  if (!rotation) throw new RangeError(`the group has no operator ${index}`);
  return { rotation, translation: primitive.translations[index] as readonly number[] };
}

/** The product `a b`, `b` acting first; the translation is not reduced. */
export function composePrimitive(a: PrimitiveOperator, b: PrimitiveOperator): PrimitiveOperator {
  return {
    rotation: multiplyIntegerMatrices(a.rotation, b.rotation),
    translation: rotated(a.rotation, b.translation).map((entry, axis) => entry + (a.translation[axis] as number)),
  };
}

/** The inverse `{R⁻¹ | −R⁻¹t}`. */
export function invertPrimitive(a: PrimitiveOperator): PrimitiveOperator {
  const rotation = invertUnimodular(a.rotation);
  return { rotation, translation: rotated(rotation, a.translation).map((entry) => 0 - entry) };
}

export function rotated(rotation: IntegerMatrix, column: readonly number[]): number[] {
  return [0, 3, 6].map((row) => dotIntegers(rotation.slice(row), column));
}

/** The components κ = k B of k along the dual of the primitive basis: `k·t = κ·τ` with τ primitive. */
export function primitiveComponents({ lattice }: SpaceGroup, k: WaveVector): readonly LinearForm[] {
  return lattice.vectors.map((vector) =>
    vector.reduce(
      (sum, entry, axis) =>
        addForms(sum, scaleForm(rational(entry, lattice.denominator), k.components[axis] as LinearForm)),
      zeroForm,
    ),
  );
}

/** k·t in turns from the primitive components of both, the translation over `denominator`. */
export function turnsOf(kappa: readonly LinearForm[], translation: readonly number[], denominator: number): LinearForm {
  return kappa.reduce(
    (sum, component, axis) => addForms(sum, scaleForm(rational(translation[axis] as number, denominator), component)),
    zeroForm,
  );
}
