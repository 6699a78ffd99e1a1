import type { WaveVector } from "@kvane/core/kvectors";
import type { BasisChange } from "@kvane/core/spacegroups";
import { type Pair, productOf, sumOf } from "./axes.js";
import type { Random } from "./random.js";
import { reduced } from "./written.js";

/** Columns: bases of half, double and triple cells, in one direction and another. */
const centrings: readonly (readonly number[])[] = [
  [1, 0, 0, 0, 1, 0, 0, 0, 1],
  [1, 1, 0, -1, 1, 0, 0, 0, 1],
  [-1, 1, 1, 1, -1, 1, 1, 1, -1],
  [1, 0, 1, -1, 1, 1, 0, -1, 1],
  [2, 0, 0, 0, 1, 0, 0, 0, 1],
];

/**
 * A random (P, p): a product of four shears (determinant 1), times a centred cell's basis or half of one, and any origin
 * in 24ths.
 */
export function randomBasis(random: Random): BasisChange {
  let matrix: readonly number[] = [1, 0, 0, 0, 1, 0, 0, 0, 1];
  for (let times = 0; times < 4; times++) {
    const [row, column] = random.pick([
      [0, 1],
      [0, 2],
      [1, 0],
      [1, 2],
      [2, 0],
      [2, 1],
    ] as const);
    const shear = [1, 0, 0, 0, 1, 0, 0, 0, 1];
    shear[3 * row + column] = random.pick([-1, 1]);
    matrix = product(matrix, shear);
  }
  matrix = product(matrix, random.pick(centrings));
  const bottom = random.pick([1, 1, 2]);
  const row = (index: number): readonly Pair[] =>
    matrix.slice(3 * index, 3 * index + 3).map((entry) => reduced(entry, bottom));
  const shift = (): Pair => reduced(random.below(24), 24);
  return { matrix: [row(0), row(1), row(2)], shift: [shift(), shift(), shift()] } as unknown as BasisChange;
}

function product(a: readonly number[], b: readonly number[]): number[] {
  return Array.from({ length: 9 }, (_, index) =>
    [0, 1, 2].reduce(
      (sum, middle) =>
        sum + (a[3 * Math.floor(index / 3) + middle] as number) * (b[3 * middle + (index % 3)] as number),
      0,
    ),
  );
}

/** `k' = k P`, letters and all. */
export function carriedWave(k: WaveVector, change: BasisChange): WaveVector {
  const through = (parts: readonly Pair[], column: number): Pair =>
    parts.reduce<Pair>(
      (sum, part, index) => sumOf(sum, productOf(part, change.matrix[index]?.[column] as Pair)),
      [0, 1],
    );
  const form = (column: number): unknown => ({
    constant: through(
      k.components.map((component) => component.constant),
      column,
    ),
    coefficients: [0, 1, 2].map((letter) =>
      through(
        k.components.map((component) => component.coefficients[letter] as Pair),
        column,
      ),
    ),
  });
  return { ...k, components: [form(0), form(1), form(2)] as unknown as WaveVector["components"] };
}
