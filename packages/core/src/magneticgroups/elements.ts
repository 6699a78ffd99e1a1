import { fail } from "../errors/index.js";
import type { IntegerMatrix } from "../numbers/index.js";
import { composeElements, formatTriplet, type Lattice, toPrimitiveElements } from "../spacegroups/index.js";
import type { MagneticGroup, MagneticOperator } from "./types.js";

/** An operator in the primitive basis of the lattice of unprimed translations, over a common denominator. */
export interface MagneticElement {
  readonly rotation: IntegerMatrix;
  readonly translation: readonly number[];
  readonly timeReversal: 1 | -1;
}

export interface MagneticElements {
  readonly elements: readonly MagneticElement[];
  readonly denominator: number;
}

/** The operators in the primitive basis. Throws `not-a-group` for one that does not map the lattice to itself. */
export function toMagneticElements(lattice: Lattice, operators: readonly MagneticOperator[]): MagneticElements {
  const { elements, denominator } = toPrimitiveElements(
    lattice,
    operators.map((one) => one.operator),
  );
  return {
    denominator,
    elements: elements.map(({ rotation, translation }, index) => {
      const given = operators[index] as MagneticOperator;
      if (rotation === null)
        return fail("not-a-group", `operator ${index + 1} does not map the translation lattice to itself`, {
          expected: "a matrix that takes every lattice vector to a lattice vector, and back",
          found: formatTriplet(given.operator),
        });
      return { rotation, translation, timeReversal: given.timeReversal };
    }),
  };
}

/** The operators of a group in its primitive basis, in their order. */
export function elementsOf(group: MagneticGroup): MagneticElements {
  return toMagneticElements(group.lattice, group.operators);
}

/** The product `a b`, `b` acting first; time reversals multiply, the translation is not reduced. */
export function composeMagneticElements(a: MagneticElement, b: MagneticElement): MagneticElement {
  return { ...composeElements(a, b), timeReversal: a.timeReversal === b.timeReversal ? 1 : -1 };
}
