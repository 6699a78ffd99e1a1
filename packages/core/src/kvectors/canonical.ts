import { invertUnimodular, modulo, overCommonDenominator } from "../numbers/index.js";
import { type SpaceGroup, toPrimitiveRow } from "../spacegroups/index.js";
import { adaptedCoordinates, saturated } from "./flats.js";
import { fromIntegerForm, type IntegerForm, rotateForm, rotateRow, toIntegerForm } from "./integer-form.js";
import { manifoldSet } from "./manifold.js";
import type { WaveVector } from "./types.js";
import { parameterValues } from "./wave-vector.js";

/** Where the kind of k has its canonical representative: `k ≡ canonical · R⁻¹` with R of `operator`. */
export interface CanonicalPlacement {
  readonly canonical: WaveVector;
  readonly operator: number;
}

/**
 * The canonical representative of the kind of k, the place where irreps are made and numbered: one arm of the star,
 * chosen by its manifold modulo L* alone (so it is the same all along a line or plane), shifted by L* so that the
 * position across the manifold lies in [0, 1) and the one along it in (−1/2, 1/2]. Equivalent k share it.
 */
export function canonicalPlacement(group: SpaceGroup, k: WaveVector): CanonicalPlacement {
  const form = toIntegerForm(group.lattice, k);
  let best: { readonly key: readonly number[]; readonly operator: number; readonly arm: Arm } | null = null;
  group.primitive.rotations.forEach((rotation, operator) => {
    const arm = describeArm(group, rotateForm(form, rotation), k);
    if (best === null || lexicographic(arm.key, best.key) < 0) best = { key: arm.key, operator, arm };
  });
  const { operator, arm } = best as unknown as { operator: number; arm: Arm };
  return { canonical: fromIntegerForm(group, shiftArm(arm, parameterValues(k)), k), operator };
}

interface Arm {
  readonly form: IntegerForm;
  /** `(t, s) = κ C`: t along the manifold (`dimension` of them), s across it; C is unimodular. */
  readonly coordinates: readonly number[];
  readonly dimension: number;
  readonly key: readonly number[];
}

function describeArm(group: SpaceGroup, form: IntegerForm, like: WaveVector): Arm {
  const set = manifoldSet(group, fromIntegerForm(group, form, like), { withInversion: false });
  const directions = set.directions.map((row) => overCommonDenominator(toPrimitiveRow(group.lattice, row)).numerators);
  const lattice = saturated(directions);
  const coordinates = adaptedCoordinates(lattice);
  const across = rotateRow(form.base, coordinates).slice(lattice.length).map((entry) => modulo(entry, form.denominator));
  return { form, coordinates, dimension: lattice.length, key: [...lattice.flat(), ...across.map((entry) => entry / form.denominator)] };
}

/** Moves the arm by a vector of L* to its canonical place; along the manifold only where there are numbers to go by. */
function shiftArm(arm: Arm, values: readonly number[] | null): IntegerForm {
  const { form, coordinates, dimension } = arm;
  const base = rotateRow(form.base, coordinates);
  const along = form.directions.map((direction) => rotateRow(direction, coordinates));
  const shift = base.map((entry, index) => {
    if (index >= dimension) return Math.floor(entry / form.denominator);
    const position = along.reduce(
      (sum, direction, letter) => (direction[index] === 0 ? sum : sum + ((direction[index] as number) / form.denominator) * (values?.[letter] ?? Number.NaN)),
      entry / form.denominator,
    );
    return Number.isNaN(position) ? 0 : Math.ceil(position - 0.5);
  });
  const step = rotateRow(shift, invertUnimodular(coordinates));
  const moved = form.base.map((entry, axis) => entry - form.denominator * (step[axis] as number)) as [number, number, number];
  return { ...form, base: moved };
}

function lexicographic(a: readonly number[], b: readonly number[]): number {
  for (let index = 0; index < Math.max(a.length, b.length); index++) {
    const difference = (a[index] ?? 0) - (b[index] ?? 0);
    if (difference !== 0) return difference;
  }
  return 0;
}
