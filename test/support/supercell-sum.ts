import type { Cell } from "@kvane/core/spacegroups";

/**
 * |F⊥(Q)|² by a plain sum over every moment of an explicit supercell, written from docs/conventions.md (Moments and
 * phases) alone: real moments `M_j(T) = S_j e^{−2πi k·T} (+ c.c.)`, `F(Q) = p f(Q) Σ M e^{2πi Q·r} / cells`, lengths and the
 * part along Q from the metric tensor. No Cartesian axes, no lists, no symmetry.
 */
export interface SupercellAtom {
  readonly position: readonly number[];
  /** S in μB along the unit vectors of the axes. */
  readonly real: readonly number[];
  readonly imaginary: readonly number[];
  /** f(|Q|), Q in Å⁻¹. */
  readonly factor: (q: number) => number;
}

export interface SupercellWave {
  readonly k: readonly number[];
  readonly halfLattice: boolean;
}

/** γ r₀/2 in 10⁻¹² cm per μB, four digits of the conventions page with two more (facts: γ r₀/2 = 0.26954). */
export const magnetonLength = 0.26954;

export function supercellSquare(
  cell: Cell,
  basis: readonly (readonly number[])[],
  waves: readonly SupercellWave[],
  /** By wave, then atom. */
  atoms: readonly (readonly SupercellAtom[])[],
  q: readonly number[],
): number {
  const metric = metricOf(cell);
  const inverse = inverseOf(metric);
  const turnsOf = (k: readonly number[], t: readonly number[]): number => dot(k, t);
  const periods = basis.map((vector) => periodOf(waves.map(({ k }) => turnsOf(k, vector))));
  const lengths = [cell.a, cell.b, cell.c];
  const size = 2 * Math.PI * Math.sqrt(quadratic(inverse, q));
  let re = [0, 0, 0];
  let im = [0, 0, 0];
  let cells = 0;
  for (let a = 0; a < (periods[0] as number); a++)
    for (let b = 0; b < (periods[1] as number); b++)
      for (let c = 0; c < (periods[2] as number); c++) {
        cells += 1;
        const shift = [0, 1, 2].map((axis) => a * at(basis, 0, axis) + b * at(basis, 1, axis) + c * at(basis, 2, axis));
        (atoms[0] as readonly SupercellAtom[]).forEach((first, atom) => {
          const moment = [0, 0, 0];
          waves.forEach(({ k, halfLattice }, wave) => {
            const own = atoms[wave]?.[atom] as SupercellAtom;
            const angle = -2 * Math.PI * turnsOf(k, shift);
            for (let axis = 0; axis < 3; axis++) {
              const value =
                (own.real[axis] as number) * Math.cos(angle) - (own.imaginary[axis] as number) * Math.sin(angle);
              moment[axis] = (moment[axis] as number) + (halfLattice ? value : 2 * value);
            }
          });
          const angle =
            2 *
            Math.PI *
            dot(
              q,
              first.position.map((entry, axis) => entry + (shift[axis] as number)),
            );
          const factor = magnetonLength * first.factor(size);
          re = re.map((entry, axis) => entry + factor * Math.cos(angle) * (moment[axis] as number));
          im = im.map((entry, axis) => entry + factor * Math.sin(angle) * (moment[axis] as number));
        });
      }
  const lattice = (vector: readonly number[]): number[] =>
    vector.map((entry, axis) => entry / cells / (lengths[axis] as number));
  const square = (vector: readonly number[]): number => {
    const along = dot(q, vector);
    return quadratic(metric, vector) - (along * along) / quadratic(inverse, q);
  };
  return square(lattice(re)) + square(lattice(im));
}

function at(rows: readonly (readonly number[])[], row: number, axis: number): number {
  return rows[row]?.[axis] as number;
}

function dot(a: readonly number[], b: readonly number[]): number {
  return a.reduce((sum, entry, axis) => sum + entry * (b[axis] as number), 0);
}

function quadratic(matrix: readonly (readonly number[])[], v: readonly number[]): number {
  return matrix.reduce((sum, row, axis) => sum + (v[axis] as number) * dot(row, v), 0);
}

function metricOf(cell: Cell): number[][] {
  const cosine = (degrees: number): number => Math.cos((degrees * Math.PI) / 180);
  const ab = cell.a * cell.b * cosine(cell.gamma);
  const ac = cell.a * cell.c * cosine(cell.beta);
  const bc = cell.b * cell.c * cosine(cell.alpha);
  return [
    [cell.a ** 2, ab, ac],
    [ab, cell.b ** 2, bc],
    [ac, bc, cell.c ** 2],
  ];
}

function inverseOf(m: readonly (readonly number[])[]): number[][] {
  const minor = (i: number, j: number): number => {
    const [r, s] = [(i + 1) % 3, (i + 2) % 3];
    const [c, d] = [(j + 1) % 3, (j + 2) % 3];
    return at(m, r, c) * at(m, s, d) - at(m, r, d) * at(m, s, c);
  };
  const determinant = [0, 1, 2].reduce((sum, j) => sum + at(m, 0, j) * minor(0, j), 0);
  return [0, 1, 2].map((i) => [0, 1, 2].map((j) => minor(j, i) / determinant));
}

function periodOf(turns: readonly number[]): number {
  for (let period = 1; period <= 720; period++)
    if (turns.every((value) => Math.abs(period * value - Math.round(period * value)) < 1e-9)) return period;
  throw new Error(`${turns} have no common period`);
}
