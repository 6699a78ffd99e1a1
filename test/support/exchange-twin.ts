import { bondTable, type ExchangeModel, exchangeModel } from "@kvane/core/exchange";
import { type Cell, parseGroup, type Site, siteOrbit } from "@kvane/core/spacegroups";
import { seeded } from "./random.js";

/**
 * The lowest eigenvalue of J(k) on a dense grid, worked out anew from positions alone: bonds are all pairs of a
 * length, found by trying every cell nearby, and the eigenvalue of a Hermitian 1 × 1, 2 × 2 or 3 × 3 matrix is the
 * closed solution of its characteristic equation. Nothing of the library is used but the sites' orbits.
 */
export interface TwinModel {
  /** Cartesian axes of the setting's cell, Å. */
  readonly axes: readonly (readonly number[])[];
  /** All atoms of the setting's cell, fractional. */
  readonly atoms: readonly (readonly number[])[];
  readonly lengths: readonly number[];
  readonly constants: readonly number[];
}

/** Axes with x along a and z along c*. */
export function axesOf({ a, b, c, alpha, beta, gamma }: Cell): number[][] {
  const [ca, cb, cg, sg] = [alpha, beta, gamma]
    .map((one) => Math.cos((one * Math.PI) / 180))
    .concat(Math.sin((gamma * Math.PI) / 180)) as [number, number, number, number];
  const y = (ca - cb * cg) / sg;
  return [
    [a, 0, 0],
    [b * cg, b * sg, 0],
    [c * cb, c * y, c * Math.sqrt(1 - cb * cb - y * y)],
  ];
}

interface TwinBond {
  readonly from: number;
  readonly to: number;
  readonly step: readonly number[];
  readonly j: number;
}

export function twinBonds({ axes, atoms, lengths, constants }: TwinModel): TwinBond[] {
  const bonds: TwinBond[] = [];
  const reach = 4;
  for (const [from, start] of atoms.entries())
    for (const [to, end] of atoms.entries())
      for (let x = -reach; x <= reach; x++)
        for (let y = -reach; y <= reach; y++)
          for (let z = -reach; z <= reach; z++) {
            const step = [x, y, z].map((n, i) => n + (end[i] as number) - (start[i] as number));
            const length = Math.hypot(
              ...[0, 1, 2].map((i) => step.reduce((sum, s, a) => sum + s * (axes[a]?.[i] as number), 0)),
            );
            const shell = lengths.findIndex((one) => Math.abs(one - length) < 1e-3);
            if (shell >= 0) bonds.push({ from, to, step, j: constants[shell] as number });
          }
  return bonds;
}

/** Lowest eigenvalue at k (in the reciprocal axes of the setting). */
export function twinEigenvalue(size: number, bonds: readonly TwinBond[], k: readonly number[]): number {
  const re = new Float64Array(size * size);
  const im = new Float64Array(size * size);
  for (const { from, to, step, j } of bonds) {
    const angle = -2 * Math.PI * step.reduce((sum, s, i) => sum + s * (k[i] as number), 0);
    re[from * size + to] = (re[from * size + to] as number) + j * Math.cos(angle);
    im[from * size + to] = (im[from * size + to] as number) + j * Math.sin(angle);
  }
  return lowestOf(size, re, im);
}

function lowestOf(size: number, re: Float64Array, im: Float64Array): number {
  const d = (i: number) => re[i * size + i] as number;
  const square = (i: number, k: number) => (re[i * size + k] as number) ** 2 + (im[i * size + k] as number) ** 2;
  if (size === 1) return d(0);
  if (size === 2) return (d(0) + d(1)) / 2 - Math.sqrt(((d(0) - d(1)) / 2) ** 2 + square(0, 1));
  // Roots of the cubic of a Hermitian matrix by cosines (O. K. Smith, Comm. ACM 4 (1961) 168).
  const mean = (d(0) + d(1) + d(2)) / 3;
  const [a, b, c] = [d(0) - mean, d(1) - mean, d(2) - mean];
  const [x, y, z] = [square(0, 1), square(1, 2), square(0, 2)];
  const p = Math.sqrt((a * a + b * b + c * c + 2 * (x + y + z)) / 6);
  if (p === 0) return mean;
  const at = (i: number, k: number) => [re[i * size + k] as number, im[i * size + k] as number] as const;
  const [ar, ai] = at(0, 1);
  const [br, bi] = at(1, 2);
  const [cr, ci] = at(2, 0);
  const triple = (ar * br - ai * bi) * cr - (ar * bi + ai * br) * ci;
  const determinant = a * b * c + 2 * triple - a * y - b * z - c * x;
  const angle = Math.acos(Math.max(-1, Math.min(1, determinant / (2 * p ** 3)))) / 3;
  return mean + 2 * p * Math.cos(angle + (2 * Math.PI) / 3);
}

/** The lowest value on a grid over the cell of L*, given by its rows in the reciprocal axes of the setting. */
export function twinMinimum(
  size: number,
  bonds: readonly TwinBond[],
  rows: readonly (readonly number[])[],
  count: number,
): { readonly value: number; readonly k: readonly number[] } {
  let best = { value: Number.POSITIVE_INFINITY, k: [0, 0, 0] as readonly number[] };
  for (let x = 0; x < count; x++)
    for (let y = 0; y < count; y++)
      for (let z = 0; z < count; z++) {
        const q = [x, y, z].map((n) => n / count);
        const k = [0, 1, 2].map((i) => q.reduce((sum, entry, row) => sum + entry * (rows[row]?.[i] as number), 0));
        const value = twinEigenvalue(size, bonds, k);
        if (value < best.value) best = { value, k };
      }
  return best;
}

/** Goes down from a place by steps along the axes that are halved when none leads down. */
export function twinDescent(size: number, bonds: readonly TwinBond[], start: readonly number[], first: number): number {
  let k = [...start];
  let value = twinEigenvalue(size, bonds, k);
  for (let step = first; step > 1e-7; step /= 2)
    for (let moved = true; moved; ) {
      moved = false;
      for (let axis = 0; axis < 3; axis++)
        for (const sign of [-1, 1]) {
          const trial = k.map((entry, i) => (i === axis ? entry + sign * step : entry));
          const next = twinEigenvalue(size, bonds, trial);
          if (next < value - 1e-13) [k, value, moved] = [trial, next, true];
        }
    }
  return value;
}

const groups: readonly (readonly [string, (random: () => number) => Cell, readonly (readonly string[])[]])[] = [
  [
    "P 1",
    triclinic,
    [["A 0 0 0"], ["A 0 0 0", "B 0.31 0.42 0.27"], ["A 0 0 0", "B 0.31 0.12 0.47", "C 0.62 0.55 0.18"]],
  ],
  ["P -1", triclinic, [["A 0.13 0.22 0.34"], ["A 0 0 0", "B 0.27 0.31 0.16"]]],
  ["P 1 2/m 1", monoclinic, [["A 0 0 0"], ["A 0 0.31 0"], ["A 0 0 0", "B 1/2 0.24 1/2"]]],
  [
    "P 2 2 2",
    orthorhombic,
    [
      ["A 0 0 0", "B 1/2 1/2 0"],
      ["A 0 0 0", "B 0.5 0 0.5", "C 0 0.5 0.5"],
    ],
  ],
  ["P 4/m m m", tetragonal, [["A 0 0 0"], ["A 0 1/2 0"], ["A 0 1/2 0", "B 0 0 1/2"]]],
  ["P 6/m m m", hexagonal, [["A 0 0 0"], ["A 1/3 2/3 0"], ["A 1/2 0 0"]]],
  ["P -3 m 1", hexagonal, [["A 1/3 2/3 0.21"], ["A 0 0 0.31"], ["A 0 0 0", "B 1/3 2/3 0.3"]]],
  ["P m -3 m", cubic, [["A 0 0 0"], ["A 0 1/2 1/2"], ["A 0 0 0", "B 1/2 1/2 1/2"]]],
];

function between(random: () => number, low: number, high: number): number {
  return Number((low + (high - low) * random()).toFixed(3));
}
function triclinic(random: () => number): Cell {
  return {
    a: between(random, 4, 7),
    b: between(random, 4, 7),
    c: between(random, 4, 7),
    alpha: between(random, 70, 110),
    beta: between(random, 70, 110),
    gamma: between(random, 70, 110),
  };
}
function monoclinic(random: () => number): Cell {
  return { ...triclinic(random), alpha: 90, gamma: 90 };
}
function orthorhombic(random: () => number): Cell {
  return { ...triclinic(random), alpha: 90, beta: 90, gamma: 90 };
}
function tetragonal(random: () => number): Cell {
  const cell = orthorhombic(random);
  return { ...cell, b: cell.a };
}
function hexagonal(random: () => number): Cell {
  return { ...tetragonal(random), gamma: 120 };
}
function cubic(random: () => number): Cell {
  const cell = orthorhombic(random);
  return { ...cell, b: cell.a, c: cell.a };
}

export interface RandomModel {
  readonly name: string;
  readonly model: ExchangeModel;
  readonly twin: TwinModel;
}

/** A random model of one to three sublattices, the same for the library and for its twin. */
export async function randomModel(seed: number): Promise<RandomModel> {
  const random = seeded(seed);
  const [symbol, cellMaker, choices] = random.pick(groups);
  const cell = cellMaker(random.next);
  const sites = random.pick(choices);
  const group = await parseGroup(symbol);
  const orbits = sites.map((text) => siteOrbit(group, siteOf(text), cell));
  const table = bondTable(group, cell, orbits, { shells: 2 + random.below(5) });
  const constants = table.shells.map(() => Number((2 * random.next() - 1).toFixed(3)));
  const model = exchangeModel(
    table,
    table.shells.map(({ number }, index) => ({ bond: String(number), between: null, j: constants[index] as number })),
  );
  return {
    name: `${symbol}, ${sites.join("; ")}, seed ${seed}`,
    model,
    twin: {
      axes: axesOf(cell),
      atoms: table.atoms.map(({ position }) => position.map(([n, d]) => n / d)),
      lengths: table.shells.map(({ distance }) => distance),
      constants,
    },
  };
}

function siteOf(text: string): Site {
  const [label = "", ...coordinates] = text.split(" ");
  const exact = (word: string) => {
    const [top = "0", bottom = "1"] = word.includes("/")
      ? word.split("/")
      : [String(Math.round(Number(word) * 100)), "100"];
    const divisor = gcd(Number(top), Number(bottom));
    return [Number(top) / divisor, Number(bottom) / divisor] as const;
  };
  return { label, position: coordinates.map(exact) as unknown as Site["position"] };
}

function gcd(a: number, b: number): number {
  return b === 0 ? Math.abs(a) || 1 : gcd(b, a % b);
}

/** What is wrong with the certified minimum of a random model; nothing when all is well. */
export function againstTwin(
  { name, twin }: RandomModel,
  ground: { readonly energy: number; readonly lowerBound: number; readonly exhaustive: boolean },
  count: number,
): string[] {
  const bonds = twinBonds(twin);
  const size = twin.atoms.length;
  const unit = [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ];
  const grid = twinMinimum(size, bonds, unit, count);
  const deepest = twinDescent(size, bonds, grid.k, 0.5 / count) / 2;
  const problems: string[] = [];
  if (!ground.exhaustive) problems.push(`${name}: the search was stopped`);
  if (grid.value / 2 < ground.lowerBound - 1e-9)
    problems.push(`${name}: the grid has ${grid.value / 2}, below the proven ${ground.lowerBound}`);
  if (deepest < ground.energy - 1e-9) problems.push(`${name}: ${deepest} lies below the ${ground.energy} found`);
  if (ground.energy < deepest - 1e-6) problems.push(`${name}: the grid ends at ${deepest}, ${ground.energy} was found`);
  return problems;
}
