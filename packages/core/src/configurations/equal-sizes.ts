import { choleskyFactor, choleskySolve } from "../algorithms/index.js";

/** What moments of one size on all atoms of a site need of the amplitudes. */
export type ConstantMoment = "always" | "possible" | "impossible";

/** Squared residual per equation below which a solution counts: sizes are scaled to 1. */
const residualLimit = 1e-14;
const starts = 8;
const mostSteps = 80;

/** Entries of two forms |m|² that are equal, as a share of the largest entry: rounding of sums of some 100 products. */
const sameForm = 1e-9;

/**
 * Whether real amplitudes exist that give all representatives of one site moments of one non-zero size.
 *
 * @param amplitudes amplitudes × representatives × three components
 * @param metric nine numbers
 */
export function constantMoment(
  amplitudes: readonly (readonly (readonly number[])[])[],
  metric: readonly number[],
): ConstantMoment {
  const size = amplitudes.length;
  const count = amplitudes[0]?.length ?? 0;
  if (size === 0) return "impossible";
  if (count === 1) return "always";
  const atoms = Array.from({ length: count }, (_, atom) =>
    cartesian(
      amplitudes.map((row) => row[atom] as number[]),
      metric,
    ),
  );
  if (atoms.some((atom) => atom.every((entry) => Math.abs(entry) < 1e-6))) return "impossible";
  if (sameForms(atoms, size)) return "always";
  for (let start = 0; start < starts; start++) if (solve(atoms, size, start)) return "possible";
  return "impossible";
}

/**
 * The moment of an atom along three orthonormal axes, as three rows of one number for each amplitude. |m|² is then the
 * sum of three squares, which costs 3n products where its matrix in the n amplitudes would cost n².
 */
function cartesian(rows: readonly (readonly number[])[], metric: readonly number[]): Float64Array {
  const size = rows.length;
  const factor = choleskyFactor(Float64Array.from(metric), 3);
  if (factor === null) throw new Error("the metric of a cell has a Cholesky factor");
  const axes = new Float64Array(3 * size);
  for (let axis = 0; axis < 3; axis++)
    rows.forEach((row, index) => {
      let sum = 0;
      for (let component = axis; component < 3; component++)
        sum += (factor[3 * component + axis] as number) * (row[component] as number);
      axes[axis * size + index] = sum;
    });
  return axes;
}

/** Whether |m|² is the same form in the amplitudes for all atoms; the first entry that differs ends the comparison. */
function sameForms(atoms: readonly Float64Array[], size: number): boolean {
  const first = atoms[0] as Float64Array;
  let scale = 0;
  for (let index = 0; index < size; index++) scale = Math.max(scale, entryOfForm(first, size, index, index));
  for (const atom of atoms)
    for (let a = 0; a < size; a++)
      for (let b = a; b < size; b++)
        if (Math.abs(entryOfForm(atom, size, a, b) - entryOfForm(first, size, a, b)) >= sameForm * scale) return false;
  return true;
}

function entryOfForm(atom: Float64Array, size: number, a: number, b: number): number {
  let sum = 0;
  for (let row = 0; row < 3 * size; row += size) sum += (atom[row + a] as number) * (atom[row + b] as number);
  return sum;
}

/** Levenberg–Marquardt on |m|² = 1 for every atom. */
function solve(atoms: readonly Float64Array[], size: number, start: number): boolean {
  const trace = atoms.reduce(
    (sum, atom) => sum + atom.reduce((own, entry) => own + entry * entry, 0) / atoms.length,
    0,
  );
  let x = Float64Array.from(
    { length: size },
    (_, index) => Math.sin(1.7 * (start + 1) * (index + 1) + start) / Math.sqrt(trace / 2),
  );
  let current = evaluate(atoms, x);
  let damping = 1e-3;
  for (let step = 0; step < mostSteps && current.cost > residualLimit * atoms.length; step++) {
    const normal = new Float64Array(size * size);
    const right = new Float64Array(size);
    current.gradients.forEach((gradient, equation) => {
      for (let a = 0; a < size; a++) {
        if (gradient[a] === 0) continue;
        right[a] = (right[a] as number) - (gradient[a] as number) * (current.residuals[equation] as number);
        // The factor reads the lower half only.
        for (let b = 0; b <= a; b++)
          normal[a * size + b] = (normal[a * size + b] as number) + (gradient[a] as number) * (gradient[b] as number);
      }
    });
    let mean = 0;
    for (let a = 0; a < size; a++) mean += (normal[a * size + a] as number) / size;
    for (let a = 0; a < size; a++) normal[a * size + a] = (normal[a * size + a] as number) + damping * (mean + 1e-12);
    const factor = choleskyFactor(normal, size);
    if (factor === null) return false;
    const move = choleskySolve(factor, right);
    const next = Float64Array.from(x, (entry, index) => entry + (move[index] as number));
    const there = evaluate(atoms, next);
    if (there.cost < current.cost) {
      if (current.cost - there.cost < 1e-7 * current.cost && current.cost > 1e-6) return false;
      [x, current, damping] = [next, there, damping / 4];
    } else damping *= 8;
    if (damping > 1e12) return false;
  }
  return current.cost <= residualLimit * atoms.length;
}

function evaluate(atoms: readonly Float64Array[], x: Float64Array) {
  const size = x.length;
  const residuals: number[] = [];
  const gradients: Float64Array[] = [];
  let cost = 0;
  for (const atom of atoms) {
    const gradient = new Float64Array(size);
    let value = -1;
    for (let row = 0; row < 3 * size; row += size) {
      let component = 0;
      for (let a = 0; a < size; a++) component += (atom[row + a] as number) * (x[a] as number);
      for (let a = 0; a < size; a++) gradient[a] = (gradient[a] as number) + 2 * component * (atom[row + a] as number);
      value += component * component;
    }
    residuals.push(value);
    gradients.push(gradient);
    cost += value * value;
  }
  return { residuals, gradients, cost };
}
