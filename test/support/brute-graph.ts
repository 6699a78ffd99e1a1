import type { Configuration } from "@kvane/core/configurations";
import type { SpaceGroup } from "@kvane/core/spacegroups";
import {
  compose,
  type FloatGroup,
  type FloatOperator,
  floatGroup,
  inner,
  inverse,
  minus,
  plus,
} from "./float-group.js";

interface FloatMagnetic {
  readonly operators: readonly { readonly operator: FloatOperator; readonly timeReversal: 1 | -1 }[];
  readonly lattice: FloatGroup;
}

/**
 * For every configuration the ids of its minimal supergroups in the list, by trying every conjugate: H ⊂ g H' g⁻¹ for an
 * operator g of the parent with any translation of its lattice, operator by operator and translation by translation.
 */
export function bruteSupergroups(group: SpaceGroup, configurations: readonly Configuration[]): string[][] {
  const parent = floatGroup(group);
  const read = configurations.map(readMagnetic);
  const conjugates = read.map((magnetic) => conjugatesOf(parent, magnetic));
  const above = configurations.map((one, index) =>
    configurations.flatMap((other, candidate) =>
      other.index < one.index &&
      one.index % other.index === 0 &&
      (conjugates[candidate] ?? []).some((larger) => isInside(read[index] as FloatMagnetic, larger))
        ? [candidate]
        : [],
    ),
  );
  return above.map((found) =>
    found
      .filter((candidate) => !found.some((between) => above[between]?.includes(candidate)))
      .map((candidate) => configurations[candidate]?.id as string),
  );
}

function readMagnetic({ magneticGroup }: Configuration): FloatMagnetic {
  const { vectors, denominator } = magneticGroup.lattice;
  return {
    operators: magneticGroup.operators.map(({ operator, timeReversal }) => ({
      operator: {
        rotation: operator.rotation.map((entry) => entry / operator.rotationDenominator),
        translation: operator.translation.map((entry) => entry / operator.translationDenominator),
      },
      timeReversal,
    })),
    lattice: latticeOf(vectors.map((row) => row.map((entry) => entry / denominator))),
  };
}

function latticeOf(basis: readonly (readonly number[])[]): FloatGroup {
  const [a, b, c] = basis as [number[], number[], number[]];
  const cross = (p: readonly number[], q: readonly number[]): number[] =>
    [0, 1, 2].map(
      (at) =>
        (p[(at + 1) % 3] as number) * (q[(at + 2) % 3] as number) -
        (p[(at + 2) % 3] as number) * (q[(at + 1) % 3] as number),
    );
  const volume = inner(a, cross(b, c));
  const dual = [cross(b, c), cross(c, a), cross(a, b)].map((row) => row.map((entry) => entry / volume));
  return { operators: [], basis, dual };
}

function isWhole(lattice: FloatGroup, vector: readonly number[]): boolean {
  return lattice.dual.every((row) => Math.abs(inner(row, vector) - Math.round(inner(row, vector))) < 1e-6);
}

function conjugatesOf(parent: FloatGroup, magnetic: FloatMagnetic): FloatMagnetic[] {
  const translations: number[][] = [[0, 0, 0]];
  for (let next = 0; next < translations.length; next++)
    for (const step of parent.basis) {
      const moved = plus(translations[next] as number[], step);
      if (!translations.some((other) => isWhole(magnetic.lattice, minus(moved, other)))) translations.push(moved);
    }
  return parent.operators.flatMap(({ rotation, translation }) =>
    translations.map((shift): FloatMagnetic => {
      const g = { rotation, translation: plus(translation, shift) };
      const back = inverse(g);
      return {
        operators: magnetic.operators.map(({ operator, timeReversal }) => ({
          operator: compose(compose(g, operator), back),
          timeReversal,
        })),
        lattice: latticeOf(
          magnetic.lattice.basis.map((vector) =>
            minus(compose(g, { rotation: identity, translation: vector }).translation, g.translation),
          ),
        ),
      };
    }),
  );
}

const identity = [1, 0, 0, 0, 1, 0, 0, 0, 1];

function isInside(small: FloatMagnetic, large: FloatMagnetic): boolean {
  const holds = (operator: FloatOperator, timeReversal: 1 | -1): boolean =>
    large.operators.some(
      (other) =>
        other.timeReversal === timeReversal &&
        other.operator.rotation.every((entry, at) => Math.abs(entry - (operator.rotation[at] as number)) < 1e-6) &&
        isWhole(large.lattice, minus(operator.translation, other.operator.translation)),
    );
  return (
    small.operators.every(({ operator, timeReversal }) => holds(operator, timeReversal)) &&
    small.lattice.basis.every((vector) => holds({ rotation: identity, translation: vector }, 1))
  );
}
