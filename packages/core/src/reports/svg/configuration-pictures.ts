import {
  composeMagnetic,
  composeSuperspace,
  parseMagneticTriplet,
  parseSuperspace,
} from "../../magneticgroups/index.js";
import {
  determinant,
  formatRational,
  fractionalPart,
  parseRational,
  type RationalVector,
  toNumber,
  zero,
} from "../../numbers/index.js";
import { applyOperator, parseBasisChange, rotationOf, type SymmetryOperator } from "../../spacegroups/index.js";
import type { CellRecord } from "../records/common.js";
import type { ConfigurationRecord, ConfigurationsRecord, ModulatedRecord } from "../records/configurations.js";
import { drawnConfigurations, groupSymbol, mostMoments } from "./drawn-configurations.js";
import type { MomentPicture } from "./moment-box.js";
import { atomsInBox, cellsAlong } from "./moment-data.js";
import { combine, directAxes, size, times, type Vector } from "./space.js";

type Axes = readonly [Vector, Vector, Vector];

/** A configuration as it is drawn: all axes in the Cartesian frame of the parent. */
export interface ConfigurationPicture extends MomentPicture {
  readonly id: string;
  /** Length of the longest moment in μB. */
  readonly largest: number;
}

/** A magnetic atom of one cell, and its moment in μB after a lattice translation, given in cells. */
interface CellAtom {
  readonly site: number;
  readonly position: RationalVector;
  readonly momentAt: (translation: readonly number[]) => Vector;
}

/**
 * The example moments of every configuration that is drawn, on all atoms: those of the asymmetric unit carried by the
 * operators and centrings, `M(R r + t) = θ det(R) R M(r)` (docs/conventions.md).
 */
export function configurationPictures(record: ConfigurationsRecord): ConfigurationPicture[] {
  const { cell } = record;
  if (cell === null) return [];
  const sites = record.parentSites.filter(({ magnetic }) => magnetic).map(({ label }) => label);
  return drawnConfigurations(record).drawn.map((one) => {
    const { axes, atoms, wave } =
      "superspace" in one.magneticGroup
        ? modulatedAtoms(one as ModulatedRecord, cell, sites)
        : commensurateAtoms(one as ConfigurationRecord, cell, sites);
    const cells = cellsAlong(wave, Math.max(1, Math.floor(mostMoments / atoms.length)));
    const placed = atoms.flatMap(({ site, position, momentAt }) =>
      atomsInBox(position.map(toNumber), cells).map(({ at, shift }) => ({ site, at, moment: momentAt(shift) })),
    );
    const largest = Math.max(...placed.map(({ moment }) => size(moment)));
    return {
      id: one.id,
      name: `${one.id}, ${groupSymbol(one)}`,
      axes: axes.map((axis) => axis.map(rounded)) as unknown as Axes,
      cells,
      sites,
      atoms: placed.map(({ site, at }) => ({ site, at })),
      vectors: placed.map(({ moment }) => scaled(moment, largest)),
      largest,
    };
  });
}

interface CellContent {
  readonly axes: Axes;
  readonly atoms: readonly CellAtom[];
  /** The wave that the box of cells should show. */
  readonly wave: readonly number[];
}

function commensurateAtoms(one: ConfigurationRecord, cell: CellRecord, sites: readonly string[]): CellContent {
  const { cellFromParent, operators, centrings } = one.magneticGroup;
  const axes = childAxes(directAxes(cell), cellFromParent);
  const read = operators.map((text) => parseMagneticTriplet(text));
  const all = centrings.flatMap((text) => {
    const centring = parseMagneticTriplet(text);
    return read.map((operator) => composeMagnetic(centring, operator));
  });
  const atoms = one.sites.flatMap((site) => {
    const start = positionOf(site.positionLattice);
    const moment = latticeComponents(site.exampleCrystal ?? [], axes);
    return distinct(
      all.map(({ operator, timeReversal }) => {
        const image = combine(axes, turned(operator, timeReversal, moment));
        return {
          site: sites.indexOf(site.parentSite),
          position: applyOperator(operator, start),
          momentAt: () => image,
        };
      }),
    );
  });
  return { axes, atoms, wave: [0, 0, 0] };
}

/** `M_{j'}(x₄') = θ det(R) R M_j(x₄)` with `x₄' = ε x₄ + H·x + δ`, and x₄' = k·r' at the atom itself. */
function modulatedAtoms(one: ModulatedRecord, cell: CellRecord, sites: readonly string[]): CellContent {
  const { k, operators, centrings } = one.magneticGroup.superspace;
  const wave = k.numeric ?? [0, 0, 0];
  const axes = directAxes(cell);
  const read = operators.map((text) => parseSuperspace(text));
  const all = centrings.flatMap((text) => {
    const centring = parseSuperspace(text);
    return read.map((operator) => composeSuperspace(centring, operator));
  });
  const atoms = one.sites.flatMap((site) => {
    const start = positionOf(site.positionLattice);
    const cosine = latticeComponents(site.exampleCosineCrystal ?? [], axes);
    const sine = latticeComponents(site.exampleSineCrystal ?? [], axes);
    return distinct(
      all.map(({ operator, timeReversal, epsilon, shift, delta }) => {
        const position = applyOperator(operator, start);
        const own = position.map(toNumber);
        const offset = inner(shift.map(toNumber), start.map(toNumber)) + toNumber(delta);
        return {
          site: sites.indexOf(site.parentSite),
          position,
          momentAt: (translation: readonly number[]) => {
            // `translation` counts from the position reduced to the first cell.
            const place = own.map((entry, axis) => entry - Math.floor(entry) + (translation[axis] as number));
            const x4 = 2 * Math.PI * epsilon * (inner(wave, place) - offset);
            const moment = [0, 1, 2].map(
              (axis) => (cosine[axis] as number) * Math.cos(x4) + (sine[axis] as number) * Math.sin(x4),
            );
            return combine(axes, turned(operator, timeReversal, moment));
          },
        };
      }),
    );
  });
  return { axes, atoms, wave };
}

/** (a', b', c') = (a, b, c) P. */
function childAxes(parent: Axes, cellFromParent: string): Axes {
  const { matrix } = parseBasisChange(cellFromParent);
  return [0, 1, 2].map((column) =>
    combine(
      parent,
      matrix.map((row) => toNumber(row[column] ?? zero)),
    ),
  ) as unknown as Axes;
}

function positionOf(texts: readonly string[]): RationalVector {
  return texts.map((text) => parseRational(text) ?? zero) as unknown as RationalVector;
}

/** Components along unit vectors of the axes as multiples of the axes. */
function latticeComponents(crystal: readonly number[], axes: Axes): readonly number[] {
  return axes.map((axis, index) => (crystal[index] ?? 0) / size(axis));
}

/** An axial vector in lattice components, turned by an operator. */
function turned(operator: SymmetryOperator, timeReversal: 1 | -1, moment: readonly number[]): number[] {
  const rotation = rotationOf(operator);
  const sign = timeReversal * Math.sign(toNumber(determinant(rotation)));
  return rotation.map((row) => sign * inner(row.map(toNumber), moment) + 0);
}

/** One atom for each position modulo the cell: its other images have the same moment, for the group leaves it alone. */
function distinct(atoms: readonly CellAtom[]): CellAtom[] {
  const found = new Map<string, CellAtom>();
  for (const atom of atoms) {
    const position = atom.position.map(fractionalPart) as unknown as RationalVector;
    const key = position.map(formatRational).join();
    if (!found.has(key)) found.set(key, { ...atom, position });
  }
  return [...found.values()];
}

function inner(a: readonly number[], b: readonly number[]): number {
  return a.reduce((sum, entry, index) => sum + entry * (b[index] ?? 0), 0);
}

/** To six decimals, so that the last bits of a machine's sines are not in the report. */
function rounded(value: number): number {
  return Math.round(value * 1e6) / 1e6 + 0;
}

function scaled(moment: Vector, largest: number): Vector {
  const [x, y, z] = largest > 0 ? times(moment, 1 / largest) : moment;
  return [rounded(x), rounded(y), rounded(z)];
}
