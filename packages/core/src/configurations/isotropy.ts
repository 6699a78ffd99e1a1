import { breathe, type WorkHost } from "../algorithms/index.js";
import { gcd } from "../numbers/index.js";
import { elementIndex, generatingPlaces, type ParentQuotient, translationNumber } from "./parent-quotient.js";
import { directSum, type ResidueAction } from "./residue-action.js";
import { scratchFor, sparseFixedPart, sparseResidues } from "./sparse-residues.js";
import {
  fixesSubspace,
  identityResidues,
  mapSubspace,
  multiplyResidues,
  type ResidueMatrix,
  type Subspace,
  subspaceKey,
  wholeSpace,
} from "./subspaces.js";

/** A class of isotropy subgroups: one fixed space of it, its conjugates, and who leaves it fixed. */
export interface IsotropyClass {
  /** The fixed space of the representative, real coordinates of the direct sum. */
  readonly space: Subspace;
  /** All images of it under the parent group, itself among them. */
  readonly orbit: readonly Subspace[];
  /** Elements of the quotient that fix every vector of `space`, rising. */
  readonly elements: readonly number[];
}

export interface IsotropyList {
  readonly classes: readonly IsotropyClass[];
  /** Distinct matrices of the image group, ± counted as two unless they are one matrix. */
  readonly imageOrder: number;
  /** What was left out because of the limit, or null. */
  readonly bounded: string | null;
}

/**
 * All isotropy subgroups of the sum of some order parameters, one of each class. They are the stabilizers of the
 * intersections of fixed spaces of single elements, `Fix(A) ∩ Fix(B) = Fix(⟨A, B⟩)`, so the fixed spaces are found by
 * intersecting with one more element until nothing new comes (Toledano & Dmitriev, Reconstructive Phase Transitions,
 * 1996, section 2.4, for the notion). The zero space, the parent itself, is left out.
 *
 * @param limit the most elements of the quotient, and the most fixed spaces with all their images
 */
export async function isotropyClasses(
  quotient: ParentQuotient,
  actions: readonly ResidueAction[],
  limit: number,
  host: WorkHost,
): Promise<IsotropyList> {
  const prime = (actions[0] as ResidueAction).field.prime;
  if (quotient.size > limit)
    return {
      classes: [],
      imageOrder: 0,
      bounded: `the parent group has ${quotient.size} elements modulo the magnetic lattice, more than the limit of ${limit}`,
    };
  const { size, operators, translations } = directSum(actions);
  const image = imageMatrices(operators, translations, size, prime);
  const generators = generatorsOf(quotient, operators, translations);
  const seen = new Set<string>();
  const classes: { space: Subspace; orbit: Subspace[] }[] = [];
  let bounded: string | null = null;
  const take = async (space: Subspace): Promise<void> => {
    const key = subspaceKey(space);
    if (seen.has(key)) return;
    const orbit = await orbitOf(space, generators, prime, host);
    for (const { key: member } of orbit) seen.add(member);
    classes.push(representative(orbit, prime));
  };
  await take(wholeSpace(size));
  const probes = cyclicGenerators(image, size, prime).map(({ number, sign }) => ({
    matrix: sparseResidues(image.matrices[number] as ResidueMatrix, size),
    sign,
  }));
  const scratch = scratchFor(size);
  for (let next = 0; next < classes.length && bounded === null; next++) {
    const { space } = classes[next] as { space: Subspace };
    const local = new Set<string>();
    for (const { matrix, sign } of probes) {
      await breathe(host);
      const part = sparseFixedPart(space, matrix, sign, prime, scratch);
      if (part === null || part.rows === space.rows) continue;
      const key = subspaceKey(part);
      if (local.has(key)) continue;
      local.add(key);
      await take(part);
      if (seen.size > limit)
        bounded ??= `more than ${limit} directions of the order parameter came up; the list is not complete`;
    }
  }
  const found: IsotropyClass[] = [];
  for (const { space, orbit } of classes) {
    await breathe(host);
    found.push({ space, orbit, elements: stabilizer(quotient, image, space, prime) });
  }
  return { classes: found, imageOrder: image.order, bounded };
}

interface ImageGroup {
  /** Distinct matrices without time reversal. */
  readonly matrices: readonly ResidueMatrix[];
  /** For operator place · translations + translation the number of its matrix. */
  readonly numbers: readonly number[];
  /** By the entries as text. */
  readonly numberOf: ReadonlyMap<string, number>;
  readonly identity: number;
  readonly order: number;
}

function imageMatrices(
  operators: readonly ResidueMatrix[],
  translations: readonly ResidueMatrix[],
  size: number,
  prime: number,
): ImageGroup {
  const numbers: number[] = [];
  const matrices: ResidueMatrix[] = [];
  const known = new Map<string, number>();
  for (const operator of operators)
    for (const translation of translations) {
      const matrix = multiplyResidues(translation, operator, size, prime);
      const key = matrix.join();
      const number = known.get(key) ?? matrices.length;
      if (number === matrices.length) {
        known.set(key, number);
        matrices.push(matrix);
      }
      numbers.push(number);
    }
  const minusOne =
    translations.length === 0
      ? ""
      : Array.from({ length: size * size }, (_, index) => (index % (size + 1) === 0 ? prime - 1 : 0)).join();
  return {
    matrices,
    numbers,
    numberOf: known,
    identity: known.get(identityResidues(size).join()) as number,
    order: matrices.length * (known.has(minusOne) ? 1 : 2),
  };
}

/**
 * One generator of every cyclic subgroup of prime-power order of the image with −1. They are enough: the fixed space of
 * any element is the intersection of those of its powers of prime-power order.
 */
function cyclicGenerators(image: ImageGroup, size: number, prime: number): { number: number; sign: 1 | -1 }[] {
  const { matrices, numberOf, identity } = image;
  const powers = matrices.map((matrix, number) => {
    const list = [number];
    for (let power = matrix; list[list.length - 1] !== identity; ) {
      power = multiplyResidues(power, matrix, size, prime);
      list.push(numberOf.get(power.join()) as number);
    }
    return list;
  });
  return matrices.flatMap((_, number) =>
    ([1, -1] as const).flatMap((sign) => {
      const list = powers[number] as readonly number[];
      const order = sign === 1 || list.length % 2 === 0 ? list.length : 2 * list.length;
      if (order === 1 || !isPrimePower(order)) return [];
      for (let exponent = 2; exponent < order; exponent++) {
        if (gcd(exponent, order) !== 1) continue;
        const other = list[(exponent - 1) % list.length] as number;
        const otherSign = sign === 1 || exponent % 2 === 0 ? 1 : -1;
        if (other < number || (other === number && otherSign > sign)) return [];
      }
      return [{ number, sign }];
    }),
  );
}

function isPrimePower(n: number): boolean {
  let divisor = 2;
  while (n % divisor !== 0) divisor += 1;
  let rest = n;
  while (rest % divisor === 0) rest /= divisor;
  return rest === 1;
}

/** Matrices that generate the image together with −1, which maps every subspace on itself. */
function generatorsOf(
  quotient: ParentQuotient,
  operators: readonly ResidueMatrix[],
  translations: readonly ResidueMatrix[],
): ResidueMatrix[] {
  const steps = [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ].map((vector) => translationNumber(quotient, vector));
  return [
    ...generatingPlaces(quotient).map((place) => operators[place] as ResidueMatrix),
    ...new Set(steps.filter((number) => number !== 0)),
  ].map((entry) => (typeof entry === "number" ? (translations[entry] as ResidueMatrix) : entry));
}

interface Keyed {
  readonly key: string;
  readonly space: Subspace;
}

async function orbitOf(
  space: Subspace,
  generators: readonly ResidueMatrix[],
  prime: number,
  host: WorkHost,
): Promise<Keyed[]> {
  const found: Keyed[] = [{ key: subspaceKey(space), space }];
  const keys = new Set([found[0]?.key]);
  for (let next = 0; next < found.length; next++) {
    await breathe(host);
    for (const generator of generators) {
      const moved = mapSubspace((found[next] as Keyed).space, generator, prime);
      const key = subspaceKey(moved);
      if (keys.has(key)) continue;
      keys.add(key);
      found.push({ key, space: moved });
    }
  }
  return found;
}

/** The member that reads best: fewest entries, plainest numbers, first axes first. */
function representative(orbit: readonly Keyed[], prime: number): { space: Subspace; orbit: Subspace[] } {
  let best = orbit[0] as Keyed;
  let bestScore = score(best.space, prime);
  for (const member of orbit.slice(1)) {
    const own = score(member.space, prime);
    if (lexicographic(own, bestScore) >= 0) continue;
    best = member;
    bestScore = own;
  }
  return { space: best.space, orbit: orbit.map(({ space }) => space) };
}

function score({ rows, width, basis }: Subspace, prime: number): number[] {
  let entries = 0;
  let odd = 0;
  let negative = 0;
  const columns: number[] = [];
  for (let row = 0; row < rows; row++)
    for (let column = 0; column < width; column++) {
      const entry = basis[row * width + column] as number;
      if (entry === 0) continue;
      entries += 1;
      columns.push(column);
      if (entry === prime - 1) negative += 1;
      else if (entry !== 1) odd += 1;
    }
  return [entries, odd, negative, ...columns, ...basis];
}

function lexicographic(a: readonly number[], b: readonly number[]): number {
  for (let index = 0; index < Math.min(a.length, b.length); index++) {
    const difference = (a[index] as number) - (b[index] as number);
    if (difference !== 0) return difference;
  }
  return a.length - b.length;
}

function stabilizer(quotient: ParentQuotient, image: ImageGroup, space: Subspace, prime: number): number[] {
  const count = quotient.translations.length;
  const verdicts = image.matrices.map((matrix) => [
    fixesSubspace(space, matrix, 1, prime),
    fixesSubspace(space, matrix, -1, prime),
  ]);
  return image.numbers.flatMap((number, index) =>
    [0, 1].flatMap((reversed) =>
      verdicts[number]?.[reversed] === true
        ? [
            elementIndex(quotient, {
              place: Math.floor(index / count),
              translation: index % count,
              timeReversal: reversed === 0 ? 1 : -1,
            }),
          ]
        : [],
    ),
  );
}
