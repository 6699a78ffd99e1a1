import {
  cartesianQ,
  clusterLines,
  displacementFactor,
  domainForm,
  lineForm,
  lineMembers,
  lorentzFactor,
  type MomentSpace,
  matchWave,
  nuclearSquares,
  nuclearStructureFactor,
  type PreparedSpace,
  prepareSpace,
  rotationNumbers,
  rowTimesNumbers,
  type ScatteringGeometry,
  scatteringGeometry,
  type Triple,
} from "../diffraction/index.js";
import type { WaveVector } from "../kvectors/index.js";
import { type NuclearLine, type SatelliteLine, satelliteLines } from "../reflections/index.js";
import type { Cell, SpaceGroup } from "../spacegroups/index.js";
import type { IntensityData, IntensityDatum } from "./types.js";

/** The calculated intensities of one candidate: `s (N_i + Σ_d w_d aᵀ A_di a)`. */
export interface FitForms {
  readonly size: number;
  /** Domains that the data tell apart, each with the operators that make it. One for a powder. */
  readonly domains: readonly (readonly number[])[];
  /** A_di, by domain, then datum: size × size, Lorentz and displacement factors included. */
  readonly forms: readonly (readonly Float64Array[])[];
  /** N_i: nuclear intensity on the datum without the scale. */
  readonly constants: Float64Array;
  /** Whether the datum is a satellite, or has a line near it, be it dark or not. */
  readonly assigned: readonly boolean[];
}

/** What does not depend on the candidate. */
export interface DataFrame {
  readonly group: SpaceGroup;
  readonly cell: Cell;
  readonly k: WaveVector;
  readonly data: IntensityData;
  /** Per datum the satellite lines of a powder that belong to it. */
  readonly lines: readonly (readonly SatelliteLine[])[];
  /** Per datum of a powder the names of its lines, satellites and nuclear ones. */
  readonly names: readonly (readonly string[])[];
  readonly constants: Float64Array;
}

/**
 * Assigns the lines of a powder to the peaks: lines that follow each other within the resolution are one peak, and belong to
 * the datum that lies on it; where several do, each line to the nearest.
 */
export function dataFrame(group: SpaceGroup, cell: Cell, k: WaveVector, data: IntensityData): DataFrame {
  const constants = new Float64Array(data.data.length);
  const lines: SatelliteLine[][] = data.data.map(() => []);
  const names: string[][] = data.data.map(() => []);
  const frame = { group, cell, k, data, lines, names, constants };
  if (data.sample === "single crystal") {
    addNuclearReflections(frame);
    return frame;
  }
  const furthest = data.data.reduce((most, { q }) => Math.max(most, q ?? 0), 0);
  if (furthest === 0) return frame;
  const limits = { qMax: furthest + 2 * data.resolution };
  const positions = (...kinds: readonly IntensityDatum["holds"][]): (number | null)[] =>
    data.data.map(({ q, holds = "satellites" }) => (kinds.includes(holds) ? q : null));
  const satellites = satelliteLines(group, cell, k, limits);
  assigned(satellites, positions("satellites", "both"), data.resolution, (line, datum) => {
    lines[datum]?.push(line);
    names[datum]?.push(satelliteName(line));
  });
  // Lines measured apart, above the ordering temperature for example, and those below the satellites are two lists.
  const lists = [positions("nuclear"), positions("both")].filter((list) => list.some((q) => q !== null));
  if (lists.length === 0) return frame;
  const nuclear = nuclearSquares(group, cell, data.nuclear, limits).map(({ line, square }) => ({
    q: line.q,
    name: nuclearName(line),
    square,
  }));
  for (const list of lists)
    assigned(nuclear, list, data.resolution, ({ q, name, square }, datum) => {
      names[datum]?.push(name);
      constants[datum] = (constants[datum] as number) + square * instrumentFactor(data, q);
    });
  return frame;
}

/** `(1 0 0) + k`. */
export function satelliteName({ h, sign }: SatelliteLine): string {
  return `(${h.join(" ")}) ${sign === -1 ? "−" : "+"} k`;
}

export function nuclearName({ h }: NuclearLine): string {
  return `(${h.join(" ")})`;
}

/** |N(H)|² of a crystal is the same for all its domains: they differ by operators of the group. */
function addNuclearReflections({ group, cell, data, constants }: DataFrame): void {
  const geometry = scatteringGeometry(group, cell);
  data.data.forEach(({ hkl, holds = "satellites" }, datum) => {
    if (hkl === null || holds === "satellites" || !isNuclear(group, hkl)) return;
    const [real, imaginary] = nuclearStructureFactor(geometry, data.nuclear, hkl);
    constants[datum] = (real * real + imaginary * imaginary) * crystalFactor(data, geometry, hkl);
  });
}

/** R.l.u. An index is whole when it is no further from a whole number. */
const wholeIndex = 1e-4;

/** Whether H·T is whole for all lattice translations. */
function isNuclear({ lattice }: SpaceGroup, hkl: Triple): boolean {
  return lattice.vectors.every((vector) => {
    const turns = vector.reduce((sum, entry, axis) => sum + entry * (hkl[axis] as number), 0) / lattice.denominator;
    return Math.abs(turns - Math.round(turns)) <= wholeIndex;
  });
}

/** Calls `take` for every line (in order of Q) that belongs to a datum. */
function assigned<T extends { readonly q: number }>(
  lines: readonly T[],
  positions: readonly (number | null)[],
  resolution: number,
  take: (line: T, datum: number) => void,
): void {
  const clusters = clusterLines(
    lines.map(({ q }) => q),
    resolution,
  );
  for (const { lines: members, qMin, qMax } of clusters) {
    const there = positions.flatMap((q, datum) =>
      q !== null && q >= qMin - resolution && q <= qMax + resolution ? [{ q, datum }] : [],
    );
    for (const member of members) {
      const line = lines[member] as T;
      const [first, ...others] = there;
      if (!first) continue;
      const nearest = others.reduce(
        (best, one) => (Math.abs(one.q - line.q) < Math.abs(best.q - line.q) ? one : best),
        first,
      );
      take(line, nearest.datum);
    }
  }
}

/** Lorentz factor × displacement factor. */
export function instrumentFactor({ geometry, displacement }: IntensityData, q: number): number {
  return lorentzFactor(geometry, q) * displacementFactor(displacement, q);
}

/** The calculated intensities of one candidate as quadratic forms. */
export function fitForms(frame: DataFrame, space: MomentSpace): FitForms {
  const prepared = prepareSpace(scatteringGeometry(frame.group, frame.cell), space);
  return frame.data.sample === "powder" ? powderForms(frame, prepared) : crystalForms(frame, prepared);
}

function powderForms({ group, k, data, lines, constants }: DataFrame, prepared: PreparedSpace): FitForms {
  const { size } = prepared;
  const members = lineMembers(group, k);
  const forms = lines.map((own) => {
    const sum = new Float64Array(size * size);
    for (const line of own) {
      const factor = instrumentFactor(data, line.q);
      lineForm(prepared, members, line).forEach((entry, index) => {
        sum[index] = (sum[index] as number) + factor * entry;
      });
    }
    return sum;
  });
  const assigned = lines.map((own, index) => own.length > 0 || (constants[index] as number) > 0);
  return { size, domains: [[0]], forms: [forms], constants, assigned };
}

/** Relative to the largest entry of all: forms of two operators that differ by less are one domain. */
const sameForm = 1e-9;

/** Lorentz and displacement factor of a reflection, 0 at the origin. */
function crystalFactor(data: IntensityData, geometry: ScatteringGeometry, hkl: Triple): number {
  const q = Math.hypot(...cartesianQ(geometry, hkl));
  return q > 0 ? instrumentFactor(data, q) : 0;
}

function crystalForms({ group, data, constants }: DataFrame, prepared: PreparedSpace): FitForms {
  const factors = data.data.map(({ hkl, holds }) =>
    hkl === null || holds === "nuclear" ? 0 : crystalFactor(data, prepared.geometry, hkl),
  );
  const domains: number[][] = [];
  const forms: Float64Array[][] = [];
  let largest = 0;
  group.operators.forEach((_, operator) => {
    const own = data.data.map(({ hkl, polarization }, datum) =>
      hkl === null
        ? new Float64Array(prepared.size ** 2)
        : domainForm(group, prepared, hkl, operator, polarization ?? 0).map(
            (entry) => entry * (factors[datum] as number),
          ),
    );
    for (const form of own) for (const entry of form) largest = Math.max(largest, Math.abs(entry));
    const known = forms.findIndex((other) =>
      other.every((form, datum) =>
        form.every((entry, at) => Math.abs(entry - (own[datum]?.[at] as number)) <= sameForm * largest),
      ),
    );
    if (known >= 0) domains[known]?.push(operator);
    else {
      domains.push([operator]);
      forms.push(own);
    }
  });
  const rotations = group.operators.map(rotationNumbers);
  const onSatellite = (hkl: Triple): boolean =>
    rotations.some((rotation) => matchWave(group, prepared, rowTimesNumbers(hkl, rotation)) !== null);
  const assigned = data.data.map(
    ({ hkl, holds }, datum) =>
      hkl !== null && ((constants[datum] as number) > 0 || (holds !== "nuclear" && onSatellite(hkl))),
  );
  return { size: prepared.size, domains, forms, constants, assigned };
}
