import {
  type Configuration,
  type ConfigurationOptions,
  type ConfigurationSet,
  configurationsOf,
} from "@kvane/core/configurations";
import { smallIrreps } from "@kvane/core/irreps";
import { parseWaveVector, placeWaveVector } from "@kvane/core/kvectors";
import { identifyMagneticGroup } from "@kvane/core/magneticgroups";
import { type SiteModes, siteModes } from "@kvane/core/modes";
import { type Cell, parseCell, siteOrbit } from "@kvane/core/spacegroups";
import { groupOf } from "./parsed-groups.js";
import { site } from "./written.js";

export interface Listed {
  readonly set: ConfigurationSet;
  readonly modes: readonly SiteModes[];
}

/** The list of configurations with everything given as text; sites `Mn: 0 0 0`. */
export async function listed(
  groupText: string,
  kText: string,
  sites: readonly string[],
  options: ConfigurationOptions & { readonly cell?: string } = {},
): Promise<Listed> {
  const group = groupOf(groupText);
  const cell: Cell | null = options.cell === undefined ? null : parseCell(options.cell);
  const irreps = smallIrreps(group, placeWaveVector(group, parseWaveVector(kText)).k);
  const modes = sites.map((text) => {
    const [label = "", position = ""] = text.split(":");
    return siteModes(group, irreps, siteOrbit(group, site(label, position), cell));
  });
  return { set: await configurationsOf(group, irreps, modes, cell, options), modes };
}

export function bnsNumber(configuration: Configuration): string {
  return identifyMagneticGroup(configuration.magneticGroup).name.bns.number;
}

export function numbersOf({ set }: Listed): string[] {
  return set.configurations.map(bnsNumber);
}
