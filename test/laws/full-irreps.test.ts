import { type FullIrrep, fullIrrepMatrix, fullIrreps } from "@kvane/core/irreps";
import { starModes } from "@kvane/core/modes";
import { composeOperators, type SymmetryOperator } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import type { Complex } from "../support/complex.js";
import { modesOf } from "../support/decomposition.js";
import { letterValues } from "../support/float-group.js";
import { phasedValue } from "../support/float-irreps.js";
import { groupOf } from "../support/parsed-groups.js";
import { seeded } from "../support/random.js";

const seed = 41;

/** Several arms, irreps of dimension 1 to 3, glides, centring, an odd basis, −k in the star and not. */
const cases = [
  ["P 21 3", "1/5 1/5 1/5", "0.138 0.138 0.138"],
  ["P n m a", "0 2/7 1/2", "0.1 0.2 0.3"],
  ["F m -3 m", "1/2 1/2 1/2", "0 0 0"],
  ["F d -3 m:2", "0 1 0", "1/2 1/2 1/2"],
  ["P 63/m m c", "1/3 1/3 1/5", "1/3 2/3 1/4"],
  ["I 41/a m d:2 (a-b,a+b,c;0,0,1/7)", "1/4 1/4 0", "0.1 0.2 0.3"],
] as const;

type Entry = FullIrrep["matrices"][number][number][number];
const complexOf = ({ phase, factor }: Entry): Complex => phasedValue(phase, factor, letterValues);

function times([a, b]: Complex, [c, d]: Complex): Complex {
  return [a * c - b * d, a * d + b * c];
}

const numbers = (matrix: readonly (readonly Entry[])[]) => matrix.map((row) => row.map(complexOf));

function product(a: readonly (readonly Complex[])[], b: readonly (readonly Complex[])[]): Complex[][] {
  return a.map((row) =>
    (b[0] ?? []).map((_, column) =>
      row.reduce<Complex>(
        ([re, im], entry, at) => {
          const [x, y] = times(entry, b[at]?.[column] ?? [0, 0]);
          return [re + x, im + y];
        },
        [0, 0],
      ),
    ),
  );
}

function largestDifference(a: readonly (readonly Complex[])[], b: readonly (readonly Complex[])[]): number {
  return Math.max(
    ...a.flatMap((row, i) =>
      row.map(([re, im], j) => Math.hypot(re - (b[i]?.[j]?.[0] ?? 0), im - (b[i]?.[j]?.[1] ?? 0))),
    ),
  );
}

describe("irreps of the whole space group", () => {
  test.each(cases)("%s at %s: D(g) D(h) = D(gh), whatever translation gh has", (name, k, position) => {
    const group = groupOf(name);
    const irreps = modesOf(name, k, position).representations;
    const random = seeded(seed);
    for (const [index, full] of fullIrreps(group, irreps).entries()) {
      const small = irreps.irreps[index];
      if (small === undefined) throw new Error("an irrep is missing");
      for (let sample = 0; sample < 6; sample++) {
        const [g, h] = [random.below(group.operators.length), random.below(group.operators.length)];
        const [a, b] = [g, h].map((at) => group.operators[at] as SymmetryOperator) as [
          SymmetryOperator,
          SymmetryOperator,
        ];
        const together = numbers(fullIrrepMatrix(group, irreps, small, composeOperators(a, b)));
        const apart = product(numbers(full.matrices[g] ?? []), numbers(full.matrices[h] ?? []));
        expect(largestDifference(apart, together)).toBeLessThan(1e-9);
      }
    }
  });

  test.each(cases)("%s at %s, %s: the modes of all arms transform by these matrices", (name, k, position) => {
    const group = groupOf(name);
    const modes = modesOf(name, k, position);
    const arms = starModes(group, modes);
    const atoms = modes.orbit.positions.map((row) => row.map(([top, bottom]) => top / bottom));
    const waves = arms.map(({ arm }) => arm.components.map(({ constant: [top, bottom] }) => top / bottom));
    const random = seeded(seed);
    /** `Σ S_j exp(−2πi k·T)` over the waves that are given, at atom j of the cell at T. */
    const field = (arm: number, irrep: number, mode: number, atom: number, t: readonly number[]): Complex[] => {
      const moment = arms[arm]?.irreps[irrep]?.modes[mode]?.moments[atom];
      if (moment === undefined) throw new Error("a mode is missing");
      const turns = (waves[arm] ?? []).reduce((sum, entry, axis) => sum + entry * (t[axis] as number), 0);
      const wave: Complex = [Math.cos(2 * Math.PI * turns), -Math.sin(2 * Math.PI * turns)];
      return moment.vector.map((factor) => times(complexOf({ phase: moment.phase, factor }), wave));
    };
    let compared = 0;
    for (const [irrep, full] of fullIrreps(group, modes.representations).entries()) {
      const list = modes.irreps[irrep];
      if (list === undefined || list.multiplicity === 0) continue;
      const { dimension } = list.irrep;
      for (let sample = 0; sample < 4; sample++) {
        const operator = random.below(group.operators.length);
        const [arm, copy, partner] = [
          random.below(arms.length),
          random.below(list.multiplicity),
          random.below(dimension),
        ];
        const matrix = numbers(full.matrices[operator] ?? []);
        const { rotation, translation, translationDenominator, rotationDenominator } = group.operators[
          operator
        ] as SymmetryOperator;
        const r = rotation.map((entry) => entry / rotationDenominator);
        const turn = (x: readonly number[]) =>
          [0, 1, 2].map((row) =>
            [0, 1, 2].reduce((sum, at) => sum + (r[3 * row + at] as number) * (x[at] as number), 0),
          );
        for (const [atom, place] of atoms.entries()) {
          const t = [0, 1, 2].map(() => random.below(3) - 1);
          const cell = latticePoint(name, t);
          const from = place.map((entry, axis) => entry + (cell[axis] as number));
          const to = turn(from).map((entry, axis) => entry + (translation[axis] as number) / translationDenominator);
          const moved = turnComplex(r, field(arm, irrep, copy * dimension + partner, atom, cell));
          const target = atoms.findIndex((other) =>
            isLatticePoint(
              name,
              to.map((entry, axis) => entry - (other[axis] as number)),
            ),
          );
          const shift = to.map((entry, axis) => entry - (atoms[target]?.[axis] as number));
          const sum: Complex[] = [
            [0, 0],
            [0, 0],
            [0, 0],
          ];
          for (let i = 0; i < arms.length; i++)
            for (let p = 0; p < dimension; p++) {
              const weight = matrix[i * dimension + p]?.[arm * dimension + partner] ?? [0, 0];
              for (const [axis, entry] of field(i, irrep, copy * dimension + p, target, shift).entries()) {
                const [x, y] = times(weight, entry);
                const [re, im] = sum[axis] as Complex;
                sum[axis] = [re + x, im + y];
              }
            }
          expect(largestDifference([moved], [sum])).toBeLessThan(1e-9);
          compared += 1;
        }
      }
    }
    expect(compared).toBeGreaterThan(3);
  });
});

/** det(R) R on a complex vector. */
function turnComplex(r: readonly number[], vector: readonly Complex[]): Complex[] {
  const [a = 0, b = 0, c = 0, d = 0, e = 0, f = 0, g = 0, h = 0, i = 0] = r;
  const determinant = a * (e * i - f * h) - b * (d * i - f * g) + c * (d * h - e * g);
  return [0, 1, 2].map((row) =>
    vector.reduce<Complex>(
      ([re, im], [x, y], at) => {
        const weight = determinant * (r[3 * row + at] as number);
        return [re + weight * x, im + weight * y];
      },
      [0, 0],
    ),
  );
}

/** A vector of the translation lattice from three integers. */
function latticePoint(name: string, [a = 0, b = 0, c = 0]: readonly number[]): number[] {
  const { vectors, denominator } = groupOf(name).lattice;
  return [0, 1, 2].map(
    (axis) =>
      (a * (vectors[0]?.[axis] as number) + b * (vectors[1]?.[axis] as number) + c * (vectors[2]?.[axis] as number)) /
      denominator,
  );
}

/** Whether a vector is one of the lattice: small integers that make it up exist. */
function isLatticePoint(name: string, x: readonly number[]): boolean {
  const { vectors, denominator } = groupOf(name).lattice;
  const rows = vectors.map((row) => row.map((entry) => entry / denominator));
  const cross = (a: readonly number[], b: readonly number[]) => [
    (a[1] ?? 0) * (b[2] ?? 0) - (a[2] ?? 0) * (b[1] ?? 0),
    (a[2] ?? 0) * (b[0] ?? 0) - (a[0] ?? 0) * (b[2] ?? 0),
    (a[0] ?? 0) * (b[1] ?? 0) - (a[1] ?? 0) * (b[0] ?? 0),
  ];
  const dot = (a: readonly number[], b: readonly number[]) =>
    a.reduce((sum, entry, at) => sum + entry * (b[at] ?? 0), 0);
  const [p = [], q = [], s = []] = rows;
  const volume = dot(p, cross(q, s));
  return [cross(q, s), cross(s, p), cross(p, q)].every((reciprocal) => {
    const value = dot(reciprocal, x) / volume;
    return Math.abs(value - Math.round(value)) < 1e-6;
  });
}
