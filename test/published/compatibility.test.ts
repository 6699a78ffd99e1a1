import { type Compatibility, compatibility, type SmallIrreps } from "@kvane/core/irreps";
import { parseWaveVector, placeWaveVector, type WaveVector } from "@kvane/core/kvectors";
import { describe, expect, test } from "vitest";
import { cyclotomicValue } from "../support/float-irreps.js";
import { groupOf } from "../support/parsed-groups.js";

/**
 * Compatibility relations of the simple cubic lattice: L. P. Bouckaert, R. Smoluchowski & E. Wigner, Phys. Rev. 50 (1936)
 * 58; tables of characters and of relations [memory 90 for both; relations worked out again by hand from the
 * characters]. Their labels are found here through the characters alone.
 */
const group = groupOf("P m -3 m");

function wave(text: string): WaveVector {
  return placeWaveVector(group, parseWaveVector(text)).k;
}

type Rotation = readonly number[];
type Table = Readonly<Record<string, readonly number[]>>;
/** One class of a table: whether a rotation belongs to it. */
type Class = (rotation: Rotation, axis: number) => boolean;

const determinant = ([a = 0, b = 0, c = 0, d = 0, e = 0, f = 0, g = 0, h = 0, i = 0]: Rotation) =>
  a * (e * i - f * h) - b * (d * i - f * g) + c * (d * h - e * g);
const trace = (rotation: Rotation) => (rotation[0] ?? 0) + (rotation[4] ?? 0) + (rotation[8] ?? 0);
const isDiagonal = (rotation: Rotation) => [1, 2, 3, 5, 6, 7].every((at) => rotation[at] === 0);
const minus = (rotation: Rotation) => rotation.map((entry) => -entry);
/** Turns about a cube edge leave it: the diagonal entry of the axis is +1. */
const about = (rotation: Rotation, axis: number) => rotation[4 * axis] === 1;

const proper =
  (test: Class): Class =>
  (r, axis) =>
    determinant(r) === 1 && test(r, axis);
/** J times a rotation of the class. */
const inverted =
  (test: Class): Class =>
  (r, axis) =>
    determinant(r) === -1 && test(minus(r), axis);

const unit: Class = (r) => trace(r) === 3;
const square: Class = (r) => trace(r) === -1 && isDiagonal(r);
const four: Class = (r) => trace(r) === 1;
const two: Class = (r) => trace(r) === -1 && !isDiagonal(r);
const three: Class = (r) => trace(r) === 0;
const along =
  (test: Class): Class =>
  (r, axis) =>
    test(r, axis) && about(r, axis);
const across =
  (test: Class): Class =>
  (r, axis) =>
    test(r, axis) && !about(r, axis);

/** With J: the same characters, or their negatives with a prime. */
function withInversion(table: Table, primed: Table): Table {
  const doubled = (entries: readonly number[], sign: number) => [...entries, ...entries.map((entry) => sign * entry)];
  return {
    ...Object.fromEntries(Object.entries(table).map(([label, entries]) => [label, doubled(entries, 1)])),
    ...Object.fromEntries(Object.entries(primed).map(([label, entries]) => [label, doubled(entries, -1)])),
  };
}

const cubic: readonly Class[] = [unit, square, four, two, three];
/** E, 3C4², 6C4, 6C2, 8C3, and J times them. Γ15', Γ25' are even, Γ15, Γ25 odd. */
const gamma = {
  classes: [...cubic.map(proper), ...cubic.map(inverted)],
  table: withInversion(
    {
      Γ1: [1, 1, 1, 1, 1],
      Γ2: [1, 1, -1, -1, 1],
      Γ12: [2, 2, 0, 0, -1],
      "Γ15'": [3, -1, 1, -1, 0],
      "Γ25'": [3, -1, -1, 1, 0],
    },
    {
      "Γ1'": [1, 1, 1, 1, 1],
      "Γ2'": [1, 1, -1, -1, 1],
      "Γ12'": [2, 2, 0, 0, -1],
      Γ15: [3, -1, 1, -1, 0],
      Γ25: [3, -1, -1, 1, 0],
    },
  ),
};
/** E, 2C4² across the axis, C4² along it, 2C4 along it, 2C2, and J times them. */
const tetragonal: readonly Class[] = [unit, across(square), along(square), along(four), two];
const xRows = {
  1: [1, 1, 1, 1, 1],
  2: [1, 1, 1, -1, -1],
  3: [1, -1, 1, -1, 1],
  4: [1, -1, 1, 1, -1],
  5: [2, 0, -2, 0, 0],
};
const x = {
  classes: [...tetragonal.map(proper), ...tetragonal.map(inverted)],
  table: withInversion(
    Object.fromEntries(Object.entries(xRows).map(([number, row]) => [`X${number}`, row])),
    Object.fromEntries(Object.entries(xRows).map(([number, row]) => [`X${number}'`, row])),
  ),
};
/** E, C4², 2C4 along the axis, 2JC4² across it, 2JC2. */
const delta = {
  classes: [proper(unit), proper(along(square)), proper(along(four)), inverted(across(square)), inverted(two)],
  table: {
    Δ1: [1, 1, 1, 1, 1],
    Δ2: [1, 1, -1, 1, -1],
    "Δ2'": [1, 1, -1, -1, 1],
    "Δ1'": [1, 1, 1, -1, -1],
    Δ5: [2, -2, 0, 0, 0],
  },
};
/** E, 2C3, 3JC2. */
const lambda = {
  classes: [proper(unit), proper(three), inverted(two)],
  table: { Λ1: [1, 1, 1], Λ2: [1, 1, -1], Λ3: [2, -1, 0] },
};

interface Named {
  readonly classes: readonly Class[];
  readonly table: Table;
}

/** The published label of every irrep, found through its characters. */
function publishedLabels(irreps: SmallIrreps, { classes, table }: Named): string[] {
  // The axis of the line or point: the component of k that is not zero.
  const axis = irreps.k.components.findIndex(({ constant, coefficients }) =>
    [constant, ...coefficients].some(([top]) => top !== 0),
  );
  const rotations = irreps.littleGroup.operators.map((index) => group.operators[index]?.rotation ?? []);
  const places = rotations.map((rotation) => classes.flatMap((test, at) => (test(rotation, axis) ? [at] : [])));
  for (const found of places) expect(found).toHaveLength(1);
  return irreps.irreps.map(({ characters }) => {
    const labels = Object.entries(table).filter(([, entries]) =>
      characters.every(
        ({ factor }, index) =>
          Math.abs(cyclotomicValue(factor)[0] - (entries[places[index]?.[0] as number] as number)) < 1e-9,
      ),
    );
    expect(labels).toHaveLength(1);
    return labels[0]?.[0] as string;
  });
}

function relations(found: Compatibility, from: Named, to: Named): Record<string, string> {
  const lines = publishedLabels(found.to, to);
  return Object.fromEntries(
    publishedLabels(found.from, from).map((label, row) => [
      label,
      (found.rows[row]?.multiplicities ?? [])
        .flatMap((count, column) => new Array<string>(count).fill(lines[column] as string))
        .sort()
        .join(" "),
    ]),
  );
}

describe("compatibility relations of the simple cubic lattice", () => {
  test.each(["0,u,0", "u,0,0", "0,0,-u"])("Γ–Δ along %s", (line) => {
    expect(relations(compatibility(group, wave("0,0,0"), wave(line)), gamma, delta)).toEqual({
      Γ1: "Δ1",
      Γ2: "Δ2",
      Γ12: "Δ1 Δ2",
      "Γ15'": "Δ1' Δ5",
      "Γ25'": "Δ2' Δ5",
      "Γ1'": "Δ1'",
      "Γ2'": "Δ2'",
      "Γ12'": "Δ1' Δ2'",
      Γ15: "Δ1 Δ5",
      Γ25: "Δ2 Δ5",
    });
  });

  test.each(["u,u,u", "-u,u,u"])("Γ–Λ along %s", (line) => {
    expect(relations(compatibility(group, wave("0,0,0"), wave(line)), gamma, lambda)).toEqual({
      Γ1: "Λ1",
      Γ2: "Λ2",
      Γ12: "Λ3",
      "Γ15'": "Λ2 Λ3",
      "Γ25'": "Λ1 Λ3",
      "Γ1'": "Λ2",
      "Γ2'": "Λ1",
      "Γ12'": "Λ3",
      Γ15: "Λ1 Λ3",
      Γ25: "Λ2 Λ3",
    });
  });

  test.each([
    ["0,1/2,0", "0,u,0"],
    // Another arm than the one on the line.
    ["1/2,0,0", "0,0,u"],
  ])("X–Δ from %s along %s", (point, line) => {
    const found = compatibility(group, wave(point), wave(line));
    expect(found.parameters).toEqual([[1, 2]]);
    expect(relations(found, x, delta)).toEqual({
      X1: "Δ1",
      X2: "Δ2",
      X3: "Δ2'",
      X4: "Δ1'",
      X5: "Δ5",
      "X1'": "Δ1'",
      "X2'": "Δ2'",
      "X3'": "Δ2",
      "X4'": "Δ1",
      "X5'": "Δ5",
    });
  });
});
