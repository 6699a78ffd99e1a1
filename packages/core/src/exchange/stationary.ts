import type { WorkHost } from "../algorithms/index.js";
import { numericWaveVector, usedParameters, type WaveVector } from "../kvectors/index.js";
import { parameterNames, roundNumber } from "../numbers/index.js";
import { type CosineTerm, cosineForm } from "./cosine-form.js";
import { interactionOf } from "./interaction.js";
import { branchesAt } from "./lattice-matrix.js";
import { curvatureOf, type Line, lineOf, slopeAt, slopeOf } from "./level-slope.js";
import { namedConstants } from "./model.js";
import { type NeededConstant, type NeededPotentials, neededConstants, neededPotentials } from "./needed-constants.js";
import type { ExchangeModel, NamedConstant } from "./types.js";

/** What a wave vector asks of the constants: for each open letter of k a linear relation Σ slope_n J_n = 0. */
export interface StationaryRelation {
  /** u, v or w. */
  readonly letter: string;
  /** For each constant ∂λ/∂letter for J = 1, the eigenvector being that of the lowest branch at k. */
  readonly slopes: readonly number[];
  /** Likewise ∂²λ/∂letter². */
  readonly curvatures: readonly number[];
  /** The slopes as sums of cosines after division by a common sine, where all constants have that form; else null. */
  readonly cosines: readonly (readonly CosineTerm[])[] | null;
}

/** Which constants put a stationary point at a given k. */
export interface StationaryAnswer {
  readonly k: WaveVector;
  /** As the model was given: one for a whole shell where its classes were not told apart. */
  readonly constants: readonly NamedConstant[];
  /** Empty where symmetry alone makes k stationary. */
  readonly relations: readonly StationaryRelation[];
  /**
   * Whether the eigenvector is fixed by symmetry: then the relations hold for all constants, else only near those of
   * the model.
   */
  readonly fixedBySymmetry: boolean;
  /** Slope along each letter for the constants of the model, and whether k is a minimum along the letters. */
  readonly slopes: readonly number[];
  readonly needed: readonly NeededConstant[];
  readonly potentials: NeededPotentials;
}

/**
 * Which constants put the minimum at a measured k? On a line or plane of symmetry the slope of the lowest eigenvalue
 * along each letter must vanish. Where symmetry fixes the eigenvector the slope is linear in the constants, so each letter
 * gives one linear relation, such as J1 + 4 cos(2πu) J2 = 0 for a chain; a second derivative above zero tells minimum
 * from maximum. For k on a line the value of each constant that would do with all others as they are is worked out and
 * held against the whole zone.
 *
 * @param k with numbers for its letters
 */
export async function stationaryConstants(
  model: ExchangeModel,
  k: WaveVector,
  options: { readonly fixedBySymmetry: boolean },
  host: WorkHost = {},
): Promise<StationaryAnswer> {
  const numbers = numericWaveVector(k);
  if (numbers === null) throw new Error("a letter of k is open");
  const letters = usedParameters(k);
  const values = k.values ?? [];
  const lines = letters.map((_, index) => lineOf(model, k, index));
  const { scale } = interactionOf(model);
  const constants = namedConstants(model);
  return {
    k,
    constants,
    relations: lines.map((line, index) => ({
      letter: parameterNames[letters[index] as 0 | 1 | 2],
      ...derivatives(model, constants, line, scale),
      cosines: cosineForm(model, constants, line, values[index] as number),
    })),
    fixedBySymmetry: options.fixedBySymmetry,
    slopes: lines.map((line) => roundNumber(slopeAt(model, line, scale), scale)),
    needed: letters.length === 1 ? await neededConstants(model, lines[0] as Line, host) : [],
    potentials: neededPotentials(model),
  };
}

function derivatives(model: ExchangeModel, constants: readonly NamedConstant[], line: Line, scale: number) {
  const branches = branchesAt(model, line.at(0));
  const parts = constants.map(({ name }) => alone(model, name));
  return {
    slopes: parts.map((part) => roundNumber(slopeOf(part, branches, line, scale))),
    curvatures: parts.map((part) => roundNumber(Number(curvatureOf(model, part, line, scale).toPrecision(7)))),
  };
}

/** One constant alone, with J = 1. */
function alone(model: ExchangeModel, name: string): ExchangeModel {
  const couplings = model.couplings.map((one) => ({ ...one, j: one.constant === name ? 1 : 0 }));
  return { ...model, couplings, potentials: model.potentials.map(() => 0) };
}
