import type { MomentSpace } from "../diffraction/index.js";

/**
 * The same arrangement with its common phase chosen: the first amplitude that is no small one, together with the one in
 * quadrature to it, is all in the first. Amplitudes that have no free phase come back as they are.
 */
export function withChosenPhase(space: MomentSpace, amplitudes: ArrayLike<number>): Float64Array {
  const own = Float64Array.from({ length: space.basis.length }, (_, index) => amplitudes[index] as number);
  const turned = turnedAmplitudes(space, own);
  if (turned === null) return own;
  const moduli = own.map((value, index) => Math.hypot(value, turned[index] as number));
  const largest = moduli.reduce((most, value) => Math.max(most, value), 0);
  const at = moduli.findIndex((value) => value >= largest / 2);
  if (at < 0 || largest === 0) return own;
  const [cosine, sine] = [
    (own[at] as number) / (moduli[at] as number),
    (turned[at] as number) / (moduli[at] as number),
  ];
  return own.map((value, index) => cosine * value + sine * (turned[index] as number));
}

/** The unit vector along `turnedAmplitudes`. */
export function commonPhaseDirection(space: MomentSpace, amplitudes: ArrayLike<number>): Float64Array | null {
  const turned = turnedAmplitudes(space, amplitudes);
  const norm = turned === null ? 0 : Math.hypot(...turned);
  return turned !== null && norm > 0 ? turned.map((value) => value / norm) : null;
}

/**
 * The amplitudes of `i S`, the direction in which the common phase of all waves turns, `S → i S`, which no diffraction sees where
 * 2k is no vector of L*; null where the space does not hold the turned arrangement.
 */
function turnedAmplitudes(space: MomentSpace, amplitudes: ArrayLike<number>): Float64Array | null {
  if (space.waves.length === 0 || space.waves.some(({ halfLattice }) => halfLattice)) return null;
  const size = space.basis.length;
  const rows = space.basis.map(({ components }) =>
    components.flatMap((wave) => wave.flatMap(({ real, imaginary }) => [...real, ...imaginary])),
  );
  const length = rows[0]?.length ?? 0;
  const turned = new Float64Array(length);
  rows.forEach((row, index) => {
    for (let at = 0; at < length; at += 6)
      for (let axis = 0; axis < 3; axis++) {
        // i (a + ib) = −b + ia
        turned[at + axis] =
          (turned[at + axis] as number) - (amplitudes[index] as number) * (row[at + 3 + axis] as number);
        turned[at + 3 + axis] =
          (turned[at + 3 + axis] as number) + (amplitudes[index] as number) * (row[at + axis] as number);
      }
  });
  const solution = leastSquares(rows, turned, size);
  if (solution === null) return null;
  let away = 0;
  let all = 0;
  for (let at = 0; at < length; at++) {
    const value = rows.reduce((sum, row, index) => sum + (solution[index] as number) * (row[at] as number), 0);
    away += (value - (turned[at] as number)) ** 2;
    all += (turned[at] as number) ** 2;
  }
  return away <= 1e-12 * all ? solution : null;
}

/** Normal equations by elimination; null where the rows are dependent. */
function leastSquares(rows: readonly (readonly number[])[], target: Float64Array, size: number): Float64Array | null {
  const matrix = rows.map((row) => [
    ...rows.map((other) => row.reduce((sum, entry, at) => sum + entry * (other[at] as number), 0)),
    row.reduce((sum, entry, at) => sum + entry * (target[at] as number), 0),
  ]);
  for (let column = 0; column < size; column++) {
    let best = column;
    for (let row = column; row < size; row++)
      if (Math.abs(matrix[row]?.[column] as number) > Math.abs(matrix[best]?.[column] as number)) best = row;
    [matrix[column], matrix[best]] = [matrix[best] as number[], matrix[column] as number[]];
    const pivot = matrix[column] as number[];
    if (Math.abs(pivot[column] as number) < 1e-12) return null;
    for (let row = 0; row < size; row++) {
      if (row === column) continue;
      const other = matrix[row] as number[];
      const factor = (other[column] as number) / (pivot[column] as number);
      for (let at = column; at <= size; at++) other[at] = (other[at] as number) - factor * (pivot[at] as number);
    }
  }
  return Float64Array.from(matrix, (row, index) => (row[size] as number) / (row[index] as number));
}
