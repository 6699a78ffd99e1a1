import type { OverlapRecord, SatelliteRecord, SatellitesRecord } from "../records/satellites.js";
import type { LineRecord } from "../records/search.js";
import { fields, paragraph, section, table, unbroken } from "./layout.js";
import { cellText, counted, decimals, groupText, kText, plain } from "./names.js";

export function satellitesText(record: SatellitesRecord): string[] {
  return [
    ...section(
      "Wave vector and cell",
      fields([
        ["Group", groupText(record.group)],
        ["Cell", cellText(record.cell)],
        ["k", kText(record.k)],
        ["Q up to", `${plain(record.qMax)} Å⁻¹`],
        ...(record.wavelengthAngstrom === null
          ? []
          : [["Wavelength", `${plain(record.wavelengthAngstrom)} Å`] as const]),
      ]),
    ),
    ...section(
      `Satellites (${counted(record.reflections.length, "line")})`,
      satelliteTable(record.reflections, record),
      [""],
      paragraph(
        `Lines that symmetry makes equal stand once. n: vectors of one single-k domain; n(star): over all arms. On it: nuclear lines that are not extinct within ${plain(record.overlapWithin)} Å⁻¹, and images of nuclear lines through half the wavelength.${extinctionText(record)}`,
      ),
    ),
  ];
}

/** The table alone, also for a shortened list. */
export function satelliteTable(reflections: readonly SatelliteRecord[], record: SatellitesRecord): string[] {
  const angles = record.wavelengthAngstrom !== null;
  const extinctions = hasExtinctions(record);
  return table(
    [
      { title: "H ± k" },
      { title: "Q / Å⁻¹", align: "right" },
      { title: "d / Å", align: "right" },
      ...(angles ? [{ title: "2θ / °", align: "right" as const }] : []),
      { title: "n", align: "right" },
      { title: "n(star)", align: "right" },
      ...(extinctions ? [{ title: "zero for" }] : []),
      { title: "on it" },
    ],
    reflections.map((line) => [
      lineText(line),
      decimals(line.q, 5),
      decimals(line.d, 4),
      ...(angles ? [decimals(line.twoThetaDeg, 3)] : []),
      String(line.multiplicity),
      String(line.multiplicityAllArms),
      ...(extinctions ? [extinctText(line)] : []),
      overlapsText(line),
    ]),
  );
}

/** Whether an irrep on the sites makes a line zero. */
export function hasExtinctions({ reflections }: SatellitesRecord): boolean {
  return reflections.some(({ extinctFor }) => (extinctFor ?? []).length > 0);
}

/** What the column means, or that it would be empty. */
export function extinctionText(record: SatellitesRecord): string {
  if (hasExtinctions(record))
    return " Zero for: irreps that give the line no intensity, whatever their amplitudes are.";
  const asked = record.reflections.some(({ extinctFor }) => extinctFor !== null);
  return asked ? " No irrep on the sites makes a whole line zero." : "";
}

/** The irreps that make the line zero. */
export function extinctText({ extinctFor }: SatelliteRecord): string {
  return (extinctFor ?? []).join(", ");
}

/** Names on a line; the JSON has more of them. */
const shownOverlaps = 3;

/** What lies on a satellite and is not extinct: nuclear lines first, then the nearest. */
export function overlapsText({ overlaps, moreOverlaps }: SatelliteRecord): string {
  const allowed = overlaps.filter((one) => one.allowed);
  // A nuclear line matters more than any image of one.
  const rank = (one: OverlapRecord) => (one.with === "nuclear" ? 0 : 1);
  const shown = [...allowed]
    .sort((a, b) => rank(a) - rank(b) || Math.abs(a.separation) - Math.abs(b.separation))
    .slice(0, shownOverlaps);
  const more = allowed.length - shown.length + moreOverlaps;
  return `${shown.map(overlapText).join(", ")}${more > 0 ? ` ${unbroken(`and ${more} more`)}` : ""}`;
}

/** `(1 0 -1) + k`; the sign says which satellite of H it is. */
export function lineText(line: Pick<LineRecord, "h" | "sign">): string {
  return unbroken(`(${line.h.join(" ")}) ${line.sign < 0 ? "−" : "+"} k`);
}

export function overlapText(overlap: OverlapRecord): string {
  const name = overlap.with === "nuclear" ? "nuclear" : "λ/2 of";
  return unbroken(`${name} (${overlap.h.join(" ")})`);
}
