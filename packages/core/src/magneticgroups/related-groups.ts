import {
  groupOnLattice,
  isTranslation,
  latticeFromVectors,
  latticeVectors,
  type SpaceGroup,
  translationOf,
} from "../spacegroups/index.js";
import type { MagneticGroup } from "./types.js";

/**
 * The space group that is left when time reversal is forgotten (the family of the magnetic group): for type IV its
 * lattice has the anti-translations too.
 */
export function familyGroup(group: MagneticGroup): SpaceGroup {
  const antiTranslations = group.operators
    .filter((one) => one.timeReversal === -1 && isTranslation(one.operator))
    .map((one) => translationOf(one.operator));
  return groupOnLattice(
    latticeFromVectors([...latticeVectors(group.lattice), ...antiTranslations]),
    group.operators.map((one) => one.operator),
  );
}

/** The space group of the operators without time reversal: the whole group for type I, half of it otherwise. */
export function unprimedSubgroup(group: MagneticGroup): SpaceGroup {
  return groupOnLattice(
    group.lattice,
    group.operators.filter((one) => one.timeReversal === 1).map((one) => one.operator),
  );
}
