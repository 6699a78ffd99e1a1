/**
 * Index-two subgroups of a space group up to its proper affine normalizer, found by brute force: a magnetic group of
 * type III or IV is a space group F with a homomorphism χ from F to {+1, −1}, here as bits. Neither the table of
 * magnetic groups nor the identification goes into it.
 */
import type { SpaceGroup } from "@kvane/core/spacegroups";
import { integerDeterminant, invertUnimodular, multiplyIntegerMatrices } from "#core/numbers/index.js";

type Matrix = readonly number[];
type Column = readonly number[];

/** χ in the primitive basis: on the three basis translations and on the operators of the group. */
export interface Coloring {
  readonly translations: Column;
  readonly operators: Column;
}

const entries = [0, 1, -1];

/**
 * All matrices with entries 0, 1, −1 and determinant 1, as columns in the axes of the setting, and the shears by two
 * axes, which move half a centred cell by one.
 */
let smallMatrices: readonly Matrix[] | null = null;
/** Those of finite order: what normalizers of all but triclinic and monoclinic groups are made of. */
let finiteMatrices: readonly Matrix[] | null = null;

function listSmallMatrices(): readonly Matrix[] {
  let all: number[][] = [[]];
  for (let place = 0; place < 9; place++) all = all.flatMap((head) => entries.map((entry) => [...head, entry]));
  const shears = [1, 2, 3, 5, 6, 7].map((place) =>
    [1, 0, 0, 0, 1, 0, 0, 0, 1].map((entry, index) => (index === place ? 2 : entry)),
  );
  return [...all.filter((matrix) => integerDeterminant(matrix) === 1), ...shears];
}

/** One of each class of homomorphisms other than the trivial one. */
export function coloringClasses(group: SpaceGroup): readonly Coloring[] {
  const all = colorings(group);
  const index = new Map(all.map((one, position) => [textOf(one), position]));
  const parent = all.map((_, position) => position);
  const rootOf = (position: number): number => {
    let root = position;
    while (parent[root] !== root) root = parent[root] as number;
    return root;
  };
  for (const map of normalizer(group))
    for (const [position, one] of all.entries())
      parent[rootOf(index.get(textOf(map(one))) as number)] = rootOf(position);
  return all.filter((_, position) => parent[position] === position);
}

function textOf({ translations, operators }: Coloring): string {
  return `${translations.join("")} ${operators.join("")}`;
}

/** All homomorphisms other than the trivial one. */
function colorings({ primitive }: SpaceGroup): readonly Coloring[] {
  const { rotations, translations, denominator } = primitive;
  const where = new Map(rotations.map((rotation, position) => [rotation.join(), position]));
  const generators = generatorsOf(rotations);
  const found: Coloring[] = [];
  for (let bits = 1; bits < 2 ** (3 + generators.length); bits++) {
    const onLattice = [0, 1, 2].map((place) => (bits >> place) & 1);
    const seeds = generators.map((_, place) => (bits >> (3 + place)) & 1);
    const values = new Array<number | undefined>(rotations.length).fill(undefined);
    values[0] = 0;
    let consistent = rotations.every((rotation) =>
      [0, 1, 2].every((column) => {
        const image = [0, 3, 6].map((row) => rotation[row + column] as number);
        return (dotOf(onLattice, image) - (onLattice[column] as number)) % 2 === 0;
      }),
    );
    const queue = [0];
    while (consistent && queue.length > 0) {
      const current = queue.pop() as number;
      for (const [place, generator] of generators.entries()) {
        const rotation = rotations[current] as Matrix;
        const target = where.get(multiplyIntegerMatrices(rotation, rotations[generator] as Matrix).join()) as number;
        const moved = times(rotation, translations[generator] as Column);
        const lattice = moved.map(
          (entry, axis) =>
            (entry + (translations[current]?.[axis] as number) - (translations[target]?.[axis] as number)) /
            denominator,
        );
        const value = mod2((values[current] as number) + (seeds[place] as number) + dotOf(onLattice, lattice));
        if (values[target] === undefined) {
          values[target] = value;
          queue.push(target);
        } else consistent = values[target] === value;
        if (!consistent) break;
      }
    }
    if (consistent) found.push({ translations: onLattice, operators: values as number[] });
  }
  return found;
}

/** How the elements of the proper affine normalizer act, those with small linear part and shift in 8ths or 12ths. */
function* normalizer(group: SpaceGroup): Generator<(one: Coloring) => Coloring> {
  const { rotations, translations, denominator } = group.primitive;
  const where = new Map(rotations.map((rotation, position) => [rotation.join(), position]));
  const generators = generatorsOf(rotations);
  // Too coarse a grid would leave classes apart, so that the counts would come out too high, never right.
  const triclinic = ["1", "-1"].includes(group.pointGroup);
  const step = triclinic ? 12 : /^-?[36]/.test(group.pointGroup) ? 2 : 3;
  const grid = Array.from({ length: 24 / step }, (_, index) => index * step);
  const seen = new Set<string>();
  smallMatrices ??= listSmallMatrices();
  finiteMatrices ??= smallMatrices.filter(hasFiniteOrder);
  const infinite = ["1", "-1", "2", "m", "2/m"].includes(group.pointGroup);
  for (const conventional of infinite ? smallMatrices : finiteMatrices) {
    const matrix = inPrimitiveBasis(group, conventional);
    if (matrix === null) continue;
    const inverse = invertUnimodular(matrix);
    const imageOf = (rotation: Matrix): number | undefined =>
      where.get(multiplyIntegerMatrices(multiplyIntegerMatrices(matrix, rotation), inverse).join());
    if (generators.some((generator) => imageOf(rotations[generator] as Matrix) === undefined)) continue;
    const images = rotations.map(imageOf);
    // With no rotations but 1 and -1, what matters of W is what it does to half a lattice vector.
    const kind = triclinic ? matrix.map(mod2).join("") : matrix.join();
    if (seen.has(kind)) continue;
    seen.add(kind);
    const latticeParts = (shift: Column): (readonly number[] | null)[] =>
      rotations.map((_, position) => {
        const target = images[position] as number;
        const moved = times(matrix, translations[position] as Column);
        const back = times(rotations[target] as Matrix, shift);
        const parts = moved.map(
          (entry, axis) =>
            (entry - (translations[target]?.[axis] as number)) / denominator +
            ((shift[axis] as number) - (back[axis] as number)) / 24,
        );
        return parts.every((part) => Math.abs(part - Math.round(part)) < 1e-9) ? parts.map(Math.round) : null;
      });
    const fits = shiftTest(generators, images as number[], rotations, translations, denominator, matrix);
    for (const x of grid)
      for (const y of grid)
        for (const z of grid) {
          if (!fits(x, y, z)) continue;
          const parts = latticeParts([x, y, z]) as (readonly number[])[];
          yield ({ translations: onLattice, operators }) => ({
            translations: [0, 1, 2].map((column) =>
              mod2(
                dotOf(
                  onLattice,
                  [0, 3, 6].map((row) => matrix[row + column] as number),
                ),
              ),
            ),
            operators: rotations.map((_, position) =>
              mod2(
                (operators[images[position] as number] as number) +
                  dotOf(onLattice, parts[position] as readonly number[]),
              ),
            ),
          });
        }
  }
}

/** Orders 1, 2, 3, 4 and 6 all divide 12. */
function hasFiniteOrder(matrix: Matrix): boolean {
  const square = multiplyIntegerMatrices(matrix, matrix);
  const fourth = multiplyIntegerMatrices(square, square);
  return multiplyIntegerMatrices(multiplyIntegerMatrices(fourth, fourth), fourth).join() === "1,0,0,0,1,0,0,0,1";
}

/** Whether {W|p} with p in 24ths maps the generators to operators of the group. */
function shiftTest(
  generators: readonly number[],
  images: readonly number[],
  rotations: readonly Matrix[],
  translations: readonly Column[],
  denominator: number,
  matrix: Matrix,
): (x: number, y: number, z: number) => boolean {
  const conditions = generators.flatMap((generator) => {
    const target = images[generator] as number;
    const moved = times(matrix, translations[generator] as Column);
    const rotation = rotations[target] as Matrix;
    return [0, 1, 2].map((row) => ({
      gap: (24 * ((moved[row] as number) - (translations[target]?.[row] as number))) / denominator,
      row: [0, 1, 2].map((column) => (row === column ? 1 : 0) - (rotation[3 * row + column] as number)),
    }));
  });
  return (x, y, z) =>
    conditions.every(
      ({ gap, row }) => (gap + (row[0] as number) * x + (row[1] as number) * y + (row[2] as number) * z) % 24 === 0,
    );
}

/** B⁻¹ W B, or null where W does not map the lattice onto itself. B: lattice vectors as columns. */
function inPrimitiveBasis({ lattice }: SpaceGroup, matrix: Matrix): Matrix | null {
  const [p, q, r] = lattice.vectors as unknown as [Column, Column, Column];
  const basis = [0, 1, 2].flatMap((row) => [p[row] as number, q[row] as number, r[row] as number]);
  const volume = integerDeterminant(basis);
  const adjoint = adjugateOf(basis);
  const product = multiplyIntegerMatrices(multiplyIntegerMatrices(adjoint, matrix), basis);
  return product.every((entry) => entry % volume === 0) ? product.map((entry) => entry / volume + 0) : null;
}

function adjugateOf(m: Matrix): Matrix {
  const at = (row: number, column: number): number => m[3 * (row % 3) + (column % 3)] as number;
  return [0, 1, 2].flatMap((row) =>
    [0, 1, 2].map(
      (column) =>
        at(column + 1, row + 1) * at(column + 2, row + 2) - at(column + 1, row + 2) * at(column + 2, row + 1) + 0,
    ),
  );
}

function generatorsOf(rotations: readonly Matrix[]): readonly number[] {
  const chosen: number[] = [];
  let reached = new Set([(rotations[0] as Matrix).join()]);
  for (let position = rotations.length - 1; position > 0; position--) {
    if (reached.has((rotations[position] as Matrix).join())) continue;
    chosen.push(position);
    const all = new Map([[(rotations[0] as Matrix).join(), rotations[0] as Matrix]]);
    for (const element of all.values())
      for (const generator of chosen) {
        const next = multiplyIntegerMatrices(element, rotations[generator] as Matrix);
        all.set(next.join(), next);
      }
    reached = new Set(all.keys());
  }
  return chosen;
}

function times(matrix: Matrix, column: Column): number[] {
  return [0, 3, 6].map((start) =>
    [0, 1, 2].reduce((sum, axis) => sum + (matrix[start + axis] as number) * (column[axis] as number), 0),
  );
}

function dotOf(a: Column, b: Column): number {
  return a.reduce((sum, entry, axis) => sum + entry * (b[axis] as number), 0);
}

function mod2(value: number): number {
  return ((value % 2) + 2) % 2;
}
