import {
  type Cell,
  checkCell,
  checkCellAgainstGroup,
  reciprocalMetric,
  type SpaceGroup,
} from "../spacegroups/index.js";

/**
 * The reciprocal metric (nine numbers, Å⁻², without 2π) of a cell in the axes of the setting, averaged over the point
 * group: cells are given to four digits, and vectors that symmetry makes equivalent must have one length.
 *
 * Throws `invalid-cell`, and `cell-contradicts-group` where the average would hide more than rounding.
 */
export function averagedReciprocalMetric(group: SpaceGroup, cell: Cell): readonly number[] {
  checkCell(cell);
  checkCellAgainstGroup(cell, group);
  const given = reciprocalMetric(cell);
  const metric = new Array<number>(9).fill(0);
  for (const { rotation, rotationDenominator } of group.operators) {
    // h → h R turns h M hᵀ into h (R M Rᵀ) hᵀ.
    const rows = [rotation.slice(0, 3), rotation.slice(3, 6), rotation.slice(6, 9)];
    transformMetric(given, rows, rotationDenominator).forEach((entry, index) => {
      metric[index] = (metric[index] as number) + entry / group.operators.length;
    });
  }
  return metric;
}

/** `T M Tᵀ` with `T = rows / denominator`. */
export function transformMetric(
  metric: readonly number[],
  rows: readonly (readonly number[])[],
  denominator: number,
): number[] {
  const result = new Array<number>(9);
  for (let i = 0; i < 3; i++)
    for (let j = 0; j < 3; j++) {
      let sum = 0;
      for (let a = 0; a < 3; a++)
        for (let b = 0; b < 3; b++)
          sum += (rows[i]?.[a] as number) * (metric[3 * a + b] as number) * (rows[j]?.[b] as number);
      result[3 * i + j] = sum / (denominator * denominator);
    }
  return result;
}
