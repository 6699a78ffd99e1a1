import {
  integerDeterminant,
  lcm,
  type Rational,
  rational,
  rationalField,
  reducedEchelon,
  safe,
  toNumber,
} from "../numbers/index.js";
import type { MagneticGroup } from "./types.js";

/** How a tensor property behaves: an axial one takes det R, one odd under time reversal the sign of the operator. */
export interface TensorKind {
  readonly rank: 1 | 2 | 3;
  readonly axial: boolean;
  readonly timeOdd: boolean;
  /** Symmetric in the last two indices. */
  readonly symmetric: boolean;
}

/**
 * All tensors of a kind that the magnetic point group leaves unchanged, as a basis of components along the axes of the
 * group (contravariant in every index, last index quickest): the image of the average over the group, exactly.
 */
export function invariantTensors(group: MagneticGroup, kind: TensorKind): readonly (readonly number[])[] {
  const size = 3 ** kind.rank;
  const images = Array.from({ length: size }, () => new Array<number>(size).fill(0));
  for (const { entries, sign } of signedRotations(group, kind)) addProduct(images, entries, sign, kind.rank);
  const symmetrized = kind.symmetric ? images.map(symmetricPart) : images;
  const rows = symmetrized
    .filter((image) => image.some((entry) => entry !== 0))
    .map((image) => image.map((entry): Rational => rational(entry)));
  return reducedEchelon(rows, rationalField).rows.map((row) => row.map(toNumber));
}

/** Adds `sign · R ⊗ R ⊗ …` to the images of the unit tensors (first index: the unit tensor), zeros left out. */
function addProduct(images: number[][], entries: readonly number[], sign: number, rank: number): void {
  const filled = [0, 1, 2].map((row) => [0, 1, 2].filter((column) => entries[3 * row + column] !== 0));
  const descend = (depth: number, index: number, unit: number, product: number): void => {
    if (depth === rank) {
      const image = images[unit] as number[];
      image[index] = safe((image[index] as number) + product);
      return;
    }
    for (let row = 0; row < 3; row++)
      for (const column of filled[row] as readonly number[])
        descend(depth + 1, 3 * index + row, 3 * unit + column, product * (entries[3 * row + column] as number));
  };
  descend(0, 0, 0, sign);
}

/** The part of a tensor that is symmetric in its last two indices, twice. */
function symmetricPart(tensor: readonly number[]): number[] {
  return tensor.map((entry, index) => {
    const [j, k] = [Math.floor(index / 3) % 3, index % 3];
    return entry + (tensor[index + 3 * (k - j) + (j - k)] as number);
  });
}

interface SignedRotation {
  readonly entries: readonly number[];
  readonly sign: number;
}

/** Each rotation once with its sign, over one denominator; none when one comes with both signs: nothing is left then. */
function signedRotations({ operators }: MagneticGroup, kind: TensorKind): readonly SignedRotation[] {
  const denominator = operators.reduce((common, one) => lcm(common, one.operator.rotationDenominator), 1);
  const found = new Map<string, SignedRotation>();
  for (const { operator, timeReversal } of operators) {
    const { rotation, rotationDenominator } = operator;
    const handedness = kind.axial ? Math.sign(integerDeterminant(rotation)) : 1;
    const sign = handedness * (kind.timeOdd ? timeReversal : 1);
    const entries = rotation.map((entry) => (entry * denominator) / rotationDenominator);
    const known = found.get(entries.join());
    if (known && known.sign !== sign) return [];
    found.set(entries.join(), { entries, sign });
  }
  return [...found.values()];
}
