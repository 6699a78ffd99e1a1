import type { Cell } from "@kvane/core/spacegroups";

/** An orthogonal cell in the axes (a, b, a + c), as groups with that change of basis ask for. */
export function withDiagonalC({ a, b, c }: Pick<Cell, "a" | "b" | "c">): Cell {
  return { a, b, c: Math.hypot(a, c), alpha: 90, beta: (Math.atan2(c, a) * 180) / Math.PI, gamma: 90 };
}

/** One with three unequal axes, invented. */
export const skewedCell: Cell = withDiagonalC({ a: 10.21, b: 6.05, c: 4.71 });
