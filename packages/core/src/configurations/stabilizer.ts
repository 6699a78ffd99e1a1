import { type MagneticGroup, type MagneticOperator, magneticGroup } from "../magneticgroups/index.js";
import { hermiteNormalForm, type RationalVector, reduceModulo, vectorFrom } from "../numbers/index.js";
import {
  fromPrimitiveColumn,
  latticeFromVectors,
  operatorFrom,
  rotationOf,
  type SymmetryOperator,
} from "../spacegroups/index.js";
import { cosetVectors } from "./arm-selection.js";
import {
  elementAt,
  operatorOf,
  type ParentQuotient,
  type QuotientElement,
  translationColumnOf,
} from "./parent-quotient.js";

/** An isotropy subgroup in the parent: its translations and one element per coset of them. */
export interface Stabilizer {
  readonly quotient: ParentQuotient;
  /** Hermite normal form in the primitive basis of the translations without time reversal. */
  readonly lattice: readonly (readonly number[])[];
  /** Representatives of the parent's translations modulo it, zero first. */
  readonly cells: readonly (readonly number[])[];
  /** One element per coset of the lattice. */
  readonly cosets: readonly QuotientElement[];
}

const identityKey = "1,0,0,0,1,0,0,0,1";

export function stabilizerOf(quotient: ParentQuotient, elements: readonly number[]): Stabilizer {
  const read = elements.map((index) => elementAt(quotient, index));
  const translations = read.filter(
    (element) =>
      element.timeReversal === 1 &&
      quotient.group.primitive.rotations[operatorOf(quotient, element)]?.join() === identityKey,
  );
  const lattice = hermiteNormalForm(
    [
      ...quotient.period,
      ...translations.map(({ translation }) => quotient.translations[translation] as readonly number[]),
    ],
    3,
  );
  const taken = new Set<string>();
  const cosets = read.filter(({ place, timeReversal, translation }) => {
    const rest = reduceModulo(quotient.translations[translation] as readonly number[], lattice);
    const key = `${place} ${timeReversal} ${rest.join()}`;
    if (taken.has(key)) return false;
    taken.add(key);
    return true;
  });
  return { quotient, lattice, cells: cosetVectors(lattice), cosets };
}

/** Number of the cell that holds a translation (primitive basis). */
export function cellNumber({ lattice }: Stabilizer, vector: readonly number[]): number {
  const [x, y, z] = reduceModulo(vector, lattice) as [number, number, number];
  const [, b, c] = [0, 1, 2].map((axis) => lattice[axis]?.[axis] as number) as [number, number, number];
  return (x * b + y) * c + z;
}

/** The translations of the stabilizer as exact columns in the axes of the parent. */
export function latticeColumns(stabilizer: Stabilizer): RationalVector[] {
  return stabilizer.lattice.map((row) => fromPrimitiveColumn(stabilizer.quotient.group.lattice, vectorFrom(row)));
}

function magneticOperatorOf(quotient: ParentQuotient, element: QuotientElement): MagneticOperator {
  const own = quotient.group.operators[operatorOf(quotient, element)] as SymmetryOperator;
  return {
    operator: operatorFrom(rotationOf(own), translationColumnOf(quotient, element)),
    timeReversal: element.timeReversal,
  };
}

/** The record of the magnetic group in the axes of the parent. */
export function groupOfStabilizer(stabilizer: Stabilizer): MagneticGroup {
  return magneticGroup(
    latticeFromVectors(latticeColumns(stabilizer)),
    stabilizer.cosets.map((element) => magneticOperatorOf(stabilizer.quotient, element)),
  );
}

/** How many arrangements the parent makes of one. */
export interface DomainCounts {
  readonly total: number;
  /** Sets of arms. */
  readonly k: number;
  /** Modulo time reversal and translations. */
  readonly orientation: number;
}

/**
 * Index in the whole grey parent, translations included, and how the domains divide: the parent moves the arrangement
 * to `index` ones.
 */
export function domainsOf(stabilizer: Stabilizer, armSets: number): { index: number; domains: DomainCounts } {
  const order = stabilizer.quotient.group.operators.length;
  const index = (2 * order * stabilizer.cells.length) / stabilizer.cosets.length;
  const rotations = new Set(stabilizer.cosets.map(({ place }) => place)).size;
  return { index, domains: { total: index, k: armSets, orientation: order / rotations } };
}
