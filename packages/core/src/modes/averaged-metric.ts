import { type Cell, directMetric, type SpaceGroup } from "../spacegroups/index.js";

/**
 * The metric of the cell (nine numbers, Å²) averaged over the point group, `G = (1/n) Σ RᵀGR`: cells are given to four
 * digits, and vectors that symmetry makes equivalent must have one length.
 */
export function averagedMetric(group: SpaceGroup, cell: Cell): readonly number[] {
  const given = directMetric(cell);
  const metric = new Array<number>(9).fill(0);
  for (const { rotation, rotationDenominator } of group.operators) {
    const scale = rotationDenominator * rotationDenominator * group.operators.length;
    for (let entry = 0; entry < 9; entry++) {
      const [left, right] = [Math.floor(entry / 3), entry % 3];
      let sum = 0;
      for (let i = 0; i < 3; i++)
        for (let j = 0; j < 3; j++)
          sum +=
            (rotation[3 * i + left] as number) * (given[3 * i + j] as number) * (rotation[3 * j + right] as number);
      metric[entry] = (metric[entry] as number) + sum / scale;
    }
  }
  return metric;
}

/** Lengths of a, b, c in Å in the averaged metric. */
export function axisLengths(group: SpaceGroup, cell: Cell): [number, number, number] {
  const metric = averagedMetric(group, cell);
  return [0, 4, 8].map((entry) => Math.sqrt(metric[entry] as number)) as [number, number, number];
}
