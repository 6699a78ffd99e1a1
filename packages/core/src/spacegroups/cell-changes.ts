import { toNumber } from "../numbers/index.js";
import { directMetric } from "./cells.js";
import type { BasisChange, Cell } from "./types.js";

/** The cell in other axes, `(a',b',c') = (a,b,c) P`: `G' = Pᵀ G P`. Å and degrees. */
export function changeCell(cell: Cell, { matrix }: BasisChange): Cell {
  const metric = directMetric(cell);
  const columns = [0, 1, 2].map((column) => matrix.map((row) => toNumber(row[column as 0 | 1 | 2])));
  const product = (i: number, j: number): number =>
    [0, 1, 2].reduce(
      (sum, a) =>
        sum +
        [0, 1, 2].reduce(
          (part, b) => part + (columns[i]?.[a] as number) * (metric[3 * a + b] as number) * (columns[j]?.[b] as number),
          0,
        ),
      0,
    );
  const [a, b, c] = [0, 1, 2].map((axis) => Math.sqrt(product(axis, axis))) as [number, number, number];
  const angle = (i: number, j: number, lengths: number): number =>
    tidyAngle((180 / Math.PI) * Math.acos(Math.min(1, Math.max(-1, product(i, j) / lengths))));
  return { a, b, c, alpha: angle(1, 2, b * c), beta: angle(0, 2, a * c), gamma: angle(0, 1, a * b) };
}

/** Degrees. Rounding makes 90° a little less or more. */
const angleRounding = 1e-9;

function tidyAngle(angle: number): number {
  const near = Math.round(angle / 30) * 30;
  return Math.abs(angle - near) < angleRounding ? near : angle;
}
