import type { WaveVector } from "../../kvectors/index.js";
import type { ExchangeRecord, OnsetRecord } from "../../reports/index.js";
import type { Work } from "../work.js";

/** What the temperature scan of the study says, or null where it names none; loaded only where it does. */
export async function onsetIfGiven(work: Work): Promise<OnsetRecord | null> {
  if (!work.study?.onset) return null;
  return (await import("../commands/onset.js")).onsetCommand(work);
}

/** What the exchange constants of the study prefer, and the energies at the k that the job follows; null without any. */
export async function exchangeIfGiven(work: Work, ks: readonly WaveVector[]): Promise<ExchangeRecord | null> {
  if ((work.study?.exchange ?? []).length === 0) return null;
  return (await import("../commands/exchange.js")).exchangeCommand(work, ks);
}
