import type { WorkHost } from "../algorithms/index.js";
import { roundNumber, sameEnergyShare } from "../numbers/index.js";
import { type Interaction, interactionOf, lowestBranch } from "./interaction.js";
import { type MinimiseOptions, minimiseZone } from "./minimise.js";
import { minimaOf } from "./minimum-set.js";
import { minimumSet } from "./set-of-k.js";
import type { ExchangeModel, Ground } from "./types.js";
import type { ZoneFrame } from "./zone-frame.js";

/** What a search may be told beside its limits. */
export interface GroundOptions extends Partial<MinimiseOptions> {
  /** The frame of a larger set of bonds, where several models share one. */
  readonly frame?: ZoneFrame;
  /** Leave out which lines and planes of symmetry lie in the set as a whole. */
  readonly withoutManifolds?: boolean;
}

/**
 * Where is the lowest eigenvalue of J(k) least, and how low is it? By the theorem of Luttinger and Tisza no arrangement
 * of spins of the given lengths has less energy (J. M. Luttinger & L. Tisza, Phys. Rev. 70 (1946) 954); whether one
 * reaches it is the question of `constantMoments`. The certificate says what was gone through and how far below the
 * value found a k could still lie. Energies are per magnetic atom, in the unit of the J.
 */
export async function groundOf(
  model: ExchangeModel,
  options: GroundOptions = {},
  host: WorkHost = {},
): Promise<Ground> {
  const interaction = interactionOf(model, options.frame);
  if (interaction.frame.rank === 0) return sameForAllK(model, interaction);
  const energyShare = options.energyShare ?? sameEnergyShare;
  const searched = await minimiseZone(model.table.group, interaction, { ...options, energyShare }, host);
  const tolerance = energyShare * interaction.scale;
  const first = minimaOf(interaction, searched, tolerance);
  // Every heap of boxes has been descended into now: what lay lower than the search had found counts.
  const hidden = first.lowest < searched.value - tolerance;
  const found = hidden ? { ...searched, value: first.lowest } : searched;
  const minima = hidden ? minimaOf(interaction, found, tolerance) : first;
  return {
    energy: perSpin(found.value, interaction),
    set: minimumSet(model, interaction, minima, {
      branch: found.branch,
      limit: found.value + tolerance,
      withoutManifolds: options.withoutManifolds ?? false,
    }),
    certificate: {
      boxes: found.boxes,
      smallestBox: roundNumber(found.leafRadius),
      exhaustive: found.stopped === null,
      leaves: found.leaves.length,
      lowerBound: perSpin(found.lowerBound, interaction),
      freeDirections: 3 - interaction.frame.rank,
      stopped: found.stopped,
    },
  };
}

/** E/N = λ/2: the bond between two atoms is counted once, J(k) holds it twice. */
function perSpin(eigenvalue: number, interaction: Interaction): number {
  return roundNumber(eigenvalue / 2, interaction.scale);
}

/** Without closed walks of bonds there is nothing that could depend on k. */
function sameForAllK(model: ExchangeModel, interaction: Interaction): Ground {
  const branch = lowestBranch(interaction);
  const { value } = branch([]);
  const limit = value + sameEnergyShare * interaction.scale;
  return {
    energy: perSpin(value, interaction),
    set: minimumSet(
      model,
      interaction,
      { dimension: 0, points: [[]], lowest: value },
      { branch, limit, withoutManifolds: false },
    ),
    certificate: {
      boxes: 1,
      smallestBox: 0,
      exhaustive: true,
      leaves: 1,
      lowerBound: perSpin(value, interaction),
      freeDirections: 3,
      stopped: null,
    },
  };
}
