import { fail } from "../errors/index.js";
import { sameBondAngstrom } from "../numbers/index.js";
import { reciprocalFrame, visitBall } from "../reflections/index.js";
import type { Cell, SiteOrbit, SpaceGroup } from "../spacegroups/index.js";
import { atomActions, bondKey, magneticAtoms, movedBond, primitiveCoordinates } from "./atoms.js";
import { invertSymmetric } from "./metric.js";
import type { Bond, BondClass, BondTable, ExchangeAtom, NeighbourShell } from "./types.js";

/** How far to look: the number of shells, a length in Å, or both (whichever ends first). */
export interface ShellLimits {
  readonly shells?: number;
  readonly reachAngstrom?: number;
}

/** Bonds of a primitive cell beyond which a list helps nobody. */
const mostBonds = 20_000;

/**
 * The shells of neighbours of the magnetic atoms: bonds of one length (to `sameBondAngstrom`), sorted into the classes
 * that the space group makes. Shells are counted from 1 over all pairs of the given sites.
 *
 * @throws `invalid-cell`, `cell-contradicts-group`; `invalid-argument` for a reach with too many bonds or none
 */
export function bondTable(group: SpaceGroup, cell: Cell, orbits: readonly SiteOrbit[], limits: ShellLimits): BondTable {
  const atoms = magneticAtoms(orbits);
  const metric = invertSymmetric(reciprocalFrame(group, cell).metric);
  const wanted = limits.shells ?? Number.POSITIVE_INFINITY;
  const farthest = limits.reachAngstrom ?? Number.POSITIVE_INFINITY;
  if (!Number.isFinite(wanted) && !Number.isFinite(farthest)) throw new TypeError("shells need a limit");
  let reach = Math.min(farthest, 1.5 * Math.sqrt(Math.min(...[0, 4, 8].map((index) => metric[index] as number))));
  for (;;) {
    const bonds = bondsWithin(group, atoms, metric, reach);
    const lengths = shellLengths(bonds.map(({ length }) => length));
    // The last shell might go on just beyond the reach.
    const complete = lengths.filter((length) => length < reach - 2 * sameBondAngstrom || reach === farthest);
    if (complete.length >= wanted || reach === farthest) {
      const kept = complete.slice(0, wanted);
      const classes = classesOf(group, atoms, bonds, lengths).filter(({ shell }) => shell <= kept.length);
      return { group, cell, atoms, shells: shellsOf(kept, classes), reach: kept.at(-1) ?? reach };
    }
    reach = Math.min(farthest, 1.3 * reach);
  }
}

interface MeasuredBond {
  readonly bond: Bond;
  readonly length: number;
}

/** Every bond once, whatever its direction, shortest first. */
function bondsWithin(
  group: SpaceGroup,
  atoms: readonly ExchangeAtom[],
  metric: readonly number[],
  reach: number,
): MeasuredBond[] {
  const places = primitiveCoordinates(group, atoms);
  const found = new Map<string, MeasuredBond>();
  for (const [from, start] of places.entries())
    for (const [to, end] of places.entries()) {
      if (to < from) continue;
      const step = end.map((entry, axis) => entry - (start[axis] as number));
      visitBall(metric, step, reach * reach, (a, b, c, square) => {
        const length = Math.sqrt(square);
        if (length < sameBondAngstrom) return;
        const bond: Bond = { from, to, translation: [a + 0, b + 0, c + 0] };
        const key = bondKey(bond);
        if (!found.has(key)) found.set(key, { bond, length });
      });
      if (found.size > mostBonds)
        fail("invalid-argument", `there are more than ${mostBonds} bonds within ${reach.toPrecision(3)} Å`, {
          expected: "fewer shells",
          found: `${reach.toPrecision(3)} Å`,
          remedy: "ask for fewer shells of neighbours, or check the units of the cell (Å)",
        });
    }
  return [...found.values()].sort((a, b) => a.length - b.length);
}

/** Lengths of the shells: a new one begins where the next bond is longer by more than the tolerance. */
function shellLengths(sorted: readonly number[]): number[] {
  const starts = sorted.filter(
    (length, index) => index === 0 || length - (sorted[index - 1] as number) > sameBondAngstrom,
  );
  return starts;
}

interface FoundClass {
  readonly shell: number;
  readonly length: number;
  readonly bonds: readonly Bond[];
}

function classesOf(
  group: SpaceGroup,
  atoms: readonly ExchangeAtom[],
  bonds: readonly MeasuredBond[],
  lengths: readonly number[],
): BondClass[] {
  const actions = atomActions(group, atoms);
  const seen = new Set<string>();
  const found: FoundClass[] = [];
  for (const { bond, length } of bonds) {
    if (seen.has(bondKey(bond))) continue;
    const images = new Map(actions.map((action) => movedBond(action, bond)).map((image) => [bondKey(image), image]));
    for (const key of images.keys()) seen.add(key);
    const shell = lengths.filter((start) => length >= start).length;
    found.push({ shell, length, bonds: [...images.values()] });
  }
  const names = namesOf(found);
  return found.map((one, index) => bondClass(group, atoms, one, names[index] as string));
}

/** `3` where the shell is one class, else `3a`, `3b` in the order of lengths and atoms. */
function namesOf(found: readonly FoundClass[]): string[] {
  return found.map(({ shell }, index) => {
    const mates = found.flatMap((one, at) => (one.shell === shell ? [at] : []));
    return mates.length === 1 ? String(shell) : `${shell}${letters(mates.indexOf(index))}`;
  });
}

function letters(index: number): string {
  return index < 26 ? String.fromCharCode(97 + index) : letters(Math.floor(index / 26) - 1) + letters(index % 26);
}

function bondClass(group: SpaceGroup, atoms: readonly ExchangeAtom[], found: FoundClass, name: string): BondClass {
  const first = found.bonds[0] as Bond;
  const label = (atom: number) => atoms[atom]?.label as string;
  const labels = [label(first.from), label(first.to)] as const;
  const places = primitiveCoordinates(group, atoms);
  const primitive = first.translation.map(
    (entry, axis) => entry + (places[first.to]?.[axis] as number) - (places[first.from]?.[axis] as number),
  );
  const { vectors, denominator } = group.lattice;
  const at = (axis: 0 | 1 | 2): number =>
    primitive.reduce((sum, entry, index) => sum + (entry * (vectors[index]?.[axis] as number)) / denominator, 0) + 0;
  return {
    name,
    shell: found.shell,
    distance: found.length,
    labels: labels[0] <= labels[1] ? labels : [labels[1], labels[0]],
    bonds: found.bonds,
    neighbours: [...new Set(labels)].map((one) => ({
      label: one,
      count:
        found.bonds.reduce(
          (sum, { from, to }) => sum + (label(from) === one ? 1 : 0) + (label(to) === one ? 1 : 0),
          0,
        ) / atoms.filter((atom) => atom.label === one).length,
    })),
    vector: [at(0), at(1), at(2)],
  };
}

function shellsOf(lengths: readonly number[], classes: readonly BondClass[]): NeighbourShell[] {
  return lengths.map((distance, index) => ({
    number: index + 1,
    distance,
    classes: classes.filter(({ shell }) => shell === index + 1),
  }));
}
