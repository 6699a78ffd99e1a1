import type { ModesRecord } from "../records/modes.js";
import type { SatellitesRecord } from "../records/satellites.js";
import type { SearchRecord } from "../records/search.js";
import { type CsvCell, csvText } from "./csv-text.js";

/** One row a line. */
export function satellitesCsv(record: SatellitesRecord): string {
  const header = ["h", "k", "l", "sign", "arm", "q_inverse_angstrom", "d_angstrom", "two_theta_deg", "multiplicity"];
  return csvText(
    [...header, "multiplicity_all_arms", "overlaps"],
    record.reflections.map((line) => [
      ...line.h,
      line.sign,
      line.arm,
      line.q,
      line.d,
      line.twoThetaDeg,
      line.multiplicity,
      line.multiplicityAllArms,
      line.overlaps.map((one) => `${one.with} ${one.h.join(" ")}`).join("; "),
    ]),
  );
}

/** One row for each peak of each candidate; `h` to `residual` are empty where the peak is not matched. */
export function searchCsv(record: SearchRecord): string {
  const header = ["candidate", "k", "evidence", "peak", "position", "q_observed", "uncertainty"];
  return csvText(
    [...header, "h", "k_index", "l", "sign", "arm", "q_computed", "residual", "alternatives"],
    record.candidates.flatMap((candidate, index) => {
      const byPeak = new Map(candidate.assignments.map((one) => [one.peak, one]));
      return record.peaks.list.map((peak): CsvCell[] => {
        const found = byPeak.get(peak.index);
        const position = peak.position ?? (peak.hkl ?? []).join(" ");
        return [
          index,
          numericOr(candidate.k.numeric, candidate.k.components),
          candidate.evidence.value,
          peak.index,
          position,
          peak.q,
          peak.uncertainty,
          ...(found ? found.h : [null, null, null]),
          found?.sign ?? null,
          found?.arm ?? null,
          found?.q ?? null,
          found?.residual ?? null,
          found?.alternatives.length ?? null,
        ];
      });
    }),
  );
}

function numericOr(numeric: readonly number[] | null, components: readonly string[]): string {
  return (numeric ?? components).join(" ");
}

/** One row for each atom of each basis vector; numbers are empty while a letter of k is open. */
export function modesCsv(record: ModesRecord): string {
  const header = ["site", "irrep", "copy", "partner", "atom", "x", "y", "z", "exact_a", "exact_b", "exact_c"];
  return csvText(
    [...header, "re_a", "im_a", "re_b", "im_b", "re_c", "im_c"],
    record.sites.flatMap((site) =>
      site.irreps.flatMap((irrep) =>
        irrep.modes.flatMap((mode) =>
          site.orbit.map((position, atom): CsvCell[] => [
            site.label,
            irrep.label,
            mode.copy,
            mode.partner,
            atom,
            ...position,
            ...(mode.exact[atom] ?? []),
            ...(mode.moments?.[atom]?.flat() ?? [null, null, null, null, null, null]),
          ]),
        ),
      ),
    ),
  );
}
