import { roundNumber } from "../../numbers/index.js";
import type { WeighPatternRecord, WeighRecord } from "../records/weigh.js";
import { type CsvCell, csvText } from "./csv-text.js";

/**
 * One row for each intensity of each candidate, best candidate first; where a pattern was asked for that pattern instead, a
 * column for each configuration.
 */
export function weighCsv(record: WeighRecord): string {
  return record.pattern === null ? rankingCsv(record) : patternCsv(record.pattern);
}

/** Intensity per degree against 2θ. */
export function patternCsv({ fromDeg, stepDeg, curves }: WeighPatternRecord): string {
  const steps = curves[0]?.intensities.length ?? 0;
  return csvText(
    ["two_theta_deg", ...curves.map(({ id }) => id)],
    Array.from({ length: steps }, (_, step): CsvCell[] => [
      roundNumber(fromDeg + step * stepDeg),
      ...curves.map(({ intensities }) => intensities[step] ?? null),
    ]),
  );
}

export function rankingCsv(record: WeighRecord): string {
  const header = ["rank", "configuration", "chi_squared", "parameters", "criterion", "label", "q_inverse_angstrom"];
  return csvText(
    [...header, "h", "k_index", "l", "holds", "polarization", "observed", "su", "calculated"],
    record.ranking.flatMap((one, rank) =>
      record.data.list.map(({ label, q, hkl, holds, polarization, observed, su }, index): CsvCell[] => [
        rank + 1,
        one.id,
        one.chiSquared,
        one.parameters,
        one.criterion,
        label,
        q,
        ...(hkl ?? [null, null, null]),
        holds,
        polarization,
        observed,
        su,
        one.calculated[index] ?? null,
      ]),
    ),
  );
}
