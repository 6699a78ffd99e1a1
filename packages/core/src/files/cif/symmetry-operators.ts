import { type Assumption, KvaneError, type Problem, problem } from "../../errors/index.js";
import { operatorTranslationSnap, type Rational, rational, subtract, toNumber, vectorOf } from "../../numbers/index.js";
import {
  formatTriplet,
  operatorFrom,
  operatorsModuloIntegers,
  parseGroup,
  parseTriplet,
  rotationOf,
  type SpaceGroup,
  type SymmetryOperator,
  translationOf,
} from "../../spacegroups/index.js";
import { type BlockReader, valuesOf } from "./block-reader.js";
import type { CifText } from "./document.js";
import { sameGroup } from "./group-text.js";
import { readingValue, valuePlace } from "./places.js";
import { saidText } from "./values.js";

/** The group that the operators of a CIF generate. */
export interface OperatorGroup {
  readonly group: SpaceGroup;
  readonly first: CifText;
  readonly assumed: readonly Assumption[];
  readonly warnings: readonly Problem[];
}

const operatorNames = ["_space_group_symop_operation_xyz", "_symmetry_equiv_pos_as_xyz"] as const;

/** The texts of the operators under each data name that the file has, the newer first; empty when it has none. */
export function operatorLists(reader: BlockReader): CifText[][] {
  return operatorNames
    .map((name) => valuesOf(reader, name).flatMap((value) => saidText(value) ?? []))
    .filter((texts) => texts.length > 0);
}

/** What a second list, under the other data name, says against the group of the first; null where they agree. */
export function otherList(
  reader: BlockReader,
  group: SpaceGroup,
  first: CifText,
  texts: readonly CifText[],
): Problem | null {
  const [start] = texts as readonly [CifText];
  const [newer, older] = operatorNames;
  let because = "is another group than that of";
  try {
    if (sameGroup(groupOfOperators(reader, texts).group, group)) return null;
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    because = `is not understood (${error.problems[0]?.message ?? "unknown"}), unlike that of`;
  }
  return problem(
    "cif-contradiction",
    `the list of ${older} (line ${start.line}) ${because} ${newer} (line ${first.line})`,
    {
      where: valuePlace(reader, start),
      expected: `the operators of ${newer} in line ${first.line}, column ${first.column}`,
      found: `${start.raw.slice(0, 60)} and so on`,
      remedy: `taken are those of ${newer}; check which are right`,
    },
  );
}

/**
 * The group of the operators that a CIF lists, in a loop or a single one without. A translation such as 0.3333 is taken
 * for the multiple of 1/24 that lies within `operatorTranslationSnap`, and that is said. Operators that the list leaves
 * out although those it has generate them are warned about.
 *
 * @throws `syntax`, `not-a-group`, with the place of the operator
 */
export function groupOfOperators(reader: BlockReader, texts: readonly CifText[]): OperatorGroup {
  const problems: Problem[] = [];
  const rounded: string[] = [];
  const seen = new Set<string>();
  const triplets: { readonly triplet: string; readonly text: CifText }[] = [];
  for (const text of texts) {
    try {
      const operator = readingValue(reader, text, () => parseTriplet(text.text));
      const snapped = text.text.includes(".") ? snapTranslation(operator) : operator;
      if (snapped !== operator) rounded.push(text.text.trim());
      const triplet = formatTriplet(moduloIntegers(snapped));
      if (!seen.has(triplet)) triplets.push({ triplet, text });
      seen.add(triplet);
    } catch (error) {
      if (!(error instanceof KvaneError)) throw error;
      problems.push(...error.problems);
    }
  }
  if (problems.length > 0) throw new KvaneError(problems);
  const group = closed(reader, triplets);
  const [first] = texts as [CifText];
  const order = readingValue(reader, first, () => operatorsModuloIntegers(group).length);
  return {
    group,
    first,
    assumed: rounded.length === 0 ? [] : [roundedNote(rounded)],
    warnings: order === triplets.length ? [] : [incomplete(reader, first, triplets.length, order)],
  };
}

function closed(reader: BlockReader, triplets: readonly { triplet: string; text: CifText }[]): SpaceGroup {
  try {
    return parseGroup(triplets.map(({ triplet }) => triplet).join(";"));
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    throw new KvaneError(
      error.problems.map((one) => {
        let end = 0;
        const column = one.where.column ?? 1;
        const found = triplets.find(({ triplet }) => {
          end += triplet.length + 1;
          return column <= end;
        });
        const { text } = found ?? (triplets[0] as (typeof triplets)[number]);
        return { ...one, where: { ...one.where, ...valuePlace(reader, text) } };
      }),
    );
  }
}

function snapTranslation(operator: SymmetryOperator): SymmetryOperator {
  const translation = translationOf(operator);
  const [x, y, z] = translation.map(nearTwentyFourth) as [Rational, Rational, Rational];
  const same = translation.every((entry, index) => subtract(entry, [x, y, z][index] as Rational)[0] === 0);
  return same ? operator : operatorFrom(rotationOf(operator), vectorOf(x, y, z));
}

/** Translations of all tabulated settings are multiples of 1/24. */
function nearTwentyFourth(value: Rational): Rational {
  const nearest = rational(Math.round(toNumber(value) * 24) + 0, 24);
  return Math.abs(toNumber(subtract(value, nearest))) <= operatorTranslationSnap ? nearest : value;
}

function moduloIntegers(operator: SymmetryOperator): SymmetryOperator {
  const { translationDenominator: denominator } = operator;
  const [x, y, z] = operator.translation.map((entry) => (((entry % denominator) + denominator) % denominator) + 0) as [
    number,
    number,
    number,
  ];
  return { ...operator, translation: [x, y, z] };
}

function roundedNote(rounded: readonly string[]): Assumption {
  return {
    what: "translations of operators",
    value: "multiples of 1/24",
    because: `decimals such as those of ${rounded[0]} lie within ${operatorTranslationSnap} of them`,
  };
}

function incomplete(reader: BlockReader, first: CifText, count: number, order: number): Problem {
  return problem("cif-contradiction", `the list of operators is incomplete: ${count} of the ${order} of its group`, {
    where: valuePlace(reader, first),
    expected: `${order} operators`,
    found: `${count} different ones`,
    remedy: "the operators that follow from those listed were added; check the list",
  });
}
