import { configurationsOf } from "@kvane/core/configurations";
import {
  addSquares,
  arrangementWith,
  basisFactors,
  configurationSpaces,
  lineMembers,
  lineSquares,
  type MomentSpace,
  magneticFormFactor,
  magneticLengthPerMagneton,
  prepareSpace,
  quadraticForm,
  scatteringGeometry,
  type Triple,
} from "@kvane/core/diffraction";
import { smallIrreps } from "@kvane/core/irreps";
import { numericWaveVector, type WaveVector } from "@kvane/core/kvectors";
import { siteModes } from "@kvane/core/modes";
import { type SatelliteLine, satelliteLines } from "@kvane/core/reflections";
import { type Cell, type SpaceGroup, siteOrbit } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import type { LinearForm } from "#core/numbers/index.js";
import { apply, floatGroup, inner, plus, turnColumn, turnRow } from "../support/float-group.js";
import { groupOf } from "../support/parsed-groups.js";
import { seeded } from "../support/random.js";
import { randomCell } from "../support/random-cells.js";
import { magnetonLength, type SupercellAtom, supercellSquare } from "../support/supercell-sum.js";
import { site, wave } from "../support/written.js";

/** |F⊥|² at H + k of a wave for all amplitudes 1, 2, 3, … */
function squareAt(
  space: MomentSpace,
  group: SpaceGroup,
  cell: Cell,
  which: number,
  q: Triple,
  amplitudes: readonly number[],
): number {
  const prepared = prepareSpace(scatteringGeometry(group, cell), space);
  const matrix = new Float64Array(space.basis.length ** 2);
  addSquares(matrix, basisFactors(prepared, which, q), space.basis.length, 1);
  return quadraticForm(matrix, amplitudes);
}

const cases: readonly (readonly [string, string, string, "pair" | "all"])[] = [
  ["F m -3 m", "1/2 1/2 1/2", "0 0 0", "pair"],
  ["F m -3 m", "0 0 1", "0 0 0", "all"],
  ["P b n m", "0 0 0", "1/2 0 0", "pair"],
  ["P n m a", "0 1/2 0", "0 0 0", "pair"],
  ["R -3 m :H", "0 0 3/2", "0 1/2 1/2", "pair"],
  ["P -3 m 1", "1/3 1/3 0", "0 0 0", "pair"],
  ["P 2/c", "1/4 1/2 1/2", "1/2 0.685 1/4", "pair"],
  ["P 63 c m", "0 0 0", "1/3 0 0", "pair"],
];

describe("configurations: the Fourier components of the adapter", () => {
  test.for(cases)("%s, k (%s), site %s, arms %s", async ([name, k, at, arms]) => {
    const random = seeded(31);
    const group = groupOf(name);
    const cell = randomCell(group, random, 90);
    const waveVector = wave(k);
    const irreps = smallIrreps(group, waveVector);
    const modes = siteModes(group, irreps, siteOrbit(group, site("M", at), null));
    const set = await configurationsOf(group, irreps, [modes], cell, { arms });
    const formFactor = magneticFormFactor({ constant: 1 });
    const spaces = configurationSpaces(set, cell, [{ modes, formFactor }]);
    expect(spaces.length).toBeGreaterThan(0);
    const { basis, operators } = floatGroup(group);
    const geometry = scatteringGeometry(group, cell);
    for (const [index, space] of spaces.slice(0, 4).entries()) {
      const configuration = set.configurations[index];
      if (!configuration) throw new Error("a configuration is missing");
      // Amplitudes of the adapter are scaled ones: the example arrangement fixes what they are.
      const amplitudes = space.basis.map(() => 0.5 + random.next());
      const arrangement = arrangementWith(space, amplitudes);
      const members = lineMembers(group, waveVector);
      const line = satelliteLines(group, cell, waveVector, { qMax: 4 })[3] as SatelliteLine;
      const [first] = members.of(line.h, line.sign);
      const q = space.waves.map((one) => members.onArm([first as Triple], one)[0] as Triple);
      const atoms = arrangement.waves.map(({ components }) =>
        components.map(
          ({ real, imaginary }, atom): SupercellAtom => ({
            position: arrangement.atoms[atom]?.position as Triple,
            real,
            imaginary,
            factor: () => 1,
          }),
        ),
      );
      const waves = arrangement.waves.map(({ k: arm, halfLattice }) => ({
        k: numericWaveVector(arm) as Triple,
        halfLattice,
      }));
      const scale = (magneticLengthPerMagneton / magnetonLength) ** 2;
      q.forEach((vector, which) => {
        const own = squareAt(space, group, cell, which, vector, amplitudes);
        const expected = scale * supercellSquare(geometry.cell, basis, waves, atoms, vector);
        expect(Math.abs(own - expected)).toBeLessThan(1e-9 * Math.max(1, expected));
      });
      // Invariance: an operator of the magnetic group leaves |F⊥|² at Q and Q R alike, R of the operator.
      for (const { operator } of configuration.magneticGroup.operators) {
        const rotation = operator.rotation.map((entry) => entry / operator.rotationDenominator);
        space.waves.forEach((waveHere, which) => {
          const start = members.onArm([first as Triple], waveHere)[0] as Triple;
          const image = turnRow([...start], rotation) as unknown as Triple;
          const found = space.waves.findIndex(({ k: arm }) => onLattice(basis, image, arm, 1));
          const opposite = space.waves.findIndex(({ k: arm }) => onLattice(basis, image, arm, -1));
          const there =
            found >= 0
              ? squareAt(space, group, cell, found, image, amplitudes)
              : squareAt(
                  space,
                  group,
                  cell,
                  opposite,
                  image.map((entry) => 0 - entry) as unknown as Triple,
                  amplitudes,
                );
          expect(there).toBeCloseTo(squareAt(space, group, cell, which, start, amplitudes), 9);
        });
      }
      expect(
        fieldProblems(space, amplitudes, configuration.magneticGroup.operators, basis, lengthsOf(geometry.cell)),
      ).toEqual([]);
      expect(operators.length).toBeGreaterThan(0);
    }
  });

  test.for([
    ["P b n m", [0, 1, 0], "1/2 0 0", 0.28],
    ["P n m a", [0, 1, 0], "0 0 0", 0.472],
    ["C 2/m", [0, 1, 0], "0.1 0.2 0.3", 0.21],
  ] as const)(
    "%s, k along %s: a modulated configuration is left unchanged by its operators",
    async ([name, along, at, value]) => {
      const group = groupOf(name);
      const cell = randomCell(group, seeded(5), 90);
      const form = (entry: number): LinearForm => ({
        constant: [0, 1],
        coefficients: [
          [entry, 1],
          [0, 1],
          [0, 1],
        ],
      });
      const k: WaveVector = {
        components: [form(along[0]), form(along[1]), form(along[2])],
        values: [value],
        uncertainties: [null],
      };
      const irreps = smallIrreps(group, k);
      const modes = siteModes(group, irreps, siteOrbit(group, site("M", at), null));
      const set = await configurationsOf(group, irreps, [modes], cell);
      expect(set.modulated.length).toBeGreaterThan(0);
      const spaces = configurationSpaces(set, cell, [{ modes, formFactor: magneticFormFactor({ constant: 1 }) }]);
      const { basis } = floatGroup(group);
      const lengths = lengthsOf(scatteringGeometry(group, cell).cell);
      for (const [index, space] of spaces.entries()) {
        const { atoms, waves } = arrangementWith(
          space,
          space.basis.map((_, at2) => 1 + 0.3 * at2),
        );
        const numeric = numericWaveVector(waves[0]?.k as WaveVector) as Triple;
        const components = waves[0]?.components ?? [];
        // M_j(x₄) = S e^{2πi k·r} e^{−2πi x₄} + c.c., lattice components.
        const momentOf = (atom: number, x4: number): number[] => {
          const { real, imaginary } = components[atom] as { real: Triple; imaginary: Triple };
          const angle = 2 * Math.PI * (inner(numeric, [...(atoms[atom]?.position ?? [])]) - x4);
          return lengths.map(
            (length, axis) =>
              (2 * ((real[axis] as number) * Math.cos(angle) - (imaginary[axis] as number) * Math.sin(angle))) / length,
          );
        };
        let largest = 0;
        for (const { operator, timeReversal, epsilon, shift, delta } of set.modulated[index]?.superspace.operators ??
          []) {
          const rotation = operator.rotation.map((entry) => entry / operator.rotationDenominator);
          const translation = operator.translation.map((entry) => entry / operator.translationDenominator);
          const sign = timeReversal * Math.round(determinantOf(rotation));
          atoms.forEach(({ position }, atom) => {
            const image = apply({ rotation, translation }, [...position]);
            const target = atoms.findIndex(({ position: other }) =>
              isInLattice(
                basis,
                image.map((entry, axis) => entry - (other[axis] as number)),
              ),
            );
            for (const x4 of [0, 0.13, 0.41]) {
              const moved =
                epsilon * x4 +
                inner(
                  shift.map(([top, bottom]) => top / bottom),
                  [...position],
                ) +
                delta[0] / delta[1];
              const expected = turnColumn(rotation, momentOf(atom, x4)).map((entry) => sign * entry);
              momentOf(target, moved).forEach((entry, axis) => {
                largest = Math.max(largest, Math.abs(entry - (expected[axis] as number)));
              });
            }
          });
        }
        expect(largest).toBeLessThan(1e-9);
        const lines = lineSquares(group, cell, k, { atoms, waves }, { qMax: 3 });
        expect(lines.some(({ square }) => square > 1e-3)).toBe(true);
      }
    },
  );
});

function lengthsOf(cell: Cell): readonly number[] {
  return [cell.a, cell.b, cell.c];
}

function onLattice(basis: readonly (readonly number[])[], q: Triple, k: WaveVector, sign: 1 | -1): boolean {
  const numeric = numericWaveVector(k) as Triple;
  return basis.every((vector) => {
    const turns = inner(
      vector,
      q.map((entry, axis) => sign * entry - (numeric[axis] as number)),
    );
    return Math.abs(turns - Math.round(turns)) < 1e-6;
  });
}

/** Real moments at any position from the Fourier components, and whether every operator carries the field into itself. */
function fieldProblems(
  space: MomentSpace,
  amplitudes: readonly number[],
  operators: readonly {
    readonly operator: {
      readonly rotation: readonly number[];
      readonly rotationDenominator: number;
      readonly translation: readonly number[];
      readonly translationDenominator: number;
    };
    readonly timeReversal: 1 | -1;
  }[],
  basis: readonly (readonly number[])[],
  lengths: readonly number[],
): string[] {
  const { atoms, waves } = arrangementWith(space, amplitudes);
  const momentAt = (position: readonly number[]): number[] => {
    for (const [atom, { position: own }] of atoms.entries()) {
      const shift = position.map((entry, axis) => entry - (own[axis] as number));
      if (!isInLattice(basis, shift)) continue;
      const moment = [0, 0, 0];
      for (const { k, halfLattice, components } of waves) {
        const angle = -2 * Math.PI * inner(numericWaveVector(k) as Triple, shift);
        const { real, imaginary } = components[atom] as { real: Triple; imaginary: Triple };
        for (let axis = 0; axis < 3; axis++)
          moment[axis] =
            (moment[axis] as number) +
            ((halfLattice ? 1 : 2) *
              ((real[axis] as number) * Math.cos(angle) - (imaginary[axis] as number) * Math.sin(angle))) /
              (lengths[axis] as number);
      }
      return moment;
    }
    throw new Error(`no atom at ${position}`);
  };
  const problems: string[] = [];
  const cells = [
    [0, 0, 0],
    basis[0] as readonly number[],
    plus(basis[1] as readonly number[], basis[2] as readonly number[]),
  ];
  for (const { operator, timeReversal } of operators) {
    const rotation = operator.rotation.map((entry) => entry / operator.rotationDenominator);
    const translation = operator.translation.map((entry) => entry / operator.translationDenominator);
    const determinant = Math.round(determinantOf(rotation));
    for (const { position } of atoms)
      for (const cell of cells) {
        const here = plus(position, cell);
        const expected = turnColumn(rotation, momentAt(here)).map((entry) => timeReversal * determinant * entry);
        const there = momentAt(apply({ rotation, translation }, here));
        if (there.some((entry, axis) => Math.abs(entry - (expected[axis] as number)) > 1e-9))
          problems.push(`${rotation} ${translation} ${timeReversal} at ${here}`);
      }
  }
  return problems.slice(0, 3);
}

function isInLattice(basis: readonly (readonly number[])[], shift: readonly number[]): boolean {
  const [a, b, c] = basis as [number[], number[], number[]];
  const cross = (p: number[], q: number[]): number[] => [
    (p[1] as number) * (q[2] as number) - (p[2] as number) * (q[1] as number),
    (p[2] as number) * (q[0] as number) - (p[0] as number) * (q[2] as number),
    (p[0] as number) * (q[1] as number) - (p[1] as number) * (q[0] as number),
  ];
  const volume = inner(a, cross(b, c));
  return [cross(b, c), cross(c, a), cross(a, b)].every((row) => {
    const turns = inner(row, shift) / volume;
    return Math.abs(turns - Math.round(turns)) < 1e-6;
  });
}

function determinantOf(m: readonly number[]): number {
  const [a, b, c, d, e, f, g, h, i] = m as [number, number, number, number, number, number, number, number, number];
  return a * (e * i - f * h) - b * (d * i - f * g) + c * (d * h - e * g);
}
