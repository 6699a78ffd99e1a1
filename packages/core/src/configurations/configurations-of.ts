import type { WorkHost } from "../algorithms/index.js";
import { fail } from "../errors/index.js";
import type { SmallIrreps } from "../irreps/index.js";
import { isExactWaveVector } from "../kvectors/index.js";
import type { SiteModes } from "../modes/index.js";
import type { Cell, SpaceGroup } from "../spacegroups/index.js";
import { commensurateConfigurations } from "./commensurate.js";
import { modulatedConfigurations } from "./modulated.js";
import type { ConfigurationOptions, ConfigurationSet } from "./types.js";

/** Enough for cubic stars of up to eight arms at k with 4k ∈ L*; more is said to be bounded. */
export const usualLimit = 10_000;

/**
 * All symmetry-distinct arrangements of moments that the irreps of one k allow on the sites: the directions of the order
 * parameter of every physically irreducible representation, each with its magnetic group, the moments on every atom and
 * the counts.
 *
 * @throws `invalid-argument` for an unknown irrep, arm or site; `interrupted` when the host's signal is aborted
 */
export async function configurationsOf(
  group: SpaceGroup,
  irreps: SmallIrreps,
  sites: readonly SiteModes[],
  cell: Cell | null,
  options: ConfigurationOptions = {},
  host: WorkHost = {},
): Promise<ConfigurationSet> {
  const { arms = "pair", together = null, onSites = {}, limit = usualLimit } = options;
  checkLabels(irreps, [...(together ?? []).flat(), ...Object.values(onSites).flat()]);
  checkSites(sites, Object.keys(onSites));
  const common = { group, k: irreps.k, arms, irreps, limit };
  const request = { group, irreps, sites, cell, arms, together, onSites, limit };
  if (isExactWaveVector(irreps.k)) {
    const found = await commensurateConfigurations(request, host);
    return { ...common, kind: "commensurate", ...found, modulated: [] };
  }
  const found = await modulatedConfigurations(request, host);
  return { ...common, kind: "incommensurate", ...found, configurations: [] };
}

function checkLabels(irreps: SmallIrreps, labels: readonly string[]): void {
  const known = irreps.irreps.map(({ label }) => label);
  const wrong = labels.find((label) => !known.includes(label));
  if (wrong !== undefined)
    fail("invalid-argument", `k has no irrep \`${wrong}\``, { expected: known.join(", "), found: wrong });
}

function checkSites(sites: readonly SiteModes[], labels: readonly string[]): void {
  const known = sites.map(({ orbit }) => orbit.label);
  const wrong = labels.find((label) => !known.includes(label));
  if (wrong !== undefined)
    fail("invalid-argument", `there is no site \`${wrong}\``, { expected: known.join(", "), found: wrong });
}
