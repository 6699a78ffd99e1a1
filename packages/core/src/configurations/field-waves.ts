import { exactWaveVector, type WaveVector } from "../kvectors/index.js";
import {
  addVectors,
  invert,
  mapVector,
  matrixFrom,
  type RationalVector,
  rational,
  toNumber,
  zeroVector,
} from "../numbers/index.js";
import { fromPrimitiveRow, type SpaceGroup } from "../spacegroups/index.js";
import type { MomentField } from "./given-field.js";

type Complex = readonly [number, number];

/** Fourier components of a field at one k: by site, atom of the orbit and lattice component of the parent. */
export interface FieldWave {
  readonly k: WaveVector;
  readonly components: readonly (readonly (readonly Complex[])[])[];
  /** Σ |S|² over all atoms, in the same unit for all k. */
  readonly power: number;
}

/**
 * `S_j(k) = (1/N) Σ_T M_j(T) exp(+2πi k·T)` over the N cells, at every k of the reciprocal lattice of the magnetic cell
 * modulo that of the parent. What has no more than `least` of the whole power is left out.
 *
 * @param metric of the parent's cell, nine numbers
 */
export function fieldWaves(
  group: SpaceGroup,
  field: MomentField,
  metric: readonly number[],
  least: number,
): readonly FieldWave[] {
  const { lattice, cells, moments } = field;
  // Rows κ with κ·T an integer for every T of the magnetic lattice: combinations of the columns of its inverse.
  const inverse = invert(matrixFrom(lattice.flat()));
  const columns = [0, 1, 2].map(
    (column) => [0, 1, 2].map((row) => inverse[row as 0 | 1 | 2][column as 0 | 1 | 2]) as unknown as RationalVector,
  );
  const waves = duals(columns).map((row): FieldWave => {
    const turns = cells.map((cell) =>
      cell.reduce((sum, entry, axis) => sum + entry * toNumber(row[axis as 0 | 1 | 2]), 0),
    );
    const phases = turns.map((turn): Complex => [Math.cos(2 * Math.PI * turn), Math.sin(2 * Math.PI * turn)]);
    const components = moments.map((atoms) =>
      atoms.map((list) =>
        [0, 1, 2].map((axis): Complex => {
          let [re, im] = [0, 0];
          list.forEach((moment, index) => {
            const [cosine, sine] = phases[index] as Complex;
            re += (moment[axis] as number) * cosine;
            im += (moment[axis] as number) * sine;
          });
          return [re / cells.length, im / cells.length];
        }),
      ),
    );
    return { k: exactWaveVector(fromPrimitiveRow(group.lattice, row)), components, power: powerOf(components, metric) };
  });
  const total = waves.reduce((sum, { power }) => sum + power, 0);
  return waves.filter(({ power }) => power > least * total);
}

/** All sums of the columns modulo 1, zero first: one k for each class. */
function duals(columns: readonly RationalVector[]): readonly RationalVector[] {
  let found: RationalVector[] = [zeroVector];
  for (const column of columns) {
    const next = [...found];
    const known = new Set(found.map(textOf));
    for (let step = column; !known.has(textOf(step)); step = mapVector(addVectors(step, column), modOne))
      next.push(...found.map((row) => mapVector(addVectors(row, step), modOne)));
    found = next;
  }
  return found;
}

function textOf(row: RationalVector): string {
  return mapVector(row, modOne)
    .map(([top, bottom]) => `${top}/${bottom}`)
    .join();
}

function modOne(value: readonly [number, number]): readonly [number, number] {
  return rational(((value[0] % value[1]) + value[1]) % value[1], value[1]);
}

function powerOf(components: FieldWave["components"], metric: readonly number[]): number {
  let sum = 0;
  for (const atoms of components)
    for (const vector of atoms)
      for (const part of [0, 1] as const)
        for (let i = 0; i < 3; i++)
          for (let j = 0; j < 3; j++)
            sum += (vector[i]?.[part] as number) * (metric[3 * i + j] as number) * (vector[j]?.[part] as number);
  return sum;
}
