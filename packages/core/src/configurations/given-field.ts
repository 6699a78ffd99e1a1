import { fail } from "../errors/index.js";
import type { MagneticOperator } from "../magneticgroups/index.js";
import {
  hermiteNormalForm,
  integerDeterminant,
  isInteger,
  type RationalVector,
  reduceModulo,
  roundNumber,
  sameAtomAngstrom,
  timesColumn,
  toNumber,
} from "../numbers/index.js";
import {
  type BasisChange,
  type Cell,
  directMetric,
  latticeFromVectors,
  lengthInMetric,
  type SiteOrbit,
  type SpaceGroup,
  toPrimitiveColumn,
  translationOf,
} from "../spacegroups/index.js";
import { cosetVectors } from "./arm-selection.js";

type Triple = readonly [number, number, number];

/** Atoms with moments in some cell, and what makes the others of them. */
export interface GivenMoments {
  /** (P, p) from the parent's axes to those of the cell. */
  readonly childFromParent: BasisChange;
  readonly cell: Cell;
  /** Operators × centrings make every moment of the cell. */
  readonly operators: readonly MagneticOperator[];
  readonly centrings: readonly MagneticOperator[];
  /** Positions in the cell, moments in μB along the unit vectors of its axes. */
  readonly atoms: readonly { readonly label: string; readonly position: Triple; readonly crystal: Triple }[];
}

/** Moments on every atom of the parent's sites in a magnetic cell. */
export interface MomentField {
  readonly orbits: readonly SiteOrbit[];
  /** Translations without time reversal that the given cell has: Hermite normal form in the primitive basis of the parent. */
  readonly lattice: readonly (readonly number[])[];
  /** Representatives of the parent's translations modulo it, zero first. */
  readonly cells: readonly (readonly number[])[];
  /** μB/Å in lattice components of the parent, by site, atom of the orbit and cell. */
  readonly moments: readonly (readonly (readonly Triple[])[])[];
  /** Å. How far the atom that was furthest off its site stands from it. */
  readonly furthest: number;
}

/**
 * Spreads given moments over the parent's sites. Every atom that operators × centrings make goes to the nearest atom of a
 * site; sites without one keep zero moments.
 *
 * @throws `cell-contradicts-group` where the cell is no supercell of the parent, `invalid-site` for an atom far from all
 *   sites, or two that come to one place with different moments
 */
export function momentField(
  group: SpaceGroup,
  cell: Cell,
  orbits: readonly SiteOrbit[],
  given: GivenMoments,
): MomentField {
  const { matrix, shift } = given.childFromParent;
  const floats = matrix.map((row) => row.map(toNumber));
  const lattice = latticeRows(group, given);
  const cells = cosetVectors(lattice);
  const field = orbits.map(({ positions }) => positions.map(() => new Array<Triple | null>(cells.length).fill(null)));
  const lengths = [given.cell.a, given.cell.b, given.cell.c];
  const places = siteFinder(group, cell, orbits);
  let furthest = 0;
  for (const atom of given.atoms) {
    const own = atom.crystal.map((entry, axis) => entry / (lengths[axis] as number));
    for (const operator of given.operators)
      for (const centring of given.centrings) {
        const rotation = operator.operator.rotation.map((entry) => entry / operator.operator.rotationDenominator);
        const columns = [translationOf(operator.operator), translationOf(centring.operator)];
        const moved = [0, 1, 2].map((axis) => rowProduct(rotation, axis, atom.position) + columnSum(columns, axis));
        const sign = Math.sign(integerDeterminant(rotation)) * operator.timeReversal * centring.timeReversal;
        const moment = [0, 1, 2].map((axis) => sign * rowProduct(rotation, axis, own));
        const inParent = floats.map((row, axis) => product(row, moved) + toNumber(shift[axis as 0 | 1 | 2]));
        const vector = floats.map((row) => product(row, moment)) as unknown as Triple;
        const found = places(inParent as unknown as Triple);
        if (found === null || found.distance > sameAtomAngstrom) refuseAtom(atom.label, found?.distance ?? null);
        furthest = Math.max(furthest, found.distance);
        const index = numberOf(lattice, found.cell);
        const row = (field[found.site] as (Triple | null)[][])[found.atom] as (Triple | null)[];
        const known = row[index] ?? null;
        if (known !== null && differ(known, vector)) refuseTwice(atom.label);
        row[index] = vector;
      }
  }
  return {
    orbits,
    lattice,
    cells,
    moments: field.map((atoms) => atoms.map((row) => row.map((entry): Triple => entry ?? [0, 0, 0]))),
    furthest: roundNumber(furthest, 1),
  };
}

/** The translations of the given cell without time reversal, in the primitive basis of the parent. */
function latticeRows(group: SpaceGroup, { childFromParent, centrings }: GivenMoments): number[][] {
  const axes = [0, 1, 2].map((axis) =>
    childFromParent.matrix.map((row) => row[axis as 0 | 1 | 2]),
  ) as unknown as RationalVector[];
  const inner = centrings
    .filter(({ timeReversal }) => timeReversal === 1)
    .map(({ operator }) => timesColumn(childFromParent.matrix, translationOf(operator)));
  const rows = [...axes, ...inner].map((vector) => toPrimitiveColumn(group.lattice, vector));
  if (rows.some((row) => !row.every(isInteger)))
    return fail("cell-contradicts-group", "the cell of the moments is no supercell of the parent's", {
      expected: "axes and centrings that are translations of the parent",
      found: "an axis that is none",
      remedy: "check the transformation from the parent to the cell of the file, and the parent's setting",
    });
  // Only to see that the vectors span space.
  latticeFromVectors([...axes]);
  return hermiteNormalForm(
    rows.map((row) => row.map(toNumber)),
    3,
  );
}

interface FoundPlace {
  readonly site: number;
  readonly atom: number;
  /** Translation of the parent in its primitive basis. */
  readonly cell: readonly number[];
  readonly distance: number;
}

/** Finds the atom of the sites that is nearest to a position. */
function siteFinder(
  group: SpaceGroup,
  cell: Cell,
  orbits: readonly SiteOrbit[],
): (position: Triple) => FoundPlace | null {
  const metric = directMetric(cell);
  const { vectors, denominator } = group.lattice;
  const basis = vectors.map((vector) => vector.map((entry) => entry / denominator));
  const inverse = inverseOf(basis);
  const atoms = orbits.flatMap(({ positions }, site) =>
    positions.map((position, atom) => ({ site, atom, position: position.map(toNumber) })),
  );
  return (position) => {
    let best: FoundPlace | null = null;
    for (const { site, atom, position: own } of atoms) {
      const step = position.map((entry, axis) => entry - (own[axis] as number));
      // ξ with step = Σ ξ_i a_i.
      const xi = [0, 1, 2].map((i) =>
        step.reduce((sum, entry, axis) => sum + entry * (inverse[axis]?.[i] as number), 0),
      );
      const nearest = xi.map(Math.round);
      const rest = [0, 1, 2].map((axis) =>
        xi.reduce((sum, entry, i) => sum + (entry - (nearest[i] as number)) * (basis[i]?.[axis] as number), 0),
      );
      const distance = lengthInMetric(metric, rest);
      if (best === null || distance < best.distance)
        best = { site, atom, cell: nearest.map((entry) => entry + 0), distance };
    }
    return best;
  };
}

/** Inverse of the matrix whose rows are given: `rows · inverse = 1`. */
function inverseOf(rows: readonly (readonly number[])[]): number[][] {
  const [a, b, c] = rows as readonly [readonly number[], readonly number[], readonly number[]];
  const cross = (u: readonly number[], v: readonly number[]): number[] =>
    [0, 1, 2].map(
      (i) =>
        (u[(i + 1) % 3] as number) * (v[(i + 2) % 3] as number) -
        (u[(i + 2) % 3] as number) * (v[(i + 1) % 3] as number),
    );
  const [bc, ca, ab] = [cross(b, c), cross(c, a), cross(a, b)];
  const volume = a.reduce((sum, entry, axis) => sum + entry * (bc[axis] as number), 0);
  return [0, 1, 2].map((axis) => [bc, ca, ab].map((vector) => (vector[axis] as number) / volume));
}

/** Number of the cell that holds a translation. */
export function numberOf(lattice: readonly (readonly number[])[], vector: readonly number[]): number {
  const [x, y, z] = reduceModulo(vector, lattice) as [number, number, number];
  const [b, c] = [lattice[1]?.[1] as number, lattice[2]?.[2] as number];
  return (x * b + y) * c + z;
}

function rowProduct(matrix: readonly number[], row: number, vector: readonly number[]): number {
  return vector.reduce((sum, entry, column) => sum + (matrix[3 * row + column] as number) * entry, 0);
}

function product(row: readonly number[], vector: readonly number[]): number {
  return row.reduce((sum, entry, axis) => sum + entry * (vector[axis] as number), 0);
}

function columnSum(columns: readonly RationalVector[], axis: number): number {
  return columns.reduce((sum, column) => sum + toNumber(column[axis as 0 | 1 | 2]), 0);
}

/** Share of the larger moment by which two may differ and still be one: files round to a hundredth of a μB. */
const sameMomentShare = 0.02;

function differ(a: Triple, b: Triple): boolean {
  const size = Math.max(...a.map(Math.abs), ...b.map(Math.abs));
  return a.some((entry, axis) => Math.abs(entry - (b[axis] as number)) > sameMomentShare * size + 1e-12);
}

function refuseAtom(label: string, distance: number | null): never {
  fail("invalid-site", `the atom \`${label}\` stands on no site of the parent`, {
    expected: `an atom within ${sameAtomAngstrom} Å`,
    found: distance === null ? "no sites" : `the nearest is ${distance.toFixed(2)} Å away`,
    remedy:
      "name the site in the parent study, or check origin and axes: the transformation from the parent to the file",
  });
}

function refuseTwice(label: string): never {
  fail("invalid-site", `two different moments come to one place, one of them of \`${label}\``, {
    expected: "one moment for each atom",
    found: "operators of the file that do not leave the moments unchanged",
    remedy: "check the moment against its symmetry form, and the operators",
  });
}
