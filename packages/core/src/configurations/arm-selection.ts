import { fail } from "../errors/index.js";
import { exactComponents, type Star, star, type WaveVector } from "../kvectors/index.js";
import {
  hermiteNormalForm,
  invertUnimodular,
  modulo,
  overCommonDenominator,
  type RationalVector,
  safe,
} from "../numbers/index.js";
import { type SpaceGroup, toPrimitiveRow } from "../spacegroups/index.js";

/** Which arms of the star take part: the pair k, −k, all of them, or those named by their number in the star. */
export type ArmChoice = "pair" | "all" | readonly number[];

/** The chosen arms, closed under k → −k where −k is in the star, and what maps them on themselves. */
export interface ArmSelection {
  readonly star: Star;
  /** Numbers in the star of the arms that take part. */
  readonly members: readonly number[];
  /** Per member the place among the members of its negative: itself where 2k ∈ L*, −1 where −k is not in the star. */
  readonly negatives: readonly number[];
  /** ±k pairs as places among the members, first arm first; one place where k ≡ −k or −k is not in the star. */
  readonly pairs: readonly (readonly number[])[];
  /** ±k pairs of the whole star. */
  readonly pairsOfStar: number;
  /** Operators of the group (by index) that permute the members. */
  readonly operators: readonly number[];
  /** All arms of the star, and those of the members, as integer rows over `denominator`, dual of the primitive basis. */
  readonly allRows: readonly (readonly number[])[];
  readonly rows: readonly (readonly number[])[];
  readonly denominator: number;
  /** For each of `operators`, in order, the place that it takes each member to. */
  readonly images: readonly (readonly number[])[];
}

/**
 * The arms that take part and the operators that permute them: the setwise stabilizer.
 *
 * @throws `invalid-argument` when a named arm is not in the star
 */
export function selectArms(group: SpaceGroup, k: WaveVector, choice: ArmChoice): ArmSelection {
  const whole = star(group, k);
  const exact = whole.arms.map((arm) => toPrimitiveRow(group.lattice, exactComponents(arm) as RationalVector));
  const { numerators, denominator } = overCommonDenominator(exact.flat());
  const all = exact.map((_, index) => numerators.slice(3 * index, 3 * index + 3));
  const keys = all.map((row) => keyOf(row, denominator));
  const negativeOf = all.map((row) =>
    keys.indexOf(
      keyOf(
        row.map((entry) => 0 - entry),
        denominator,
      ),
    ),
  );
  const wanted =
    choice === "all" ? all.map((_, index) => index) : choice === "pair" ? [0] : checked(choice, all.length);
  const members = all
    .map((_, index) => index)
    .filter((index) => wanted.includes(index) || wanted.includes(negativeOf[index] as number));
  const inside = members.map((index) => keys[index] as string);
  const operators: number[] = [];
  const images: number[][] = [];
  group.primitive.rotations.forEach((rotation, index) => {
    const back = invertUnimodular(rotation);
    const targets = members.map((arm) =>
      inside.indexOf(keyOf(rowTimesIntegers(all[arm] as number[], back), denominator)),
    );
    if (targets.includes(-1)) return;
    operators.push(index);
    images.push(targets);
  });
  const negatives = members.map((index) => members.indexOf(negativeOf[index] as number));
  return {
    star: whole,
    members,
    negatives,
    pairs: negatives.flatMap((other, place) =>
      other < 0 || other === place ? [[place]] : other > place ? [[place, other]] : [],
    ),
    pairsOfStar: negativeOf.filter((other, index) => other < 0 || other >= index).length,
    operators,
    allRows: all,
    rows: members.map((index) => all[index] as number[]),
    denominator,
    images,
  };
}

function checked(choice: readonly number[], arms: number): readonly number[] {
  const wrong = choice.find((index) => !Number.isInteger(index) || index < 0 || index >= arms);
  if (wrong !== undefined || choice.length === 0)
    fail("invalid-argument", wrong === undefined ? "no arm of the star was named" : `the star has no arm ${wrong}`, {
      expected: `numbers from 0 to ${arms - 1}`,
      found: choice.join(", ") || "nothing",
      remedy: "list the arms with `kvane star`",
    });
  return choice;
}

function keyOf(row: readonly number[], denominator: number): string {
  return row.map((entry) => modulo(entry, denominator)).join();
}

/** Row times matrix. */
function rowTimesIntegers(row: readonly number[], matrix: readonly number[]): number[] {
  return [0, 1, 2].map((column) =>
    safe(
      (row[0] as number) * (matrix[column] as number) +
        (row[1] as number) * (matrix[3 + column] as number) +
        (row[2] as number) * (matrix[6 + column] as number),
    ),
  );
}

/**
 * The translations T with k·T integer for all given rows k over `denominator`, in the primitive basis: Hermite normal
 * form. They are the dual of the lattice that the rows and the unit rows span.
 */
export function periodLattice(rows: readonly (readonly number[])[], denominator: number): number[][] {
  const units = [0, 1, 2].map((axis) => [0, 1, 2].map((other) => (axis === other ? denominator : 0)));
  const [p, q, r] = hermiteNormalForm([...rows, ...units], 3) as [number[], number[], number[]];
  const [a, b, c] = [p[0] as number, q[1] as number, r[2] as number];
  // T with H T / denominator integer: the columns of denominator·H⁻¹, H being upper triangular.
  const volume = safe(a * b * c);
  const columns = [
    [b * c, 0, 0],
    [0 - c * (p[1] as number), a * c, 0],
    [(p[1] as number) * (q[2] as number) - (p[2] as number) * b, 0 - a * (q[2] as number), a * b],
  ];
  return hermiteNormalForm(
    columns.map((column) => column.map((entry) => safe(denominator * entry) / volume)),
    3,
  );
}

/** One vector of each coset of the sublattice of a Hermite normal form, zero first. */
export function cosetVectors(hermite: readonly (readonly number[])[]): number[][] {
  const [a, b, c] = [0, 1, 2].map((axis) => hermite[axis]?.[axis] as number) as [number, number, number];
  const vectors: number[][] = [];
  for (let x = 0; x < a; x++) for (let y = 0; y < b; y++) for (let z = 0; z < c; z++) vectors.push([x, y, z]);
  return vectors;
}

/** How many sets of arms the group makes of some members together with their negatives. */
export function armSets(group: SpaceGroup, selection: ArmSelection, places: readonly number[]): number {
  const { allRows, denominator } = selection;
  const keys = new Map(allRows.map((row, index) => [keyOf(row, denominator), index]));
  const negative = allRows.map((row) => {
    const opposite = row.map((entry) => 0 - entry);
    return keys.get(keyOf(opposite, denominator)) ?? -1;
  });
  const start = places.map((place) => selection.members[place] as number);
  const sets = group.primitive.rotations.map((rotation) => {
    const back = invertUnimodular(rotation);
    const moved = start.map(
      (arm) => keys.get(keyOf(rowTimesIntegers(allRows[arm] as readonly number[], back), denominator)) as number,
    );
    // Where −k is an arm of its own, k and −k are one.
    return [...new Set(moved.map((arm) => (negative[arm] === -1 ? arm : Math.min(arm, negative[arm] as number))))]
      .sort((a, b) => a - b)
      .join();
  });
  return new Set(sets).size;
}
