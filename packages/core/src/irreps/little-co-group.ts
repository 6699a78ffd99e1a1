import { type LittleGroup, littleGroup, type WaveVector } from "../kvectors/index.js";
import { dotIntegers, gcd, invertUnimodular, lcm, modulo, multiplyIntegerMatrices, safe } from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";

/**
 * The little co-group of k as an abstract finite group with the factor system of its projective representations:
 * `Δ(g) Δ(h) = e^{2πi·factor(g,h)/order} Δ(gh)`, factor = H_g · t_h with `H = kR − k` (docs/conventions.md, Moments and
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
  /** Factors in units of 1/`factorOrder` turn, `factor[g * size + h]`. */
  readonly factor: readonly number[];
  readonly factorOrder: number;
  /** The mean origin p, primitive coordinates over `originDenominator`. */
  readonly origin: readonly [number, number, number];
  readonly originDenominator: number;
}

export function littleCoGroup(group: SpaceGroup, k: WaveVector): LittleCoGroup {
  const little = littleGroup(group, k);
  const { rotations, translations, denominator } = group.primitive;
  const size = little.operators.length;
  const numberOf = new Map<string, number>();
  for (const [element, operator] of little.operators.entries()) numberOf.set(String(rotations[operator]), element);
  const rotationOf = (element: number): readonly number[] =>
    rotations[little.operators[element] as number] as readonly number[];
  const product = new Array<number>(size * size);
  for (let g = 0; g < size; g++)
    for (let h = 0; h < size; h++)
      product[g * size + h] = numberOf.get(String(multiplyIntegerMatrices(rotationOf(g), rotationOf(h)))) as number;
  const inverse = Array.from(
    { length: size },
    (_, g) => numberOf.get(String(invertUnimodular(rotationOf(g)))) as number,
  );
  const origin = [0, 1, 2].map((axis) =>
    little.operators.reduce((sum, operator) => sum + (translations[operator]?.[axis] as number), 0),
  ) as [number, number, number];
  const originDenominator = safe(denominator * size);
  const shifted = little.operators.map((operator) =>
    aboutOrigin(rotations[operator] as readonly number[], translations[operator] as readonly number[], size, origin),
  );
  const factor = new Array<number>(size * size);
  for (let g = 0; g < size; g++)
    for (let h = 0; h < size; h++)
      factor[g * size + h] = modulo(
        dotIntegers(little.shifts[g] as readonly number[], shifted[h] as readonly number[]),
        originDenominator,
      );
  return {
    littleGroup: little,
    size,
    product,
    inverse,
    ...reduced(factor, originDenominator),
    origin,
    originDenominator,
  };
}

/** Numerators of `t + (R − 1) p` over `denominator · size`, t being given over `denominator`. */
function aboutOrigin(
  rotation: readonly number[],
  translation: readonly number[],
  size: number,
  origin: readonly number[],
): [number, number, number] {
  const at = (row: number): number =>
    safe(
      size * (translation[row] as number) +
        dotIntegers(rotation.slice(3 * row, 3 * row + 3), origin) -
        (origin[row] as number),
    );
  return [at(0), at(1), at(2)];
}

/** The factors over their smallest common denominator. */
function reduced(factor: readonly number[], denominator: number): { factor: number[]; factorOrder: number } {
  const factorOrder = factor.reduce((order, entry) => lcm(order, denominator / gcd(entry, denominator)), 1);
  return { factor: factor.map((entry) => entry / (denominator / factorOrder)), factorOrder };
}
