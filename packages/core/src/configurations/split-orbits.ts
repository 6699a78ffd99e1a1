import {
  type Cyclotomic,
  cyclotomicFromRational,
  multiplyMatrices,
  negate,
  nullSpace,
  one,
  type Rational,
  type RationalMatrix,
  rational,
  rationalField,
  subtract,
  zero,
} from "../numbers/index.js";
import { rotationOf, type SymmetryOperator } from "../spacegroups/index.js";
import { operatorOf, properSign, timesColumnIntegers } from "./parent-quotient.js";
import type { SiteFrame } from "./site-frames.js";
import { cellNumber, type Stabilizer } from "./stabilizer.js";

/** An orbit of atoms under a magnetic group, by its first atom. */
export interface SplitOrbit {
  /** Atom of the parent orbit and cell (primitive basis) of the representative. */
  readonly atom: number;
  readonly cell: readonly number[];
  /** Atoms of one magnetic lattice cell on the orbit. */
  readonly members: number;
  /**
   * Basis of the moments that the magnetic group allows on the representative, in lattice components of the parent:
   * echelon form.
   */
  readonly allowed: readonly (readonly Rational[])[];
}

/** The atoms of one site split into orbits of the stabilizer, exact. */
export function splitOrbits(stabilizer: Stabilizer, frame: SiteFrame, axes: AxesOfMoments): SplitOrbit[] {
  const { quotient, cells, cosets } = stabilizer;
  const { rotations } = quotient.group.primitive;
  const atoms = frame.orbit.positions.length;
  const moves = cosets.map((element) => {
    const operator = operatorOf(quotient, element);
    return {
      operator,
      timeReversal: element.timeReversal,
      rotation: rotations[operator] as readonly number[],
      translation: quotient.translations[element.translation] as readonly number[],
    };
  });
  const seen = new Set<number>();
  const result: SplitOrbit[] = [];
  for (let atom = 0; atom < atoms; atom++)
    cells.forEach((cell, cellIndex) => {
      if (seen.has(cellIndex * atoms + atom)) return;
      const fixing: { operator: number; timeReversal: 1 | -1 }[] = [];
      const members = new Set<number>();
      for (const { operator, timeReversal, rotation, translation } of moves) {
        const moved = timesColumnIntegers(rotation, cell);
        const shift = frame.shifts[operator]?.[atom] as readonly number[];
        const target = frame.images[operator]?.[atom] as number;
        const number =
          cellNumber(
            stabilizer,
            moved.map((entry, axis) => entry + (shift[axis] as number) + (translation[axis] as number)),
          ) *
            atoms +
          target;
        members.add(number);
        if (number === cellIndex * atoms + atom) fixing.push({ operator, timeReversal });
      }
      for (const member of members) seen.add(member);
      result.push({ atom, cell, members: members.size, allowed: axes.allowed(fixing) });
    });
  return result;
}

/** What moments operators allow, with `det(R) R` of each operator in the axes that moments are given in. */
export interface AxesOfMoments {
  /** From parent components to those of the axes. */
  readonly fromParent: RationalMatrix;
  readonly allowed: (fixing: readonly { operator: number; timeReversal: 1 | -1 }[]) => readonly (readonly Rational[])[];
}

/** Moment components along axes `(a,b,c) P`: `m' = P⁻¹ m`, and `R' = P⁻¹ R P`. */
export function momentAxes(
  operators: readonly SymmetryOperator[],
  rotations: readonly (readonly number[])[],
  matrix: RationalMatrix,
  inverse: RationalMatrix,
): AxesOfMoments {
  const turned = new Map<number, RationalMatrix>();
  const rotationIn = (operator: number): RationalMatrix => {
    const known = turned.get(operator);
    if (known !== undefined) return known;
    const made = multiplyMatrices(
      multiplyMatrices(inverse, rotationOf(operators[operator] as SymmetryOperator)),
      matrix,
    );
    turned.set(operator, made);
    return made;
  };
  return {
    fromParent: inverse,
    allowed: (fixing) => {
      const equations = fixing.flatMap(({ operator, timeReversal }) => {
        const negative = properSign(rotations[operator] as readonly number[]) * timeReversal < 0;
        return rotationIn(operator).map((row, index) =>
          row.map((entry, column) => subtract(negative ? negate(entry) : entry, index === column ? one : zero)),
        );
      });
      return nullSpace(equations, 3, rationalField, zero, one);
    },
  };
}

export function asCyclotomic(matrix: RationalMatrix): Cyclotomic[][] {
  return matrix.map((row) => row.map(([top, bottom]) => cyclotomicFromRational(rational(top, bottom))));
}
