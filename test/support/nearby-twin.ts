import type { KindOfK } from "@kvane/core/kvectors";
import { type Cell, reciprocalMetric, type SpaceGroup } from "@kvane/core/spacegroups";
import { type FloatGroup, floatGroup, inner, inverse, turnRow } from "./float-group.js";
import { floatKind } from "./kinds-in-floats.js";

/** Shifts by L* are tried with primitive components up to this: plenty for a k inside one cell. */
const largestShift = 3;

/**
 * The distance in Å⁻¹ from k to the nearest point of each kind, by trying every arm (and −k, where the classification
 * has it) with every small shift: slow and plain, to hold the fast search against.
 */
export function distancesToKinds(
  group: SpaceGroup,
  cell: Cell,
  kinds: readonly KindOfK[],
  k: readonly number[],
  withInversion: boolean,
): number[] {
  const float = floatGroup(group);
  const axes = cartesianAxes(cell);
  const shifts = shiftsOf(float);
  return kinds.map((kind) => {
    const { base, directions } = floatKind(float, kind.k, withInversion);
    let smallest = Number.POSITIVE_INFINITY;
    for (const { rotation } of float.operators.map(inverse))
      for (const sign of withInversion ? [1, -1] : [1]) {
        const across = perpendicularTo(directions.map((row) => cartesian(axes, turnRow(row, rotation))));
        const arm = turnRow(base, rotation).map((entry, index) => sign * entry - (k[index] as number));
        for (const shift of shifts) {
          const step = cartesian(
            axes,
            arm.map((entry, index) => entry + (shift[index] as number)),
          );
          smallest = Math.min(smallest, Math.hypot(...across(step)));
        }
      }
    return smallest;
  });
}

function shiftsOf(float: FloatGroup): number[][] {
  const steps = Array.from({ length: 2 * largestShift + 1 }, (_, index) => index - largestShift);
  return steps.flatMap((l) =>
    steps.flatMap((m) =>
      steps.map((n) =>
        [0, 1, 2].map((axis) =>
          inner(
            [l, m, n],
            float.dual.map((row) => row[axis] as number),
          ),
        ),
      ),
    ),
  );
}

/** Columns of a lower triangular matrix whose product with its transpose is the metric with 2π (Cholesky). */
function cartesianAxes(cell: Cell): number[][] {
  const metric = reciprocalMetric(cell).map((entry) => 4 * Math.PI ** 2 * entry);
  const axes = [0, 1, 2].map(() => [0, 0, 0]);
  for (let i = 0; i < 3; i++)
    for (let j = 0; j <= i; j++) {
      const [left, right] = [axes[i] as number[], axes[j] as number[]];
      const rest = (metric[3 * i + j] as number) - inner(left, right);
      left[j] = i === j ? Math.sqrt(rest) : rest / (right[j] as number);
    }
  return axes;
}

function cartesian(axes: readonly (readonly number[])[], row: readonly number[]): number[] {
  return [0, 1, 2].map((axis) =>
    inner(
      row,
      axes.map((one) => one[axis] as number),
    ),
  );
}

/** What is left of a vector when its parts along some directions are taken away (Gram and Schmidt). */
function perpendicularTo(directions: readonly (readonly number[])[]): (vector: readonly number[]) => number[] {
  const units: number[][] = [];
  const without = (vector: readonly number[]): number[] =>
    units.reduce(
      (rest, unit) => {
        const part = inner(rest, unit);
        return rest.map((entry, index) => entry - part * (unit[index] as number));
      },
      [...vector],
    );
  for (const direction of directions) {
    const rest = without(direction);
    const length = Math.hypot(...rest);
    units.push(rest.map((entry) => entry / length));
  }
  return without;
}
