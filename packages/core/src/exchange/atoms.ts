import { dotIntegers, lcm, modulo, overCommonDenominator, safe } from "../numbers/index.js";
import { type SiteOrbit, type SpaceGroup, toPrimitiveColumn } from "../spacegroups/index.js";
import type { Bond, ExchangeAtom } from "./types.js";

/** How one operator of the group moves the atoms: `g r_j = r_{image[j]} + shift[j]`, shifts in the primitive basis. */
export interface AtomAction {
  readonly image: readonly number[];
  readonly shift: readonly (readonly number[])[];
  readonly rotation: readonly number[];
}

/** Every atom of the primitive cell that carries a moment. */
export function magneticAtoms(orbits: readonly SiteOrbit[]): ExchangeAtom[] {
  return orbits.flatMap((orbit, number) =>
    orbit.positions.map((position, index) => ({ label: orbit.label, orbit: number, index, position })),
  );
}

/** Fractional coordinates of the atoms in the primitive basis, as integers over one denominator. */
function primitivePositions(
  group: SpaceGroup,
  atoms: readonly ExchangeAtom[],
): { readonly places: readonly (readonly number[])[]; readonly denominator: number } {
  const exact = atoms.map(({ position }) => overCommonDenominator(toPrimitiveColumn(group.lattice, position)));
  const denominator = exact.reduce((common, one) => lcm(common, one.denominator), group.primitive.denominator);
  return {
    places: exact.map((one) => one.numerators.map((entry) => safe(entry * (denominator / one.denominator)))),
    denominator,
  };
}

/** Floats of the same. */
export function primitiveCoordinates(group: SpaceGroup, atoms: readonly ExchangeAtom[]): readonly number[][] {
  const { places, denominator } = primitivePositions(group, atoms);
  return places.map((place) => place.map((entry) => entry / denominator));
}

/** The action of every operator of the group on the atoms, exact. */
export function atomActions(group: SpaceGroup, atoms: readonly ExchangeAtom[]): AtomAction[] {
  const { rotations, translations, denominator: common } = group.primitive;
  const { places, denominator } = primitivePositions(group, atoms);
  const key = (place: readonly number[]) => place.map((entry) => modulo(entry, denominator)).join(" ");
  const indexOf = new Map(places.map((place, index) => [key(place), index]));
  return rotations.map((rotation, operator) => {
    const image: number[] = [];
    const shift: number[][] = [];
    for (const place of places) {
      const moved = [0, 1, 2].map((row) =>
        safe(
          dotIntegers(rotation.slice(3 * row, 3 * row + 3), place) +
            (translations[operator]?.[row] as number) * (denominator / common),
        ),
      );
      const target = indexOf.get(key(moved));
      if (target === undefined) throw new Error("an operator moves an atom off its orbit");
      image.push(target);
      shift.push(moved.map((entry, axis) => (entry - (places[target]?.[axis] as number)) / denominator));
    }
    return { image, shift, rotation };
  });
}

/** The image of a bond: `(i, j, T) → (i', j', R T + a_j − a_i)`. */
export function movedBond({ image, shift, rotation }: AtomAction, { from, to, translation }: Bond): Bond {
  const at = (row: 0 | 1 | 2): number =>
    dotIntegers(rotation.slice(3 * row, 3 * row + 3), translation) +
    (shift[to]?.[row] as number) -
    (shift[from]?.[row] as number) +
    0;
  return { from: image[from] as number, to: image[to] as number, translation: [at(0), at(1), at(2)] };
}

export function reversedBond({ from, to, translation: [a, b, c] }: Bond): Bond {
  return { from: to, to: from, translation: [0 - a, 0 - b, 0 - c] };
}

/** One text for a bond and its reverse. */
export function bondKey(bond: Bond): string {
  const text = (one: Bond) => `${one.from} ${one.to} ${one.translation.join(" ")}`;
  return [text(bond), text(reversedBond(bond))].sort()[0] as string;
}
