import {
  add,
  addVectors,
  floor,
  mapVector,
  multiply,
  type Rational,
  type RationalVector,
  rational,
  siteSnapAngstrom,
  siteSnapFraction,
  subtractVectors,
  toNumber,
  zeroVector,
} from "../numbers/index.js";
import { directMetric, lengthInMetric } from "./cells.js";
import { fromPrimitiveColumn, toPrimitiveColumn } from "./lattices.js";
import { applyOperator, composeOperators, operatorFrom, rotationOf, translationOf } from "./operators.js";
import type { Cell, SpaceGroup, SymmetryOperator } from "./types.js";

/** A position on the special position it was meant for, and how far it was moved. */
export interface SnappedPosition {
  readonly position: RationalVector;
  readonly moved: boolean;
  /** Å; null without a cell. */
  readonly distanceAngstrom: number | null;
}

/** Lengths in Å with a cell, else the largest component in fractions of the axes; with the tolerance that belongs. */
interface Ruler {
  readonly length: (v: RationalVector) => number;
  readonly tolerance: number;
  /** An atom this far from a fixed point is moved by at most this many times the distance by an operator. */
  readonly reach: number;
}

/**
 * Puts a position onto the special position that lies within tolerance (`siteSnapAngstrom` with a cell, else
 * `siteSnapFraction`): operators that bring it almost back are taken, nearest first, as long as the group they generate
 * has a fixed point within tolerance; the exact average over that group is the fixed point next to the position.
 */
export function snapPosition(group: SpaceGroup, position: RationalVector, cell: Cell | null): SnappedPosition {
  const ruler = rulerFor(cell);
  const near = nearStabilizer(group, position, ruler);
  // Those that leave the position exactly where it is are a group already.
  let stabilizer: readonly SymmetryOperator[] = near.filter(isExact).map(({ operator }) => operator);
  let best = position;
  for (const { operator: candidate } of near.filter((one) => !isExact(one))) {
    if (stabilizer.some((known) => isSame(known, candidate))) continue;
    const larger = finiteClosure([...stabilizer, candidate]);
    if (larger === null) continue;
    const average = averageOver(larger, position);
    if (ruler.length(subtractVectors(average, position)) > ruler.tolerance) continue;
    stabilizer = larger;
    best = average;
  }
  const difference = subtractVectors(best, position);
  const moved = difference.some((entry) => entry[0] !== 0);
  return {
    position: best,
    moved,
    distanceAngstrom: cell === null ? null : ruler.length(difference),
  };
}

function rulerFor(cell: Cell | null): Ruler {
  if (cell !== null) {
    const metric = directMetric(cell);
    return { length: (v) => lengthInMetric(metric, v.map(toNumber)), tolerance: siteSnapAngstrom, reach: 2 };
  }
  // A rotation in conventional axes at most doubles the largest component.
  return {
    length: (v) => Math.max(...v.map((entry) => Math.abs(toNumber(entry)))),
    tolerance: siteSnapFraction,
    reach: 3,
  };
}

/** An operator `{R|t − a}` that brings the position almost back, and how far from it. */
interface NearOperator {
  readonly operator: SymmetryOperator;
  readonly distance: number;
}

function isExact({ distance }: NearOperator): boolean {
  return distance === 0;
}

/** Those of the group, by how far they move the position. */
function nearStabilizer(group: SpaceGroup, position: RationalVector, ruler: Ruler): NearOperator[] {
  const found: NearOperator[] = [];
  for (const operator of group.operators) {
    const difference = subtractVectors(applyOperator(operator, position), position);
    const nearest = mapVector(toPrimitiveColumn(group.lattice, difference), nearestInteger);
    const shift = fromPrimitiveColumn(group.lattice, nearest);
    const distance = ruler.length(subtractVectors(difference, shift));
    if (distance <= ruler.reach * ruler.tolerance)
      found.push({
        operator: operatorFrom(rotationOf(operator), subtractVectors(translationOf(operator), shift)),
        distance,
      });
  }
  return found.sort((a, b) => a.distance - b.distance);
}

function nearestInteger(value: Rational): Rational {
  return rational(floor(add(value, rational(1, 2))));
}

/** The group of affine maps that the operators generate, or null when it holds a translation (is no point group). */
function finiteClosure(generators: readonly SymmetryOperator[]): readonly SymmetryOperator[] | null {
  const reached = new Map<string, SymmetryOperator>();
  for (const generator of generators) reached.set(generator.rotation.join(), generator);
  for (const element of reached.values())
    for (const generator of generators) {
      const product = composeOperators(element, generator);
      const key = product.rotation.join();
      const known = reached.get(key);
      if (known === undefined) reached.set(key, product);
      else if (!isSame(known, product)) return null;
    }
  return [...reached.values()];
}

function isSame(a: SymmetryOperator, b: SymmetryOperator): boolean {
  return JSON.stringify(a) === JSON.stringify(b);
}

function averageOver(operators: readonly SymmetryOperator[], position: RationalVector): RationalVector {
  const sum = operators.map((operator) => applyOperator(operator, position)).reduce(addVectors, zeroVector);
  return mapVector(sum, (entry) => multiply(entry, rational(1, operators.length)));
}
