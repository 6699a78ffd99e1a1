import { type ConfigurationOptions, configurationsOf } from "@kvane/core/configurations";
import { smallIrreps } from "@kvane/core/irreps";
import { parseWaveVector, placeWaveVector } from "@kvane/core/kvectors";
import { siteModes } from "@kvane/core/modes";
import { parseGroup, parseSite, siteOrbit } from "@kvane/core/spacegroups";
import { processorTime } from "./clocks.js";
import { pairedRatios } from "./paired.js";
import type { Part, Row } from "./part.js";

interface Case {
  readonly what: string;
  readonly group: string;
  readonly k: string;
  readonly site: string;
  readonly options: ConfigurationOptions;
}

const cases: readonly Case[] = [
  {
    what: "P 6/m m m, k 0,0,1/2, general site",
    group: "P 6/m m m",
    k: "0,0,1/2",
    site: "Fe 0.11 0.23 0.31",
    options: {},
  },
  {
    what: "P m -3 m, k 1/2,0,0, three arms, site 0 0 0",
    group: "P m -3 m",
    k: "1/2,0,0",
    site: "Mn 0 0 0",
    options: { arms: "all" },
  },
  {
    what: "F m -3 m, k 1/2,1/2,1/2, four arms, site 0 0 0",
    group: "F m -3 m",
    k: "1/2,1/2,1/2",
    site: "Mn 0 0 0",
    options: { arms: "all" },
  },
];

/** The reference is short: so many of it are measured at once. */
const rounds = 10;

/** All configurations of a k, over the irreps and modes that they are made from. */
export const configurations: Part = {
  name: "configurations",
  measure: async ({ few }) => {
    const rows: Row[] = [];
    for (const one of cases) {
      const group = parseGroup(one.group);
      const { k } = placeWaveVector(group, parseWaveVector(one.k));
      const orbit = siteOrbit(group, parseSite(one.site), null);
      const made = () => {
        const irreps = smallIrreps(group, k);
        return { irreps, modes: [siteModes(group, irreps, orbit)] };
      };
      const { irreps, modes } = made();
      const listed = () => processorTime(() => configurationsOf(group, irreps, modes, null, one.options));
      const reference = async () =>
        (await processorTime(() => {
          for (let round = 0; round < rounds; round += 1) made();
        })) / rounds;
      await listed();
      await reference();
      const { ratios } = await pairedRatios(few, listed, reference);
      rows.push({ what: `configurations, ${one.what}`, over: "irreps and modes of the same", ratios });
    }
    return { rows, notes: [] };
  },
};
