import type { CheckedSiteRecord, CheckRecord } from "../records/check.js";
import { fields, paragraph, section, table } from "./layout.js";
import { cellText, counted, groupText, kText, positionText } from "./names.js";

export function checkText(record: CheckRecord): string[] {
  return [
    ...section(
      record.title ?? "Study",
      fields([
        ["Group", record.group ? groupText(record.group) : "not given"],
        ["Cell", record.cell ? cellText(record.cell) : "not given"],
        ["k", record.k.length > 0 ? record.k.map(kText).join("; ") : "to be searched for"],
        ["Peaks", record.peaks ? `${record.peaks.count} (${record.peaks.kind}) in ${record.peaks.file}` : "not given"],
      ]),
    ),
    ...section(`Sites (${record.sites.length})`, siteTable(record.sites)),
    ...section(
      "Result",
      record.missing.length === 0
        ? paragraph("Nothing is missing: kvane run can do the whole job.")
        : [
            ...paragraph("Incomplete: what is there is right, but kvane run needs more."),
            ...record.missing.flatMap((text) => paragraph(`Missing: ${text}.`)),
          ],
    ),
  ];
}

function siteTable(sites: readonly CheckedSiteRecord[]): string[] {
  if (sites.length === 0) return [];
  return table(
    [
      { title: "label" },
      { title: "ion" },
      { title: "position" },
      { title: "in the cell", align: "right" },
      { title: "symmetry" },
      { title: "free" },
    ],
    sites.map((site) => [
      site.label,
      site.ion ?? "–",
      `${positionText(site.position)}${site.snapped ? " moved" : ""}`,
      counted(site.multiplicity, "atom"),
      site.siteSymmetry,
      `(${site.freeCoordinates.join(", ")})`,
    ]),
  );
}
