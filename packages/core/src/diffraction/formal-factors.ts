import type { WaveVector } from "../kvectors/index.js";
import type { ModeMoment, SiteModes } from "../modes/index.js";
import {
  add,
  addVectors,
  coordinateNames,
  dot,
  fractionalPart,
  isZero,
  mapVector,
  multiply,
  multiplyMatrices,
  parseForm,
  type RationalMatrix,
  type RationalVector,
  rational,
  subtractVectors,
  timesColumn,
  transpose,
  zero,
  zeroVector,
} from "../numbers/index.js";
import { rotationOf, type SpaceGroup, type SymmetryOperator, translationOf } from "../spacegroups/index.js";
import { scaledTerms, sumVanishes, type UnityTerm, unityTerms } from "./unity-sums.js";

/**
 * A vector of reciprocal space with letters: `constant + Σ letter · coefficient`, rows in a*, b*, c*. The letters are u, v,
 * w of k and integers that run through a family of reflections; what holds for all their values is what is asked for.
 */
export interface FormalVector {
  readonly constant: RationalVector;
  readonly letters: readonly RationalVector[];
  /** How many of the letters are u, v, w: they come first. */
  readonly ofK: number;
}

/** A position `constant + Σ x · coefficient` with the free coordinates of its site as letters. */
export interface FormalPosition {
  readonly constant: RationalVector;
  readonly letters: readonly RationalVector[];
}

/** k with its letters u, v, w (all three, so that phases of modes fit). */
export function formalWave(k: WaveVector): FormalVector {
  const [a, b, c] = k.components;
  return {
    constant: [a.constant, b.constant, c.constant],
    letters: ([0, 1, 2] as const).map((letter) => [
      a.coefficients[letter],
      b.coefficients[letter],
      c.coefficients[letter],
    ]),
    ofK: 3,
  };
}

/** The positions of an orbit; with `free` their free coordinates stay letters, else they are what was given. */
export function formalPositions(group: SpaceGroup, { orbit }: SiteModes, free: boolean): FormalPosition[] {
  if (!free) return orbit.positions.map((constant) => ({ constant, letters: [] }));
  const forms = orbit.freeCoordinates.map((text) => parseForm(text, coordinateNames));
  const letters = ([0, 1, 2] as const)
    .map((letter): RationalVector => mapVector(zeroVector, (_, axis) => forms[axis]?.coefficients[letter] ?? zero))
    .map((direction, letter) => ({ direction, value: orbit.position[letter as 0 | 1 | 2] }))
    .filter(({ direction }) => !direction.every(isZero));
  // What is left when the letters have their values: exact, where the forms are reduced modulo 1.
  const constant = letters.reduce(
    (rest, { direction, value }) =>
      subtractVectors(
        rest,
        mapVector(direction, (entry) => multiply(entry, value)),
      ),
    orbit.position,
  );
  return orbit.carriers.map(({ operator, shift }) => {
    const carrier = group.operators[operator] as SymmetryOperator;
    const rotation = rotationOf(carrier);
    return {
      constant: subtractVectors(addVectors(timesColumn(rotation, constant), translationOf(carrier)), shift),
      letters: letters.map(({ direction }) => timesColumn(rotation, direction)),
    };
  });
}

/** The metrics that the point group allows, as a spanning set: `Σ Rᵀ E R` over elementary symmetric matrices E. */
export function invariantMetrics(group: SpaceGroup): RationalMatrix[] {
  const found = new Map<string, RationalMatrix>();
  for (const [i, j] of [
    [0, 0],
    [1, 1],
    [2, 2],
    [0, 1],
    [0, 2],
    [1, 2],
  ] as const) {
    const elementary = [0, 1, 2].map((row) =>
      [0, 1, 2].map((column) => rational((row === i && column === j) || (row === j && column === i) ? 1 : 0)),
    ) as unknown as RationalMatrix;
    const sum = group.operators.reduce<RationalMatrix | null>((total, operator) => {
      const rotation = rotationOf(operator);
      const image = multiplyMatrices(transpose(rotation), multiplyMatrices(elementary, rotation));
      return total === null
        ? image
        : (total.map((row, at) => addVectors(row, image[at] as RationalVector)) as unknown as RationalMatrix);
    }, null);
    if (sum !== null && !sum.every((row) => row.every(isZero))) found.set(JSON.stringify(sum), sum);
  }
  return [...found.values()];
}

/**
 * Whether `F⊥ = 0` for one mode at Q, for all values of all letters and in every metric that the group allows. Terms whose
 * exponentials differ in a letter are independent functions, and so are the powers of a letter before them; F⊥ is zero when
 * `(G F) × Q` is, G the metric, which is linear in the entries of G.
 */
export function factorVanishes(
  moments: readonly ModeMoment[],
  positions: readonly FormalPosition[],
  q: FormalVector,
  metrics: readonly RationalMatrix[],
): boolean {
  const parts = [q.constant, ...q.letters].filter((part) => !part.every(isZero));
  for (const components of groupedTerms(moments, positions, q).values()) {
    if (components.every(sumVanishes)) continue;
    if (parts.length === 0) return false;
    const parallel = metrics.every((metric) => {
      const covector = metric.map((row) => row.flatMap((entry, axis) => scaledTerms(entry, components[axis] ?? [])));
      return parts.every((part) => crossVanishes(covector, part));
    });
    if (!parallel) return false;
  }
  return true;
}

function crossVanishes(covector: readonly (readonly UnityTerm[])[], q: RationalVector): boolean {
  for (const [a, b] of [
    [0, 1],
    [1, 2],
    [2, 0],
  ] as const) {
    const terms = [
      ...scaledTerms(q[b], covector[a] as UnityTerm[]),
      ...scaledTerms(multiply([-1, 1], q[a]), covector[b] as UnityTerm[]),
    ];
    if (!sumVanishes(terms)) return false;
  }
  return true;
}

/** Σ_j e^{2πi(phase_j + Q·r_j)} v_j, apart by what letters stand in the exponent; three components each. */
function groupedTerms(
  moments: readonly ModeMoment[],
  positions: readonly FormalPosition[],
  q: FormalVector,
): Map<string, UnityTerm[][]> {
  const groups = new Map<string, UnityTerm[][]>();
  moments.forEach(({ phase, vector }, atom) => {
    const { constant, letters } = positions[atom] as FormalPosition;
    if (vector.every(({ coefficients }) => coefficients.every((entry) => entry === 0))) return;
    const turns = add(phase.constant, dot(q.constant, constant));
    const exponents = [
      ...q.letters.map((letter, index) => {
        const own = dot(letter, constant);
        // u, v, w also stand in the phase of the mode; whole turns of an integer letter are nothing.
        return index < q.ofK ? add(own, phase.coefficients[index as 0 | 1 | 2]) : fractionalPart(own);
      }),
      ...letters.flatMap((x) => [dot(q.constant, x), ...q.letters.map((letter) => dot(letter, x))]),
    ];
    const key = exponents.map(([top, bottom]) => `${top}/${bottom}`).join();
    const group = groups.get(key) ?? [[], [], []];
    vector.forEach((entry, axis) => {
      group[axis]?.push(...unityTerms(entry, turns));
    });
    groups.set(key, group);
  });
  return groups;
}

/** `a − b` where the same letters stand in both. */
export function subtractPositions(a: FormalPosition, b: FormalPosition): readonly RationalVector[] {
  return a.letters.map((letter, index) => subtractVectors(letter, b.letters[index] as RationalVector));
}

/** Denominator of `q·r`. */
export function denominatorOf(q: RationalVector, r: RationalVector): number {
  return dot(q, r)[1];
}
