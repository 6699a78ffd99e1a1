import type { Mode, SiteModes } from "@kvane/core/modes";
import type { SpaceGroup } from "@kvane/core/spacegroups";
import { type ComplexMatrix, rank, zeroMatrix } from "./complex.js";
import {
  apply,
  determinantOf,
  type FloatGroup,
  type FloatOperator,
  inner,
  latticeCoordinates,
  letterValues,
  minus,
} from "./float-group.js";
import { type FloatIrreps, floatIrreps, phasedValue } from "./float-irreps.js";
import { overlap } from "./validate-irreps.js";

const tolerance = 1e-9;

/** A mode as 3N complex numbers: x, y, z of atom 0, then of atom 1, … */
export interface FloatMode {
  readonly real: Float64Array;
  readonly imaginary: Float64Array;
  readonly copy: number;
  readonly partner: number;
  readonly suborbit: number;
}

export interface FloatModes {
  readonly irreps: FloatIrreps;
  readonly axial: boolean;
  readonly positions: readonly (readonly number[])[];
  readonly suborbits: readonly (readonly number[])[];
  readonly multiplicities: readonly number[];
  /** Modes of each irrep, in the order of `irreps`. */
  readonly modes: readonly (readonly FloatMode[])[];
}

/** Where operator g takes the atoms of an orbit: `g r_j = r_{target} + shift`. */
export interface Landing {
  readonly target: number;
  readonly shift: readonly number[];
}

export function floatModes(group: SpaceGroup, modes: SiteModes): FloatModes {
  const positions = modes.orbit.positions.map((position) => position.map(([top, bottom]) => top / bottom));
  return {
    irreps: floatIrreps(group, modes.representations),
    axial: modes.axial,
    positions,
    suborbits: modes.suborbits,
    multiplicities: modes.irreps.map((entry) => entry.multiplicity),
    modes: modes.irreps.map((entry) => entry.modes.map(floatMode)),
  };
}

function floatMode(mode: Mode): FloatMode {
  const components = mode.moments.flatMap(({ phase, vector }) =>
    vector.map((component) => phasedValue(phase, component, letterValues)),
  );
  return {
    real: Float64Array.from(components, ([re]) => re),
    imaginary: Float64Array.from(components, ([, im]) => im),
    copy: mode.copy,
    partner: mode.partner,
    suborbit: mode.suborbit,
  };
}

/** Throws when the positions are not closed under the operator. */
export function landings(
  group: FloatGroup,
  operator: FloatOperator,
  positions: readonly (readonly number[])[],
): readonly Landing[] {
  return positions.map((position) => {
    const moved = apply(operator, position);
    const target = positions.findIndex((other) => latticeCoordinates(group, minus(moved, other)) !== null);
    if (target < 0) throw new Error(`the orbit is not closed: ${moved} is no atom`);
    return { target, shift: minus(moved, positions[target] as readonly number[]) };
  });
}

/** `R` on lattice components, times det R for moments. */
export function vectorMatrix(operator: FloatOperator, axial: boolean): number[] {
  const sign = axial ? determinantOf(operator.rotation) : 1;
  return operator.rotation.map((entry) => sign * entry);
}

/** Everything that mode vectors must obey at one k, from floats and docs/conventions.md alone. Empty is a pass. */
export function modeProblems(group: SpaceGroup, modes: SiteModes): string[] {
  const read = floatModes(group, modes);
  if (!modes.irreps.every((entry, index) => entry.irrep.label === read.irreps.labels[index]))
    return ["the irreps of the modes are not those of the representations, in order"];
  return [
    ...countProblems(read),
    ...multiplicityProblems(read),
    ...suborbitProblems(read),
    ...lawProblems(read),
    ...parameterProblems(read, modes),
  ];
}

/** Σ multiplicity × dimension = 3N, copies and partners in order, all vectors linearly independent. */
function countProblems(read: FloatModes): string[] {
  const problems: string[] = [];
  const size = 3 * read.positions.length;
  const total = read.modes.reduce((sum, list) => sum + list.length, 0);
  if (total !== size) problems.push(`${total} modes for ${size} components`);
  read.modes.forEach((list, irrep) => {
    const dimension = read.irreps.dimensions[irrep] as number;
    const inOrder = list.every(
      (mode, index) => mode.copy === Math.floor(index / dimension) + 1 && mode.partner === (index % dimension) + 1,
    );
    if (!inOrder || list.length !== dimension * (read.multiplicities[irrep] as number))
      problems.push(`${read.irreps.labels[irrep]}: modes are not multiplicity copies × partners in order`);
  });
  if (rankOf(read.modes.flat(), size) !== total) problems.push("the mode vectors are linearly dependent");
  return problems;
}

export function rankOf(vectors: readonly Pick<FloatMode, "real" | "imaginary">[], size: number): number {
  const matrix = zeroMatrix(vectors.length, size);
  vectors.forEach((vector, row) => {
    matrix.real.set(vector.real, row * size);
    matrix.imaginary.set(vector.imaginary, row * size);
  });
  return rank(matrix);
}

/** Multiplicities from the characters: `n = 1/|G| Σ χ_Γ(g) χ(g)*`. */
function multiplicityProblems(read: FloatModes): string[] {
  const { group, operators, k } = read.irreps;
  const characters = operators.map((index): [number, number] => {
    const operator = group.operators[index] as FloatOperator;
    const matrix = vectorMatrix(operator, read.axial);
    const spur = (matrix[0] as number) + (matrix[4] as number) + (matrix[8] as number);
    return landings(group, operator, read.positions).reduce<[number, number]>(
      ([re, im], { target, shift }, atom) => {
        if (target !== atom) return [re, im];
        const angle = 2 * Math.PI * inner(k, shift);
        return [re + spur * Math.cos(angle), im + spur * Math.sin(angle)];
      },
      [0, 0],
    );
  });
  return read.irreps.characters.flatMap((irrep, index) => {
    const [re, im] = overlap(characters, irrep);
    const expected = re / operators.length;
    const fits = Math.hypot(expected - (read.multiplicities[index] as number), im) < tolerance * 100;
    return fits
      ? []
      : [`${read.irreps.labels[index]}: multiplicity ${read.multiplicities[index]} instead of ${expected}`];
  });
}

/** Suborbits are the classes of atoms under the little group, and a mode lives on one of them. */
function suborbitProblems(read: FloatModes): string[] {
  const problems: string[] = [];
  const parent = read.positions.map((_, atom) => atom);
  for (const index of read.irreps.operators)
    landings(read.irreps.group, read.irreps.group.operators[index] as FloatOperator, read.positions).forEach(
      ({ target }, atom) => {
        const low = Math.min(parent[atom] as number, parent[target] as number);
        const high = Math.max(parent[atom] as number, parent[target] as number);
        parent.forEach((root, at) => {
          if (root === high) parent[at] = low;
        });
      },
    );
  const expected = [...new Set(parent)].map((root) =>
    parent.flatMap((other, atom) => (other === root ? [atom] : [])).join(),
  );
  const given = read.suborbits.map((atoms) => [...atoms].sort((a, b) => a - b).join());
  if ([...given].sort().join(";") !== [...expected].sort().join(";"))
    problems.push(`suborbits ${given.join(" ; ")} instead of ${expected.join(" ; ")}`);
  for (const mode of read.modes.flat()) {
    const own = new Set(read.suborbits[mode.suborbit] ?? []);
    const strays = read.positions.some((_, atom) => !own.has(atom) && sizeOn(mode, atom) > tolerance);
    if (strays) problems.push(`a mode of suborbit ${mode.suborbit} reaches another one`);
  }
  return problems;
}

/** Sum of the absolute components on one atom. */
function sizeOn(mode: Field, atom: number): number {
  let size = 0;
  for (let index = 3 * atom; index < 3 * atom + 3; index++)
    size += Math.abs(mode.real[index] as number) + Math.abs(mode.imaginary[index] as number);
  return size;
}

/**
 * `Γ(g) e_{c,p} = Σ_q D(g)_{qp} e_{c,q}` with `Γ(g)_{j'j} = e^{+2πi k·a} det(R) R` and `g r_j = r_{j'} + a`, for every
 * operator of the little group.
 */
export function lawProblems(read: FloatModes): string[] {
  const problems: string[] = [];
  const { group, operators } = read.irreps;
  operators.forEach((index, at) => {
    const operator = group.operators[index] as FloatOperator;
    const where = landings(group, operator, read.positions);
    const matrix = vectorMatrix(operator, read.axial);
    read.modes.forEach((list, irrep) => {
      const size = read.irreps.dimensions[irrep] as number;
      const matrixOfIrrep = read.irreps.matrices[irrep]?.[at] as ComplexMatrix;
      for (let mode = 0; mode < list.length; mode++) {
        const first = mode - (mode % size);
        const moved = actOn(list[mode] as FloatMode, where, matrix, read.irreps.k);
        const expected = mixed(list.slice(first, first + size), matrixOfIrrep, mode % size);
        const error = largestDifference(moved, expected) / largestEntry(list[mode] as FloatMode);
        if (!(error < tolerance))
          problems.push(
            `${read.irreps.labels[irrep]}: Γ(g) e ≠ Σ D e for operator ${index}, mode ${mode} (by ${error})`,
          );
      }
    });
  });
  return problems.slice(0, 20);
}

/** 3N complex components. */
export type Field = Pick<FloatMode, "real" | "imaginary">;

/** Γ(g) on 3N complex components. */
export function actOn(mode: Field, where: readonly Landing[], matrix: readonly number[], k: readonly number[]): Field {
  const real = new Float64Array(mode.real.length);
  const imaginary = new Float64Array(mode.real.length);
  for (let atom = 0; atom < where.length; atom++) {
    if (sizeOn(mode, atom) === 0) continue;
    const { target, shift } = where[atom] as Landing;
    const angle = 2 * Math.PI * inner(k, shift);
    const [cosine, sine] = [Math.cos(angle), Math.sin(angle)];
    for (let row = 0; row < 3; row++) {
      let re = 0;
      let im = 0;
      for (let axis = 0; axis < 3; axis++) {
        re += (matrix[3 * row + axis] as number) * (mode.real[3 * atom + axis] as number);
        im += (matrix[3 * row + axis] as number) * (mode.imaginary[3 * atom + axis] as number);
      }
      real[3 * target + row] = cosine * re - sine * im;
      imaginary[3 * target + row] = sine * re + cosine * im;
    }
  }
  return { real, imaginary };
}

/** Σ_q D_{q,partner} e_q. */
function mixed(partners: readonly Field[], matrix: ComplexMatrix, partner: number): Field {
  const factors = partners.map((_, row): [number, number] => {
    const at = row * matrix.columns + partner;
    return [matrix.real[at] as number, matrix.imaginary[at] as number];
  });
  return combined(partners, factors);
}

/** Σ factor × field. */
export function combined(fields: readonly Field[], factors: readonly (readonly [number, number])[]): Field {
  const length = fields[0]?.real.length ?? 0;
  const real = new Float64Array(length);
  const imaginary = new Float64Array(length);
  fields.forEach((field, row) => {
    const [re, im] = factors[row] as readonly [number, number];
    if (re === 0 && im === 0) return;
    for (let index = 0; index < length; index++) {
      const x = field.real[index] as number;
      const y = field.imaginary[index] as number;
      real[index] = (real[index] as number) + re * x - im * y;
      imaginary[index] = (imaginary[index] as number) + re * y + im * x;
    }
  });
  return { real, imaginary };
}

/** The largest difference of two components, as |Re| + |Im|; NaN counts as infinite. */
export function largestDifference(a: Field, b: Field): number {
  let largest = 0;
  for (let index = 0; index < a.real.length; index++) {
    const size =
      Math.abs((a.real[index] as number) - (b.real[index] as number)) +
      Math.abs((a.imaginary[index] as number) - (b.imaginary[index] as number));
    if (!(size <= largest)) largest = Number.isNaN(size) ? Number.POSITIVE_INFINITY : size;
  }
  return largest;
}

function largestEntry(a: Field): number {
  return largestDifference(a, { real: new Float64Array(a.real.length), imaginary: new Float64Array(a.real.length) });
}

/**
 * Atoms that stay without a moment, and the number of free real parameters of one arm: 2 × multiplicity × dimension,
 * or, where 2k ∈ L* and all S are real, the dimension of the complex span of the modes with their conjugates.
 */
function parameterProblems(read: FloatModes, modes: SiteModes): string[] {
  const problems: string[] = [];
  const size = 3 * read.positions.length;
  read.modes.forEach((list, irrep) => {
    const entry = modes.irreps[irrep];
    if (entry === undefined) return;
    const vanishing = read.positions.flatMap((_, atom) =>
      list.every((mode) => sizeOn(mode, atom) < tolerance) ? [atom] : [],
    );
    // An irrep that does not occur has no arrangement, so it lists no atoms.
    if (list.length > 0 && entry.vanishingAtoms.join() !== vanishing.join())
      problems.push(`${entry.irrep.label}: vanishing atoms ${entry.vanishingAtoms} instead of ${vanishing}`);
    const conjugates = list.map((mode) => ({ real: mode.real, imaginary: mode.imaginary.map((value) => -value) }));
    const expected =
      modes.representations.minusK === "equivalent" ? rankOf([...list, ...conjugates], size) : 2 * list.length;
    if (entry.freeParameters !== expected)
      problems.push(`${entry.irrep.label}: ${entry.freeParameters} free parameters instead of ${expected}`);
    if (entry.constraint.length !== read.positions.length && list.length > 0)
      problems.push(
        `${entry.irrep.label}: ${entry.constraint.length} constraint texts for ${read.positions.length} atoms`,
      );
  });
  return problems;
}
