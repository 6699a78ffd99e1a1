import { fail } from "../errors/index.js";
import { formatRational, type IntegerMatrix, modulo, multiplyIntegerMatrices, vectorFrom } from "../numbers/index.js";
import { arrangeElements, fromPrimitiveColumn, type Lattice, rotationType } from "../spacegroups/index.js";
import { composeMagneticElements, type MagneticElement, toMagneticElements } from "./elements.js";
import { magneticPointGroupSymbol } from "./point-groups.js";
import { formatMagneticTriplet } from "./triplets.js";
import type { MagneticGroup, MagneticGroupType, MagneticOperator } from "./types.js";

/** Largest point group of a crystal, m-3m, with and without time reversal. */
const largestCosetCount = 96;

const identityRotation: IntegerMatrix = [1, 0, 0, 0, 1, 0, 0, 0, 1];

/**
 * The magnetic group that `operators` and the translations of `lattice` (all without time reversal) generate. A product
 * that is another translation is an error; a translation with time reversal makes type IV, time reversal alone type II.
 *
 * @throws `not-a-group`, naming the operator or the product at fault
 */
export function magneticGroup(lattice: Lattice, operators: readonly MagneticOperator[]): MagneticGroup {
  const { elements, denominator } = toMagneticElements(lattice, operators);
  return assembleMagneticGroup(lattice, close(lattice, elements, denominator, operators), denominator);
}

/**
 * The record of a group from one representative per coset: those without time reversal first, each half in the order of
 * operators of the room `spacegroups`.
 */
export function assembleMagneticGroup(
  lattice: Lattice,
  elements: readonly MagneticElement[],
  denominator: number,
): MagneticGroup {
  const half = (timeReversal: 1 | -1): MagneticOperator[] =>
    arrangeElements(
      lattice,
      elements.filter((one) => one.timeReversal === timeReversal),
      denominator,
    ).map(({ operator }) => ({ operator, timeReversal }));
  return {
    lattice,
    operators: [...half(1), ...half(-1)],
    type: typeOf(elements, denominator),
    pointGroup: magneticPointGroupSymbol(elements),
  };
}

function typeOf(elements: readonly MagneticElement[], denominator: number): MagneticGroupType {
  if (elements.every((one) => one.timeReversal === 1)) return 1;
  const reversed = elements.find((one) => one.timeReversal === -1 && one.rotation.join() === identityRotation.join());
  if (reversed === undefined) return 3;
  return reversed.translation.every((entry) => modulo(entry, denominator) === 0) ? 2 : 4;
}

interface Reached extends MagneticElement {
  /** Which given operators were multiplied, for messages. */
  readonly word: readonly number[];
}

/** All elements modulo the lattice that the given ones generate, by multiplication from the right with generators. */
function close(
  lattice: Lattice,
  given: readonly MagneticElement[],
  denominator: number,
  operators: readonly MagneticOperator[],
): readonly MagneticElement[] {
  const identity: Reached = { rotation: identityRotation, translation: [0, 0, 0], timeReversal: 1, word: [] };
  const reached = new Map<string, Reached>([[keyOf(identity), identity]]);
  const generators: Reached[] = [];
  const reach = (element: Reached): boolean => {
    const key = keyOf(element);
    const translation = element.translation.map((entry) => modulo(entry, denominator));
    const known = reached.get(key);
    if (known === undefined) {
      if (reached.size === largestCosetCount || !isCrystallographic(element.rotation))
        refuse(operators, element.word, "leads to infinitely many rotations");
      reached.set(key, { ...element, translation });
      return true;
    }
    const extra = translation.map((entry, axis) => entry - (known.translation[axis] as number));
    if (extra.every((entry) => entry === 0)) return false;
    const vector = fromPrimitiveColumn(lattice, vectorFrom(extra, denominator)).map(formatRational).join(",");
    return refuse(
      operators,
      element.word,
      `differs from another one by the translation (${vector}), not in the lattice`,
    );
  };
  given.forEach((element, index) => {
    const operator: Reached = { ...element, word: [index] };
    if (!reach(operator)) return;
    generators.push(operator);
    for (const element of reached.values())
      for (const generator of generators)
        reach({ ...composeMagneticElements(element, generator), word: [...element.word, ...generator.word] });
  });
  return [...reached.values()].map(({ rotation, translation, timeReversal }) => ({
    rotation,
    translation,
    timeReversal,
  }));
}

function keyOf({ rotation, timeReversal }: MagneticElement): string {
  return `${rotation.join()};${timeReversal}`;
}

/** True for a matrix of finite order: its twelfth power is the identity. */
function isCrystallographic(rotation: IntegerMatrix): boolean {
  if (rotationType(rotation) === null) return false;
  const square = multiplyIntegerMatrices(rotation, rotation);
  const fourth = multiplyIntegerMatrices(square, square);
  return multiplyIntegerMatrices(multiplyIntegerMatrices(fourth, fourth), fourth).join() === identityRotation.join();
}

function refuse(operators: readonly MagneticOperator[], word: readonly number[], problem: string): never {
  const culprit = formatMagneticTriplet(operators[word[word.length - 1] as number] as MagneticOperator);
  const subject =
    word.length === 1
      ? `operator ${(word[0] as number) + 1} (${culprit})`
      : `the product ${word.map((index) => index + 1).join("·")} of the operators given`;
  return fail("not-a-group", `${subject} ${problem}`, {
    expected: "operators that generate a magnetic group on the lattice given",
    found: culprit,
    remedy: "correct the translation or the time reversal, or put the translation among those of the lattice",
  });
}
