import { hermitianEigen, hermitianMatrix } from "../algorithms/index.js";
import { fillInteraction, type Interaction, lowestBranch } from "./interaction.js";
import { seededDescents } from "./minimise.js";
import { type Descent, descend } from "./polish.js";
import type { ZoneWedge } from "./wedge.js";

/** A local minimum of the lowest eigenvalue over the zone. */
export interface ZoneSeed extends Descent {
  /** The eigenvalues there, lowest first, each with the share of every atom in its eigenvector. */
  readonly levels: readonly { readonly value: number; readonly weights: readonly number[] }[];
}

const mostSeeds = 6;
/** Differences of energy (share of the scale) and of weights within which two minima are arms of one star. */
const sameEnergy = 1e-9;
const sameWeight = 1e-6;

/**
 * The lowest local minima over the zone of models that differ in their site potentials: minima that were found for one
 * choice lead to those of the next.
 */
export function zoneSeeds(wedge: ZoneWedge) {
  const size = Math.hypot(...wedge.half);
  let known: ZoneSeed[] = [];
  return {
    /** @param everywhere also from new places; else only where a minimum was seen before */
    lowest: (interaction: Interaction, everywhere: boolean): readonly ZoneSeed[] => {
      const { scale } = interaction;
      const branch = lowestBranch(interaction);
      const found = [
        ...known.map(({ x }) => descend(branch, x, size, scale)),
        ...(everywhere || known.length === 0 ? seededDescents(branch, wedge, size, scale, 2) : []),
      ].sort((a, b) => a.value - b.value);
      const distinct: ZoneSeed[] = [];
      for (const one of found) {
        const levels = levelsAt(interaction, one.x);
        const alike = (other: ZoneSeed) =>
          Math.abs(other.value - one.value) < sameEnergy * scale &&
          (other.levels[0]?.weights ?? []).every(
            (weight, atom) => Math.abs(weight - (levels[0]?.weights[atom] as number)) < sameWeight,
          );
        if (!distinct.some(alike)) distinct.push({ ...one, levels });
      }
      known = distinct.slice(0, mostSeeds);
      return known;
    },
  };
}

function levelsAt(interaction: Interaction, x: Float64Array): ZoneSeed["levels"] {
  const { size } = interaction;
  const matrix = hermitianMatrix(size);
  fillInteraction(interaction, x, matrix);
  const { values, real, imaginary } = hermitianEigen(matrix);
  return Array.from(values, (value, n) => ({
    value,
    weights: Array.from(
      { length: size },
      (_, atom) => (real[atom * size + n] as number) ** 2 + (imaginary[atom * size + n] as number) ** 2,
    ),
  }));
}
