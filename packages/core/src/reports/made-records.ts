import type { ConfigurationSet, Decomposition, GivenMoments, MomentField } from "../configurations/index.js";
import type { CifVersion } from "../files/index.js";
import type { Cell, SpaceGroup } from "../spacegroups/index.js";
import type { Weighing } from "../weighing/index.js";
import type { DecomposedFile } from "./building/decompose.js";
import type { NamedSite, ParentSites } from "./building/parent-sites.js";
import type { WeighedInput } from "./building/weigh.js";
import type { AnyConfiguration, ConfigurationsRecord } from "./records/configurations.js";
import type { DecomposeRecord } from "./records/decompose.js";
import type { WeighRecord } from "./records/weigh.js";

/** Records whose making needs rooms that small commands must not load: they are loaded by the first call. */

export async function configurationsRecord(
  set: ConfigurationSet,
  cell: Cell | null,
  sites: ParentSites,
): Promise<ConfigurationsRecord> {
  return (await import("./building/configurations.js")).configurationsRecord(set, cell, sites);
}

/** The record of decomposed moments; its maker is loaded only when it is asked for. */
export async function decomposeRecord(
  group: SpaceGroup,
  cell: Cell,
  source: DecomposedFile,
  moments: GivenMoments,
  field: MomentField,
  found: Decomposition,
  sites: readonly NamedSite[],
): Promise<DecomposeRecord> {
  const { decomposeRecord: made } = await import("./building/decompose.js");
  return made(group, cell, source, moments, field, found, sites);
}

/** The ranking of configurations by intensities. */
export async function weighRecord(input: WeighedInput, found: Weighing): Promise<WeighRecord> {
  return (await import("./building/weigh.js")).weighRecord(input, found);
}

/** One configuration as a magnetic CIF, with the moments of its fit where `weigh` has one; null without a cell. */
export async function configurationCif(
  record: ConfigurationsRecord,
  one: AnyConfiguration,
  version: CifVersion,
  weigh: WeighRecord | null = null,
): Promise<string | null> {
  const made = await import("./magnetic-cif-of.js");
  return made.configurationCif(record, one, version, weigh && made.fittedMoments(weigh, one.id));
}
