import { fail } from "../errors/index.js";
import { formatWaveVector, isHalfLattice, numericWaveVector, parameterValues } from "../kvectors/index.js";
import { axisLengths, type ModeMoment, type SiteModes } from "../modes/index.js";
import {
  addCyclotomic,
  type Cyclotomic,
  conjugateCyclotomic,
  cyclotomicNumbers,
  cyclotomicToComplex,
  cyclotomicZero,
  multiplyCyclotomic,
  phaseTurns,
  type RationalVector,
  reducedEchelon,
  rootOfUnity,
  toNumber,
  unitComplex,
} from "../numbers/index.js";
import type { Cell, SpaceGroup } from "../spacegroups/index.js";
import type { MagneticFormFactor } from "./form-factors.js";
import type { FourierComponent, MomentBasisVector, MomentSpace, ScatteringAtom } from "./moment-space.js";

/** The modes of one site with what its ion scatters. */
export interface ScatteringSite {
  readonly modes: SiteModes;
  readonly formFactor: MagneticFormFactor;
  /** Share of the site that carries moments, 1 where it is left out: amplitudes are those of an atom that is there. */
  readonly occupancy?: number;
}

/**
 * The arrangements of one irrep (or of several together) on one arm: every copy and partner with a complex amplitude, as
 * two real ones; where 2k ∈ L* the real arrangements of the physically irreducible representation. Each amplitude is
 * scaled so that 1 gives a largest component |S| of 1 μB.
 *
 * Throws `k-needs-values` while k has an open letter.
 */
export function modeSpace(
  group: SpaceGroup,
  cell: Cell,
  sites: readonly ScatteringSite[],
  irreps: readonly string[],
  id = irreps.join("+"),
): MomentSpace {
  const k = sites[0]?.modes.representations.k;
  if (!k) return { id, atoms: [], waves: [], basis: [] };
  if (numericWaveVector(k) === null)
    fail("k-needs-values", `structure factors need numbers, but k = ${formatWaveVector(k)} has open parameters`, {
      expected: "three numbers or fractions",
      found: formatWaveVector(k),
      remedy: "write a number or a fraction in place of each letter, for example 0,0.472,0",
    });
  const halfLattice = isHalfLattice(group, k);
  const lengths = axisLengths(group, cell);
  const counts = sites.map(({ modes }) => modes.orbit.positions.length);
  const total = counts.reduce((sum, count) => sum + count, 0);
  let first = 0;
  const basis = sites.flatMap(({ modes }, site): MomentBasisVector[] => {
    const start = first;
    first += counts[site] as number;
    const own = halfLattice ? realVectors(modes, irreps) : complexVectors(modes, irreps, parameterValues(k));
    return own.map(({ label, moments }) => ({
      label: sites.length > 1 ? `${modes.orbit.label} ${label}` : label,
      components: [placed(scaledToOne(moments, lengths), start, total)],
    }));
  });
  return { id, atoms: sites.flatMap(atomsOf), waves: [{ k, halfLattice, operator: 0 }], basis };
}

export function atomsOf({ modes, formFactor, occupancy = 1 }: ScatteringSite): ScatteringAtom[] {
  return modes.orbit.positions.map((position) => ({
    site: modes.orbit.label,
    position: numbersOf(position),
    formFactor,
    occupancy,
  }));
}

export function numbersOf([x, y, z]: RationalVector): [number, number, number] {
  return [toNumber(x), toNumber(y), toNumber(z)];
}

/** Fourier components in lattice components, atom by atom, as `[re, im]`. */
interface RawVector {
  readonly label: string;
  readonly moments: readonly (readonly (readonly [number, number])[])[];
}

function complexVectors(modes: SiteModes, irreps: readonly string[], values: readonly number[] | null): RawVector[] {
  return modes.irreps
    .filter(({ irrep }) => irreps.includes(irrep.label))
    .flatMap(({ irrep, modes: own }) =>
      own.flatMap((mode) => {
        const moments = mode.moments.map((moment) => complexMoment(moment, values));
        const name = `${irreps.length > 1 ? `${irrep.label} ` : ""}${mode.copy}${irrep.dimension > 1 ? `.${mode.partner}` : ""}`;
        const times = (factor: readonly [number, number]) =>
          moments.map((moment) => moment.map((value) => product(value, factor)));
        return [
          { label: `re ${name}`, moments },
          { label: `im ${name}`, moments: times([0, 1]) },
        ];
      }),
    );
}

function complexMoment({ phase, vector }: ModeMoment, values: readonly number[] | null): [number, number][] {
  const turns = phaseTurns(phase, values);
  if (turns === null) throw new Error("the phase of a mode has a letter that k gives no value");
  return vector.map((entry) => product(cyclotomicToComplex(entry), unitComplex(turns)));
}

function product([a, b]: readonly [number, number], [c, d]: readonly [number, number]): [number, number] {
  return [a * c - b * d, a * d + b * c];
}

/**
 * Real and imaginary parts of all modes span the real arrangements of an irrep with its conjugate; reduced echelon form,
 * exact.
 */
function realVectors(modes: SiteModes, irreps: readonly string[]): RawVector[] {
  const own = modes.irreps.filter(({ irrep }) => irreps.includes(irrep.label));
  return own.flatMap(({ irrep, modes: list }) => {
    if (
      irrep.conjugateOf !== null &&
      own.some(
        (other) =>
          other.irrep.label === irrep.conjugateOf && own.indexOf(other) < own.findIndex((one) => one.irrep === irrep),
      )
    )
      return [];
    const rows = list.flatMap((mode) => {
      const entries = mode.moments.flatMap(({ phase, vector }) =>
        vector.map((entry) => multiplyCyclotomic(entry, rootOfUnity(phase.constant))),
      );
      return [
        entries.map(twiceReal),
        entries.map((entry) => twiceReal(multiplyCyclotomic(entry, rootOfUnity([-1, 4])))),
      ];
    });
    if (rows.length === 0) return [];
    return reducedEchelon(rows, cyclotomicNumbers).rows.map((row, index) => ({
      label: `${irreps.length > 1 ? `${irrep.label} ` : ""}${index + 1}`,
      moments: triples(row),
    }));
  });
}

function twiceReal(entry: Cyclotomic): Cyclotomic {
  return addCyclotomic(entry, conjugateCyclotomic(entry));
}

function triples(row: readonly Cyclotomic[]): [number, number][][] {
  return Array.from({ length: row.length / 3 }, (_, atom) =>
    [0, 1, 2].map((axis) => [cyclotomicToComplex(row[3 * atom + axis] ?? cyclotomicZero)[0], 0] as [number, number]),
  );
}

/** To components along unit vectors, largest |S| in them 1. */
function scaledToOne(moments: RawVector["moments"], lengths: readonly number[]): FourierComponent[] {
  const components = moments.map((moment): FourierComponent => {
    const part = (which: 0 | 1, axis: number): number => (moment[axis]?.[which] ?? 0) * (lengths[axis] as number);
    return {
      real: [part(0, 0), part(0, 1), part(0, 2)],
      imaginary: [part(1, 0), part(1, 1), part(1, 2)],
    };
  });
  const largest = Math.max(...components.map(({ real, imaginary }) => Math.hypot(...real, ...imaginary)));
  const scale = largest > 0 ? 1 / largest : 1;
  return components.map(({ real, imaginary }) => ({
    real: [scale * real[0], scale * real[1], scale * real[2]],
    imaginary: [scale * imaginary[0], scale * imaginary[1], scale * imaginary[2]],
  }));
}

function placed(components: readonly FourierComponent[], start: number, total: number): FourierComponent[] {
  const none: FourierComponent = { real: [0, 0, 0], imaginary: [0, 0, 0] };
  return Array.from({ length: total }, (_, atom) => components[atom - start] ?? none);
}
