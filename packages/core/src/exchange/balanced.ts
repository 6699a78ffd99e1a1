import { breathe, goldenSection, hermitianEigen, hermitianMatrix, type WorkHost } from "../algorithms/index.js";
import { fillInteraction, type Interaction, interactionOf, lowestBranch } from "./interaction.js";
import { seededDescents } from "./minimise.js";
import { descend } from "./polish.js";
import type { ExchangeModel } from "./types.js";
import { type ZoneWedge, zoneWedge } from "./wedge.js";
import type { ZoneFrame } from "./zone-frame.js";

/** What was prepared for several models with the same bonds. */
export interface PreparedZone {
  readonly frame: ZoneFrame;
  readonly wedge: ZoneWedge;
}

const rounds = 12;
const steps = 26;
/** Share of the scale within which a round counts as no gain. */
const enough = 1e-13;

/**
 * The same model with site potentials ν (Σ ν = 0, one for each orbit) that raise the lowest eigenvalue as far as they
 * can. For spins of full length they add nothing to the energy, so each choice gives a lower bound, and the best one is
 * the generalized bound of D. H. Lyons and T. A. Kaplan (Phys. Rev. 120 (1960) 1580) for atoms that symmetry does not
 * relate; within an orbit equal ν are best, for the bound is concave in ν. It is raised along one orbit after another;
 * where that stalls at a kink the bound is only less tight, never wrong.
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
  const wedge = prepared?.wedge ?? zoneWedge(group, start.frame);
  const counts = orbits.map((orbit) => atoms.filter((atom) => atom.orbit === orbit).length);
  // Places where a minimum was found before are looked at again each time.
  const seeds: Float64Array[] = [];
  const potentialsOf = (nu: readonly number[]) => {
    const mean = nu.reduce((sum, entry, n) => sum + entry * (counts[n] as number), 0) / atoms.length;
    return atoms.map(({ orbit }) => (nu[orbits.indexOf(orbit)] as number) - mean);
  };
  const bound = (nu: readonly number[], everywhere = true) =>
    lowestOver({ ...start, potentials: Float64Array.from(potentialsOf(nu)) }, wedge, seeds, everywhere);
  /** The slope of the bound: by how much the orbit has more than its share of the lowest eigenvector. */
  const excess = (nu: readonly number[], axis: number): number => {
    const { weights } = bound(nu, false);
    const own = atoms.reduce(
      (sum, { orbit }, atom) => sum + (orbit === orbits[axis] ? (weights[atom] as number) : 0),
      0,
    );
    return own - (counts[axis] as number) / atoms.length;
  };
  let nu: number[] = orbits.map(() => 0);
  let value = bound(nu).value;
  for (let round = 0; round < rounds; round++) {
    const before = value;
    for (let axis = 1; axis < orbits.length; axis++) {
      await breathe(host);
      const along = (entry: number) => nu.map((old, n) => (n === axis ? entry : old));
      const reach = 2 * start.scale;
      const from = nu[axis] as number;
      const near = goldenSection((one) => -bound(along(one)).value, from - reach, from + reach, steps);
      // Golden sections end where rounding hides the maximum; the sign of the slope goes on from there.
      const entry = signChange((one) => excess(along(one), axis), near, 1e-4 * start.scale);
      const next = bound(along(entry)).value;
      if (next > value - enough * start.scale) [nu, value] = [along(entry), next];
    }
    if (orbits.length === 2 || value - before <= enough * start.scale) break;
  }
  return { ...model, potentials: potentialsOf(nu) };
}

/** Where a falling function changes sign near a place; the place itself where it does not nearby. */
function signChange(value: (x: number) => number, near: number, reach: number): number {
  let [low, high] = [near - reach, near + reach];
  if (!(value(low) > 0) || !(value(high) < 0)) return near;
  for (let step = 0; step < 42; step++) {
    const middle = (low + high) / 2;
    if (value(middle) > 0) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/** @param everywhere also from new places; else only where a minimum was seen before */
function lowestOver(interaction: Interaction, wedge: ZoneWedge, seeds: Float64Array[], everywhere: boolean) {
  const branch = lowestBranch(interaction);
  const size = Math.hypot(...wedge.half);
  const found = [
    ...seeds.map((x) => descend(branch, x, size, interaction.scale)),
    ...(everywhere ? seededDescents(branch, wedge, size, interaction.scale, 2) : []),
  ];
  const best = found.reduce((least, one) => (one.value < least.value ? one : least));
  if (!seeds.some((x) => Math.hypot(...x.map((entry, axis) => entry - (best.x[axis] as number))) < 1e-3 * size))
    seeds.push(best.x);
  if (seeds.length > 6) seeds.shift();
  const matrix = hermitianMatrix(interaction.size);
  fillInteraction(interaction, best.x, matrix);
  const { real, imaginary } = hermitianEigen(matrix);
  const weights = Array.from(
    { length: interaction.size },
    (_, atom) => (real[atom * interaction.size] as number) ** 2 + (imaginary[atom * interaction.size] as number) ** 2,
  );
  return { value: best.value, weights };
}
