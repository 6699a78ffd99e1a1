import { choleskyFactor, choleskySolve } from "../algorithms/index.js";
import { exactComponents, isHalfLattice, parameterValues } from "../kvectors/index.js";
import { isInteger, multiply, phasedToComplex } from "../numbers/index.js";
import { averagedMetric, type Cell, directMetric, type SpaceGroup, toPrimitiveRow } from "../spacegroups/index.js";
import type { IrrepModes, SiteModes } from "./types.js";

/** What a single irrep allows about the sizes of the moments on a site. */
export interface MomentSizes {
  /** Equal |S_j| > 0 on all atoms of the orbit. */
  readonly equalAmplitude: boolean;
  /** Equal moments on all atoms in all cells. */
  readonly constantMoment: boolean;
  /** Whatever the amplitudes, all moments of the site are parallel or antiparallel. */
  readonly collinear: boolean;
}

/**
 * Whether equal amplitudes and constant moments are possible for one irrep, and whether it forces collinearity. With
 * `|S|² = S† G S` in the metric G of the cell, moments are constant over all cells when `S·S = S^T G S` vanishes (Re S
 * and Im S orthogonal and equally long); where 4k ∈ L* its real part is enough; where 2k ∈ L* nothing more is needed.
 *
 * A solution of these quadratic equations is sought by damped least squares from fixed starting points; what is found
 * is proved by its residual (below `residualLimit`), "not possible" means not found from any start. Null where k has
 * open letters.
 */
export function momentSizes(group: SpaceGroup, cell: Cell, site: SiteModes, part: IrrepModes): MomentSizes | null {
  const waves = numericModes(site, part);
  if (waves === null) return null;
  if (part.multiplicity === 0) return { equalAmplitude: false, constantMoment: false, collinear: false };
  const { k } = site.representations;
  const half = isHalfLattice(group, k);
  const problem = ofUnitSize({
    waves: half ? realWaves(waves) : waves.flatMap((atoms) => [atoms, timesI(atoms)]),
    metric: averagedMetric(group.operators, directMetric(cell)),
  });
  const period = half ? "none" : quarterLattice(group, site) ? "real part" : "whole";
  const complete = part.vanishingAtoms.length === 0;
  const constantMoment = complete && solvable(problem, period);
  return {
    // Constant moments are of equal amplitude.
    equalAmplitude: constantMoment || (complete && period !== "none" && solvable(problem, "none")),
    constantMoment,
    collinear: isCollinear(problem),
  };
}

/** Squared residual per equation below which a solution counts: sizes are scaled to 1 and found to 1e-7. */
const residualLimit = 1e-14;
const starts = 24;
const mostSteps = 200;

/** Per atom three complex components, flat [re, im, re, im, re, im]. */
type Wave = readonly (readonly number[])[];

interface SizeProblem {
  /** Waves that real amplitudes multiply; one with a complex amplitude stands here twice, itself and i times itself. */
  readonly waves: readonly Wave[];
  readonly metric: readonly number[];
}

/** The same with waves whose largest moment has size 1: along axes of any lengths amplitudes near 1 are then near a solution. */
function ofUnitSize(problem: SizeProblem): SizeProblem {
  const waves = problem.waves.map((wave) => {
    const largest = 1 + Math.max(...residuals({ ...problem, waves: [wave] }, "none", [1]));
    return wave.map((atom) => atom.map((entry) => entry / Math.sqrt(largest)));
  });
  return { ...problem, waves };
}

function numericModes(site: SiteModes, part: IrrepModes): number[][][] | null {
  const values = parameterValues(site.representations.k);
  const result: number[][][] = [];
  for (const mode of part.modes) {
    const atoms = mode.moments.map(({ phase, vector }) =>
      vector.map((factor) => phasedToComplex({ phase, factor }, values)),
    );
    if (atoms.some((atom) => atom.includes(null))) return null;
    result.push(atoms.map((atom) => atom.flatMap((entry) => entry as [number, number])));
  }
  return result;
}

/** i times a wave. */
function timesI(atoms: Wave): number[][] {
  return atoms.map((atom) => [0, 2, 4].flatMap((re) => [-(atom[re + 1] as number), atom[re] as number]));
}

/** Real and imaginary parts of the modes as real modes: together they span the physically irreducible space. */
function realWaves(waves: readonly Wave[]): number[][][] {
  const parts = waves.flatMap((atoms) =>
    [0, 1].map((part) =>
      atoms.map((atom) => atom.map((_, index) => (index % 2 === 0 ? (atom[index + part] as number) : 0))),
    ),
  );
  return parts.filter((atoms) => atoms.some((atom) => atom.some((entry) => Math.abs(entry) > 1e-12)));
}

function quarterLattice(group: SpaceGroup, site: SiteModes): boolean {
  const row = exactComponents(site.representations.k);
  return row !== null && toPrimitiveRow(group.lattice, row).every((entry) => isInteger(multiply([4, 1], entry)));
}

/** S of every atom for the amplitudes x. */
function fields({ waves }: SizeProblem, x: ArrayLike<number>): number[][] {
  const sum = (waves[0] as Wave).map(() => [0, 0, 0, 0, 0, 0]);
  waves.forEach((wave, number) => {
    const amplitude = x[number] as number;
    wave.forEach((atom, index) => {
      const target = sum[index] as number[];
      for (let part = 0; part < 6; part++) target[part] = (target[part] as number) + amplitude * (atom[part] as number);
    });
  });
  return sum;
}

type Period = "none" | "real part" | "whole";

/** Residuals: |S_j|² − 1, and the parts of S_j·S_j that must vanish. */
function residuals(problem: SizeProblem, period: Period, x: ArrayLike<number>): number[] {
  return fields(problem, x).flatMap((s) => {
    let size = -1;
    let re = 0;
    let im = 0;
    for (let i = 0; i < 3; i++)
      for (let j = 0; j < 3; j++) {
        const g = problem.metric[3 * i + j] as number;
        const [a, b, c, d] = [s[2 * i], s[2 * i + 1], s[2 * j], s[2 * j + 1]] as [number, number, number, number];
        size += g * (a * c + b * d);
        re += g * (a * c - b * d);
        im += g * (a * d + b * c);
      }
    return period === "none" ? [size] : period === "real part" ? [size, re] : [size, re, im];
  });
}

/** Levenberg–Marquardt on the quadratic equations; derivatives are exact because differences of quadratics are. */
function solvable(problem: SizeProblem, period: Period): boolean {
  for (let start = 0; start < starts; start++) {
    let x = Float64Array.from(problem.waves, (_, index) => Math.sin(1.7 * (start + 1) * (index + 1) + start));
    let r = residuals(problem, period, x);
    let cost = sumOfSquares(r);
    const limit = residualLimit * r.length;
    let damping = 1e-3;
    for (let step = 0; step < mostSteps && cost > limit; step++) {
      const jacobian = differentiate(problem, period, x);
      const trial = dampedStep(jacobian, r, x, damping);
      if (trial === null) break;
      const next = residuals(problem, period, trial);
      const nextCost = sumOfSquares(next);
      if (nextCost < cost) {
        if (cost - nextCost < 1e-9 * cost && cost > 1e-6) break;
        [x, r, cost, damping] = [trial, next, nextCost, damping / 4];
      } else damping *= 8;
      if (damping > 1e12) break;
    }
    if (cost <= limit) return true;
  }
  return false;
}

function differentiate(problem: SizeProblem, period: Period, x: Float64Array): number[][] {
  return Array.from({ length: x.length }, (_, index) => {
    const ahead = Float64Array.from(x);
    const behind = Float64Array.from(x);
    ahead[index] = (ahead[index] as number) + 1;
    behind[index] = (behind[index] as number) - 1;
    const a = residuals(problem, period, ahead);
    const b = residuals(problem, period, behind);
    // The central difference of a quadratic is its derivative, whatever the step.
    return a.map((value, row) => (value - (b[row] as number)) / 2);
  });
}

function dampedStep(
  columns: readonly (readonly number[])[],
  r: readonly number[],
  x: Float64Array,
  damping: number,
): Float64Array<ArrayBuffer> | null {
  const size = x.length;
  const normal = new Float64Array(size * size);
  const right = new Float64Array(size);
  for (let a = 0; a < size; a++) {
    const column = columns[a] as readonly number[];
    right[a] = -dotNumbers(column, r);
    // Of the symmetric matrix the lower triangle is enough.
    for (let b = 0; b <= a; b++) {
      normal[a * size + b] = dotNumbers(column, columns[b] as readonly number[]);
    }
  }
  const trace = Array.from({ length: size }, (_, index) => normal[index * size + index] as number).reduce(
    (sum, entry) => sum + entry,
    0,
  );
  for (let index = 0; index < size; index++)
    normal[index * size + index] = (normal[index * size + index] as number) + damping * (trace / size + 1e-12);
  const factor = choleskyFactor(normal, size);
  if (factor === null) return null;
  const step = choleskySolve(factor, right);
  return Float64Array.from(x, (entry, index) => entry + (step[index] as number));
}

function dotNumbers(a: readonly number[], b: readonly number[]): number {
  return a.reduce((sum, entry, index) => sum + entry * (b[index] as number), 0);
}

function sumOfSquares(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value * value, 0);
}

/** Generic amplitudes decide: parallel real and imaginary parts there means parallel everywhere (an identity of polynomials). */
function isCollinear(problem: SizeProblem): boolean {
  const vectors = fields(
    problem,
    problem.waves.map((_, index) => Math.cos(index)),
  ).flatMap((s) => [[s[0], s[2], s[4]] as number[], [s[1], s[3], s[5]] as number[]]);
  const longest = vectors.reduce(
    (best, vector) => (sumOfSquares(vector) > sumOfSquares(best) ? vector : best),
    [0, 0, 0],
  );
  const limit = 1e-18 * sumOfSquares(longest) ** 2;
  return vectors.every((v) => {
    const cross = [0, 1, 2].map(
      (i) =>
        (v[(i + 1) % 3] as number) * (longest[(i + 2) % 3] as number) -
        (v[(i + 2) % 3] as number) * (longest[(i + 1) % 3] as number),
    );
    return sumOfSquares(cross) <= limit;
  });
}
