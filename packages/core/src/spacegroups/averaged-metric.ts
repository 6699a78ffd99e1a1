import type { SymmetryOperator } from "./types.js";

/**
 * A metric (nine numbers row by row, Å²) averaged over the rotations of a group, `G = (1/n) Σ RᵀGR`: cells are given to
 * four digits, and vectors that symmetry makes equivalent must have one length.
 *
 * @param operators of the whole group, in the axes of the metric
 */
export function averagedMetric(
  operators: readonly Pick<SymmetryOperator, "rotation" | "rotationDenominator">[],
  metric: readonly number[],
): number[] {
  const mean = new Array<number>(9).fill(0);
  for (const { rotation, rotationDenominator } of operators) {
    const scale = rotationDenominator * rotationDenominator * operators.length;
    metricOfAxes(metric, rotation).forEach((entry, index) => {
      mean[index] = (mean[index] as number) + entry / scale;
    });
  }
  return mean;
}

/** The metric `MᵀGM` of the axes that are the columns of M (nine numbers row by row) in those of G. */
export function metricOfAxes(metric: readonly number[], axes: readonly number[]): number[] {
  return Array.from({ length: 9 }, (_, entry) => {
    const [left, right] = [Math.floor(entry / 3), entry % 3];
    let sum = 0;
    for (let i = 0; i < 3; i++)
      for (let j = 0; j < 3; j++)
        sum += (axes[3 * i + left] as number) * (metric[3 * i + j] as number) * (axes[3 * j + right] as number);
    return sum;
  });
}
