import { breathe, type WorkHost } from "../algorithms/index.js";
import { concaveMaximum } from "./concave-maximum.js";
import { interactionOf } from "./interaction.js";
import { nearestInHull } from "./nearest-in-hull.js";
import type { ExchangeModel } from "./types.js";
import { type ZoneWedge, zoneWedge } from "./wedge.js";
import type { ZoneFrame } from "./zone-frame.js";
import { zoneSeeds } from "./zone-seeds.js";

/** What was prepared for several models with the same bonds. */
export interface PreparedZone {
  readonly frame: ZoneFrame;
  readonly wedge: ZoneWedge;
}

const mostSteps = 60;
/** Share of the scale that counts as no gain. */
const noGain = 1e-14;
/** Excess of an orbit in the lowest eigenvector that is rounding. */
const even = 1e-12;
/** Share of the scale within which minima count as met: wide at first, so that a kink is not missed, then narrower. */
const widest = 1e-3;
const narrowest = 1e-13;
const mostMet = 6;
/** Of the scale. */
const firstStep = 0.25;
/** Places along one direction for which the whole zone is sampled; then only known minima are followed. */
const lookedAround = 4;

/**
 * The same model with site potentials ν (Σ ν = 0, one for each orbit) that raise the lowest eigenvalue as far as they
 * can. For spins of full length they add nothing to the energy, so each choice gives a lower bound, and the best one is
 * the generalized bound of D. H. Lyons and T. A. Kaplan (Phys. Rev. 120 (1960) 1580) for atoms that symmetry does not
 * relate; within an orbit equal ν are best. The bound is concave in ν and has kinks where two k, or two eigenvalues,
 * are equally low: it is raised along the steepest direction that all of those allow, conjugate to the one before. Where
 * the work ends too early the bound is only less tight, never wrong.
 */
export async function balancedModel(
  model: ExchangeModel,
  prepared: PreparedZone | null = null,
  host: WorkHost = {},
): Promise<ExchangeModel> {
  const { atoms, group } = model.table;
  const orbits = [...new Set(atoms.map(({ orbit }) => orbit))];
  const start = interactionOf(model, prepared?.frame);
  if (orbits.length < 2 || start.frame.rank === 0 || start.count === 0) return model;
  const share = orbits.map((orbit) => atoms.filter((atom) => atom.orbit === orbit).length / atoms.length);
  const orbitOf = atoms.map(({ orbit }) => orbits.indexOf(orbit));
  const potentialsOf = (nu: readonly number[]) => {
    const mean = dot(nu, share);
    return orbitOf.map((orbit) => (nu[orbit] as number) - mean);
  };
  const seeds = zoneSeeds(prepared?.wedge ?? zoneWedge(group, start.frame));
  const minimaAt = (nu: readonly number[], everywhere = true) =>
    seeds.lowest({ ...start, potentials: Float64Array.from(potentialsOf(nu)) }, everywhere);
  /** Slope of an eigenvalue in ν: by how much each orbit has more than its share of the eigenvector. */
  const excess = (weights: readonly number[]) =>
    share.map((part, orbit) => weights.reduce((sum, one, atom) => sum + (orbitOf[atom] === orbit ? one : 0), -part));
  const { scale } = start;
  let nu: number[] = orbits.map(() => 0);
  let before: { readonly slope: number[]; readonly direction: number[] } | null = null;
  let width = widest;
  let minima = minimaAt(nu);
  for (let step = 0; step < mostSteps && width >= narrowest; step++) {
    await breathe(host);
    const value = minima[0]?.value as number;
    const met = minima
      .flatMap(({ levels }) => levels)
      .filter((one) => one.value <= value + width * scale)
      .sort((a, b) => a.value - b.value)
      .slice(0, mostMet);
    const slope = nearestInHull(met.map(({ weights }) => excess(weights)));
    if (Math.hypot(...slope) <= even) {
      width /= 10;
      continue;
    }
    const direction = conjugate(slope, before);
    const along = (t: number) => nu.map((entry, orbit) => entry + t * (direction[orbit] as number));
    let places = 0;
    const at = (t: number) => {
      const [lowest] = minimaAt(along(t), places++ < lookedAround);
      return {
        value: lowest?.value as number,
        slope: dot(excess(lowest?.levels[0]?.weights ?? []), direction),
      };
    };
    const size = Math.hypot(...direction);
    const best = concaveMaximum(at, 0, (firstStep * scale) / size, even * size);
    const there = minimaAt(along(best));
    const gain = (there[0]?.value as number) - value;
    if (gain > 0) [nu, minima] = [along(best), there];
    before = gain > 0 ? { slope, direction } : null;
    // Where nothing is gained along a direction that two near minima allow, one of them is not met yet.
    if (gain <= noGain * scale && direction === slope) width /= 10;
  }
  return { ...model, potentials: potentialsOf(nu) };
}

/** The direction of E. Polak and G. Ribière; the slope itself at first and where that one does not rise. */
function conjugate(
  slope: number[],
  before: { readonly slope: number[]; readonly direction: number[] } | null,
): number[] {
  if (before === null) return slope;
  const change = slope.map((entry, n) => entry - (before.slope[n] as number));
  const factor = Math.max(0, dot(slope, change) / dot(before.slope, before.slope));
  const direction = slope.map((entry, n) => entry + factor * (before.direction[n] as number));
  return factor > 0 && dot(direction, slope) > 0 ? direction : slope;
}

function dot(a: readonly number[], b: readonly number[]): number {
  return a.reduce((sum, entry, n) => sum + entry * (b[n] as number), 0);
}
