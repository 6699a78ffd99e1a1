import { formatRational, type RationalVector, toNumber } from "../../numbers/index.js";
import type { Cell, SiteOrbit, SpaceGroup } from "../../spacegroups/index.js";
import { cellParameters } from "./cell.js";
import { groupText } from "./group-text.js";
import { orbitOf, ownerOf } from "./magnetic-sites.js";
import { momentChance, momentReason } from "./moments.js";
import type { CifSite } from "./sites.js";
import type { CifStructure } from "./structure.js";

/** A site of the draft. */
export interface DraftSite {
  readonly site: CifSite;
  readonly orbit: SiteOrbit | null;
  /** Whether it stands in the draft as a site, not as a comment. */
  readonly active: boolean;
  /** Why, in words. */
  readonly because: string;
}

/** The text of a study to start from, with what it holds. */
export interface StudyDraft {
  readonly text: string;
  readonly sites: readonly DraftSite[];
}

/** So many sites are written out of each sort; a study is a page. */
const writtenSites = 100;

/**
 * A commented study file (YAML) with the group, cell and sites of a CIF: sites that are likely to carry a moment as
 * sites, all others as comments to choose from, and what is to be filled in. All text of the CIF is quoted or kept
 * within a comment.
 *
 * @param notes sentences that belong to the draft: warnings and assumptions
 */
export function draftStudy(
  structure: CifStructure,
  group: SpaceGroup,
  cell: Cell | null,
  notes: readonly string[],
): StudyDraft {
  const sites = draftSites(structure, group, cell);
  const lines = [
    `# Drafted by kvane from ${comment(structure.file.replace(/^.*[\\/]/, ""))}, data block ${comment(structure.block)}. Lines behind # are notes, and choices`,
    "# that are left to you. `kvane check` says what is wrong or missing; `kvane help study-file` shows the keys.",
    ...notes.map((text) => `# Note: ${comment(text)}`),
    `title: ${scalar(structure.title ?? structure.block)}  # add the temperature`,
    "",
    `# From the ${comment(structure.symmetry?.source ?? "CIF")} of the CIF.`,
    `group: ${scalar(groupText(group))}`,
    ...cellLines(structure, cell),
    "",
    ...siteLines(sites),
    "",
    "# The wave vector, if it is known. Without it, it is searched for in the peaks.",
    "# k: [[0, 0, 1/2]]",
    "",
    "# The satellite peaks: write a list with one position a row, fill in its name and what the positions are",
    "# (d, q, two-theta or hkl; two-theta needs the wavelength in Å), and remove the #.",
    "# peaks: {file: satellites.csv, as: two-theta, wavelength: 2.41}",
  ];
  return { text: `${lines.join("\n")}\n`, sites };
}

function cellLines({ cell: written }: CifStructure, cell: Cell | null): string[] {
  if (cell === null) return ["# cell: {a: , b: , c: , alpha: 90, beta: 90, gamma: 90}  # the CIF has none"];
  const values = cellParameters.map((name) => `${name}: ${cell[name]}`).join(", ");
  const uncertain = written !== null && cellParameters.some((name) => written.uncertainties[name] !== null);
  const shown = written && cellParameters.map((name) => comment(written.written[name])).join(" ");
  return [...(uncertain ? [`# Å and degrees; in the CIF ${shown}.`] : ["# Å and degrees."]), `cell: {${values}}`];
}

const sharedOrbit = "stands on the orbit of";

function draftSites({ sites }: CifStructure, group: SpaceGroup, cell: Cell | null): DraftSite[] {
  const taken = new Map<string, string>();
  let active = 0;
  let passive = 0;
  return sites.flatMap((site): DraftSite[] => {
    const likely = momentChance(site.ion) === "likely" && site.position !== null;
    if ((likely ? active : passive) >= writtenSites) return [];
    const orbit = orbitOf(site, group, cell);
    const owner = likely && orbit ? ownerOf(orbit, taken) : null;
    const shared = owner === null ? null : `${sharedOrbit} ${owner}`;
    if (likely && shared === null) active += 1;
    else passive += 1;
    const reason = site.position === null ? "has no coordinates" : (shared ?? momentReason(site.ion));
    return [{ site, orbit, active: likely && shared === null, because: reason }];
  });
}

function siteLines(sites: readonly DraftSite[]): string[] {
  const active = sites.filter((one) => one.active);
  const shared = sites.filter((one) => !one.active && one.because.startsWith(sharedOrbit));
  const asked = sites.filter((one) => !one.active && !shared.includes(one) && momentChance(one.site.ion) !== "none");
  const others = sites.filter((one) => !one.active && one.site.position !== null);
  const placeless = sites.filter((one) => !one.active && one.site.position === null && !asked.includes(one));
  const lines = (list: readonly DraftSite[], mark: string) => list.map((one) => `${mark}  - ${siteText(one)}`);
  return [
    ...(active.length > 0
      ? ["# Sites that mostly carry a moment, by their elements alone: a guess. `spin: 5/2` may be added.", "sites:"]
      : ["# No site is likely to carry a moment, by its element alone. Remove the # of those that do.", "# sites:"]),
    ...lines(active, ""),
    ...(asked.length > 0 ? ["# Do these carry a moment? Remove the # if so. They stand below too."] : []),
    ...lines(asked, "#"),
    ...(shared.length > 0
      ? [
          "# A site has one line above: of several ions on it, put the one whose moment counts there. All stand below too.",
        ]
      : []),
    ...(others.length > 0 ? ["", "# The other atoms, for the files that are written.", "atoms:"] : []),
    ...lines(others, ""),
    ...(placeless.length > 0 ? ["# Without coordinates:"] : []),
    ...lines(placeless, "#"),
  ];
}

function siteText({ site, orbit, because }: DraftSite): string {
  const ion = site.ion === null ? "" : `, ion: ${scalar(site.ion.text)}`;
  const at = site.position === null ? "" : `, at: [${coordinates(site, site.position, orbit)}]`;
  const moved = orbit?.snapped ? `; in the CIF ${site.written.map(comment).join(" ")}` : "";
  const place = orbit === null ? "" : `${orbit.multiplicity} in the cell, symmetry ${orbit.siteSymmetryClass}`;
  const share =
    site.occupancy === 1 || site.occupancy <= 0 || site.occupancy > 1 ? "" : `, occupancy: ${site.occupancy}`;
  const note = `${place}${moved}${place === "" ? "" : "; "}${because}`;
  return `{label: ${scalar(site.label)}${ion}${at}${share}}  # ${note}`;
}

/** The exact special position where the site was put on one, else the decimals as the CIF has them. */
function coordinates(site: CifSite, position: RationalVector, orbit: SiteOrbit | null): string {
  if (orbit?.snapped) return orbit.position.map(formatRational).join(", ");
  return position
    .map((value, index) => {
      const decimals = /\.(\d*)/.exec(site.written[index as 0 | 1 | 2])?.[1]?.length ?? 0;
      const exponent = /e/i.test(site.written[index as 0 | 1 | 2]);
      const text = toNumber(value).toFixed(Math.min(7, exponent ? 7 : decimals));
      return text.includes(".")
        ? text
            .replace(/(\.\d*?)0+$/, "$1")
            .replace(/\.$/, "")
            .replace(/^-0$/, "0")
        : text;
    })
    .join(", ");
}

/** One line without control characters. */
function comment(text: string): string {
  // biome-ignore lint/suspicious/noControlCharactersInRegex: they are taken out
  return text.replace(/[\u0000-\u001f\u007f-\u009f\u2028\u2029]+/g, " ").trim();
}

/** A text of YAML: plain where that is safe, else between double quotation marks (JSON is YAML). */
function scalar(text: string): string {
  const plain =
    /^[A-Za-z0-9][A-Za-z0-9_()+./'* -]*$/.test(text) && !/^(null|true|false|~)$/i.test(text) && !/ #| $/.test(text);
  return plain ? text : JSON.stringify(comment(text));
}
