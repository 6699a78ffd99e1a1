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
  const fit = ["rank", "configuration", "chi_squared", "reduced_chi_squared", "r_factor", "parameters", "criterion"];
  const datum = ["label", "lines", "q_inverse_angstrom", "two_theta_deg"];
  return csvText(
    [
      ...fit,
      ...datum,
      "h_satellite",
      "k_satellite",
      "l_satellite",
      "holds",
      "polarization",
      "observed",
      "su",
      "calculated",
    ],
    record.ranking.flatMap((one) =>
      record.data.list.map(
        ({ label, lines, q, twoThetaDeg, hkl, holds, polarization, observed, su }, index): CsvCell[] => [
          one.rank,
          one.id,
          one.chiSquared,
          one.reducedChiSquared,
          one.rFactor,
          one.parameters,
          one.criterion,
          label,
          lines.join("; "),
          q,
          twoThetaDeg,
          ...(hkl ?? [null, null, null]),
          holds,
          polarization,
          observed,
          su,
          one.calculated[index] ?? null,
        ],
      ),
    ),
  );
}

/** The fitted moments, one row an atom of the primitive cell and configuration: in the cell at the origin, and S of each arm. */
export function fittedMomentsCsv({ ranking, relative }: WeighRecord): string {
  const waves = Math.max(
    0,
    ...ranking.flatMap(({ moments }) => moments.map(({ fourierCrystal }) => fourierCrystal.length)),
  );
  const components = Array.from({ length: waves }, (_, wave) =>
    ["a", "b", "c"].flatMap((axis) => [`S${wave + 1}_${axis}_re`, `S${wave + 1}_${axis}_im`]),
  ).flat();
  const unit = relative ? "relative" : "mu_B";
  return csvText(
    [
      "rank",
      "configuration",
      "unit",
      "atom",
      "x",
      "y",
      "z",
      "m_a",
      "m_b",
      "m_c",
      "largest",
      "largest_su",
      "limit",
      ...components,
    ],
    ranking.flatMap((one) =>
      one.moments.map((moment): CsvCell[] => [
        one.rank,
        one.id,
        unit,
        moment.label,
        ...moment.position,
        ...moment.momentCrystal,
        moment.largest,
        moment.largestSu,
        moment.limit,
        ...moment.fourierCrystal.flat(2),
      ]),
    ),
  );
}
