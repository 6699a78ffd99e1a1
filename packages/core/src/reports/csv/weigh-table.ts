import type { WeighRecord } from "../records/weigh.js";
import { type CsvCell, csvText } from "./csv-text.js";

/** One row for each intensity of each candidate, best candidate first. */
export function weighCsv(record: WeighRecord): string {
  const header = ["rank", "configuration", "chi_squared", "parameters", "criterion", "label", "q_inverse_angstrom"];
  return csvText(
    [...header, "h", "k_index", "l", "observed", "su", "calculated"],
    record.ranking.flatMap((one, rank) =>
      record.data.list.map(({ label, q, hkl, observed, su }, index): CsvCell[] => [
        rank + 1,
        one.id,
        one.chiSquared,
        one.parameters,
        one.criterion,
        label,
        q,
        ...(hkl ?? [null, null, null]),
        observed,
        su,
        one.calculated[index] ?? null,
      ]),
    ),
  );
}
