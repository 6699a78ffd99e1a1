import { constantRoot, waveTimesColumn } from "../irreps/index.js";
import type { WaveVector } from "../kvectors/index.js";
import type { SuperspaceOperator } from "../magneticgroups/index.js";
import {
  addCyclotomic,
  addForms,
  type Cyclotomic,
  conjugateCyclotomic,
  constantForm,
  cyclotomicNumbers,
  cyclotomicOne,
  cyclotomicZero,
  dot,
  isCyclotomicZero,
  multiplyCyclotomic,
  negateCyclotomic,
  nullSpace,
  type Rational,
  type RationalVector,
  reducedEchelon,
  reduceOrder,
  rootOfUnity,
  subtract,
  subtractCyclotomic,
  subtractForms,
  subtractVectors,
  vectorFrom,
} from "../numbers/index.js";
import { fromPrimitiveColumn, type SpaceGroup, type SymmetryOperator, translationOf } from "../spacegroups/index.js";
import { imaginaryPart, realPart } from "./fixed-vectors.js";
import { axialMatrix, dotCyclotomic, type SiteFrame } from "./site-frames.js";
import { type SparseRow, sparseEchelon } from "./sparse-echelon.js";

/** A superspace operator with the index of its operator in the group, and its phase with θ counted as half a turn. */
export interface PlacedSuperspace {
  readonly index: number;
  readonly operator: SuperspaceOperator;
  readonly turns: Rational;
}

/** An orbit of atoms under the operators, with the amplitudes (cosine x y z, sine x y z) allowed on its first atom, as A'. */
export interface ModulatedOrbit {
  readonly atom: number;
  readonly members: number;
  readonly allowed: readonly (readonly Cyclotomic[])[];
  readonly pivots: readonly number[];
}

/**
 * The complex amplitude A_j of `M_j(x₄) = A_j e^{−2πi x₄} + c.c.` is moved as `A_j' = e^{2πi(δ + H·r_j)} det(R) R A_j` (θ in
 * δ), conjugated first where ε = −1. Here `A'_j = A_j e^{−2πi k_c·r_j}` is used, k_c the constant part of k: with
 * `g r_j = r_j' + a` the phase becomes `δ − k_c·(t − a)`, a short fraction at any position, and nothing depends on the
 * letters of k.
 */
function factorOn(group: SpaceGroup, k: WaveVector, frame: SiteFrame, own: PlacedSuperspace, atom: number): Cyclotomic {
  const shift = fromPrimitiveColumn(group.lattice, vectorFrom(frame.shifts[own.index]?.[atom] as readonly number[]));
  const step = subtractVectors(translationOf(group.operators[own.index] as SymmetryOperator), shift);
  return rootOfUnity(subtract(own.turns, dot(constantPart(k), step)));
}

/** k with its letters left out. */
export function constantPart(k: WaveVector): RationalVector {
  return [k.components[0].constant, k.components[1].constant, k.components[2].constant];
}

export function modulatedOrbits(
  group: SpaceGroup,
  k: WaveVector,
  frame: SiteFrame,
  operators: readonly PlacedSuperspace[],
): ModulatedOrbit[] {
  const seen = new Set<number>();
  return frame.orbit.positions.flatMap((_, atom): ModulatedOrbit[] => {
    if (seen.has(atom)) return [];
    const images = operators.map(({ index }) => frame.images[index]?.[atom] as number);
    for (const image of images) seen.add(image);
    const equations = operators.flatMap((own, place) =>
      images[place] === atom ? siteEquations(group, own, factorOn(group, k, frame, own, atom)) : [],
    );
    const basis = nullSpace(equations, 6, cyclotomicNumbers, cyclotomicZero, cyclotomicOne);
    const { rows, pivots } = reducedEchelon(basis, cyclotomicNumbers);
    return [{ atom, members: new Set(images).size, allowed: rows.map((row) => row.map(reduceOrder)), pivots }];
  });
}

/** Rows of `L − 1` for the real map L of (cosine, sine) amplitudes: A' = c M A or c M A*. */
function siteEquations(group: SpaceGroup, { index, operator }: PlacedSuperspace, factor: Cyclotomic): Cyclotomic[][] {
  const matrix = axialMatrix(group, index);
  const [re, im] = [realPart(factor), imaginaryPart(factor)];
  const sign = operator.epsilon;
  return [0, 1].flatMap((part) =>
    [0, 1, 2].map((row) =>
      Array.from({ length: 6 }, (_, column) => {
        const entry = matrix[row]?.[column % 3] as Cyclotomic;
        // (Re c, −Im c; Im c, Re c) on (C, ε S).
        const scale = column < 3 ? (part === 0 ? re : im) : signed(part === 0 ? negateCyclotomic(im) : re, sign);
        const value = multiplyCyclotomic(scale, entry);
        return 3 * part + row === column ? reduceOrder(subtractCyclotomic(value, cyclotomicOne)) : reduceOrder(value);
      }),
    ),
  );
}

function signed(value: Cyclotomic, sign: 1 | -1): Cyclotomic {
  return sign === 1 ? value : negateCyclotomic(value);
}

/** Per mode of an irrep the amplitudes A'_j of all atoms up to one common phase per copy, free of the letters of k. */
export function amplitudeModes(k: WaveVector, frame: SiteFrame, label: string): Cyclotomic[][][] {
  const part = frame.modes.irreps.find(({ irrep }) => irrep.label === label);
  if (part === undefined) return [];
  const constants = constantPart(k);
  const running = frame.orbit.positions.map((position) =>
    subtractForms(waveTimesColumn(k, position), constantForm(dot(constants, position))),
  );
  const references = new Map<number, ReturnType<typeof addForms>>();
  return part.modes.map((mode) =>
    mode.moments.map(({ phase, vector }, atom) => {
      if (vector.every(isCyclotomicZero)) return [cyclotomicZero, cyclotomicZero, cyclotomicZero];
      const total = addForms(phase, running[atom] as typeof phase);
      const reference = references.get(mode.copy) ?? total;
      references.set(mode.copy, reference);
      const root = constantRoot(subtractForms(total, reference));
      return vector.map((entry) => multiplyCyclotomic(root, entry));
    }),
  );
}

/**
 * The amplitudes of some irreps that the operators leave unchanged, on the first atoms of the orbits: rows are free real
 * amplitudes, six columns (cosine, sine) per orbit. The mean over the operators of every mode, times 1 and i.
 */
export function modulatedRows(
  group: SpaceGroup,
  k: WaveVector,
  frame: SiteFrame,
  operators: readonly PlacedSuperspace[],
  orbits: readonly ModulatedOrbit[],
  modes: readonly (readonly (readonly Cyclotomic[])[])[],
): SparseRow[] {
  const matrices = operators.map(({ index }) => axialMatrix(group, index));
  const i = rootOfUnity([1, 4]);
  const rows = modes.flatMap((mode) =>
    [cyclotomicOne, i].map((factor) => {
      const row = new Map<number, Cyclotomic>();
      orbits.forEach(({ atom }, number) => {
        let mean: Cyclotomic[] = [cyclotomicZero, cyclotomicZero, cyclotomicZero];
        operators.forEach((own, place) => {
          const source = frame.images[own.index]?.indexOf(atom) as number;
          const start = mode[source] as readonly Cyclotomic[];
          if (start.every(isCyclotomicZero)) return;
          const scaled = start.map((entry) => {
            const value = multiplyCyclotomic(factor, entry);
            return own.operator.epsilon === 1 ? value : conjugateCyclotomic(value);
          });
          const phase = factorOn(group, k, frame, own, source);
          mean = mean.map((entry, axis) =>
            addCyclotomic(
              entry,
              multiplyCyclotomic(phase, dotCyclotomic(matrices[place]?.[axis] as Cyclotomic[], scaled)),
            ),
          );
        });
        mean.forEach((entry, axis) => {
          const [re, im] = [realPart(entry), imaginaryPart(entry)];
          if (!isCyclotomicZero(re)) row.set(6 * number + axis, re);
          if (!isCyclotomicZero(im)) row.set(6 * number + 3 + axis, im);
        });
      });
      return row;
    }),
  );
  return sparseEchelon(rows.filter((row) => row.size > 0));
}
