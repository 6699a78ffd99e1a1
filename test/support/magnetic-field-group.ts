/**
 * The magnetic group of an explicit arrangement of moments, by brute force: every operator of the parent group with
 * every lattice translation of a supercell, with and without time reversal, is tried on every atom. Floats; only the
 * operators of the parent group come from the library.
 */
import { type MagneticGroup, type MagneticOperator, magneticGroup } from "@kvane/core/magneticgroups";
import { latticeFromVectors, operatorsModuloIntegers, type SpaceGroup } from "@kvane/core/spacegroups";

export interface Moment {
  /** Coordinates in the parent's axes. */
  readonly at: readonly number[];
  /** Components along the parent's axes. */
  readonly moment: readonly number[];
}

/** The moments of `field` on all sites within a supercell of `size` parent cells; sites given in one cell. */
export function momentsInSupercell(
  sites: readonly (readonly number[])[],
  size: readonly [number, number, number],
  field: (at: readonly number[], site: number) => readonly number[],
): readonly Moment[] {
  return cellsOf(size).flatMap((shift) =>
    sites.map((site, index) => {
      const at = site.map((entry, axis) => entry + (shift[axis] as number));
      return { at, moment: field(at, index) };
    }),
  );
}

export function groupOfMoments(
  parent: SpaceGroup,
  moments: readonly Moment[],
  size: readonly [number, number, number],
): MagneticGroup {
  const kept: MagneticOperator[] = [];
  for (const operator of operatorsModuloIntegers(parent))
    for (const shift of cellsOf(size)) {
      const moved = operator.translation.map(
        (entry, axis) => entry + (shift[axis] as number) * operator.translationDenominator,
      ) as unknown as readonly [number, number, number];
      for (const timeReversal of [1, -1] as const) {
        const candidate: MagneticOperator = { operator: { ...operator, translation: moved }, timeReversal };
        if (leavesMoments(candidate, moments, size)) kept.push(candidate);
      }
    }
  const edges = [0, 1, 2].map((axis) => [0, 1, 2].map((index) => [index === axis ? (size[axis] as number) : 0, 1]));
  const translations = kept.filter((one) => one.timeReversal === 1 && one.operator.rotation.join("") === "100010001");
  const vectors = translations.map(({ operator }) =>
    operator.translation.map((entry) => reduced(entry, operator.translationDenominator)),
  );
  const lattice = latticeFromVectors([...edges, ...vectors] as unknown as Parameters<typeof latticeFromVectors>[0]);
  return magneticGroup(lattice, kept);
}

function leavesMoments(
  { operator, timeReversal }: MagneticOperator,
  moments: readonly Moment[],
  size: readonly [number, number, number],
): boolean {
  const r = operator.rotation;
  const sign = timeReversal * Math.sign(determinant(r));
  const turn = (v: readonly number[]): number[] =>
    [0, 3, 6].map((row) => [0, 1, 2].reduce((sum, axis) => sum + (r[row + axis] as number) * (v[axis] as number), 0));
  return moments.every(({ at, moment }) => {
    const image = turn(at).map(
      (entry, axis) => entry + (operator.translation[axis] as number) / operator.translationDenominator,
    );
    const found = moments.find((other) =>
      other.at.every((entry, axis) => {
        const gap = (entry - (image[axis] as number)) / (size[axis] as number);
        return Math.abs(gap - Math.round(gap)) < 1e-6;
      }),
    );
    if (!found) throw new Error("the sites are not complete");
    return turn(moment).every((entry, axis) => Math.abs(sign * entry - (found.moment[axis] as number)) < 1e-9);
  });
}

function determinant(m: readonly number[]): number {
  const [a, b, c, d, e, f, g, h, i] = m as [number, number, number, number, number, number, number, number, number];
  return a * (e * i - f * h) - b * (d * i - f * g) + c * (d * h - e * g);
}

function cellsOf(size: readonly [number, number, number]): readonly (readonly number[])[] {
  const cells: number[][] = [];
  for (let x = 0; x < size[0]; x++)
    for (let y = 0; y < size[1]; y++) for (let z = 0; z < size[2]; z++) cells.push([x, y, z]);
  return cells;
}

function reduced(top: number, bottom: number): readonly [number, number] {
  let [a, b] = [Math.abs(top), bottom];
  while (b !== 0) [a, b] = [b, a % b];
  return a === 0 ? [0, 1] : [top / a, bottom / a];
}
