import type { SiteModes } from "@kvane/core/modes";
import type { SpaceGroup } from "@kvane/core/spacegroups";
import {
  type Field,
  greyOperators,
  movedField,
  randomIrrepField,
  type Supercell,
  supercell,
} from "./configurations-field.js";
import { componentsOf, inverse, isReciprocalVector, turnRow } from "./float-group.js";
import { seeded } from "./random.js";
import { armCarriers } from "./validate-configurations.js";

/** A class of isotropy subgroups found by going through all subgroups. */
export interface BruteClass {
  readonly index: number;
  readonly dimension: number;
}

/**
 * All classes of isotropy subgroups of the fields of some irreps by brute force: the matrices of every operator of the
 * grey group on these fields in a supercell, all subgroups of the finite group that they form, those that are the whole
 * stabilizer of what they leave fixed, one of each class of conjugates. Null when the image has more than `most` elements.
 */
export function bruteIsotropy(
  group: SpaceGroup,
  site: SiteModes,
  labels: readonly string[],
  arms: "pair" | "all",
  most: number,
): BruteClass[] | null {
  const k = componentsOf(site.representations.k);
  const probe = supercell(group, [site], unitAxes());
  const carriers = armCarriers(probe, k);
  const waves = (arms === "pair" ? carriers.slice(0, 1) : carriers).map((operator) =>
    turnRow(k, inverse(operator).rotation),
  );
  const periods = [0, 1, 2].map((axis) => periodOf(waves.map((wave) => wave[axis] as number)));
  const cell = supercell(
    group,
    [site],
    unitAxes().map((row, axis) => row.map((entry) => entry * (periods[axis] as number))),
  );
  const random = seeded(7);
  const used = arms === "pair" ? carriers.slice(0, 1) : carriers;
  const basis = orthonormal(cell, () => randomIrrepField(cell, labels, k, used, random));
  const elements = greyOperators(cell).filter(
    ({ operator }) => arms === "all" || takesToPair(cell, k, operator.rotation),
  );
  const matrices: number[][] = [];
  const numbers = new Map<string, number>();
  for (const element of elements) {
    const matrix = matrixOn(
      basis,
      basis.map((field) => movedField(cell, field, element)),
    );
    const key = keyOf(matrix);
    if (numbers.has(key)) continue;
    numbers.set(key, matrices.length);
    matrices.push(matrix);
    if (matrices.length > most) return null;
  }
  const size = basis.length;
  const table = matrices.map((a) => matrices.map((b) => numbers.get(keyOf(times(a, b, size))) as number));
  if (table.flat().includes(undefined as unknown as number)) throw new Error("the matrices form no group");
  const pairs =
    arms === "all"
      ? 1
      : cell.group.operators.length / new Set(elements.map(({ operator }) => operator.rotation.join())).size;
  return classesOf(allSubgroups(table), table, matrices, size).map((entry) => ({
    ...entry,
    index: entry.index * pairs,
  }));
}

function unitAxes(): number[][] {
  return [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ];
}

function periodOf(values: readonly number[]): number {
  for (let period = 1; period < 64; period++)
    if (values.every((value) => Math.abs(value * period - Math.round(value * period)) < 1e-9)) return period;
  throw new Error("k has no short period");
}

function takesToPair(cell: Supercell, k: readonly number[], rotation: readonly number[]): boolean {
  const turned = turnRow(k, rotation);
  return [1, -1].some((sign) =>
    isReciprocalVector(
      cell.group,
      turned.map((entry, axis) => entry - sign * (k[axis] as number)),
    ),
  );
}

function orthonormal(cell: Supercell, make: () => Field): Field[] {
  const kept: Field[] = [];
  for (let misses = 0; misses < 3; ) {
    const rest = make();
    for (let round = 0; round < 2; round++)
      for (const unit of kept) {
        let overlap = 0;
        for (let index = 0; index < rest.length; index++) overlap += (rest[index] as number) * (unit[index] as number);
        for (let index = 0; index < rest.length; index++)
          rest[index] = (rest[index] as number) - overlap * (unit[index] as number);
      }
    const length = Math.sqrt(inner3(rest, rest));
    if (length < 1e-6) misses += 1;
    else kept.push(rest.map((entry) => entry / length));
    if (kept.length > 3 * cell.atoms.length) throw new Error("more fields than components");
  }
  return kept;
}

function inner3(a: Field, b: Field): number {
  return a.reduce((sum, entry, index) => sum + entry * (b[index] as number), 0);
}

function matrixOn(basis: readonly Field[], moved: readonly Field[]): number[] {
  return basis.flatMap((row) => moved.map((column) => inner3(row, column)));
}

function keyOf(matrix: readonly number[]): string {
  return matrix.map((entry) => Math.round(entry * 1e5) + 0).join();
}

function times(a: readonly number[], b: readonly number[], size: number): number[] {
  return Array.from({ length: size * size }, (_, index) => {
    const [row, column] = [Math.floor(index / size), index % size];
    let sum = 0;
    for (let at = 0; at < size; at++) sum += (a[row * size + at] as number) * (b[at * size + column] as number);
    return sum;
  });
}

/** All subgroups of a group given by its table, as sorted lists of elements; the identity is element 0. */
export function allSubgroups(table: readonly (readonly number[])[]): number[][] {
  const found = new Map<string, number[]>([["0", [0]]]);
  const queue: number[][] = [[0]];
  for (let next = queue.pop(); next !== undefined; next = queue.pop())
    for (let element = 0; element < table.length; element++) {
      if (next.includes(element)) continue;
      const larger = generated([...next, element], table);
      const key = larger.join();
      if (found.has(key)) continue;
      found.set(key, larger);
      queue.push(larger);
    }
  return [...found.values()];
}

function generated(generators: readonly number[], table: readonly (readonly number[])[]): number[] {
  const reached = new Set<number>([0]);
  const queue = [0];
  for (let next = queue.pop(); next !== undefined; next = queue.pop())
    for (const generator of generators) {
      const product = table[next]?.[generator] as number;
      if (reached.has(product)) continue;
      reached.add(product);
      queue.push(product);
    }
  return [...reached].sort((a, b) => a - b);
}

function classesOf(
  subgroups: readonly (readonly number[])[],
  table: readonly (readonly number[])[],
  matrices: readonly (readonly number[])[],
  size: number,
): BruteClass[] {
  const inverses = table.map((row) => row.indexOf(0));
  const taken = new Set<string>();
  return subgroups.flatMap((subgroup) => {
    if (taken.has(subgroup.join())) return [];
    const mean = Array.from(
      { length: size * size },
      (_, entry) =>
        subgroup.reduce((sum, element) => sum + (matrices[element]?.[entry] as number), 0) / subgroup.length,
    );
    const dimension = Math.round(
      Array.from({ length: size }, (_, at) => mean[at * size + at] as number).reduce((a, b) => a + b, 0),
    );
    if (dimension === 0) return [];
    const fixing = matrices.flatMap((matrix, element) =>
      times(matrix, mean, size).every((entry, at) => Math.abs(entry - (mean[at] as number)) < 1e-6) ? [element] : [],
    );
    if (fixing.length !== subgroup.length) return [];
    table.forEach((_, by) => {
      const conjugate = subgroup.map(
        (element) => table[table[by]?.[element] as number]?.[inverses[by] as number] as number,
      );
      taken.add(conjugate.sort((a, b) => a - b).join());
    });
    return [{ index: table.length / subgroup.length, dimension }];
  });
}
