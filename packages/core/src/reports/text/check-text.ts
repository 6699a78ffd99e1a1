import type { CheckedSiteRecord, CheckRecord, CifBlockRecord, CifRecord } from "../records/check.js";
import { fields, paragraph, section, table } from "./layout.js";
import { cellText, counted, groupText, kText, positionText } from "./names.js";

export function checkText(record: CheckRecord): string[] {
  if (record.cif) return cifText(record, record.cif);
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

function cifText(record: CheckRecord, cif: CifRecord): string[] {
  const blocks = record.blocks ?? [];
  const head = fields([
    ["Version", `CIF ${cif.version}`],
    ["Blocks", `${counted(blocks.length, "data block")}${blocks.length > 0 ? `: ${shortList(blocks)}` : ""}`],
    ["Content", `${counted(cif.items, "single item")}, ${counted(cif.loops, "loop")}`],
    ...(cif.block === null
      ? []
      : ([
          ["Read", cif.block],
          ["Group", record.group ? `${groupText(record.group)}, from the ${cif.symmetryFrom}` : "not given"],
          ["Cell", record.cell ? cellText(record.cell) : "not given"],
        ] as const)),
  ]);
  const hidden = (cif.siteCount ?? 0) - record.sites.length;
  const more = hidden > 0 ? paragraph(`${counted(hidden, "site")} more, without coordinates or not shown.`) : [];
  return [
    ...section(record.title ?? "CIF", head),
    ...(cif.block === null ? [] : section(`Sites (${cif.siteCount ?? 0})`, siteTable(record.sites), more)),
    ...(cif.block === null && cif.structures.length > 0 ? section("Structures", blockTable(cif.structures)) : []),
    ...section("Result", paragraph(resultOf(cif))),
  ];
}

function resultOf({ block, structures }: CifRecord): string {
  if (block !== null)
    return "The structure can be used: kvane study FILE.cif writes a study to start from, --structure FILE.cif takes it into every command.";
  const [first] = structures;
  return first === undefined
    ? "The grammar is right."
    : `The grammar is right. Choose a structure: --block ${first.block}`;
}

function shortList(names: readonly string[]): string {
  return names.length > 12 ? `${names.slice(0, 12).join(", ")} and ${names.length - 12} more` : names.join(", ");
}

function blockTable(structures: readonly CifBlockRecord[]): string[] {
  return table(
    [
      { title: "block" },
      { title: "compound" },
      { title: "sites", align: "right" },
      { title: "group" },
      { title: "cell" },
    ],
    structures.map(({ block, title, sites, group, cell }) => [
      block,
      title ?? "–",
      String(sites),
      group ? groupText(group) : "–",
      cell ? cellText(cell) : "–",
    ]),
  );
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
