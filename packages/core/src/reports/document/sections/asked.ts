import { cellText, groupText, plain, positionText } from "../../text/names.js";
import { peakKindNames } from "../../text/search-text.js";
import { type DocumentSection, fieldsBlock, tableBlock } from "../blocks.js";
import type { DocumentSource } from "../run-document.js";

/** What was asked, and what was known. */
export function askedSection({ record }: DocumentSource): DocumentSection {
  const { peaks } = record;
  const sites = record.branches[0]?.modes.sites ?? [];
  const given = record.search?.certificate === null || record.search === null;
  return {
    id: "asked",
    title: "What was asked",
    parts: [],
    blocks: [
      ...fieldsBlock([
        ["Question", given ? "what the given k allows" : "which k explains the peaks, and what that k allows"],
        ["Group", groupText(record.group)],
        ...(record.cell ? [["Cell", cellText(record.cell)] as const] : []),
        ...(peaks
          ? [
              [
                "Peaks",
                `${peaks.list.length} as ${peakKindNames[peaks.kind]}${peaks.file ? `, from ${peaks.file}` : ""}`,
              ] as const,
              ...(peaks.wavelengthAngstrom === null
                ? []
                : [["Wavelength", `${plain(peaks.wavelengthAngstrom)} Å`] as const]),
              ["Uncertainties", peaks.uncertaintySource] as const,
            ]
          : []),
      ]),
      ...tableBlock(
        "Sites that can carry moments",
        ["site", "position", ">atoms in the cell", "site symmetry"],
        sites.map((site) => [site.label, positionText(site.position), String(site.multiplicity), site.siteSymmetry]),
      ),
    ],
  };
}
