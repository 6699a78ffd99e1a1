import { choleskyFactor, choleskySolve } from "../algorithms/index.js";
import { isHalfLattice, numericWaveVector, parameterValues } from "../kvectors/index.js";
import { phasedToComplex, type RationalVector, toNumber } from "../numbers/index.js";
import { averagedMetric, type Cell, directMetric, type SpaceGroup } from "../spacegroups/index.js";
import { checkCellGiven, convertComponents } from "./components.js";
import type { IrrepModes, SiteModes } from "./types.js";
import type { WritingConvention } from "./written-site.js";

type Complex = readonly [number, number];

/** The part of an arrangement that belongs to one irrep. */
export interface IrrepShare {
  readonly label: string;
  /** Its share of Σ |S|², 0 to 1. */
  readonly share: number;
  /** Amplitudes of the basis vectors (kvane's own convention, lattice components), in their order. */
  readonly amplitudes: readonly Complex[];
}

/** Fourier components that somebody gave, understood. */
export interface ProjectedComponents {
  /** In kvane's own convention and lattice components, per atom. */
  readonly components: readonly (readonly Complex[])[];
  readonly shares: readonly IrrepShare[];
}

/**
 * Fourier components written in some convention: what they are in kvane's own, and how they split over the irreps, each
 * part by least squares in the metric of the cell averaged over the point group (without a cell the
 * parts are the same, and their shares those of axes at right angles and of one length, averaged likewise). Modes of
 * different irreps are orthogonal in it, so the shares add up to 1. Null while a letter of k is open.
 *
 * @param given per atom of the orbit three complex components in `convention`
 * @param cell needed for crystal and Cartesian components
 * @throws `missing-argument` where those come without one
 */
export function projectComponents(
  group: SpaceGroup,
  site: SiteModes,
  given: readonly (readonly Complex[])[],
  { convention, cell }: { readonly convention: WritingConvention; readonly cell: Cell | null },
): ProjectedComponents | null {
  checkCellGiven(convention.components, cell);
  const { k } = site.representations;
  const numbers = numericWaveVector(k);
  if (numbers === null) return null;
  const half = isHalfLattice(group, k);
  const components = given.map((vector, atom) => {
    const position = (site.orbit.positions[atom] as RationalVector).map(toNumber);
    const turns =
      convention.phase === "position" ? position.reduce((sum, x, axis) => sum + x * (numbers[axis] as number), 0) : 0;
    const factor = convention.factor === "half" && !half ? 1 / 2 : 1;
    const [cosine, sine] = [Math.cos(2 * Math.PI * turns), -Math.sin(2 * Math.PI * turns)];
    return inLattice(vector, cell, convention).map(([re, written]): Complex => {
      const im = convention.exponent === "plus" ? -written : written;
      return [factor * (re * cosine - im * sine), factor * (re * sine + im * cosine)];
    });
  });
  const metric = averagedMetric(group.operators, directMetric(cell ?? unitCell));
  const total = product(components, components, metric)[0];
  const values = parameterValues(k);
  return {
    components,
    shares: site.irreps.map((part) => shareOf(part, components, metric, total, values)),
  };
}

const unitCell: Cell = { a: 1, b: 1, c: 1, alpha: 90, beta: 90, gamma: 90 };

function inLattice(
  vector: readonly Complex[],
  cell: Cell | null,
  { components }: WritingConvention,
): readonly Complex[] {
  const part = (index: 0 | 1): readonly [number, number, number] => {
    const along = vector.map((entry) => entry[index]) as [number, number, number];
    // Lattice components need no cell.
    return convertComponents(cell as Cell, along, components, "lattice");
  };
  const [real, imaginary] = [part(0), part(1)];
  return ([0, 1, 2] as const).map((axis): Complex => [real[axis], imaginary[axis]]);
}

type Arrangement = readonly (readonly Complex[])[];

/** `Σ_j a_j† G b_j`. */
function product(a: Arrangement, b: Arrangement, metric: readonly number[]): Complex {
  let [re, im] = [0, 0];
  a.forEach((left, atom) => {
    left.forEach(([x, y], row) => {
      (b[atom] as readonly Complex[]).forEach(([u, v], column) => {
        const weight = metric[3 * row + column] as number;
        re += weight * (x * u + y * v);
        im += weight * (x * v - y * u);
      });
    });
  });
  return [re, im];
}

/** Normal equations `E†G E a = E†G S`, written with real numbers. */
function shareOf(
  { irrep, modes }: IrrepModes,
  components: Arrangement,
  metric: readonly number[],
  total: number,
  values: readonly number[] | null,
): IrrepShare {
  const size = modes.length;
  if (size === 0) return { label: irrep.label, share: 0, amplitudes: [] };
  const vectors = modes.map(
    ({ moments }): Arrangement =>
      moments.map(({ phase, vector }) => vector.map((factor) => phasedToComplex({ phase, factor }, values) as Complex)),
  );
  const unknowns = 2 * size;
  // Of the symmetric matrix the lower triangle is enough.
  const normal = new Float64Array(unknowns * unknowns);
  const right = new Float64Array(unknowns);
  vectors.forEach((left, row) => {
    const [x, y] = product(left, components, metric);
    right[row] = x;
    right[size + row] = y;
    vectors.forEach((other, column) => {
      const [re, im] = product(left, other, metric);
      const at = (i: number, j: number): number => unknowns * i + j;
      normal[at(row, column)] = re;
      normal[at(size + row, size + column)] = re;
      normal[at(size + row, column)] = im;
    });
  });
  const factor = choleskyFactor(normal, unknowns);
  if (factor === null) throw new Error("basis vectors of one irrep depend on each other");
  const solution = choleskySolve(factor, right);
  const explained = solution.reduce((sum, value, index) => sum + value * (right[index] as number), 0);
  return {
    label: irrep.label,
    share: total > 0 ? explained / total : 0,
    amplitudes: modes.map((_, index): Complex => [solution[index] as number, solution[size + index] as number]),
  };
}
