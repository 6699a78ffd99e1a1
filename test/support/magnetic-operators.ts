/** Records of magnetic operators from the plain lists of `magnetic-table.ts` and back, and the groups they make. */
import type { MagneticGroup, MagneticOperator } from "@kvane/core/magneticgroups";
import { magneticGroup } from "@kvane/core/magneticgroups";
import { latticeFromVectors, operatorsModuloIntegers } from "@kvane/core/spacegroups";
import type { FlatOperator } from "./magnetic-table.js";

type Triple = readonly [number, number, number];

export function operatorOf(flat: FlatOperator): MagneticOperator {
  return {
    operator: {
      rotation: flat.slice(0, 9),
      rotationDenominator: 1,
      translation: flat.slice(9, 12) as unknown as Triple,
      translationDenominator: 24,
    },
    timeReversal: flat[12] === -1 ? -1 : 1,
  };
}

/** The group of a complete list modulo integers; pure translations without time reversal span its lattice. */
export function groupOfFlat(list: readonly FlatOperator[]): MagneticGroup {
  const centrings = list.filter((flat) => flat[12] === 1 && flat.slice(0, 9).join("") === "100010001");
  const pair = (numerator: number) => {
    const divisor = [24, 12, 8, 6, 4, 3, 2, 1].find((one) => numerator % one === 0) as number;
    return [numerator / divisor, 24 / divisor] as const;
  };
  const vectors = centrings.map((flat) => [9, 10, 11].map((place) => pair(flat[place] as number)));
  const units = [0, 1, 2].map((axis) => [0, 1, 2].map((index) => [index === axis ? 1 : 0, 1] as const));
  const lattice = latticeFromVectors([...units, ...vectors] as unknown as Parameters<typeof latticeFromVectors>[0]);
  return magneticGroup(lattice, list.map(operatorOf));
}

/** All operators modulo integer translations as texts, sorted: comparable with those of a plain list. */
export function flatTexts(group: MagneticGroup): readonly string[] {
  return [1, -1]
    .flatMap((timeReversal) => {
      const operators = group.operators.filter((one) => one.timeReversal === timeReversal).map((one) => one.operator);
      const all = operatorsModuloIntegers({
        lattice: group.lattice,
        operators,
      } as unknown as Parameters<typeof operatorsModuloIntegers>[0]);
      return all.map(({ rotation, rotationDenominator, translation, translationDenominator }) =>
        [
          ...rotation.map((entry) => entry / rotationDenominator),
          ...translation.map((entry) => ((24 * entry) / translationDenominator) % 24),
          timeReversal,
        ].join(),
      );
    })
    .sort();
}
