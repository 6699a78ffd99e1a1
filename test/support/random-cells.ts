import type { Cell, SpaceGroup } from "@kvane/core/spacegroups";
import type { Random } from "./random.ts";

/**
 * A cell that the group allows and no higher symmetry asks for: a random triclinic metric averaged over the rotations,
 * scaled so that the cell's volume is `volume` Å³.
 */
export function randomCell(group: SpaceGroup, random: Random, volume: number): Cell {
  // Columns of a matrix not far from a multiple of the identity: no extreme angles.
  const axes = [0, 1, 2].map((row) =>
    [0, 1, 2].map((column) => (row === column ? 1 + random.next() : 0.4 * random.next() - 0.2)),
  );
  const metric = [0, 1, 2].map((i) =>
    [0, 1, 2].map((j) => axes.reduce((sum, row) => sum + (row[i] as number) * (row[j] as number), 0)),
  );
  const mean = [0, 1, 2].map(() => [0, 0, 0]);
  for (const { rotation, rotationDenominator } of group.operators) {
    const r = (i: number, j: number): number => (rotation[3 * i + j] as number) / rotationDenominator;
    for (let i = 0; i < 3; i++)
      for (let j = 0; j < 3; j++)
        for (let m = 0; m < 3; m++)
          for (let n = 0; n < 3; n++)
            (mean[i] as number[])[j] =
              (mean[i]?.[j] as number) + (r(m, i) * (metric[m]?.[n] as number) * r(n, j)) / group.operators.length;
  }
  const g = (i: number, j: number): number => mean[i]?.[j] as number;
  const determinant =
    g(0, 0) * (g(1, 1) * g(2, 2) - g(1, 2) ** 2) -
    g(0, 1) * (g(0, 1) * g(2, 2) - g(1, 2) * g(0, 2)) +
    g(0, 2) * (g(0, 1) * g(1, 2) - g(1, 1) * g(0, 2));
  const scale = Math.cbrt(volume / Math.sqrt(determinant));
  const angle = (i: number, j: number): number => (Math.acos(g(i, j) / Math.sqrt(g(i, i) * g(j, j))) * 180) / Math.PI;
  return {
    a: scale * Math.sqrt(g(0, 0)),
    b: scale * Math.sqrt(g(1, 1)),
    c: scale * Math.sqrt(g(2, 2)),
    alpha: angle(1, 2),
    beta: angle(0, 2),
    gamma: angle(0, 1),
  };
}
