import { levenbergMarquardt, type WeightedResiduals } from "../algorithms/index.js";
import { isHalfLattice, numericWaveVector, star, type WaveVector } from "../kvectors/index.js";
import { branchesAt, degeneracy } from "./lattice-matrix.js";
import { kappaOf } from "./placing.js";
import type { ExchangeModel, OrderingVector } from "./types.js";

/** Whether spins of the given lengths can have the energy that the lowest eigenvalue allows. */
export interface ConstantMoments {
  /**
   * `reached`: an arrangement was built, so the bound is the ground state. `only a bound`: proven that none of these k
   * reaches it. `not found`: none was found, and none is excluded.
   */
  readonly answer: "reached" | "only a bound" | "not found";
  /** The k of the arrangement; several for one with several wave vectors. */
  readonly k: readonly WaveVector[];
  readonly spins: "collinear" | "coplanar" | "non-coplanar" | null;
  /** Labels of sites whose spins cannot have their full length; empty unless proven. */
  readonly short: readonly string[];
}

const kinds = ["collinear", "coplanar", "non-coplanar"] as const;
const mostArms = 4;
const mostPairs = 12;
const starts = 6;
/** Sum of squared deviations of |M|² from 1 below which an arrangement counts as built: rounding leaves 1e-20. */
const built = 1e-14;

/**
 * The strong condition of Luttinger and Tisza: |S| on every atom of every cell. A sum of waves of the lowest eigenvalue
 * has |M_j(T)|² = 1 in all cells exactly when all Fourier coefficients of |M_j|² but the constant vanish; these
 * quadratic equations are solved by damped least squares from seeded starts, first collinear, then in a plane, then in
 * space, first for one k, then for the star, then for two stars. (T. A. Kaplan & N. Menyuk, Philos. Mag. 87 (2007) 3711,
 * section 2.)
 */
export function constantMoments(
  model: ExchangeModel,
  vectors: readonly OrderingVector[],
  tolerance: number,
): ConstantMoments {
  const stars = vectors.map(({ k }) => armPairs(model, k));
  const waves = stars.map((arms) => arms.map((k) => waveOf(model, k, tolerance)));
  for (const [index, arms] of waves.entries()) {
    const one = solved(model, arms.slice(0, 1));
    if (one) return { answer: "reached", k: (stars[index] as WaveVector[]).slice(0, 1), spins: one, short: [] };
  }
  for (const [index, arms] of waves.entries()) {
    if (arms.length < 2) continue;
    for (let count = 2; count <= Math.min(arms.length, mostArms); count++) {
      const several = solved(model, arms.slice(0, count));
      if (several)
        return { answer: "reached", k: (stars[index] as WaveVector[]).slice(0, count), spins: several, short: [] };
    }
  }
  for (const pair of pairsOf(waves)) {
    const mixed = solved(
      model,
      pair.map(([star, arm]) => waves[star]?.[arm] as Wave),
    );
    if (mixed)
      return {
        answer: "reached",
        k: pair.map(([star, arm]) => stars[star]?.[arm] as WaveVector),
        spins: mixed,
        short: [],
      };
  }
  const short = shortSites(model, waves);
  return { answer: short.length > 0 ? "only a bound" : "not found", k: [], spins: null, short };
}

/**
 * Two k of two stars that are equally low, as cones need: the first arm of one with each of the other, as star and arm.
 * Such stars meet at boundaries of phases, and where site potentials balance them.
 */
function pairsOf(waves: readonly (readonly Wave[])[]): [number, number][][] {
  const found: [number, number][][] = [];
  for (let a = 0; a < waves.length; a++)
    for (let b = a + 1; b < waves.length; b++)
      for (let arm = 0; arm < (waves[b]?.length ?? 0); arm++)
        found.push([
          [a, 0],
          [b, arm],
        ]);
  return found.slice(0, mostPairs);
}

/** One arm of each ±k pair of the star. */
function armPairs(model: ExchangeModel, k: WaveVector): WaveVector[] {
  const { group } = model.table;
  const kept: WaveVector[] = [];
  for (const arm of star(group, k).arms) {
    const numbers = kappaOf(group, numericWaveVector(arm) ?? []);
    const known = kept.some((other) => {
      const sum = kappaOf(group, numericWaveVector(other) ?? []).map(
        (entry, axis) => entry + (numbers[axis] as number),
      );
      return sum.every((entry) => Math.abs(entry - Math.round(entry)) < 1e-6);
    });
    if (!known) kept.push(arm);
  }
  return kept;
}

interface Wave {
  readonly k: WaveVector;
  readonly kappa: readonly number[];
  /** 2k ∈ L*. */
  readonly half: boolean;
  /** Eigenvectors of the lowest eigenvalue: real and imaginary parts by atom. */
  readonly vectors: readonly { readonly real: readonly number[]; readonly imaginary: readonly number[] }[];
}

function waveOf(model: ExchangeModel, k: WaveVector, tolerance: number): Wave {
  const { group } = model.table;
  const kappa = kappaOf(group, numericWaveVector(k) ?? []);
  const branches = branchesAt(model, kappa);
  const { size } = branches;
  const column = (part: Float64Array, n: number) =>
    Array.from({ length: size }, (_, i) => part[i * size + n] as number);
  return {
    k,
    kappa,
    half: isHalfLattice(group, k),
    vectors: Array.from({ length: degeneracy(branches, tolerance) }, (_, n) => ({
      real: column(branches.real, n),
      imaginary: column(branches.imaginary, n),
    })),
  };
}

/** The plainest sort of arrangement with these waves, or null. */
function solved(model: ExchangeModel, waves: readonly Wave[]): ConstantMoments["spins"] {
  const atoms = model.table.atoms.length;
  for (const [index, kind] of kinds.entries()) {
    const problem = equations(atoms, waves, index + 1);
    for (let start = 0; start < starts; start++) {
      const random = generator(1 + start);
      const from = Array.from({ length: problem.unknowns }, () => 2 * random() - 1);
      if (levenbergMarquardt(from, problem.model, { enough: built }).chiSquared <= built) return kind;
    }
  }
  return null;
}

/** A fixed sequence of numbers in [0, 1) (W. H. Press et al., Numerical Recipes, section 7.1: quick generators). */
function generator(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
}

/** |M_j|² as Fourier coefficients: quadratic in the amplitudes, so that central differences are exact. */
function equations(atoms: number, waves: readonly Wave[], components: number) {
  const parts = waves.flatMap(({ half, kappa, vectors }, wave) =>
    half
      ? [{ wave, conjugate: false, kappa, vectors }]
      : [false, true].map((conjugate) => ({
          wave,
          conjugate,
          kappa: conjugate ? kappa.map((entry) => -entry) : kappa,
          vectors,
        })),
  );
  const classes = pairClasses(parts.map(({ kappa }) => kappa));
  const offsets: number[] = [];
  let unknowns = 0;
  for (const { half, vectors } of waves) {
    offsets.push(unknowns);
    unknowns += vectors.length * components * (half ? 1 : 2);
  }
  const values = (amplitudes: Float64Array): Float64Array => {
    const fields = waves.map((wave, index) => fieldOf(wave, amplitudes, offsets[index] as number, components, atoms));
    const result: number[] = [];
    for (let atom = 0; atom < atoms; atom++)
      for (const { pairs, constant } of classes) {
        let [real, imaginary] = [0, 0];
        for (const [a, b] of pairs)
          for (let c = 0; c < components; c++) {
            const [ar, ai] = entryOf(parts[a] as Part, fields, atom, c, components);
            const [br, bi] = entryOf(parts[b] as Part, fields, atom, c, components);
            real += ar * br + ai * bi;
            imaginary += ai * br - ar * bi;
          }
        result.push(real);
        if (!constant) result.push(imaginary);
      }
    return Float64Array.from(result);
  };
  const wanted = Float64Array.from(
    Array.from({ length: atoms }, () => classes.flatMap(({ constant }) => (constant ? [1] : [0, 0]))).flat(),
  );
  const model = (amplitudes: Float64Array): WeightedResiduals => {
    const calculated = values(amplitudes);
    const jacobian = new Float64Array(calculated.length * unknowns);
    for (let index = 0; index < unknowns; index++) {
      const [up, down] = [amplitudes.slice(), amplitudes.slice()];
      up[index] = (up[index] as number) + 0.5;
      down[index] = (down[index] as number) - 0.5;
      const [above, below] = [values(up), values(down)];
      for (let row = 0; row < calculated.length; row++)
        jacobian[row * unknowns + index] = (above[row] as number) - (below[row] as number);
    }
    return { residuals: wanted.map((entry, row) => entry - (calculated[row] as number)), jacobian };
  };
  return { unknowns, model };
}

interface Part {
  readonly wave: number;
  readonly conjugate: boolean;
}

interface Field {
  readonly real: Float64Array;
  readonly imaginary: Float64Array;
}

/** S_j of one wave: atoms × components. */
function fieldOf(wave: Wave, amplitudes: Float64Array, offset: number, components: number, atoms: number): Field {
  const real = new Float64Array(atoms * components);
  const imaginary = new Float64Array(atoms * components);
  const stride = wave.half ? 1 : 2;
  wave.vectors.forEach((vector, n) => {
    for (let c = 0; c < components; c++) {
      const at = offset + (n * components + c) * stride;
      const [ar, ai] = [amplitudes[at] as number, wave.half ? 0 : (amplitudes[at + 1] as number)];
      for (let atom = 0; atom < atoms; atom++) {
        const [vr, vi] = [vector.real[atom] as number, vector.imaginary[atom] as number];
        real[atom * components + c] = (real[atom * components + c] as number) + ar * vr - ai * vi;
        imaginary[atom * components + c] = (imaginary[atom * components + c] as number) + ar * vi + ai * vr;
      }
    }
  });
  return { real, imaginary };
}

function entryOf({ wave, conjugate }: Part, fields: readonly Field[], atom: number, c: number, components: number) {
  const field = fields[wave] as Field;
  const at = atom * components + c;
  return [field.real[at] as number, (conjugate ? -1 : 1) * (field.imaginary[at] as number)] as const;
}

/** Pairs of waves by their difference modulo L*; of a difference and its negative only one is kept. */
function pairClasses(kappas: readonly (readonly number[])[]) {
  const classes: { readonly difference: number[]; readonly constant: boolean; readonly pairs: [number, number][] }[] =
    [];
  const whole = (step: readonly number[]) => step.every((entry) => Math.abs(entry - Math.round(entry)) < 1e-6);
  for (let a = 0; a < kappas.length; a++)
    for (let b = 0; b < kappas.length; b++) {
      const difference = (kappas[a] as number[]).map((entry, axis) => entry - (kappas[b]?.[axis] as number));
      const known = classes.find((one) =>
        whole(one.difference.map((entry, axis) => entry - (difference[axis] as number))),
      );
      if (known) known.pairs.push([a, b]);
      else if (!classes.some((one) => whole(one.difference.map((entry, axis) => entry + (difference[axis] as number)))))
        classes.push({ difference, constant: whole(difference), pairs: [[a, b]] });
    }
  return classes;
}

/**
 * Sites that a proof keeps short: one k with a single eigenvector whose weight differs between atoms, or no weight in
 * any of the waves.
 */
function shortSites(model: ExchangeModel, stars: readonly (readonly Wave[])[]): string[] {
  const { atoms } = model.table;
  const weight = (wave: Wave, atom: number) =>
    wave.vectors.reduce(
      (sum, { real, imaginary }) => sum + (real[atom] as number) ** 2 + (imaginary[atom] as number) ** 2,
      0,
    );
  const [only] = stars;
  const single = stars.length === 1 && only?.length === 1 && only[0]?.vectors.length === 1;
  const largest = single ? Math.max(...atoms.map((_, atom) => weight(only[0] as Wave, atom))) : 0;
  return [
    ...new Set(
      atoms.flatMap(({ label }, atom) => {
        const none = stars.every((arms) => arms.every((wave) => weight(wave, atom) < 1e-12));
        return none || (single && weight(only[0] as Wave, atom) < largest - 1e-6) ? [label] : [];
      }),
    ),
  ];
}
