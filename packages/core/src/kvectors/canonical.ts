import { modulo } from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import { fixedRows, fixingForm } from "./acting-rotations.js";
import { type DirectionLattice, directionTable } from "./flats.js";
import { fromIntegerForm, type IntegerForm, rotateForm, rotateRow, toIntegerForm } from "./integer-form.js";
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
  const own = group.primitive.rotations.map((matrix) => ({ matrix, own: true }));
  // The manifold of k R is that of k, rotated.
  const directions = fixedRows(fixingForm(own, form));
  const lattices = directionTable();
  const arms = own.map(({ matrix }) =>
    describeArm(rotateForm(form, matrix), lattices(directions.map((row) => rotateRow(row, matrix)))),
  );
  const best = arms.reduce((first, arm) => (lexicographic(arm.key, first.key) < 0 ? arm : first));
  return {
    canonical: fromIntegerForm(group, shiftArm(best, parameterValues(k)), k),
    operator: arms.indexOf(best),
  };
}

interface Arm {
  readonly form: IntegerForm;
  /** The directions of its manifold. */
  readonly lattice: DirectionLattice;
  readonly key: readonly number[];
}

function describeArm(form: IntegerForm, lattice: DirectionLattice): Arm {
  const across = rotateRow(form.base, lattice.coordinates).slice(lattice.rows.length);
  const places = across.map((entry) => modulo(entry, form.denominator) / form.denominator);
  return { form, lattice, key: [...lattice.rows.flat(), ...places] };
}

/** Moves the arm by a vector of L* to its canonical place; along the manifold only where there are numbers to go by. */
function shiftArm(arm: Arm, values: readonly number[] | null): IntegerForm {
  const { form, lattice } = arm;
  const { coordinates } = lattice;
  const base = rotateRow(form.base, coordinates);
  const along = form.directions.map((direction) => rotateRow(direction, coordinates));
  const shift = base.map((entry, index) => {
    if (index >= lattice.rows.length) return Math.floor(entry / form.denominator);
    const position = along.reduce(
      (sum, direction, letter) =>
        direction[index] === 0
          ? sum
          : sum + ((direction[index] as number) / form.denominator) * (values?.[letter] ?? Number.NaN),
      entry / form.denominator,
    );
    return Number.isNaN(position) ? 0 : Math.ceil(position - 0.5);
  });
  const step = rotateRow(shift, lattice.inverse);
  const moved = form.base.map((entry, axis) => entry - form.denominator * (step[axis] as number)) as [
    number,
    number,
    number,
  ];
  return { ...form, base: moved };
}

function lexicographic(a: readonly number[], b: readonly number[]): number {
  for (let index = 0; index < Math.max(a.length, b.length); index++) {
    const difference = (a[index] ?? 0) - (b[index] ?? 0);
    if (difference !== 0) return difference;
  }
  return 0;
}
