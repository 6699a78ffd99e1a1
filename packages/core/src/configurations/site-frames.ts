import type { SiteModes } from "../modes/index.js";
import {
  addCyclotomic,
  type Cyclotomic,
  cyclotomicFromRational,
  cyclotomicZero,
  integerDeterminant,
  isCyclotomicZero,
  lcm,
  modulo,
  multiplyCyclotomic,
  overCommonDenominator,
  rational,
  rootOfUnity,
  safe,
} from "../numbers/index.js";
import { type SiteOrbit, type SpaceGroup, type SymmetryOperator, toPrimitiveColumn } from "../spacegroups/index.js";
import type { ArmSelection } from "./arm-selection.js";
import { plain } from "./order-parameter.js";

/** How every operator of the parent moves the atoms of one site: `g r_j = r_image[j] + shift[j]`, primitive integers. */
export interface SiteFrame {
  readonly modes: SiteModes;
  readonly orbit: SiteOrbit;
  readonly images: readonly (readonly number[])[];
  readonly shifts: readonly (readonly (readonly number[])[])[];
}

export function siteFrame(group: SpaceGroup, modes: SiteModes): SiteFrame {
  const { orbit } = modes;
  const { rotations, translations, denominator: own } = group.primitive;
  const exact = orbit.positions.map((position) => overCommonDenominator(toPrimitiveColumn(group.lattice, position)));
  const denominator = exact.reduce((common, entry) => lcm(common, entry.denominator), own);
  const atoms = exact.map((entry) => entry.numerators.map((value) => safe(value * (denominator / entry.denominator))));
  const key = (numerators: readonly number[]): string => numerators.map((entry) => modulo(entry, denominator)).join();
  const places = new Map(atoms.map((atom, index) => [key(atom), index]));
  const images: number[][] = [];
  const shifts: number[][][] = [];
  rotations.forEach((rotation, operator) => {
    const translation = translations[operator] as readonly number[];
    const moved = atoms.map((atom) =>
      [0, 1, 2].map((row) =>
        safe(
          (rotation[3 * row] as number) * (atom[0] as number) +
            (rotation[3 * row + 1] as number) * (atom[1] as number) +
            (rotation[3 * row + 2] as number) * (atom[2] as number) +
            (translation[row] as number) * (denominator / own),
        ),
      ),
    );
    const targets = moved.map((position) => places.get(key(position)) as number);
    images.push(targets);
    shifts.push(
      moved.map((position, atom) =>
        position.map(
          (entry, axis) => (entry - ((atoms[targets[atom] as number] as number[])[axis] as number)) / denominator,
        ),
      ),
    );
  });
  return { modes, orbit, images, shifts };
}

/** Fourier components of one copy: for each arm of the selection, each partner, each atom three exact numbers. */
export type CopyOnArms = readonly (readonly (readonly (readonly Cyclotomic[])[])[])[];

/**
 * The copies of one irrep carried to the chosen arms, `e^(i) = Γ(s_i) e`: on arm k_i = k S⁻¹ the component of atom j',
 * `s r_j = r_j' + a`, is `e^{2πi k_i·a} det(S) S` times that of j.
 */
export function copiesOnArms(
  group: SpaceGroup,
  selection: ArmSelection,
  frame: SiteFrame,
  label: string,
): readonly CopyOnArms[] {
  const part = frame.modes.irreps.find(({ irrep }) => irrep.label === label);
  if (part === undefined || part.multiplicity === 0) return [];
  const atoms = frame.orbit.positions.length;
  const start = part.modes.map((mode) =>
    mode.moments.map(({ phase, vector }) => vector.map((entry) => plain(phase, entry))),
  );
  return Array.from({ length: part.multiplicity }, (_, copy) =>
    selection.members.map((member, place) => {
      const operator = selection.star.representatives[member] as number;
      const matrix = axialMatrix(group, operator);
      const row = selection.rows[place] as readonly number[];
      return part.modes.flatMap((mode, number) => {
        if (mode.copy !== copy + 1) return [];
        const carried = new Array<readonly Cyclotomic[]>(atoms).fill([cyclotomicZero, cyclotomicZero, cyclotomicZero]);
        (start[number] ?? []).forEach((vector, atom) => {
          if (vector.every(isCyclotomicZero)) return;
          const shift = frame.shifts[operator]?.[atom] as readonly number[];
          const phase = waveRoot(row, shift, selection.denominator);
          carried[frame.images[operator]?.[atom] as number] = matrix.map((entries) =>
            multiplyCyclotomic(phase, dotCyclotomic(entries, vector)),
          );
        });
        return [carried];
      });
    }),
  );
}

/** `det(R) R` of an operator in the axes of the setting. */
export function axialMatrix(group: SpaceGroup, operator: number): Cyclotomic[][] {
  const { rotation, rotationDenominator } = group.operators[operator] as SymmetryOperator;
  const sign = integerDeterminant(group.primitive.rotations[operator] as readonly number[]);
  return [0, 3, 6].map((row) =>
    [0, 1, 2].map((column) =>
      cyclotomicFromRational(rational(sign * (rotation[row + column] as number), rotationDenominator)),
    ),
  );
}

export function dotCyclotomic(a: readonly Cyclotomic[], b: readonly Cyclotomic[]): Cyclotomic {
  return a.reduce(
    (sum, entry, index) => addCyclotomic(sum, multiplyCyclotomic(entry, b[index] ?? cyclotomicZero)),
    cyclotomicZero,
  );
}

/** e^{2πi k·T} for k as an integer row over `denominator` and T in the primitive basis. */
export function waveRoot(row: readonly number[], translation: readonly number[], denominator: number): Cyclotomic {
  const turns = row.reduce((sum, entry, axis) => safe(sum + entry * (translation[axis] as number)), 0);
  return rootOfUnity(rational(modulo(turns, denominator), denominator));
}
