import {
  exactWaveVector,
  numericWaveVector,
  parseWaveVector,
  placeWaveVector,
  type WaveVector,
} from "@kvane/core/kvectors";
import { nuclearLines, type SatelliteLine, satelliteLines } from "@kvane/core/reflections";
import {
  type Cell,
  changeBasis,
  parseBasisChange,
  parseGroup,
  type SpaceGroup,
  tabulatedSettings,
} from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { floatGroup, isReciprocalVector, minus, plus, turnRow } from "../support/float-group.ts";
import { lengthOf, reciprocalAxes, twinLines } from "../support/line-twin.ts";
import { type Random, seeded } from "../support/random.ts";
import { randomCell } from "../support/random-cells.ts";
import { reduced } from "../support/written.ts";

type Vector = [number, number, number];

/** All images of k under the rotations, one of each pair ±k modulo L*. */
function armsOf(group: SpaceGroup, k: readonly number[]): Vector[] {
  const float = floatGroup(group);
  const arms: Vector[] = [];
  for (const { rotation } of float.operators) {
    const image = turnRow(k, rotation) as Vector;
    const known = arms.some(
      (arm) => isReciprocalVector(float, minus(image, arm)) || isReciprocalVector(float, plus(image, arm)),
    );
    if (!known) arms.push(image);
  }
  return arms;
}

/** Multiplicities of all lines at one position, added. */
function shells(lines: readonly SatelliteLine[], of: (line: SatelliteLine) => number): { q: number; count: number }[] {
  const found: { q: number; count: number }[] = [];
  for (const line of lines) {
    const last = found.at(-1);
    if (last && line.q - last.q < 1e-7) last.count += of(line);
    else found.push({ q: line.q, count: of(line) });
  }
  return found;
}

function expectSame(
  found: readonly { q: number; count: number }[],
  expected: readonly { q: number; count: number }[],
  what: string,
): void {
  expect(
    found.map(({ count }) => count),
    what,
  ).toEqual(expected.map(({ count }) => count));
  found.forEach(({ q }, index) => {
    expect(Math.abs(q - (expected[index]?.q as number)), what).toBeLessThan(1e-8);
  });
}

/** A fraction, or a measured decimal that no symmetry pins. */
function randomK(group: SpaceGroup, random: Random): WaveVector {
  if (random.next() < 0.6) {
    const denominator = random.pick([1, 2, 3, 4, 6]);
    const entry = (): [number, number] => reduced(random.below(2 * denominator) - denominator, denominator);
    return exactWaveVector([entry(), entry(), entry()]);
  }
  const entry = (): string => random.pick(["0", "1/2", "1/3", `0.${100 + random.below(900)}7`]);
  return placeWaveVector(group, parseWaveVector([entry(), entry(), entry()].join(","))).k;
}

function centringOf(group: SpaceGroup): Vector[] {
  return group.lattice.vectors.map((vector) => vector.map((entry) => entry / group.lattice.denominator) as Vector);
}

describe("satellites against every h k l of a box", () => {
  const random = seeded(20_240_602);
  const settings = tabulatedSettings();
  const cases = Array.from({ length: 120 }, (_, index) => {
    const hall = random.pick(settings).hall;
    return { name: `${index}: ${hall}`, hall, seed: random.below(1e9) };
  });

  test.each(cases)("$name", ({ hall, seed }) => {
    const own = seeded(seed);
    const group = parseGroup(`hall:${hall}`);
    const cell = randomCell(group, own, 60 + 120 * own.next());
    const k = randomK(group, own);
    const numeric = numericWaveVector(k) as Vector;
    const qMax = 2.2 + own.next();
    const lines = satelliteLines(group, cell, k, { qMax });
    const what = `${hall} k = ${numeric.join(", ")}`;
    const axes = reciprocalAxes(cell);
    for (const { h, sign, q } of lines) {
      // For sign 0, where both signs are the same set, H + k is meant.
      const vector = h.map((entry, axis) => entry + (sign === -1 ? -1 : 1) * (numeric[axis] as number));
      expect(Math.abs(lengthOf(axes, vector) - q), `${what}: ${h.join(" ")}`).toBeLessThan(1e-8);
    }
    const centring = centringOf(group);
    expectSame(
      shells(lines, (line) => line.multiplicity),
      twinLines(cell, centring, [numeric], qMax),
      `${what}, one domain`,
    );
    expectSame(
      shells(lines, (line) => line.multiplicityAllArms),
      twinLines(cell, centring, armsOf(group, numeric), qMax),
      `${what}, all arms`,
    );
    expectSame(
      shells(
        nuclearLines(group, cell, { qMax }).map((line) => ({ ...line, sign: 0, arm: 0, multiplicityAllArms: 0 })),
        (line) => line.multiplicity,
      ),
      twinLines(cell, centring, [[0, 0, 0]], qMax),
      `${hall} nuclear`,
    );
  });
});

describe("a change of basis", () => {
  const cases: readonly [string, string][] = [
    ["F m -3 m", "1/2b+1/2c,1/2a+1/2c,1/2a+1/2b;0,0,0"],
    ["F m -3 m", "a/2+b/2-c,-a/2+b/2,2c;0,0,0"],
    ["C 1 2/c 1", "-a-c,b,a;1/4,1/4,0"],
    ["R -3 m :H", "2/3a+1/3b+1/3c,-1/3a+1/3b+1/3c,-1/3a-2/3b+1/3c;0,0,0"],
    ["P n m a", "a,b,2c;0,0,1/4"],
    ["P 63/m m c", "a+5b,b,c;0,0,0"],
    // Integer vectors no longer belong to L: H may be half-integer, rotations fractional.
    ["P n m a", "1/2a,b,c;0,0,0"],
    ["P m -3 m", "1/2a,b,c;0,0,0"],
  ];

  test.each(cases)("%s (%s): same positions, multiplicities and absences", (symbol, text) => {
    const random = seeded(7);
    const group = parseGroup(symbol);
    const cell = randomCell(group, random, 150);
    const change = parseBasisChange(text);
    const changed = changeBasis(group, change);
    const matrix = change.matrix.map((row) => row.map(([top, bottom]) => top / bottom));
    const newCell = cellAfter(cell, matrix);
    const k = (
      [
        [1, 2],
        [0, 1],
        [1, 3],
      ] as const
    ).map(([top, bottom]) => top / bottom);
    // k' = k P, exactly: denominators 6 × 6 suffice here.
    const newK = [0, 1, 2].map((column) =>
      k.reduce((sum, entry, row) => sum + entry * (matrix[row]?.[column] as number), 0),
    );
    const exact = newK.map((entry) => reduced(Math.round(entry * 36), 36)) as [
      [number, number],
      [number, number],
      [number, number],
    ];
    const before = satelliteLines(
      group,
      cell,
      exactWaveVector([
        [1, 2],
        [0, 1],
        [1, 3],
      ]),
      { qMax: 4 },
    );
    const after = satelliteLines(changed, newCell, exactWaveVector(exact), { qMax: 4 });
    expectSame(
      shells(after, (line) => line.multiplicity),
      shells(before, (line) => line.multiplicity),
      text,
    );
    expectSame(
      shells(after, (line) => line.multiplicityAllArms),
      shells(before, (line) => line.multiplicityAllArms),
      text,
    );
    const absent = (g: SpaceGroup, c: Cell): string[] =>
      nuclearLines(g, c, { qMax: 5 })
        .filter(({ extinct }) => extinct)
        .map(({ q, multiplicity }) => `${q.toFixed(6)} ${multiplicity}`)
        .sort();
    expect(absent(changed, newCell)).toEqual(absent(group, cell));
  });

  /** Lengths and angles of the axes (a, b, c) P. */
  function cellAfter(cell: Cell, matrix: readonly (readonly number[])[]): Cell {
    const angle = {
      alpha: (cell.alpha * Math.PI) / 180,
      beta: (cell.beta * Math.PI) / 180,
      gamma: (cell.gamma * Math.PI) / 180,
    };
    const metric = [
      [cell.a ** 2, cell.a * cell.b * Math.cos(angle.gamma), cell.a * cell.c * Math.cos(angle.beta)],
      [cell.a * cell.b * Math.cos(angle.gamma), cell.b ** 2, cell.b * cell.c * Math.cos(angle.alpha)],
      [cell.a * cell.c * Math.cos(angle.beta), cell.b * cell.c * Math.cos(angle.alpha), cell.c ** 2],
    ];
    const product = (i: number, j: number): number => {
      let sum = 0;
      for (let m = 0; m < 3; m++)
        for (let n = 0; n < 3; n++)
          sum += (matrix[m]?.[i] as number) * (metric[m]?.[n] as number) * (matrix[n]?.[j] as number);
      return sum;
    };
    const length = (i: number): number => Math.sqrt(product(i, i));
    const between = (i: number, j: number): number =>
      (Math.acos(product(i, j) / (length(i) * length(j))) * 180) / Math.PI;
    return {
      a: length(0),
      b: length(1),
      c: length(2),
      alpha: between(1, 2),
      beta: between(0, 2),
      gamma: between(0, 1),
    };
  }
});
