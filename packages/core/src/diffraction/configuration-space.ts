import type { Configuration, ConfigurationSet, ModulatedConfiguration } from "../configurations/index.js";
import { isHalfLattice, numericWaveVector, star } from "../kvectors/index.js";
import { axisLengths } from "../modes/index.js";
import {
  addVectors,
  determinant,
  dot,
  isInteger,
  type RationalMatrix,
  type RationalVector,
  subtractVectors,
  timesColumn,
  toNumber,
} from "../numbers/index.js";
import {
  type Cell,
  isLatticeVector,
  rotationOf,
  type SpaceGroup,
  type SymmetryOperator,
  translationOf,
} from "../spacegroups/index.js";
import type { Triple } from "./geometry.js";
import { atomsOf, type ScatteringSite } from "./mode-space.js";
import type { ArrangementWave, FourierComponent, MomentSpace } from "./moment-space.js";

/** The moment spaces of all configurations of a set, in its order. Sites by the labels that the set was made with. */
export function configurationSpaces(
  set: ConfigurationSet,
  cell: Cell,
  sites: readonly ScatteringSite[],
): readonly MomentSpace[] {
  return [
    ...set.configurations.map((one) => commensurateSpace(set, one, cell, sites)),
    ...set.modulated.map((one) => modulatedSpace(set, one, cell, sites)),
  ];
}

/** An atom of the primitive cell among those of all sites, with the lattice vector that leads from it to a position. */
interface Place {
  readonly atom: number;
  readonly translation: RationalVector;
}

function placeFinder(group: SpaceGroup, sites: readonly ScatteringSite[]): (label: string, x: RationalVector) => Place {
  let first = 0;
  const starts = new Map<string, { readonly first: number; readonly positions: readonly RationalVector[] }>();
  for (const { modes } of sites) {
    starts.set(modes.orbit.label, { first, positions: modes.orbit.positions });
    first += modes.orbit.positions.length;
  }
  return (label, x) => {
    const site = starts.get(label);
    const index = site?.positions.findIndex((position) => isLatticeVector(group.lattice, subtractVectors(x, position)));
    if (!site || index === undefined || index < 0) throw new Error(`no atom of ${label} at ${x.join(" ")}`);
    return { atom: site.first + index, translation: subtractVectors(x, site.positions[index] as RationalVector) };
  };
}

/** Complex lattice components of every atom on every wave for one amplitude: (re x y z, im x y z) per atom. */
type WaveSums = Float64Array[];

/** Moments of a commensurate configuration: `S = (1/cells) Σ_T M(T) e^{2πi k·T}` over its magnetic cell, wave by wave. */
function commensurateSpace(
  { group, k }: ConfigurationSet,
  configuration: Configuration,
  cell: Cell,
  sites: readonly ScatteringSite[],
): MomentSpace {
  const arms = star(group, k);
  const halfLattice = isHalfLattice(group, k);
  const waves = configuration.arms.map(
    (arm): ArrangementWave => ({
      k: arms.arms[arm] as ArrangementWave["k"],
      halfLattice,
      operator: arms.representatives[arm] as number,
    }),
  );
  const find = placeFinder(group, sites);
  const atoms = sites.flatMap(atomsOf);
  const counts = new Float64Array(atoms.length);
  const amplitudes = configuration.freeParameters.irreps;
  const sums: WaveSums[] = Array.from({ length: amplitudes }, () =>
    waves.map(() => new Float64Array(6 * atoms.length)),
  );
  const { matrix, shift } = configuration.cell.cellFromParent;
  for (const site of configuration.sites)
    for (const { position, axial } of images(configuration, site.positionLattice)) {
      const { atom, translation } = find(site.parentSite, addVectors(timesColumn(matrix, position), shift));
      counts[atom] = (counts[atom] as number) + 1;
      for (const { amplitude, momentLattice } of site.amplitudes) {
        const moment = numbersTimes(matrix, timesNumbers(axial, momentLattice));
        waves.forEach(({ k: arm }, wave) => {
          addWave(sums[amplitude]?.[wave] as Float64Array, atom, moment, phaseOfCell(arm, translation));
        });
      }
    }
  for (const own of sums)
    for (const wave of own)
      wave.forEach((value, index) => {
        // Sites that carry nothing are not in the list of a configuration.
        wave[index] = value / Math.max(1, counts[Math.floor(index / 6)] as number);
      });
  return spaceOf(group, cell, configuration.id, sites, waves, sums);
}

/** All positions that the magnetic group makes of one in the cell of its own, each once, and how its moment is turned. */
function images(
  { cell }: Configuration,
  start: RationalVector,
): { readonly position: RationalVector; readonly axial: readonly number[] }[] {
  const found: { readonly position: RationalVector; readonly axial: readonly number[] }[] = [];
  for (const { operator, timeReversal } of cell.operators)
    for (const centring of cell.centrings) {
      const moved = addVectors(timesColumn(rotationOf(operator), start), translationOf(operator));
      const position = addVectors(moved, translationOf(centring.operator));
      if (found.some((one) => subtractVectors(one.position, position).every(isInteger))) continue;
      found.push({ position, axial: axialNumbers(operator, timeReversal * centring.timeReversal) });
    }
  return found;
}

/** `θ det(R) R` as nine numbers. */
function axialNumbers(operator: SymmetryOperator, timeReversal: number): readonly number[] {
  const rotation = rotationOf(operator);
  const sign = timeReversal * (determinant(rotation)[0] < 0 ? -1 : 1);
  return rotation.flatMap((row) => row.map((entry) => sign * toNumber(entry)));
}

function timesNumbers(m: readonly number[], [x, y, z]: Triple): Triple {
  const at = (row: number): number =>
    (m[3 * row] as number) * x + (m[3 * row + 1] as number) * y + (m[3 * row + 2] as number) * z;
  return [at(0), at(1), at(2)];
}

function numbersTimes(matrix: RationalMatrix, vector: Triple): Triple {
  return timesNumbers(
    matrix.flatMap((row) => row.map(toNumber)),
    vector,
  );
}

/** k·T in turns. */
function phaseOfCell(k: ArrangementWave["k"], translation: RationalVector): number {
  const constants: RationalVector = [k.components[0].constant, k.components[1].constant, k.components[2].constant];
  const [top, bottom] = dot(constants, translation);
  return (top % bottom) / bottom;
}

function addWave(sums: Float64Array, atom: number, moment: Triple, turns: number): void {
  const [cosine, sine] = [Math.cos(2 * Math.PI * turns), Math.sin(2 * Math.PI * turns)];
  moment.forEach((entry, axis) => {
    sums[6 * atom + axis] = (sums[6 * atom + axis] as number) + entry * cosine;
    sums[6 * atom + axis + 3] = (sums[6 * atom + axis + 3] as number) + entry * sine;
  });
}

/**
 * Moments of an incommensurate configuration. With Z = C + iS of an atom `M(x₄) = Re Z e^{−2πi x₄}`, x₄ = k·x, so that an
 * operator makes `θ det(R) R Z e^{2πi(H·x + δ)}` of it, Z* for ε = −1, and `S_j = Z e^{−2πi k·r_j} / 2`.
 */
function modulatedSpace(
  { group, k }: ConfigurationSet,
  configuration: ModulatedConfiguration,
  cell: Cell,
  sites: readonly ScatteringSite[],
): MomentSpace {
  const arms = star(group, k);
  const arm = configuration.arms[0] ?? 0;
  const wave: ArrangementWave = {
    k: arms.arms[arm] as ArrangementWave["k"],
    halfLattice: false,
    operator: arms.representatives[arm] as number,
  };
  const numeric = numericWaveVector(wave.k);
  if (numeric === null) throw new Error("moments of a modulated configuration need values for the letters of k");
  const find = placeFinder(group, sites);
  const atoms = sites.flatMap(atomsOf);
  const sums: WaveSums[] = Array.from({ length: configuration.freeParameters.irreps }, () => [
    new Float64Array(6 * atoms.length),
  ]);
  const done = new Set<number>();
  for (const site of configuration.sites)
    for (const { operator, timeReversal, epsilon, shift, delta } of configuration.superspace.operators) {
      const position = addVectors(timesColumn(rotationOf(operator), site.position), translationOf(operator));
      const { atom } = find(site.parentSite, position);
      if (done.has(atom)) continue;
      done.add(atom);
      const axial = axialNumbers(operator, timeReversal);
      const own = (atoms[atom] as { position: Triple }).position;
      const added = toNumber(dot(shift, site.position)) + toNumber(delta);
      const turns = added - own.reduce((sum, entry, axis) => sum + entry * (numeric[axis] as number), 0);
      for (const { amplitude, cosine, sine } of site.amplitudes) {
        const target = sums[amplitude]?.[0] as Float64Array;
        addComplex(target, atom, timesNumbers(axial, cosine), turns, 0.5);
        addComplex(target, atom, timesNumbers(axial, sine), turns + epsilon / 4, 0.5);
      }
    }
  return spaceOf(group, cell, configuration.id, sites, [wave], sums);
}

/** Adds `factor · vector · e^{2πi·turns}`. */
function addComplex(sums: Float64Array, atom: number, vector: Triple, turns: number, factor: number): void {
  const [cosine, sine] = [factor * Math.cos(2 * Math.PI * turns), factor * Math.sin(2 * Math.PI * turns)];
  vector.forEach((entry, axis) => {
    sums[6 * atom + axis] = (sums[6 * atom + axis] as number) + entry * cosine;
    sums[6 * atom + axis + 3] = (sums[6 * atom + axis + 3] as number) + entry * sine;
  });
}

/** Letters of free amplitudes as configurations print them. */
const amplitudeLetters = ["u", "v", "w", "p", "q", "r", "s", "t", "f", "g", "h", "k", "l", "m", "n"];

function letterOf(index: number): string {
  const round = Math.floor(index / amplitudeLetters.length);
  return `${amplitudeLetters[index % amplitudeLetters.length]}${round === 0 ? "" : round}`;
}

/** Lattice components to those along unit vectors; every amplitude at 1 gives a largest |S| of 1 μB. */
function spaceOf(
  group: SpaceGroup,
  cell: Cell,
  id: string,
  sites: readonly ScatteringSite[],
  waves: readonly ArrangementWave[],
  sums: readonly WaveSums[],
): MomentSpace {
  const lengths = axisLengths(group, cell);
  const atoms = sites.flatMap(atomsOf);
  return {
    id,
    atoms,
    waves,
    basis: sums.map((own, index) => {
      const scaled = own.map((wave) => wave.map((value, at) => value * (lengths[at % 3] as number)));
      const sizes = scaled.flatMap((wave) =>
        atoms.map((_, atom) => Math.hypot(...wave.subarray(6 * atom, 6 * atom + 6))),
      );
      const largest = Math.max(...sizes) || 1;
      return {
        label: letterOf(index),
        unit: 1 / largest,
        components: scaled.map((wave) =>
          atoms.map((_, atom): FourierComponent => {
            const at = (part: number): number => (wave[6 * atom + part] as number) / largest + 0;
            return { real: [at(0), at(1), at(2)], imaginary: [at(3), at(4), at(5)] };
          }),
        ),
      };
    }),
  };
}
