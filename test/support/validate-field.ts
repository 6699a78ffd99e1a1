import type { SiteModes } from "@kvane/core/modes";
import type { SpaceGroup } from "@kvane/core/spacegroups";
import type { ComplexMatrix } from "./complex.js";
import { type FloatGroup, type FloatOperator, inner, inverse, latticeCoordinates, turnColumn } from "./float-group.js";
import { type Random, seeded } from "./random.js";
import { type FloatReversal, floatReversal } from "./validate-minus-k.js";
import { type FloatModes, floatModes, landings, vectorMatrix } from "./validate-modes.js";

/** How the field is built and compared; the wrong choices serve to show that the check notices them. */
export interface FieldOptions {
  /** −1: `M_j(T) = S_j e^{−2πi k·T} + c.c.`; +1 is the wrong sign. */
  readonly phaseSign?: 1 | -1;
  /** Compares with D(g)* instead of D(g): wrong unless D is real. */
  readonly conjugateMatrices?: boolean;
  /** Takes S_j* for S_j: wrong unless the modes are real. */
  readonly conjugateModes?: boolean;
  /** Cells looked at one by one, all up to this many, else a seeded choice. */
  readonly cells?: number;
  readonly seed?: number;
}

const tolerance = 1e-8;

/** The largest period of a rational k along one lattice vector that a supercell is built for. */
const longestPeriod = 720;

interface Supercell {
  readonly periods: readonly [number, number, number];
  /** k·T in turns for the three basis vectors. */
  readonly turns: readonly number[];
}

/** Real moments of every atom of every cell: index ((cell·atoms) + atom)·3 + axis. */
interface Field {
  readonly supercell: Supercell;
  readonly atoms: number;
  readonly moments: Float64Array;
}

/** Amplitudes a_{c,p} of every mode of every irrep. */
type Amplitudes = readonly (readonly (readonly [number, number])[])[];

/**
 * Builds the real moments of all atoms in a supercell that is commensurate with k, once for random amplitudes of all
 * modes, moves them atom by atom with `(gM)(r) = det(R) R M(g⁻¹ r)`, g every operator of the little group, the three
 * lattice translations and the operator that takes k to −k, and compares with the field of the amplitudes `a' = D(g) a`. For k without letters.
 */
export function fieldProblems(group: SpaceGroup, modes: SiteModes, options: FieldOptions = {}): string[] {
  const read = floatModes(group, modes);
  const random = seeded(options.seed ?? 1);
  const supercell = supercellOf(read.irreps.group, read.irreps.k);
  const amplitudes = randomAmplitudes(read, random);
  const field = fieldOf(read, supercell, amplitudes, options);
  const cells = chosenCells(supercell, options.cells ?? 64, random);
  const problems: string[] = [];
  read.irreps.operators.forEach((index, at) => {
    const operator = read.irreps.group.operators[index] as FloatOperator;
    const expected = fieldOf(read, supercell, transformed(read, amplitudes, at, options), options);
    const error = differenceAfter(read, field, expected, operator, cells);
    if (!(error < tolerance)) problems.push(`operator ${index} does not act as D says (by ${error.toPrecision(2)})`);
  });
  read.irreps.group.basis.forEach((vector, axis) => {
    const translation = { rotation: [1, 0, 0, 0, 1, 0, 0, 0, 1], translation: vector };
    const turned = amplitudes.map((list) => list.map((value) => turnedBy(value, inner(read.irreps.k, vector))));
    const error = differenceAfter(read, field, fieldOf(read, supercell, turned, options), translation, cells);
    if (!(error < tolerance))
      problems.push(`translation ${axis} does not act as e^{+2πi k·T} (by ${error.toPrecision(2)})`);
  });
  const reversal = floatReversal(group, modes);
  if (reversal !== null) {
    const expected = fieldOf(read, supercell, reversed(amplitudes, reversal), options);
    const error = differenceAfter(read, field, expected, reversal.operator, cells);
    if (!(error < tolerance))
      problems.push(`the operator that takes k to −k does not act as N and B say (by ${error.toPrecision(2)})`);
  }
  return problems;
}

/** Number of cells of the supercell that a rational k needs, to keep the long ones out of a quick run. */
export function supercellSize(group: FloatGroup, k: readonly number[]): number {
  return supercellOf(group, k).periods.reduce((size, period) => size * period, 1);
}

function supercellOf(group: FloatGroup, k: readonly number[]): Supercell {
  const turns = group.basis.map((vector) => inner(k, vector));
  const periods = turns.map((value) => {
    for (let period = 1; period <= longestPeriod; period++)
      if (Math.abs(period * value - Math.round(period * value)) < 1e-9) return period;
    throw new Error(`k·T = ${value} has no period up to ${longestPeriod}`);
  });
  return { periods: periods as [number, number, number], turns };
}

function randomAmplitudes(read: FloatModes, random: Random): Amplitudes {
  return read.modes.map((list) => list.map(() => [2 * random.next() - 1, 2 * random.next() - 1] as const));
}

function turnedBy([re, im]: readonly [number, number], turns: number): [number, number] {
  const [cosine, sine] = [Math.cos(2 * Math.PI * turns), Math.sin(2 * Math.PI * turns)];
  return [re * cosine - im * sine, re * sine + im * cosine];
}

/** a'_{c,q} = Σ_p D(g)_{qp} a_{c,p}. */
function transformed(read: FloatModes, amplitudes: Amplitudes, at: number, options: FieldOptions): Amplitudes {
  return amplitudes.map((list, irrep) => {
    const matrix = read.irreps.matrices[irrep]?.[at] as ComplexMatrix;
    const size = matrix.rows;
    const sign = options.conjugateMatrices === true ? -1 : 1;
    return list.map((_, mode): [number, number] => {
      const first = mode - (mode % size);
      let re = 0;
      let im = 0;
      for (let partner = 0; partner < size; partner++) {
        const entry = (mode % size) * size + partner;
        const [x, y] = [matrix.real[entry] as number, sign * (matrix.imaginary[entry] as number)];
        const [u, v] = list[first + partner] as readonly [number, number];
        re += x * u - y * v;
        im += x * v + y * u;
      }
      return [re, im];
    });
  });
}

/** a'_{c',q} of the partner irrep = Σ_{c,p} N_{qp} B_{c'c} a_{c,p}*. */
function reversed(amplitudes: Amplitudes, reversal: FloatReversal): Amplitudes {
  const result = amplitudes.map((list) => list.map((): [number, number] => [0, 0]));
  reversal.actions.forEach((action, irrep) => {
    if (action === null) return;
    const size = action.matrix.rows;
    (result[action.partner] as [number, number][]).forEach((sum, target) => {
      (amplitudes[irrep] as Amplitudes[number]).forEach(([a, b], source) => {
        const copies = Math.floor(target / size) * action.copies.columns + Math.floor(source / size);
        const partners = (target % size) * size + (source % size);
        const [x, y] = [action.copies.real[copies] as number, action.copies.imaginary[copies] as number];
        const [u, v] = [action.matrix.real[partners] as number, action.matrix.imaginary[partners] as number];
        const [re, im] = [x * u - y * v, x * v + y * u];
        sum[0] += re * a + im * b;
        sum[1] += im * a - re * b;
      });
    });
  });
  return result;
}

/** `M_j(T) = S_j e^{−2πi k·T} + c.c.` with `S = Σ a e`, for every cell. */
function fieldOf(read: FloatModes, supercell: Supercell, amplitudes: Amplitudes, options: FieldOptions): Field {
  const atoms = read.positions.length;
  const re = new Float64Array(3 * atoms);
  const im = new Float64Array(3 * atoms);
  const side = options.conjugateModes === true ? -1 : 1;
  read.modes.forEach((list, irrep) => {
    list.forEach((mode, at) => {
      const [x, y] = (amplitudes[irrep] as Amplitudes[number])[at] as readonly [number, number];
      for (let index = 0; index < re.length; index++) {
        const [u, v] = [mode.real[index] as number, side * (mode.imaginary[index] as number)];
        re[index] = (re[index] as number) + x * u - y * v;
        im[index] = (im[index] as number) + x * v + y * u;
      }
    });
  });
  const [first, second, third] = supercell.periods;
  const moments = new Float64Array(first * second * third * 3 * atoms);
  for (let cell = 0; cell < first * second * third; cell++) {
    const turns = inner(supercell.turns, coordinatesOf(supercell, cell));
    const angle = (options.phaseSign ?? -1) * 2 * Math.PI * turns;
    const [cosine, sine] = [2 * Math.cos(angle), 2 * Math.sin(angle)];
    for (let index = 0; index < re.length; index++)
      moments[cell * re.length + index] = (re[index] as number) * cosine - (im[index] as number) * sine;
  }
  return { supercell, atoms, moments };
}

function coordinatesOf({ periods }: Supercell, cell: number): [number, number, number] {
  const [first, second] = periods;
  return [cell % first, Math.floor(cell / first) % second, Math.floor(cell / (first * second))];
}

function cellAt({ periods }: Supercell, coordinates: readonly number[]): number {
  const wrapped = coordinates.map((value, axis) => {
    const period = periods[axis] as number;
    return ((value % period) + period) % period;
  });
  return (wrapped[0] as number) + periods[0] * ((wrapped[1] as number) + periods[1] * (wrapped[2] as number));
}

function chosenCells({ periods }: Supercell, most: number, random: Random): number[] {
  const all = periods[0] * periods[1] * periods[2];
  if (all <= most) return Array.from({ length: all }, (_, cell) => cell);
  return Array.from({ length: most }, () => random.below(all));
}

/** The largest difference between `expected` and g applied to `field`, over the chosen cells. */
function differenceAfter(
  read: FloatModes,
  field: Field,
  expected: Field,
  operator: FloatOperator,
  cells: readonly number[],
): number {
  const { group } = read.irreps;
  const back = inverse(operator);
  const sources = landings(group, back, read.positions).map(({ target, shift }) => ({
    target,
    shift: wholeCoordinates(group, shift),
  }));
  const images = group.basis.map((vector) => wholeCoordinates(group, turnColumn(back.rotation, vector)));
  const matrix = vectorMatrix(operator, read.axial);
  let largest = 0;
  for (const cell of cells) {
    const [a, b, c] = coordinatesOf(field.supercell, cell);
    sources.forEach(({ target, shift }, atom) => {
      const from = shift.map(
        (value, axis) => value + a * at(images, 0, axis) + b * at(images, 1, axis) + c * at(images, 2, axis),
      );
      const start = 3 * (cellAt(field.supercell, from) * field.atoms + target);
      const moved = turnColumn(matrix, [at3(field, start), at3(field, start + 1), at3(field, start + 2)]);
      for (let axis = 0; axis < 3; axis++) {
        const error = Math.abs((moved[axis] as number) - at3(expected, 3 * (cell * field.atoms + atom) + axis));
        if (!(error <= largest)) largest = Number.isNaN(error) ? Number.POSITIVE_INFINITY : error;
      }
    });
  }
  return largest;
}

function at(rows: readonly (readonly number[])[], row: number, column: number): number {
  return rows[row]?.[column] as number;
}

function at3(field: Field, index: number): number {
  return field.moments[index] as number;
}

function wholeCoordinates(group: FloatGroup, vector: readonly number[]): number[] {
  const whole = latticeCoordinates(group, vector);
  if (whole === null) throw new Error(`${vector} is no lattice vector`);
  return whole;
}
