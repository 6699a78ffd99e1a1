import type { Configuration, ConfigurationSet, ModulatedConfiguration } from "../../configurations/index.js";
import type { MomentSpace } from "../../diffraction/index.js";
import { axisLengths } from "../../modes/index.js";
import { roundNumber } from "../../numbers/index.js";
import { type Cell, changeCell } from "../../spacegroups/index.js";
import type { WeighedCandidate } from "../../weighing/index.js";
import type { FittedSiteRecord } from "../records/weigh.js";

/** Digits of a moment in μB. */
const momentDigits = 6;

type Triple = readonly [number, number, number];

/** The fitted moments of a candidate on the sites of its configuration, in the axes that its magnetic CIF has. */
export function fittedSites(
  set: ConfigurationSet,
  cell: Cell,
  { id, amplitudes }: WeighedCandidate,
  space: MomentSpace | undefined,
): FittedSiteRecord[] {
  const values = amplitudes.map(({ value }, index) => value * (space?.basis[index]?.unit ?? 0));
  const commensurate = set.configurations.find((one) => one.id === id);
  if (commensurate !== undefined) return commensurateSites(commensurate, cell, values);
  const modulated = set.modulated.find((one) => one.id === id);
  return modulated === undefined ? [] : modulatedSites(modulated, axisLengths(set.group, cell), values);
}

function commensurateSites(one: Configuration, cell: Cell, values: readonly number[]): FittedSiteRecord[] {
  const child = changeCell(cell, one.cell.cellFromParent);
  const lengths: Triple = [child.a, child.b, child.c];
  return one.sites.map(({ label, amplitudes }) => ({
    label,
    momentCrystal: summed(
      amplitudes.map(({ amplitude, momentLattice }) => [amplitude, momentLattice]),
      values,
      lengths,
    ),
    cosineCrystal: null,
    sineCrystal: null,
  }));
}

function modulatedSites(one: ModulatedConfiguration, lengths: Triple, values: readonly number[]): FittedSiteRecord[] {
  return one.sites.map(({ label, amplitudes }) => ({
    label,
    momentCrystal: null,
    cosineCrystal: summed(
      amplitudes.map(({ amplitude, cosine }) => [amplitude, cosine]),
      values,
      lengths,
    ),
    sineCrystal: summed(
      amplitudes.map(({ amplitude, sine }) => [amplitude, sine]),
      values,
      lengths,
    ),
  }));
}

/** Lattice components times amplitudes, along unit vectors of the axes. */
function summed(
  shares: readonly (readonly [number, Triple])[],
  values: readonly number[],
  lengths: Triple,
): readonly number[] {
  return lengths.map((length, axis) =>
    roundNumber(
      length *
        shares.reduce((sum, [amplitude, vector]) => sum + (values[amplitude] ?? 0) * (vector[axis] as number), 0),
      1,
      momentDigits,
    ),
  );
}
