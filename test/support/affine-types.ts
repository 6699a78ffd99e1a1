/**
 * Whether two space groups are of one type or of one arithmetic class, by searching for the map between them: integer
 * matrices C of determinant ±1 with C P₁ C⁻¹ = P₂ (P the point groups in primitive bases), then an origin shift. Every
 * map found is verified; the search runs over small combinations of a basis of all solutions of C gᵢ = hᵢ C.
 */

import type { SpaceGroup } from "@kvane/core/spacegroups";
import {
  hermiteNormalForm,
  type IntegerMatrix,
  integerDeterminant,
  multiplyIntegerMatrices,
} from "#core/numbers/index.js";

interface Conjugator {
  readonly matrix: IntegerMatrix;
  readonly determinant: number;
  /** Indices of generators of the first group and of their images in the second. */
  readonly pairs: readonly (readonly [number, number])[];
  /** All integer rows y with `y (1 − h) = 0` over the stacked images h, as a basis. */
  readonly leftKernel: readonly (readonly number[])[];
}

export interface TypeFinder {
  /** True when some integer change of primitive basis takes one point group into the other. */
  readonly sameArithmeticClass: (a: SpaceGroup, b: SpaceGroup) => boolean;
  /** True when an affine map takes one group into the other; `handed` asks for one of positive determinant. */
  readonly sameType: (a: SpaceGroup, b: SpaceGroup, handed: boolean) => boolean;
}

/** The two tests; maps between point groups are searched once a pair. */
export function typeFinder(): TypeFinder {
  const known = new Map<string, readonly Conjugator[]>();
  const texts = new WeakMap<SpaceGroup, string>();
  const textOf = (group: SpaceGroup): string => {
    const text = texts.get(group) ?? group.primitive.rotations.join(" ");
    texts.set(group, text);
    return text;
  };
  const conjugators = (a: SpaceGroup, b: SpaceGroup): readonly Conjugator[] => {
    if (a.pointGroup !== b.pointGroup) return [];
    const key = `${textOf(a)}|${textOf(b)}`;
    const found = known.get(key) ?? findConjugators(a.primitive.rotations, b.primitive.rotations);
    known.set(key, found);
    return found;
  };
  return {
    sameArithmeticClass: (a, b) => conjugators(a, b).length > 0,
    sameType: (a, b, handed) =>
      conjugators(a, b).some((one) => (!handed || one.determinant === 1) && hasOriginShift(a, b, one)),
  };
}

function findConjugators(first: readonly IntegerMatrix[], second: readonly IntegerMatrix[]): readonly Conjugator[] {
  const generators = generatorsOf(first);
  const candidates = generators.map((generator) =>
    second.filter(
      (image) => trace(image) === trace(generator) && integerDeterminant(image) === integerDeterminant(generator),
    ),
  );
  const found = new Map<string, Conjugator>();
  const secondKeys = second.map((rotation) => rotation.join());
  for (const images of product(candidates)) {
    for (const matrix of unimodularSolutions(generators, images)) {
      if (found.has(matrix.join())) continue;
      const determinant = integerDeterminant(matrix);
      const inverse = inverseOf(matrix);
      const moved = first.map((rotation) =>
        secondKeys.indexOf(multiplyIntegerMatrices(multiplyIntegerMatrices(matrix, rotation), inverse).join()),
      );
      if (moved.some((index) => index < 0)) continue;
      const pairs = generators.map((generator) => {
        const source = first.indexOf(generator);
        return [source, moved[source] as number] as const;
      });
      found.set(matrix.join(), {
        matrix,
        determinant,
        pairs,
        leftKernel: shiftKernel(pairs.map(([, to]) => second[to] as IntegerMatrix)),
      });
    }
  }
  return [...found.values()];
}

/** Operators that generate the set, greedily. */
function generatorsOf(rotations: readonly IntegerMatrix[]): readonly IntegerMatrix[] {
  const generators: IntegerMatrix[] = [];
  let reached = new Set([(rotations[0] as IntegerMatrix).join()]);
  // From the last: improper operators of high order come there and generate most.
  for (const rotation of [...rotations].reverse()) {
    if (reached.has(rotation.join())) continue;
    generators.push(rotation);
    reached = closure(generators);
  }
  return generators;
}

function closure(generators: readonly IntegerMatrix[]): Set<string> {
  const reached = new Map<string, IntegerMatrix>([["1,0,0,0,1,0,0,0,1", [1, 0, 0, 0, 1, 0, 0, 0, 1]]]);
  for (const element of reached.values())
    for (const generator of generators) {
      const next = multiplyIntegerMatrices(element, generator);
      if (!reached.has(next.join())) reached.set(next.join(), next);
    }
  return new Set(reached.keys());
}

/** Matrices of determinant ±1 with C gᵢ = hᵢ C among small combinations of a basis of all integer solutions. */
function unimodularSolutions(generators: readonly IntegerMatrix[], images: readonly IntegerMatrix[]): IntegerMatrix[] {
  const equations: number[][] = [];
  generators.forEach((g, index) => {
    const h = images[index] as IntegerMatrix;
    for (let row = 0; row < 3; row++)
      for (let column = 0; column < 3; column++) {
        const equation = new Array<number>(9).fill(0);
        for (let middle = 0; middle < 3; middle++) {
          equation[3 * row + middle] = (equation[3 * row + middle] as number) + (g[3 * middle + column] as number);
          equation[3 * middle + column] = (equation[3 * middle + column] as number) - (h[3 * row + middle] as number);
        }
        equations.push(equation);
      }
  });
  const basis = integerKernel(equations, 9);
  // One dimension allows no other multiple; more are searched as far as the classes of the 530 settings need.
  const range = basis.length === 1 ? [1, -1] : [0, 1, -1, 2, -2].slice(0, basis.length > 3 ? 3 : 5);
  return [...product(basis.map(() => range))]
    .map((factors) =>
      new Array<number>(9)
        .fill(0)
        .map((_, entry) =>
          basis.reduce((sum, vector, index) => sum + (factors[index] as number) * (vector[entry] as number), 0),
        ),
    )
    .filter((matrix) => Math.abs(integerDeterminant(matrix)) === 1);
}

function shiftKernel(rotations: readonly IntegerMatrix[]): number[][] {
  const columns = [0, 1, 2].map((column) =>
    rotations.flatMap((rotation) =>
      [0, 1, 2].map((row) => (row === column ? 1 : 0) - (rotation[3 * row + column] as number)),
    ),
  );
  return integerKernel(columns, 3 * rotations.length);
}

/**
 * A shift p with t₂(h) ≡ C t₁(g) + (1 − h) p modulo 1 for all generators exists exactly when every integer row y with
 * y (1 − h) = 0 gives an integer y · (t₂ − C t₁).
 */
function hasOriginShift(a: SpaceGroup, b: SpaceGroup, { matrix, pairs, leftKernel }: Conjugator): boolean {
  const gaps = pairs.flatMap(([source, target]) => {
    const from = (a.primitive.translations[source] as readonly number[]).map(
      (entry) => entry / a.primitive.denominator,
    );
    const to = (b.primitive.translations[target] as readonly number[]).map((entry) => entry / b.primitive.denominator);
    return [0, 1, 2].map(
      (row) =>
        (to[row] as number) -
        from.reduce((sum, entry, column) => sum + (matrix[3 * row + column] as number) * entry, 0),
    );
  });
  return leftKernel.every((y) => {
    const value = y.reduce((sum, entry, index) => sum + entry * (gaps[index] as number), 0);
    return Math.abs(value - Math.round(value)) < 1e-9;
  });
}

/** A basis of all integer vectors v with `equations · v = 0`: rows of [Eᵀ | 1] in Hermite form with zero first part. */
function integerKernel(equations: readonly (readonly number[])[], width: number): number[][] {
  const height = equations.length;
  const stacked = Array.from({ length: width }, (_, row) => [
    ...equations.map((equation) => equation[row] as number),
    ...Array.from({ length: width }, (_unused, column) => (row === column ? 1 : 0)),
  ]);
  return hermiteNormalForm(stacked, height + width)
    .filter((row) => row.slice(0, height).every((entry) => entry === 0))
    .map((row) => row.slice(height));
}

function inverseOf(m: IntegerMatrix): IntegerMatrix {
  const [a, b, c, d, e, f, g, h, i] = m as [number, number, number, number, number, number, number, number, number];
  const cofactors = [
    e * i - f * h,
    c * h - b * i,
    b * f - c * e,
    f * g - d * i,
    a * i - c * g,
    c * d - a * f,
    d * h - e * g,
    b * g - a * h,
    a * e - b * d,
  ];
  return cofactors.map((entry) => entry * integerDeterminant(m) + 0);
}

function trace(m: IntegerMatrix): number {
  return (m[0] as number) + (m[4] as number) + (m[8] as number);
}

function* product<T>(lists: readonly (readonly T[])[]): Generator<readonly T[]> {
  const [first, ...rest] = lists;
  if (!first) yield [];
  else for (const tail of product(rest)) for (const item of first) yield [item, ...tail];
}
