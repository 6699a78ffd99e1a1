import { fail } from "../errors/index.js";
import {
  type IntegerMatrix,
  invertUnimodular,
  isInteger,
  multiplyIntegerMatrices,
  type RationalVector,
  subtractVectors,
  vectorFrom,
} from "../numbers/index.js";
import {
  assembleGroup,
  type BasisChange,
  type SpaceGroup,
  timesIntegers,
  toPrimitiveColumn,
  type WayToSetting,
  waysToSettings,
} from "../spacegroups/index.js";
import { antiTranslationOf, bnsSettings, primesOf } from "./compact-rows.js";
import { elementsOf, type MagneticElement } from "./elements.js";
import { rowsOfNumber, type StoredRow } from "./stored-rows.js";
import { nameOf } from "./table.js";
import type { MagneticGroup, MagneticGroupName } from "./types.js";

/** The name of a magnetic group and the way to its BNS setting. */
export interface IdentifiedMagneticGroup {
  readonly name: MagneticGroupName;
  /** From the axes of the group to those of the BNS setting, where it has exactly the operators of the table. */
  readonly toBns: BasisChange;
}

/**
 * Which of the 1651 types is it? Any basis and origin may be given. The space group that the BNS number begins with (of
 * all operators, for type IV of those without time reversal) is brought to its setting in every way that differs by an
 * element of its affine normalizer, until the primes or the anti-translation are those of a row.
 */
export function identifyMagneticGroup(group: MagneticGroup): IdentifiedMagneticGroup {
  const { elements, denominator } = elementsOf(group);
  const base = assembleGroup(group.lattice, baseElements(group, elements), denominator);
  const isRow = rowTest(group, elements, denominator);
  for (const way of waysToSettings(base, [...bnsSettings().values()])) {
    const row = rowsOfNumber(way.setting.number).find((one) => one.type === group.type && isRow(one, way));
    if (row) return { name: nameOf(row), toBns: way.change };
  }
  return fail("internal-fault", "a magnetic group was recognised as none of the 1651 types");
}

function baseElements({ type }: MagneticGroup, elements: readonly MagneticElement[]): readonly MagneticElement[] {
  return type === 3 ? elements : elements.filter((one) => one.timeReversal === 1);
}

/** Whether a group, brought to the setting of its number, is that of the row. */
function rowTest(group: MagneticGroup, elements: readonly MagneticElement[], denominator: number) {
  if (group.type === 3) {
    const primed = new Set(elements.filter((one) => one.timeReversal === -1).map((one) => one.rotation.join()));
    return (row: StoredRow, way: WayToSetting): boolean => {
      const carried = carrier(way.primitiveBasis);
      return primesOf(row.data, way.target).every(
        (prime, index) => prime === primed.has(carried(way.target.primitive.rotations[index] as IntegerMatrix)),
      );
    };
  }
  if (group.type !== 4) return (): boolean => true;
  const anti = elements.find(
    (one) => one.timeReversal === -1 && one.rotation.join() === "1,0,0,0,1,0,0,0,1",
  ) as MagneticElement;
  return (row: StoredRow, way: WayToSetting): boolean => {
    const carried = timesIntegers(invertUnimodular(way.primitiveBasis), anti.translation);
    return sameTranslation(way.target, vectorFrom(carried, denominator), antiTranslationOf(row.data));
  };
}

/** The text of a rotation of the setting in the primitive basis of the group. */
function carrier(basis: IntegerMatrix): (rotation: IntegerMatrix) => string {
  const inverse = invertUnimodular(basis);
  return (rotation) => multiplyIntegerMatrices(multiplyIntegerMatrices(basis, rotation), inverse).join();
}

function sameTranslation({ lattice }: SpaceGroup, primitive: RationalVector, vector: RationalVector): boolean {
  return subtractVectors(primitive, toPrimitiveColumn(lattice, vector)).every(isInteger);
}
