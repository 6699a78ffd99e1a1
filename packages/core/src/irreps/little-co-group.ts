import { type LittleGroup, littleGroup, type WaveVector } from "../kvectors/index.js";
import { dotIntegers, type IntegerMatrix, modulo, multiplyIntegerMatrices, safe } from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import { type PrimitiveOperator, primitiveOperator, rotated } from "./primitive-operators.js";

/**
 * The little co-group of k as an abstract finite group with the factor system of its projective representations:
 * `Δ(g) Δ(h) = e^{2πi·factor(g,h)/denominator} Δ(gh)`, factor = H_g · t_h with `H = kR − k` (docs/conventions.md, Moments and
 * phases). Elements are numbered 0 … n − 1 in the little group's operator order; 0 is the identity.
 *
 * Translations are taken about the origin `p = (1/n) Σ t`, the mean over the co-group. There `t + (R − 1)p` lies in
 * (1/n)L (the averaging argument for the vanishing of the cohomology of a finite group), so whatever origin the user
 * has, the factors are roots of unity whose order divides that of the group.
 */
export interface LittleCoGroup {
  readonly littleGroup: LittleGroup;
  readonly size: number;
  /** `product[g * size + h]` is the number of gh. */
  readonly product: readonly number[];
  readonly inverse: readonly number[];
  /** Factors in units of 1/`originDenominator` turn, `factor[g * size + h]`. */
  readonly factor: readonly number[];
  /** The mean origin p, primitive coordinates over `originDenominator`. */
  readonly origin: readonly [number, number, number];
  readonly originDenominator: number;
  /** The elements about the mean origin, translations over `originDenominator`. */
  readonly elements: readonly PrimitiveOperator[];
  /** Any operator of the group, by index, in the same way. */
  readonly aboutOrigin: (operator: number) => PrimitiveOperator;
}

export function littleCoGroup(group: SpaceGroup, k: WaveVector): LittleCoGroup {
  const little = littleGroup(group, k);
  const { rotations, translations, denominator } = group.primitive;
  const size = little.operators.length;
  const product = productTable(little.operators.map((operator) => rotations[operator] as IntegerMatrix));
  const inverse = Array.from({ length: size }, (_, g) => product.indexOf(0, g * size) - g * size);
  const origin = [0, 1, 2].map((axis) =>
    little.operators.reduce(
      (sum, operator) => sum + ((translations[operator] as readonly number[])[axis] as number),
      0,
    ),
  ) as [number, number, number];
  const originDenominator = safe(denominator * size);
  const aboutOrigin = (operator: number): PrimitiveOperator =>
    movedOrigin(primitiveOperator(group, operator), size, origin);
  const elements = little.operators.map(aboutOrigin);
  const factor = little.shifts.flatMap((shift) =>
    elements.map(({ translation }) => modulo(dotIntegers(shift, translation), originDenominator)),
  );
  return {
    littleGroup: little,
    size,
    product,
    inverse,
    factor,
    origin,
    originDenominator,
    elements,
    aboutOrigin,
  };
}

/** `product[g * size + h]`, the number of gh: a few rows are multiplied out, `(sg)h = s(gh)` gives the others. */
function productTable(rotations: readonly IntegerMatrix[]): number[] {
  const numberOf = new Map(rotations.map((rotation, element) => [rotation.join(), element]));
  const rows: (readonly number[])[] = [rotations.map((_, h) => h)];
  for (const [s, matrix] of rotations.entries()) {
    if (rows[s] !== undefined) continue;
    const times = rotations.map((rotation) => numberOf.get(multiplyIntegerMatrices(matrix, rotation).join()) as number);
    // A row begins with the number of its own element, being the product with the identity.
    for (const row of Object.values(rows)) rows[times[row[0] as number] as number] = row.map((h) => times[h] as number);
  }
  return rows.flat();
}

/** `{R | t + (R − 1) p}` over `denominator · size`, t being given over `denominator`. */
function movedOrigin(
  { rotation, translation }: PrimitiveOperator,
  size: number,
  origin: readonly number[],
): PrimitiveOperator {
  return {
    rotation,
    translation: rotated(rotation, origin).map((entry, axis) =>
      safe(size * (translation[axis] as number) + entry - (origin[axis] as number)),
    ),
  };
}
