import { toNumber } from "../../numbers/index.js";
import { latticeVectorsInCell } from "../../spacegroups/index.js";
import { physicalSets } from "../physical-sets.js";
import type { ComplexRecord } from "../records/common.js";
import type { ModeRecord, SiteModesRecord } from "../records/modes.js";
import type { BranchRecord, RunRecord } from "../records/run.js";
import { kShort } from "../text/names.js";
import { groupOf, isNamed } from "./group-of-record.js";
import { directAxes, type Vector } from "./space.js";

/** An atom that is drawn: which one of its site's orbit, where (in cells), and the k·T of its lattice translation. */
export interface SceneAtom {
  readonly site: number;
  readonly atom: number;
  readonly at: readonly [number, number, number];
  readonly turns: number;
}

/** Fourier components of all atoms, site by site; null for a site that has no part in it. */
export interface Arrangement {
  readonly name: string;
  /** Shown without being asked for: the first copy of its irrep. */
  readonly example: boolean;
  readonly components: readonly (readonly (readonly ComplexRecord[])[] | null)[];
}

/** Atoms and arrangements of one branch, as plain data. */
export interface MomentScene {
  readonly k: string;
  /** a, b, c in Å. */
  readonly axes: readonly [Vector, Vector, Vector];
  readonly cells: readonly [number, number, number];
  readonly sites: readonly string[];
  readonly atoms: readonly SceneAtom[];
  /** 2k is a reciprocal lattice vector: real components, no conjugate is added. */
  readonly real: boolean;
  readonly arrangements: readonly Arrangement[];
}

/** Cells that are drawn at most, and along one axis. */
const mostCells = 32;
const mostAlong = 8;

/** Whether moments of a branch can be drawn: that needs a cell, numbers for k and a lattice. */
export function hasMoments(record: Pick<RunRecord, "cell" | "group">, branch: BranchRecord): boolean {
  return record.cell !== null && isNamed(record.group) && branch.k.numeric !== null && carriedSets(branch).length > 0;
}

/** The physical sets of irreps that some site has, in order. */
export function carriedSets({ irreps, modes }: BranchRecord): readonly (readonly string[])[] {
  const carried = new Set(
    modes.sites.flatMap((site) => site.irreps.flatMap(({ label, multiplicity }) => (multiplicity > 0 ? [label] : []))),
  );
  return physicalSets(irreps).filter((set) => set.some((label) => carried.has(label)));
}

/** The atoms and arrangements of a branch; null where `hasMoments` says no. */
export function momentScene(record: RunRecord, branch: BranchRecord): MomentScene | null {
  const group = groupOf(record.group);
  const { numeric } = branch.k;
  if (group === null || record.cell === null || numeric === null) return null;
  const centrings = latticeVectorsInCell(group).map((vector) => vector.map(toNumber));
  const cells = cellsAlong(numeric);
  const { sites } = branch.modes;
  const real = branch.modes.minusK === "equivalent";
  return {
    k: kShort(branch.k),
    axes: directAxes(record.cell),
    cells,
    sites: sites.map(({ label }) => label),
    atoms: sites.flatMap((site, index) => siteAtoms(site, index, centrings, cells, numeric)),
    real,
    arrangements: carriedSets(branch).flatMap((set) => arrangementsOf(sites, set, real)),
  };
}

/** So many cells that the wave is seen: its period where that is a few cells, else about one wave; `most` in all. */
export function cellsAlong(k: readonly number[], most = mostCells): [number, number, number] {
  const along = k.map((entry) => {
    const part = Math.abs(entry - Math.round(entry));
    if (part < 1e-4) return 1;
    const period = [2, 3, 4, 5, 6, 7, 8].find((cells) => Math.abs(part * cells - Math.round(part * cells)) < 1e-3);
    return Math.min(period ?? Math.ceil(1 / part), mostAlong);
  });
  while (along.reduce((product, one) => product * one, 1) > Math.min(most, mostCells)) {
    const longest = along.indexOf(Math.max(...along));
    along[longest] = Math.max(1, (along[longest] as number) - 1);
  }
  return along as [number, number, number];
}

/** All atoms in the closed box of cells, those on its far sides too. */
function siteAtoms(
  { orbit }: SiteModesRecord,
  site: number,
  centrings: readonly (readonly number[])[],
  cells: readonly number[],
  k: readonly number[],
): SceneAtom[] {
  return orbit.flatMap((position, atom) => {
    const start = position.map(fraction);
    return centrings.flatMap((centring) =>
      atomsInBox(start, cells, centring).map(({ at, shift }): SceneAtom => {
        const turns = shift.reduce((sum, entry, axis) => sum + entry * (k[axis] as number), 0);
        return { site, atom, at, turns: Math.round(turns * 1e9) / 1e9 + 0 };
      }),
    );
  });
}

/** Where an atom is in the closed box of cells, and by which translation it got there from its own place. */
export function atomsInBox(
  start: readonly number[],
  cells: readonly number[],
  centring: readonly number[] = [0, 0, 0],
): { readonly at: readonly [number, number, number]; readonly shift: readonly number[] }[] {
  const inside = (value: number, axis: number) => value > -1e-6 && value < (cells[axis] as number) + 1e-6;
  return cellCorners(cells).flatMap((corner) => {
    const shift = corner.map((entry, axis) => entry + (centring[axis] ?? 0));
    const at = start.map((entry, axis) => entry + (shift[axis] as number));
    return at.every(inside) ? [{ at: at.map(rounded) as [number, number, number], shift }] : [];
  });
}

/** Cells from −1 (centring vectors may lead in) to the far side. */
function cellCorners([x = 1, y = 1, z = 1]: readonly number[]): number[][] {
  const range = (count: number) => Array.from({ length: count + 2 }, (_, index) => index - 1);
  return range(x).flatMap((i) => range(y).flatMap((j) => range(z).map((l) => [i, j, l])));
}

function fraction(text: string): number {
  const [top = "0", bottom = "1"] = text.split("/");
  return Number(top) / Number(bottom);
}

function rounded(value: number): number {
  return Math.round(value * 1e6) / 1e6 + 0;
}

/** The example of a set of irreps, and behind it each basis vector alone. */
function arrangementsOf(sites: readonly SiteModesRecord[], set: readonly string[], real: boolean): Arrangement[] {
  const name = set.join(" ⊕ ");
  const modesOf = (site: SiteModesRecord): readonly ModeRecord[] =>
    site.irreps.find(({ label, multiplicity }) => set.includes(label) && multiplicity > 0)?.modes ?? [];
  const example = sites.map((site) => exampleOf(modesOf(site), real));
  const single = sites.flatMap((site, index) =>
    modesOf(site).flatMap((mode): Arrangement[] =>
      mode.moments === null
        ? []
        : [
            {
              name: `${name}: ${site.label}, copy ${mode.copy}, partner ${mode.partner}`,
              example: false,
              components: sites.map((_, other) => (other === index ? mode.moments : null)),
            },
          ],
    ),
  );
  return [{ name: `${name}: example`, example: true, components: example }, ...single];
}

/** Share of each further partner in an example: none of them is special. */
const partnerShare = 0.4;

type Components = readonly (readonly ComplexRecord[])[];

/**
 * The first copy with the amplitudes 1, 0.4, 0.16, … of its partners, a direction that no symmetry singles out; and with
 * it further copies as far as atoms that can have a moment would be left without one. Where moments are the real parts,
 * the phase of each basis vector is taken so that it begins with a real number, or its real part might vanish.
 */
function exampleOf(modes: readonly ModeRecord[], real: boolean): Components | null {
  const copies = [...new Set(modes.map(({ copy }) => copy))].map((copy) =>
    weighted(
      modes.filter((mode) => mode.copy === copy && mode.moments !== null),
      real,
    ),
  );
  return copies.reduce<Components | null>((sum, next) => {
    if (sum === null || next === null) return sum ?? next;
    const fillsGap = next.some((vector, atom) => hasLength(vector) && !hasLength(sum[atom] ?? []));
    return fillsGap ? added(sum, next) : sum;
  }, null);
}

function weighted(partners: readonly ModeRecord[], real: boolean): Components | null {
  const shares = partners.map(({ moments }, partner) => {
    const entries = (moments ?? []).flat();
    const [x, y] = (real ? entries.find(([re, im]) => Math.hypot(re, im) > 1e-9) : null) ?? [1, 0];
    const scale = partnerShare ** partner / Math.hypot(x, y);
    return (moments ?? []).map((vector) =>
      vector.map(([re, im]): ComplexRecord => [(re * x + im * y) * scale, (im * x - re * y) * scale]),
    );
  });
  return shares.length === 0 ? null : shares.reduce((sum, next) => added(sum, next));
}

function added(a: Components, b: Components): ComplexRecord[][] {
  return a.map((vector, atom) =>
    vector.map(([re, im], axis): ComplexRecord => {
      const [x, y] = b[atom]?.[axis] ?? [0, 0];
      return [re + x, im + y];
    }),
  );
}

function hasLength(vector: readonly ComplexRecord[]): boolean {
  return vector.some(([re, im]) => Math.hypot(re, im) > 1e-9);
}

/** The amplitudes of the partners in an example, in words. */
export function exampleDirection(dimension: number): string {
  const shares = Array.from({ length: dimension }, (_, partner) =>
    String(Number((partnerShare ** partner).toFixed(3))),
  );
  return `(${shares.join(", ")})`;
}
