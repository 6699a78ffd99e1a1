import { fail, placed } from "../../errors/index.js";
import {
  type BondTable,
  bondTable,
  type DiagramAxis,
  exchangeModel,
  farthestShell,
  type GivenCoupling,
} from "../../exchange/index.js";
import type { Cell, SiteOrbit, SpaceGroup } from "../../spacegroups/index.js";
import { argumentNames } from "../request.js";
import { together } from "../work.js";
import { axesOf, type GivenRange } from "./exchange-input.js";
import type { GivenSite } from "./site-input.js";

/** Shells that are listed where nobody says how many. */
const usualShells = 6;

/** The bonds as far as constants and ranges name them, and what runs; all that names no bonds is told at once. */
export async function bondsFor(
  group: SpaceGroup,
  cell: Cell,
  orbits: readonly SiteOrbit[],
  given: {
    readonly sites: readonly GivenSite[];
    readonly constants: readonly GivenCoupling[];
    readonly ranges: readonly GivenRange[];
    readonly shells: number | null;
  },
): Promise<{ readonly table: BondTable; readonly axes: readonly DiagramAxis[] }> {
  const { constants, ranges, shells } = given;
  const named = [...constants, ...ranges];
  const needed = farthestShell(named);
  const wanted = Math.max(shells ?? (needed > 0 ? needed : usualShells), needed);
  // Too many bonds are the fault of whatever asks for the farthest.
  const farthest = named.find((one) => farthestShell([one]) === wanted);
  const table = placed(farthest?.where ?? { argument: argumentNames.shells }, () =>
    bondTable(group, cell, orbits, { shells: wanted }),
  );
  refuseCloseAtoms(table, given.sites);
  const { axes } = await together({
    constants: () => exchangeModel(table, constants),
    axes: () => axesOf(table, ranges),
  });
  return { table, axes };
}

/** Å. Magnetic atoms nearer than this are one atom written twice, or split positions of one: no bond is so short. */
const shortestBondAngstrom = 0.5;

function refuseCloseAtoms({ shells }: BondTable, sites: readonly GivenSite[]): void {
  const [nearest] = shells;
  if (nearest === undefined || nearest.distance >= shortestBondAngstrom) return;
  const labels: readonly string[] = nearest.classes[0]?.labels ?? [];
  // The later of two sites is the one that was put on top.
  const site = sites.filter((one) => labels.includes(one.site.label)).at(-1);
  fail("invalid-site", `two magnetic atoms are ${nearest.distance.toPrecision(2)} Å apart`, {
    where: site?.given.where ?? {},
    expected: `at least ${shortestBondAngstrom} Å between magnetic atoms`,
    found: `atoms of ${[...new Set(labels)].join(" and ")}`,
    remedy: "give an atom once, and of split positions only one",
  });
}
