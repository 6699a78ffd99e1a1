import {
  type BasisChange,
  changeBasis,
  composeBasisChanges,
  composeOperators,
  formatBasisChange,
  formatTriplet,
  fromPrimitiveColumn,
  fromPrimitiveRow,
  groupFromOperators,
  groupFromSetting,
  invertBasisChange,
  invertOperator,
  isLatticeVector,
  latticeVectorsInCell,
  operatorsModuloIntegers,
  parseBasisChange,
  parseGroup,
  parseTriplet,
  type SpaceGroup,
  siteOrbit,
  tabulatedSettings,
  toPrimitiveColumn,
  toPrimitiveRow,
} from "@kvane/core/spacegroups";
import { describe, expect, it } from "vitest";
import {
  add,
  determinant,
  dot,
  isInteger,
  multiply,
  type Rational,
  type RationalVector,
  rational,
} from "#core/numbers/index.js";
import { type Random, seeded } from "../support/random.js";
import { groupProblems } from "../support/slow-group.js";

const seed = 20_261_201;
const settings = tabulatedSettings();

function fraction(random: Random, denominators: readonly number[]): Rational {
  return rational(random.below(5) - 2, random.pick(denominators));
}

function fractions(random: Random, denominators: readonly number[]): RationalVector {
  return [fraction(random, denominators), fraction(random, denominators), fraction(random, denominators)];
}

/** A regular P of small fractions, a shift of origin of small fractions. */
function randomChange(random: Random): BasisChange {
  for (;;) {
    const row = (): RationalVector => fractions(random, [1, 1, 1, 2, 3]);
    const change: BasisChange = { matrix: [row(), row(), row()], shift: fractions(random, [1, 2, 3, 4, 5, 8]) };
    if (determinant(change.matrix)[0] !== 0) return change;
  }
}

/** A sample of settings that holds every crystal class and lattice type sooner or later. */
function sample(random: Random, count: number): SpaceGroup[] {
  return Array.from({ length: count }, () => groupFromSetting(random.pick(settings)));
}

const sameGroup = (a: SpaceGroup, b: SpaceGroup): boolean =>
  JSON.stringify([a.lattice, a.operators, a.primitive]) === JSON.stringify([b.lattice, b.operators, b.primitive]);

describe(`groups in any basis (seed ${seed})`, () => {
  it("are groups in the tabulated settings, by the slow check", () => {
    const every = settings.filter((_, index) => index % 15 === 0).map(groupFromSetting);
    expect(every.flatMap((group) => groupProblems(group).map((text) => `${group.name.hall}: ${text}`))).toEqual([]);
  });

  it("stay groups under random changes of basis, and come back record by record", () => {
    const random = seeded(seed);
    const problems = sample(random, 40).flatMap((group) => {
      const change = randomChange(random);
      const changed = changeBasis(group, change);
      const back = changeBasis(changed, invertBasisChange(change));
      const found = [...groupProblems(changed), ...(sameGroup(back, group) ? [] : ["does not come back"])];
      if (back.name.basisChange !== "a,b,c;0,0,0") found.push(`the way back is called ${back.name.basisChange}`);
      return found.map((text) => `${group.name.hall} (${formatBasisChange(change)}): ${text}`);
    });
    expect(problems).toEqual([]);
  });

  it("do not depend on the way: two changes in a row are their product", () => {
    const random = seeded(seed + 1);
    const problems = sample(random, 15).filter((group) => {
      const [first, second] = [randomChange(random), randomChange(random)];
      const slow = changeBasis(changeBasis(group, first), second);
      const quick = changeBasis(group, composeBasisChanges(first, second));
      return !sameGroup(slow, quick) || slow.name.basisChange !== quick.name.basisChange;
    });
    expect(problems).toEqual([]);
  });

  it("move points as the coordinates do: x' = P⁻¹ (x − p) of an image is the image of x'", () => {
    const random = seeded(seed + 2);
    for (const group of sample(random, 10)) {
      const change = randomChange(random);
      const changed = changeBasis(group, change);
      const back = invertBasisChange(change);
      const transform = (x: RationalVector): RationalVector => image(back.matrix, x, back.shift);
      const position = fractions(random, [7, 11]);
      const images = orbitKeys(group, position, changed, transform);
      const other = orbitKeys(changed, transform(position), changed, (x) => x);
      expect(images, `${group.name.hall} ${formatBasisChange(change)}`).toEqual(other);
    }
  });

  it("keep the text of a change of basis", () => {
    const random = seeded(seed + 3);
    for (let count = 0; count < 50; count++) {
      const change = randomChange(random);
      expect(parseBasisChange(`(${formatBasisChange(change)})`)).toEqual(change);
    }
  });

  it("have one order of operators, however they are given", () => {
    const random = seeded(seed + 4);
    for (const group of sample(random, 25)) {
      const given = operatorsModuloIntegers(group).filter((_, index) => index > 0);
      for (let index = given.length - 1; index > 0; index--) {
        const other = random.below(index + 1);
        [given[index], given[other]] = [given[other] as (typeof given)[0], given[index] as (typeof given)[0]];
      }
      expect(sameGroup(groupFromOperators(given), group), `${group.name.hall}`).toBe(true);
    }
  });
});

describe(`operators and lattices (seed ${seed})`, () => {
  it("read back from their triplets", () => {
    const random = seeded(seed + 5);
    for (const group of sample(random, 15)) {
      const changed = changeBasis(group, randomChange(random));
      for (const operator of changed.operators) expect(parseTriplet(formatTriplet(operator))).toEqual(operator);
    }
  });

  it("have inverses", () => {
    const random = seeded(seed + 6);
    for (const group of sample(random, 10))
      for (const operator of group.operators)
        expect(formatTriplet(composeOperators(operator, invertOperator(operator)))).toBe("x,y,z");
  });

  it("go to the primitive basis and back; phases k·x do not depend on the basis", () => {
    const random = seeded(seed + 7);
    for (const group of sample(random, 20)) {
      const { lattice } = changeBasis(group, randomChange(random));
      const [x, k] = [fractions(random, [3, 7]), fractions(random, [2, 5])];
      const [xi, kappa] = [toPrimitiveColumn(lattice, x), toPrimitiveRow(lattice, k)];
      expect(fromPrimitiveColumn(lattice, xi)).toEqual(x);
      expect(fromPrimitiveRow(lattice, kappa)).toEqual(k);
      expect(dot(kappa, xi)).toEqual(dot(k, x));
      expect(isLatticeVector(lattice, x)).toBe(xi.every(isInteger));
    }
  });

  it("list the operators modulo integers where integers are no lattice vectors", () => {
    // Halving a and doubling b: (1,0,0) is twice a lattice vector, (0,1,0) is none.
    const group = parseGroup("P 1 (2a,b/2,c)");
    expect(latticeVectorsInCell(group)).toEqual([
      [
        [0, 1],
        [0, 1],
        [0, 1],
      ],
      [
        [1, 2],
        [0, 1],
        [0, 1],
      ],
    ]);
    expect(operatorsModuloIntegers(group).map(formatTriplet)).toEqual(["x,y,z", "x+1/2,y,z"]);
    expect(
      isLatticeVector(group.lattice, [
        [0, 1],
        [1, 1],
        [0, 1],
      ]),
    ).toBe(false);
  });

  it("give orbits whose atoms come from atom 0 exactly, multiplicity times site order = order of the group", () => {
    const random = seeded(seed + 8);
    for (const group of sample(random, 40)) {
      const special = (): Rational => rational(random.below(8), random.pick([4, 8, 3, 6, 97]));
      const orbit = siteOrbit(group, { label: "A", position: [special(), special(), special()] }, null);
      expect(orbit.positions.length * orbit.siteSymmetry.length).toBe(group.operators.length);
      expect(orbit.positions[0]).toEqual(orbit.position);
      orbit.carriers.forEach(({ operator, shift }, index) => {
        const moved = applied(group, operator, orbit.position);
        const atom = orbit.positions[index] as RationalVector;
        expect([0, 1, 2].map((row) => add(atom[row as 0] as Rational, shift[row as 0] as Rational))).toEqual(moved);
        expect(isLatticeVector(group.lattice, shift)).toBe(true);
        expect(atom.every(([numerator, denominator]) => numerator >= 0 && numerator < denominator)).toBe(true);
      });
    }
  });
});

function image(matrix: BasisChange["matrix"], x: RationalVector, shift: RationalVector): RationalVector {
  const row = (index: 0 | 1 | 2): Rational =>
    matrix[index].reduce<Rational>((sum, entry, column) => add(sum, multiply(entry, x[column as 0])), shift[index]);
  return [row(0), row(1), row(2)];
}

/** `R x + t` from the numerators. */
function applied(group: SpaceGroup, index: number, x: RationalVector): Rational[] {
  const operator = group.operators[index] as SpaceGroup["operators"][number];
  return [0, 1, 2].map((row) =>
    [0, 1, 2].reduce<Rational>(
      (sum, column) =>
        add(
          sum,
          multiply(
            rational(operator.rotation[3 * row + column] as number, operator.rotationDenominator),
            x[column as 0],
          ),
        ),
      rational(operator.translation[row as 0], operator.translationDenominator),
    ),
  );
}

/** The images of a point, transformed, modulo the lattice of `target`, as sorted text. */
function orbitKeys(
  group: SpaceGroup,
  position: RationalVector,
  target: SpaceGroup,
  transform: (x: RationalVector) => RationalVector,
): string[] {
  const keys = group.operators.map((_, index) => {
    const xi = toPrimitiveColumn(
      target.lattice,
      transform(applied(group, index, position) as unknown as RationalVector),
    );
    return xi
      .map(([numerator, denominator]) => `${((numerator % denominator) + denominator) % denominator}/${denominator}`)
      .join();
  });
  return [...new Set(keys)].sort();
}
