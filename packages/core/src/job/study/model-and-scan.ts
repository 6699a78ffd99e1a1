import { fail } from "../../errors/index.js";
import type { WaveVector } from "../../kvectors/index.js";
import type { ExchangeRecord, OnsetRecord } from "../../reports/index.js";
import type { Cell, SiteOrbit, SpaceGroup } from "../../spacegroups/index.js";
import { studyText } from "../inputs/given.js";
import { sitesIfGiven } from "../inputs/site-input.js";
import type { Work } from "../work.js";

/** What the temperature scan of the study says, or null where it names none; loaded only where it does. */
export async function onsetIfGiven(work: Work): Promise<OnsetRecord | null> {
  if (!work.study?.onset) return null;
  return (await import("../commands/onset.js")).onsetCommand(work);
}

/** Bonds have lengths: that a cell is missing is said before the work, not after it. */
export function needCellForExchange({ study }: Work, cell: Cell | null): void {
  if (cell !== null || study === null || (study.exchange ?? []).length === 0) return;
  fail("missing-key", "the exchange constants of the study need a cell, and it has none", {
    where: studyText(study, "exchange", "").where,
    expected: "a line such as `cell: {a: 10.21, b: 6.05, c: 4.71, alpha: 90, beta: 90, gamma: 90}`",
    found: "no `cell`",
    remedy: "add the cell to the study, or take `exchange` out",
  });
}

/** Whether the bonds and ranges of the study are there, for `kvane check`; nothing is computed from them. */
export async function checkExchange(
  work: Work,
  group: SpaceGroup | null,
  cell: Cell | null,
  orbits: readonly SiteOrbit[],
): Promise<void> {
  if ((work.study?.exchange ?? []).length === 0) return;
  if (group !== null && orbits.length > 0) needCellForExchange(work, cell);
  if (group === null || cell === null || orbits.length === 0) return;
  const [{ bondsFor }, { constantsOf, rangesOf }] = await Promise.all([
    import("../inputs/exchange-bonds.js"),
    import("../inputs/exchange-input.js"),
  ]);
  const [sites, constants, ranges] = [await sitesIfGiven(work), constantsOf(work), rangesOf(work)];
  await bondsFor(group, cell, orbits, { sites, constants, ranges, shells: null });
}

/** What the exchange constants of the study prefer, and the energies at the k that the job follows; null without any. */
export async function exchangeIfGiven(work: Work, ks: readonly WaveVector[]): Promise<ExchangeRecord | null> {
  if ((work.study?.exchange ?? []).length === 0) return null;
  return (await import("../commands/exchange.js")).exchangeCommand(work, ks);
}
