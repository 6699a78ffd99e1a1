import { waveTimesColumn } from "../irreps/index.js";
import type { WaveVector } from "../kvectors/index.js";
import {
  type LinearForm,
  lcm,
  modulo,
  overCommonDenominator,
  type RationalVector,
  rational,
  safe,
} from "../numbers/index.js";
import { fromPrimitiveColumn, type SiteOrbit, type SpaceGroup, toPrimitiveColumn } from "../spacegroups/index.js";

/** How one operator of the little group moves the atoms: `g r_j = r_{image[j]} + a_j`, `phase[j] = k·a_j` in turns. */
export interface OperatorAction {
  readonly image: readonly number[];
  readonly phase: readonly LinearForm[];
}

/** The action of the given operators (by index) on the atoms of an orbit, exact. */
export function siteAction(
  group: SpaceGroup,
  k: WaveVector,
  orbit: SiteOrbit,
  operators: readonly number[],
): OperatorAction[] {
  const { rotations, translations, denominator: translationDenominator } = group.primitive;
  const primitive = orbit.positions.map((position) =>
    overCommonDenominator(toPrimitiveColumn(group.lattice, position)),
  );
  const denominator = primitive.reduce((common, entry) => lcm(common, entry.denominator), translationDenominator);
  const atoms = primitive.map((entry) =>
    entry.numerators.map((value) => safe(value * (denominator / entry.denominator))),
  );
  const indexOf = new Map(atoms.map((atom, index) => [classKey(atom, denominator), index]));
  return operators.map((operator) => {
    const rotation = rotations[operator] as readonly number[];
    const translation = (translations[operator] as readonly number[]).map(
      (entry) => entry * (denominator / translationDenominator),
    );
    const image: number[] = [];
    const phase: LinearForm[] = [];
    for (const atom of atoms) {
      const moved = [0, 1, 2].map((row) =>
        safe(
          (rotation[3 * row] as number) * (atom[0] as number) +
            (rotation[3 * row + 1] as number) * (atom[1] as number) +
            (rotation[3 * row + 2] as number) * (atom[2] as number) +
            (translation[row] as number),
        ),
      );
      const target = indexOf.get(classKey(moved, denominator));
      if (target === undefined) throw new Error("an operator moves an atom off its orbit");
      const there = atoms[target] as readonly number[];
      const shift = moved.map((entry, axis) => rational((entry - (there[axis] as number)) / denominator));
      image.push(target);
      phase.push(waveTimesColumn(k, fromPrimitiveColumn(group.lattice, shift as unknown as RationalVector)));
    }
    return { image, phase };
  });
}

function classKey(numerators: readonly number[], denominator: number): string {
  return numerators.map((entry) => modulo(entry, denominator)).join(" ");
}

/** Orbits of the atoms under the operators, each in rising order, by their lowest atom. */
export function suborbits(actions: readonly OperatorAction[], atoms: number): number[][] {
  const seen = new Set<number>();
  const result: number[][] = [];
  for (let start = 0; start < atoms; start++) {
    if (seen.has(start)) continue;
    // A group acts, so the images of one atom are its whole orbit.
    const members = [...new Set(actions.map((action) => action.image[start] as number))].sort((a, b) => a - b);
    for (const member of members) seen.add(member);
    result.push(members);
  }
  return result;
}
