import { fail } from "../errors/index.js";
import {
  divide,
  type IntegerMatrix,
  integerDeterminant,
  invert,
  invertUnimodular,
  isZero,
  lcm,
  mapVector,
  matrixFrom,
  multiply,
  multiplyIntegerMatrices,
  multiplyMatrices,
  type Rational,
  type RationalVector,
  subtract,
  timesColumn,
  toNumber,
  vectorFrom,
} from "../numbers/index.js";
import { axesChoices } from "./axes-choices.js";
import { type DiagonalForm, diagonalForm, freeDirections, solveCongruences } from "./congruences.js";
import { crystalSystem, fittingAxes } from "./conventional-axes.js";
import { latticeMatrix, reduceByLattice } from "./lattices.js";
import { groupFromSetting } from "./name-groups.js";
import { timesIntegers } from "./primitive-elements.js";
import { settingTable } from "./settings.js";
import type { BasisChange, SpaceGroup, TabulatedSetting } from "./types.js";

/** A way from the axes of a group to a tabulated setting of its type. */
export interface WayToSetting {
  readonly setting: TabulatedSetting;
  /** The group of the setting: exactly the operators of the given one after `change`. */
  readonly target: SpaceGroup;
  readonly change: BasisChange;
  /** The primitive basis of the setting as columns in the primitive basis of the given group; determinant 1. */
  readonly primitiveBasis: IntegerMatrix;
}

/**
 * Which space group is it? The tabulated setting that the number stands for (unique axis b, cell choice 1, origin 2,
 * hexagonal axes) and a change of basis that leads to it: `changeBasis(group, change)` has exactly its operators. Any
 * basis and origin may be given; enantiomorphic types are told apart, so that det P > 0. Of the many changes that serve,
 * one near the identity is taken.
 *
 * Source: R. W. Grosse-Kunstleve, Acta Cryst. A55 (1999) 383.
 */
export function standardSetting(group: SpaceGroup): { setting: TabulatedSetting; change: BasisChange } {
  for (const { setting, change } of waysToSettings(group, standardRows())) return { setting, change };
  return fail("not-a-group", "the operators are those of none of the 230 types of space groups");
}

let standard: readonly TabulatedSetting[] | null = null;

function standardRows(): readonly TabulatedSetting[] {
  standard ??= settingTable().filter((row) => row.standard);
  return standard;
}

/**
 * All ways from a group to the settings listed that differ in more than a shift of origin, one for each choice of axes
 * (for monoclinic and triclinic groups: each small one), the nearest to the axes given first within a setting. Found as
 * they are asked for.
 */
export function* waysToSettings(
  group: SpaceGroup,
  settings: readonly TabulatedSetting[],
): Generator<WayToSetting, undefined> {
  const fitting = fittingAxes(group, averagedMetric(group));
  const points = integerDeterminant(fitting);
  const axes = candidateAxes(group, fitting);
  const translations = new Map(
    group.primitive.rotations.map((rotation, index) => [
      rotation.join(),
      group.primitive.translations[index] as readonly number[],
    ]),
  );
  for (const setting of settings) {
    if (!mayBe(setting, group, points)) continue;
    const target = targetOf(setting);
    if (target.group.operators.length !== group.operators.length || target.group.pointGroup !== group.pointGroup)
      continue;
    for (const columns of axes) {
      const way = wayTo(group, translations, target, columns);
      if (way) yield { setting, target: target.group, ...way };
    }
  }
}

interface Target {
  readonly group: SpaceGroup;
  /** B with the numerators of the lattice vectors as columns, over `lattice.denominator`. */
  readonly latticeColumns: IntegerMatrix;
  /** Indices of operators that generate the point group. */
  readonly generators: readonly number[];
  /** Of the stacked `R − 1` of the generators. */
  readonly shifts: DiagonalForm;
}

const targets = new Map<string, Target>();

function targetOf(setting: TabulatedSetting): Target {
  const key = `${setting.number}:${setting.choice}`;
  const known = targets.get(key);
  if (known) return known;
  const group = groupFromSetting(setting);
  const generators = generatingRotations(group.primitive.rotations);
  const target: Target = {
    group,
    latticeColumns: latticeColumns(group),
    generators,
    shifts: diagonalForm(
      generators.flatMap((index) => {
        const rotation = group.primitive.rotations[index] as IntegerMatrix;
        return [0, 1, 2].map((row) =>
          [0, 1, 2].map((column) => (rotation[3 * row + column] as number) - (row === column ? 1 : 0)),
        );
      }),
    ),
  };
  targets.set(key, target);
  return target;
}

/** From the last operator on: improper ones of high order come there and generate most. */
function generatingRotations(rotations: readonly IntegerMatrix[]): readonly number[] {
  const chosen: number[] = [];
  let reached = new Map([[(rotations[0] as IntegerMatrix).join(), rotations[0] as IntegerMatrix]]);
  for (let index = rotations.length - 1; index > 0; index--) {
    if (reached.has((rotations[index] as IntegerMatrix).join())) continue;
    chosen.push(index);
    reached = new Map([[(rotations[0] as IntegerMatrix).join(), rotations[0] as IntegerMatrix]]);
    for (const element of reached.values())
      for (const generator of chosen) {
        const next = multiplyIntegerMatrices(element, rotations[generator] as IntegerMatrix);
        if (!reached.has(next.join())) reached.set(next.join(), next);
      }
  }
  return chosen;
}

/** First and last number of each crystal class in International Tables A. */
const classNumbers: Readonly<Record<string, readonly [number, number]>> = {
  "1": [1, 1],
  "-1": [2, 2],
  "2": [3, 5],
  "m": [6, 9],
  "2/m": [10, 15],
  "222": [16, 24],
  "mm2": [25, 46],
  "mmm": [47, 74],
  "4": [75, 80],
  "-4": [81, 82],
  "4/m": [83, 88],
  "422": [89, 98],
  "4mm": [99, 110],
  "-42m": [111, 122],
  "4/mmm": [123, 142],
  "3": [143, 146],
  "-3": [147, 148],
  "32": [149, 155],
  "3m": [156, 161],
  "-3m": [162, 167],
  "6": [168, 173],
  "-6": [174, 174],
  "6/m": [175, 176],
  "622": [177, 182],
  "6mm": [183, 186],
  "-62m": [187, 190],
  "6/mmm": [191, 194],
  "23": [195, 199],
  "m-3": [200, 206],
  "432": [207, 214],
  "-43m": [215, 220],
  "m-3m": [221, 230],
};

/** Lattice points per cell by the lattice letter of a Hall symbol. */
const pointsOfLetter: Readonly<Record<string, number>> = { P: 1, A: 2, B: 2, C: 2, I: 2, R: 3, F: 4 };

/** False for another crystal class or another number of lattice points per cell: spares the building of the group. */
function mayBe({ number, hall }: TabulatedSetting, { pointGroup }: SpaceGroup, points: number): boolean {
  const range = classNumbers[pointGroup];
  const letter = hall.replace("-", "").trim().slice(0, 1);
  return range !== undefined && number >= range[0] && number <= range[1] && pointsOfLetter[letter] === points;
}

/**
 * Conventional axes as columns in the primitive basis: fitting axes in all choices, and the axes given where they are
 * lattice vectors; the nearest to those given first.
 */
function candidateAxes(group: SpaceGroup, fitting: IntegerMatrix): readonly IntegerMatrix[] {
  const { denominator } = group.lattice;
  const basis = latticeColumns(group);
  const all = axesChoices(crystalSystem(group.pointGroup)).map((choice) => multiplyIntegerMatrices(fitting, choice));
  const given = invert(latticeMatrix(group.lattice)).flat();
  if (given.every((entry) => entry[1] === 1)) all.unshift(given.map((entry) => entry[0]));
  const distance = (columns: IntegerMatrix): number =>
    multiplyIntegerMatrices(basis, columns).reduce(
      (sum, entry, index) => sum + (entry - (index % 4 === 0 ? denominator : 0)) ** 2,
      0,
    );
  return all
    .map((columns) => ({ columns, distance: distance(columns) }))
    .sort((one, other) => one.distance - other.distance)
    .map(({ columns }) => columns);
}

/** Numerators of the lattice vectors as columns. */
function latticeColumns({ lattice }: SpaceGroup): IntegerMatrix {
  return [0, 1, 2].flatMap((row) => lattice.vectors.map((vector) => vector[row as 0 | 1 | 2]));
}

/** The metric of the primitive basis with the axes given as if orthonormal, averaged over the rotations. */
function averagedMetric({ lattice, primitive }: SpaceGroup): readonly number[] {
  const columns = lattice.vectors;
  const plain = [0, 1, 2].flatMap((row) =>
    [0, 1, 2].map((column) =>
      [0, 1, 2].reduce((sum, axis) => sum + (columns[row]?.[axis] as number) * (columns[column]?.[axis] as number), 0),
    ),
  );
  const sum = new Array<number>(9).fill(0);
  for (const rotation of primitive.rotations) {
    const turned = multiplyIntegerMatrices(
      [0, 3, 6, 1, 4, 7, 2, 5, 8].map((index) => rotation[index] as number),
      multiplyIntegerMatrices(plain, rotation),
    );
    turned.forEach((entry, index) => {
      sum[index] = (sum[index] as number) + entry;
    });
  }
  return sum;
}

/** The change with these axes, when with some origin they give the operators of the target; else null. */
function wayTo(
  group: SpaceGroup,
  translations: ReadonlyMap<string, readonly number[]>,
  target: Target,
  columns: IntegerMatrix,
): { change: BasisChange; primitiveBasis: IntegerMatrix } | null {
  const { lattice, primitive } = target.group;
  // The lattices agree exactly when the target's primitive vectors are a basis of the group's.
  const scaled = multiplyIntegerMatrices(columns, target.latticeColumns);
  if (scaled.some((entry) => entry % lattice.denominator !== 0)) return null;
  const basis = scaled.map((entry) => entry / lattice.denominator + 0);
  if (integerDeterminant(basis) !== 1) return null;
  const inverse = invertUnimodular(basis);
  const denominator = lcm(primitive.denominator, group.primitive.denominator);
  const gaps: number[] = [];
  for (const index of target.generators) {
    const rotation = multiplyIntegerMatrices(
      multiplyIntegerMatrices(basis, primitive.rotations[index] as IntegerMatrix),
      inverse,
    );
    const own = translations.get(rotation.join());
    if (own === undefined) return null;
    const carried = timesIntegers(inverse, own);
    (primitive.translations[index] as readonly number[]).forEach((entry, axis) => {
      gaps.push(
        entry * (denominator / primitive.denominator) -
          (carried[axis] as number) * (denominator / group.primitive.denominator),
      );
    });
  }
  const found = solveCongruences(target.shifts, gaps, denominator);
  if (found === null) return null;
  const toAxes = multiplyMatrices(latticeMatrix(group.lattice), matrixFrom(basis));
  const shift = plainestShift(
    found.solutions.map((solution) => timesColumn(toAxes, vectorFrom(solution, found.denominator))),
    freeDirections(target.shifts).map((direction) => timesColumn(toAxes, vectorFrom(direction))),
    group,
  );
  const matrix = multiplyMatrices(latticeMatrix(group.lattice), matrixFrom(columns));
  return { change: { matrix, shift }, primitiveBasis: basis };
}

/** The shift with the fewest components other than 0, then the smallest, among those that serve. */
function plainestShift(
  shifts: readonly RationalVector[],
  free: readonly RationalVector[],
  group: SpaceGroup,
): RationalVector {
  const directions = independentDirections(free);
  const plain = shifts
    .map((shift) => reduceByLattice(group.lattice, alongFree(shift, directions)))
    .map((shift) => alongFree(shift, directions))
    .map((shift) => ({
      shift,
      filled: shift.filter((entry) => !isZero(entry)).length,
      size: shift.reduce((sum, entry) => sum + Math.abs(toNumber(entry)), 0),
    }));
  plain.sort((a, b) => a.filled - b.filled || a.size - b.size);
  return (plain[0] as (typeof plain)[number]).shift;
}

interface Direction {
  readonly vector: RationalVector;
  readonly pivot: 0 | 1 | 2;
}

/** Moves the shift along free directions until the components at their pivots vanish. */
function alongFree(shift: RationalVector, directions: readonly Direction[]): RationalVector {
  return directions.reduce(
    (moved, { vector, pivot }) => subtractMultiple(moved, vector, divide(moved[pivot], vector[pivot])),
    shift,
  );
}

/** Echelon form: each direction with a pivot at which the later ones vanish. */
function independentDirections(free: readonly RationalVector[]): readonly Direction[] {
  const directions: Direction[] = [];
  for (const vector of free) {
    const rest = alongFree(vector, directions);
    const pivot = ([2, 1, 0] as const).find((axis) => !isZero(rest[axis]));
    if (pivot !== undefined) directions.push({ vector: rest, pivot });
  }
  return directions;
}

function subtractMultiple(a: RationalVector, b: RationalVector, factor: Rational): RationalVector {
  return mapVector(a, (entry, axis) => subtract(entry, multiply(factor, b[axis as 0 | 1 | 2])));
}
