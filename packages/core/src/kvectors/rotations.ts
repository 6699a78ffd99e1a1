import { matrixFrom, type RationalMatrix } from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";

/** The rotation of one operator in the axes of the setting, exact. It acts on wave vectors as a row from the left: k R. */
export function settingRotation(group: SpaceGroup, index: number): RationalMatrix {
  const operator = group.operators[index];
  if (!operator) throw new RangeError(`the group has no operator ${index}`);
  return matrixFrom(operator.rotation, operator.rotationDenominator);
}
