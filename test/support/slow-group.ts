/**
 * A plain, slow check that a record of a space group is one: floats and all pairs, written without any of the code that
 * builds groups. Gives the list of what is wrong.
 */
import type { SpaceGroup } from "@kvane/core/spacegroups";

const small = 1e-9;

type Matrix = readonly (readonly number[])[];

interface FloatOperator {
  readonly rotation: Matrix;
  readonly translation: readonly number[];
}

export function groupProblems(group: SpaceGroup): string[] {
  const problems: string[] = [];
  const basis = group.lattice.vectors.map((vector) => vector.map((entry) => entry / group.lattice.denominator));
  const operators = group.operators.map(toFloat);
  if (!isIdentity(operators[0])) problems.push("the identity is not first");
  operators.forEach((operator, index) => {
    for (const vector of basis)
      if (!inLattice(times(operator.rotation, vector), basis)) problems.push(`operator ${index} moves the lattice`);
  });
  operators.forEach((a, first) => {
    operators.forEach((b, second) => {
      const rotation = product(a.rotation, b.rotation);
      const translation = times(a.rotation, b.translation).map((entry, index) => entry + (a.translation[index] ?? 0));
      const matches = operators.filter((one) => sameMatrix(one.rotation, rotation));
      const difference = matches[0]?.translation.map((entry, index) => entry - (translation[index] ?? 0));
      if (matches.length !== 1 || !difference || !inLattice(difference, basis))
        problems.push(`the product ${first}·${second} is not in the group`);
    });
  });
  return [...problems, ...primitiveProblems(group, operators, basis)];
}

/** The primitive form must be the same operators, `x = B ξ`, exactly as given and not only modulo L. */
function primitiveProblems(group: SpaceGroup, operators: readonly FloatOperator[], basis: Matrix): string[] {
  const columns = [0, 1, 2].map((row) => basis.map((vector) => vector[row] as number));
  return operators.flatMap((operator, index) => {
    const flat = group.primitive.rotations[index] as readonly number[];
    const rotation = [flat.slice(0, 3), flat.slice(3, 6), flat.slice(6, 9)];
    const translation = (group.primitive.translations[index] as readonly number[]).map(
      (entry) => entry / group.primitive.denominator,
    );
    const good =
      sameMatrix(product(operator.rotation, columns), product(columns, rotation)) &&
      times(columns, translation).every((entry, row) => Math.abs(entry - (operator.translation[row] ?? 0)) < small) &&
      flat.every(Number.isInteger);
    return good ? [] : [`the primitive form of operator ${index} is another operator`];
  });
}

function toFloat(operator: SpaceGroup["operators"][number]): FloatOperator {
  const entries = operator.rotation.map((entry) => entry / operator.rotationDenominator);
  return {
    rotation: [entries.slice(0, 3), entries.slice(3, 6), entries.slice(6, 9)],
    translation: operator.translation.map((entry) => entry / operator.translationDenominator),
  };
}

function isIdentity(operator: FloatOperator | undefined): boolean {
  return operator?.rotation.flat().join() === "1,0,0,0,1,0,0,0,1" && operator.translation.join() === "0,0,0";
}

function product(a: Matrix, b: Matrix): number[][] {
  return a.map((row) =>
    [0, 1, 2].map((column) => row.reduce((sum, entry, index) => sum + entry * (b[index]?.[column] ?? 0), 0)),
  );
}

function times(a: Matrix, v: readonly number[]): number[] {
  return a.map((row) => row.reduce((sum, entry, index) => sum + entry * (v[index] ?? 0), 0));
}

function sameMatrix(a: Matrix, b: Matrix): boolean {
  return a.every((row, first) => row.every((entry, second) => Math.abs(entry - (b[first]?.[second] ?? 0)) < small));
}

/** Cramer's rule for the coefficients on the basis vectors. */
function inLattice(v: readonly number[], basis: Matrix): boolean {
  const [a, b, c] = basis as [number[], number[], number[]];
  const volume = triple(a, b, c);
  return [triple(v, b, c), triple(a, v, c), triple(a, b, v)].every(
    (part) => Math.abs(part / volume - Math.round(part / volume)) < 1e-7,
  );
}

function triple(a: readonly number[], b: readonly number[], c: readonly number[]): number {
  const [a0 = 0, a1 = 0, a2 = 0] = a;
  const [b0 = 0, b1 = 0, b2 = 0] = b;
  const [c0 = 0, c1 = 0, c2 = 0] = c;
  return a0 * (b1 * c2 - b2 * c1) + a1 * (b2 * c0 - b0 * c2) + a2 * (b0 * c1 - b1 * c0);
}
