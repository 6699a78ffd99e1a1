import type { DecomposeRecord, IrrepPartRecord } from "../records/decompose.js";
import { fields, paragraph, section, table } from "./layout.js";
import { cellText, decimals, groupText, kForm, plain } from "./names.js";

export function decomposeText(record: DecomposeRecord): string[] {
  const { magneticGroup: group, recognised } = record;
  return [
    ...section(
      "Moments",
      fields([
        ["File", record.block === null ? record.file : `${record.file}, block ${record.block}`],
        ["Parent", groupText(record.group)],
        ["Cell", cellText(record.cell)],
        ["Axes of the file", `(${record.childFromParent}) of the parent`],
        ...record.moments.map(momentField),
        [
          "Furthest atom",
          `${plain(Number(record.furthest.toPrecision(2)))} Å from its parent site${record.furthest > farAtom ? ": is it the right parent, axes and origin?" : ""}`,
        ],
      ]),
    ),
    ...section(
      "Irreps",
      table(
        [
          { title: "k" },
          { title: "irrep" },
          { title: "share / %", align: "right" },
          { title: "site" },
          { title: "amplitudes, copy by copy, partner by partner, μB/Å" },
        ],
        record.parts.flatMap(partRows),
      ),
    ),
    ...section(
      "Magnetic group",
      fields([
        [
          "Of these moments",
          `${group.bns.symbol}, BNS ${group.bns.number}, OG ${group.og.number}, point group ${group.pointGroup}`,
        ],
        ["To the BNS setting", `(${group.toBns}) from the parent's axes`],
        ...(record.block === null ? [] : [inFileField(record)]),
      ]),
    ),
    ...section(
      "Configuration",
      recognised === null
        ? paragraph(
            `None of those that ${record.primary.irreps.join(" and ")} of k = ${kForm(record.primary.k)} give (${record.listed.join(", ") || "no list"}): more than one order parameter, or moments that rounding makes less symmetric.`,
          )
        : fields([
            ["Configuration", `${recognised.id}, direction ${recognised.direction}`],
            ["Listed for", listedFor(record.primary)],
            ["Domain", domainText(recognised.operator)],
          ]),
    ),
  ];
}

/** An operator that moves nothing is the listed domain. */
function domainText(operator: string): string {
  return operator === "x,y,z,+1" ? "the listed one itself" : `the listed one moved by ${operator}`;
}

/** Ids are those of one list: of this k (another arm has the same list in other axes) and of these arms together. */
function listedFor({ k, arms }: DecomposeRecord["primary"]): string {
  return `k = ${kForm(k)}${arms.length > 1 ? `, arms ${[...arms].sort((a, b) => a - b).join(", ")} together` : ""}`;
}

/** What the file calls its group, and what its operators are. */
function inFileField({ declared, magneticGroup: group }: DecomposeRecord): [string, string] {
  return [
    "In the file",
    `${declared.bns === null ? "not named" : `BNS ${declared.bns}`}; its operators are BNS ${declared.operators}${declared.operators === group.bns.number ? "" : ". That is another group: either the moments have more symmetry than the file lists, or they break some of it"}`,
  ];
}

/** Å. Distortions below the ordering temperature rarely move an atom further. */
const farAtom = 0.1;

function momentField({ site, ion, largest, limit, verdict }: DecomposeRecord["moments"][number]): [string, string] {
  const size = `${decimals(largest, 2)} μB at most`;
  if (limit === null || verdict === null) return [`Moment of ${site}`, size];
  const words = {
    "beyond the ion": "more than the free ion has: check scale and form factor",
    usual: "as usual for the ion",
    low: "low for the ion: zero-point motion and covalency rarely take more than half",
  }[verdict];
  return [`Moment of ${site}`, `${size}, ${ion ?? "the ion"} can have ${decimals(limit, 2)}: ${words}`];
}

function partRows({ k, label, share, arms }: IrrepPartRecord): string[][] {
  return arms
    .flatMap((arm, index) =>
      arm.sites.map((site, place) => [
        place === 0 ? kForm(arm.k) : "",
        index + place === 0 ? label : "",
        index + place === 0 ? decimals(100 * share, 2) : "",
        site.label,
        site.amplitudes
          .map(([re, im]) => (im === 0 ? short(re) : `${short(re)}${im < 0 ? "-" : "+"}${short(Math.abs(im))}i`))
          .join(", ") || "–",
      ]),
    )
    .concat(arms.length === 0 ? [[kForm(k), label, decimals(100 * share, 2), "", ""]] : []);
}

function short(value: number): string {
  return plain(Number(value.toFixed(4)));
}
