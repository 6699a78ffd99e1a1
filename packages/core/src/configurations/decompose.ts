import type { WorkHost } from "../algorithms/index.js";
import { smallIrreps } from "../irreps/index.js";
import { equivalentWaveVectors, isHalfLattice, star, type WaveVector } from "../kvectors/index.js";
import type { MagneticGroup } from "../magneticgroups/index.js";
import { ownConvention, projectComponents, type SiteModes, siteModes } from "../modes/index.js";
import { roundNumber } from "../numbers/index.js";
import { type Cell, directMetric, type SiteOrbit, type SpaceGroup } from "../spacegroups/index.js";
import { configurationsOf } from "./configurations-of.js";
import { groupOfField } from "./field-group.js";
import { type FieldWave, fieldWaves } from "./field-waves.js";
import type { MomentField } from "./given-field.js";
import { type Recognised, recognise } from "./recognise.js";
import { siteFrame } from "./site-frames.js";
import type { ConfigurationSet } from "./types.js";

type Complex = readonly [number, number];

/** The part of a field that one irrep of one star has. */
export interface IrrepPart {
  readonly k: WaveVector;
  readonly label: string;
  /** Share of Σ |S|² of the whole field, 0 to 1. */
  readonly share: number;
  /** By arm, and within an arm by site: amplitudes of the basis vectors, μB/Å in lattice components. */
  readonly arms: readonly {
    readonly k: WaveVector;
    readonly sites: readonly { readonly label: string; readonly amplitudes: readonly Complex[] }[];
  }[];
}

/** What a field of moments is made of. */
export interface Decomposition {
  /** Largest share first. */
  readonly parts: readonly IrrepPart[];
  /** Within the parent group, in its axes. */
  readonly magneticGroup: MagneticGroup;
  /** The irreps that drive it: the star of the largest part, with every irrep of it that has a share to speak of. */
  readonly primary: { readonly k: WaveVector; readonly irreps: readonly string[]; readonly arms: readonly number[] };
  /** The list that was looked through, null where the limit forbade it; and the configuration that the field is. */
  readonly listed: ConfigurationSet | null;
  readonly recognised: Recognised | null;
}

/** Share of Σ |S|² below which a component is rounding of the file and not part of the arrangement. */
const leastShare = 1e-4;

/**
 * Splits the moments of a commensurate structure over the irreps of the parent, names the magnetic group of the field, and
 * looks the arrangement up among the configurations of its k in all domains, arms and origins.
 *
 * @param field made by `momentField`
 */
export async function decomposeField(
  group: SpaceGroup,
  cell: Cell,
  field: MomentField,
  host: WorkHost = {},
): Promise<Decomposition> {
  const metric = directMetric(cell);
  const waves = fieldWaves(group, field, metric, leastShare);
  const total = waves.reduce((sum, { power }) => sum + power, 0);
  const stars = starsOf(group, waves);
  const parts = stars
    .flatMap((one) => partsOf(group, cell, field.orbits, one, total))
    .filter(({ share }) => share > leastShare)
    .sort((a, b) => b.share - a.share);
  const [first] = stars;
  const k = first?.k ?? (waves[0] as FieldWave).k;
  const irreps = smallIrreps(group, k);
  const modes = field.orbits.map((orbit) => siteModes(group, irreps, orbit));
  const magneticGroup = groupOfField(
    group,
    field,
    modes.map((one) => siteFrame(group, one)),
  );
  const labels = parts.filter((part) => part.k === k && part.share > leastShare).map(({ label }) => label);
  const arms = first?.arms.map(({ arm }) => arm) ?? [0];
  const listed = await listOf(group, cell, k, modes, labels, arms, host);
  return {
    parts,
    magneticGroup,
    primary: { k, irreps: labels, arms },
    listed,
    recognised: recognise(group, magneticGroup, field.cells, labels, listed.configurations),
  };
}

/** The waves on the arms of one star. */
interface StarWaves {
  readonly k: WaveVector;
  readonly arms: readonly { readonly arm: number; readonly wave: FieldWave }[];
  readonly power: number;
}

/** By falling power; of each ±k pair of arms the first. */
function starsOf(group: SpaceGroup, waves: readonly FieldWave[]): readonly StarWaves[] {
  const found: { k: WaveVector; arms: { arm: number; wave: FieldWave }[]; power: number }[] = [];
  for (const wave of [...waves].sort((a, b) => b.power - a.power)) {
    const home = found.find(({ k }) => armOf(group, k, wave.k) >= 0);
    if (home === undefined) found.push({ k: wave.k, arms: [{ arm: 0, wave }], power: wave.power });
    else {
      home.arms.push({ arm: armOf(group, home.k, wave.k), wave });
      home.power += wave.power;
    }
  }
  // −k of a star that does not hold it is the complex conjugate: one of the two says all.
  return found.sort((a, b) => b.power - a.power);
}

function armOf(group: SpaceGroup, k: WaveVector, other: WaveVector): number {
  return star(group, k).arms.findIndex((arm) => equivalentWaveVectors(group, arm, other));
}

function partsOf(
  group: SpaceGroup,
  cell: Cell,
  orbits: readonly SiteOrbit[],
  { k, arms }: StarWaves,
  total: number,
): IrrepPart[] {
  const byLabel = new Map<string, { share: number; arms: IrrepPart["arms"][number][] }>();
  for (const { wave } of arms) {
    const irreps = smallIrreps(group, wave.k);
    const sites = orbits.map((orbit, index) => {
      const projected = projectComponents(
        group,
        siteModes(group, irreps, orbit),
        wave.components[index] as readonly (readonly Complex[])[],
        { convention: { ...ownConvention, components: "lattice" }, cell },
      );
      return { label: orbit.label, shares: projected?.shares ?? [], power: sitePower(wave, index, cell) };
    });
    for (const { label } of irreps.irreps) {
      const entry = byLabel.get(label) ?? { share: 0, arms: [] };
      const own = sites.map(({ shares, power }) => ({ share: shares.find((one) => one.label === label), power }));
      entry.share += own.reduce((sum, { share, power }) => sum + (share?.share ?? 0) * power, 0) / total;
      entry.arms.push({
        k: wave.k,
        sites: sites.map(({ label: site }, index) => ({
          label: site,
          amplitudes: (own[index]?.share?.amplitudes ?? []).map(
            ([re, im]): Complex => [roundNumber(re, 1, amplitudeDigits), roundNumber(im, 1, amplitudeDigits)],
          ),
        })),
      });
      byLabel.set(label, entry);
    }
  }
  return [...byLabel].map(([label, { share, arms: list }]) => ({ k, label, share: roundNumber(share, 1), arms: list }));
}

/** Digits of amplitudes: moments are not known better. */
const amplitudeDigits = 10;

function sitePower(wave: FieldWave, index: number, cell: Cell): number {
  const metric = directMetric(cell);
  let sum = 0;
  for (const vector of wave.components[index] ?? [])
    for (const part of [0, 1] as const)
      for (let i = 0; i < 3; i++)
        for (let j = 0; j < 3; j++)
          sum += (vector[i]?.[part] as number) * (metric[3 * i + j] as number) * (vector[j]?.[part] as number);
  return sum;
}

/** "all" where the arrangement has every arm: the configurations are then numbered as `configurations --arms all` does. */
function listedArms(group: SpaceGroup, k: WaveVector, arms: readonly number[]): "all" | number[] {
  return arms.length === star(group, k).arms.length ? "all" : [...arms].sort((a, b) => a - b);
}

async function listOf(
  group: SpaceGroup,
  cell: Cell,
  k: WaveVector,
  modes: readonly SiteModes[],
  labels: readonly string[],
  arms: readonly number[],
  host: WorkHost,
): Promise<ConfigurationSet> {
  const irreps = smallIrreps(group, k);
  // With −k in another arm the pair counts as one.
  const pair = arms.length === 1 || (arms.length === 2 && !isHalfLattice(group, k));
  return configurationsOf(
    group,
    irreps,
    modes,
    cell,
    { arms: pair ? "pair" : listedArms(group, k, arms), together: [labels] },
    host,
  );
}
