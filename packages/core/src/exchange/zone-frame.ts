import { choleskyFactor } from "../algorithms/index.js";
import { hermiteNormalForm } from "../numbers/index.js";
import { reciprocalFrame } from "../reflections/index.js";
import { primitiveCoordinates } from "./atoms.js";
import { invertSymmetric } from "./metric.js";
import type { Bond, BondTable } from "./types.js";

/**
 * The part of k that bonds notice. The closed walks along bonds span a lattice of rank r in L; the eigenvalues of J(k)
 * depend on the r numbers `q = κ · basis` alone (κ: k in the dual of the primitive basis), taken modulo 1. `q` is
 * used in Cartesian coordinates x, Å⁻¹ without 2π, in which every bond has a vector d and its phase is `x · d` turns.
 */
export interface ZoneFrame {
  readonly rank: 0 | 1 | 2 | 3;
  /** Rows: r vectors that span the walks, then those that complete a basis of L; integers in the primitive basis. */
  readonly basis: readonly (readonly number[])[];
  /** Its dual, rows: `κ = Σ q_a dual_a`; rows from r on are the directions that no bond notices. */
  readonly dual: readonly (readonly number[])[];
  /** Lower triangular, r × r: `basis_a = Σ_b cartesian[a][b] e_b`, Å. */
  readonly cartesian: readonly (readonly number[])[];
  /** Metric of q, r × r row by row, Å⁻². */
  readonly metric: readonly number[];
  /** Whether the bonds join all atoms; the number of parts they leave. */
  readonly parts: number;
}

/** The frame of a set of bonds; bonds with J = 0 should be left out. */
export function zoneFrame(table: BondTable, bonds: readonly Bond[]): ZoneFrame {
  const { cycles, parts } = closedWalks(table.atoms.length, bonds);
  const basis = adaptedBasis(cycles);
  const rank = basis.rank;
  const metric = invertSymmetric(reciprocalFrame(table.group, table.cell).metric);
  const gram = Array.from({ length: rank * rank }, (_, at) =>
    product(metric, basis.rows[Math.floor(at / rank)] as number[], basis.rows[at % rank] as number[]),
  );
  const factor = rank === 0 ? new Float64Array() : choleskyFactor(gram, rank);
  if (factor === null) throw new Error("a metric is not positive definite");
  return {
    rank,
    basis: basis.rows,
    dual: transposedInverse(basis.rows),
    cartesian: Array.from({ length: rank }, (_, row) => [...factor.slice(row * rank, row * rank + rank)]),
    metric: rank === 0 ? [] : invertSymmetric(gram),
    parts,
  };
}

/** The vector d of a bond in the frame: its projection on the span of the walks. */
export function bondVectors(table: BondTable, frame: ZoneFrame): (bond: Bond) => readonly number[] {
  const { rank, basis, cartesian } = frame;
  const places = primitiveCoordinates(table.group, table.atoms);
  const metric = invertSymmetric(reciprocalFrame(table.group, table.cell).metric);
  return ({ from, to, translation }) => {
    const step = translation.map(
      (entry, axis) => entry + (places[to]?.[axis] as number) - (places[from]?.[axis] as number),
    );
    // d · basis_a is known; cartesian is triangular, so the components follow one after another.
    const d: number[] = [];
    for (let a = 0; a < rank; a++) {
      let rest = product(metric, step, basis[a] as readonly number[]);
      for (let b = 0; b < a; b++) rest -= (cartesian[a]?.[b] as number) * (d[b] as number);
      d.push(rest / (cartesian[a]?.[a] as number));
    }
    return d;
  };
}

/** `q` of a κ. */
export function toZone({ rank, basis }: ZoneFrame, kappa: readonly number[]): number[] {
  return basis.slice(0, rank).map((row) => row.reduce((sum, entry, axis) => sum + entry * (kappa[axis] as number), 0));
}

/** A κ with this q, its other components zero. */
export function fromZone({ dual }: ZoneFrame, q: readonly number[]): number[] {
  return [0, 1, 2].map((axis) => q.reduce((sum, entry, a) => sum + entry * (dual[a]?.[axis] as number), 0));
}

/** Cartesian x of a q: `q_a = basis_a · x`. */
export function toCartesian({ rank, cartesian }: ZoneFrame, q: ArrayLike<number>): number[] {
  const x: number[] = [];
  for (let a = 0; a < rank; a++) {
    let rest = q[a] as number;
    for (let b = 0; b < a; b++) rest -= (cartesian[a]?.[b] as number) * (x[b] as number);
    x.push(rest / (cartesian[a]?.[a] as number));
  }
  return x;
}

/** q of a Cartesian x. */
export function fromCartesian({ cartesian }: ZoneFrame, x: ArrayLike<number>): number[] {
  return cartesian.map((row) => row.reduce((sum, entry, b) => sum + entry * (x[b] as number), 0));
}

function product(metric: readonly number[], a: readonly number[], b: readonly number[]): number {
  let sum = 0;
  for (let row = 0; row < 3; row++)
    for (let column = 0; column < 3; column++)
      sum += (a[row] as number) * (metric[3 * row + column] as number) * (b[column] as number);
  return sum;
}

/** Translations of closed walks, by a spanning forest: every bond outside it closes one. */
function closedWalks(atoms: number, bonds: readonly Bond[]): { cycles: number[][]; parts: number } {
  const part = Array.from({ length: atoms }, (_, atom) => atom);
  /** Lattice vector of the cell in which the forest reaches the atom. */
  const reached = Array.from({ length: atoms }, () => [0, 0, 0]);
  const cycles: number[][] = [];
  for (const { from, to, translation } of bonds) {
    const step = translation.map((entry, axis) => entry + (reached[from]?.[axis] as number));
    const difference = step.map((entry, axis) => entry - (reached[to]?.[axis] as number));
    if (part[from] === part[to]) {
      if (difference.some((entry) => entry !== 0)) cycles.push(difference);
      continue;
    }
    const [kept, joined] = [part[from] as number, part[to] as number];
    for (let atom = 0; atom < atoms; atom++)
      if (part[atom] === joined) {
        part[atom] = kept;
        reached[atom] = (reached[atom] as number[]).map((entry, axis) => entry + (difference[axis] as number));
      }
  }
  return { cycles, parts: new Set(part).size };
}

/** A basis of Z³ whose first rows span the same space as the cycles. */
function adaptedBasis(cycles: readonly (readonly number[])[]): { rows: number[][]; rank: 0 | 1 | 2 | 3 } {
  const reduced =
    cycles.length === 0 ? [] : hermiteNormalForm(cycles, 3).filter((row) => row.some((entry) => entry !== 0));
  const unit = [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ];
  if (reduced.length === 0 || reduced.length === 3) return { rows: unit, rank: reduced.length as 0 | 3 };
  if (reduced.length === 1) return { rows: completed(reduced[0] as number[]), rank: 1 };
  // A basis whose dual has the normal of the plane as its last row.
  const dual = completed(primitiveVector(crossProduct(reduced[0] as number[], reduced[1] as number[])));
  const rows = transposedInverse([dual[1] as number[], dual[2] as number[], dual[0] as number[]]);
  return { rows: rows.map((row) => row.map((entry) => Math.round(entry) + 0)), rank: 2 };
}

/** A basis of Z³ that begins with the vector, divided by the common factor of its entries. */
function completed(vector: readonly number[]): number[][] {
  const [a, b, c] = primitiveVector(vector) as [number, number, number];
  const { divisor: g, first: u, second: v } = bezout(a, b);
  if (g === 0)
    return [
      [a, b, c],
      [1, 0, 0],
      [0, 1, 0],
    ];
  const { first: s, second: t } = bezout(g, c);
  // det of these rows is s g + t c = 1 up to sign.
  return [
    [a, b, c],
    [-v, u, 0],
    [(-t * a) / g, (-t * b) / g, s],
  ];
}

function primitiveVector(vector: readonly number[]): number[] {
  const common = vector.reduce((sum, entry) => bezout(sum, entry).divisor, 0);
  return vector.map((entry) => entry / common + 0);
}

function crossProduct(a: readonly number[], b: readonly number[]): number[] {
  const at = (i: number, j: number) => (a[i] as number) * (b[j] as number) - (a[j] as number) * (b[i] as number);
  return [at(1, 2), at(2, 0), at(0, 1)];
}

/** `first · a + second · b = divisor ≥ 0` (Euclid). */
function bezout(a: number, b: number): { divisor: number; first: number; second: number } {
  let [r0, r1, s0, s1, t0, t1] = [a, b, 1, 0, 0, 1];
  while (r1 !== 0) {
    const quotient = Math.floor(r0 / r1);
    [r0, r1] = [r1, r0 - quotient * r1];
    [s0, s1] = [s1, s0 - quotient * s1];
    [t0, t1] = [t1, t0 - quotient * t1];
  }
  return r0 < 0 ? { divisor: -r0, first: -s0, second: -t0 } : { divisor: r0, first: s0, second: t0 };
}

/** Rows of the inverse transpose of a 3 × 3 matrix. */
function transposedInverse(rows: readonly (readonly number[])[]): number[][] {
  const [a, b, c] = rows as [number[], number[], number[]];
  const volume = crossProduct(a, b).reduce((sum, entry, axis) => sum + entry * (c[axis] as number), 0);
  return [crossProduct(b, c), crossProduct(c, a), crossProduct(a, b)].map((row) =>
    row.map((entry) => entry / volume + 0),
  );
}
