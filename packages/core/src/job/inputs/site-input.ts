import { fail, KvaneError, type Problem, problem } from "../../errors/index.js";
import type { CifStructure } from "../../files/index.js";
import { formatRational, type Rational, toNumber } from "../../numbers/index.js";
import {
  type Cell,
  parseSite,
  type Site,
  type SiteOrbit,
  type SpaceGroup,
  siteOrbit,
} from "../../spacegroups/index.js";
import { remember, type Work } from "../work.js";
import { type Given, orOption, readingGiven, studyText } from "./given.js";
import { structureFor, throwPart } from "./structure-notes.js";

/** A site as it was written, with where, and its ion if the study names one. */
export interface GivenSite {
  readonly given: Given;
  readonly site: Site;
  readonly ion: string | null;
}

/** The sites of the options, of the study or of the CIF; throws the problems of all of them at once. */
export async function writtenSites(work: Work): Promise<GivenSite[]> {
  const sites = await sitesIfGiven(work);
  if (sites.length > 0) return sites;
  if (work.study !== null)
    fail("missing-key", "the study has no sites", {
      where: { file: work.study.file, path: "sites" },
      expected: "a list such as `sites: [{label: Fe1, ion: Fe3+, at: [0, 0, 0]}]`",
      found: "none",
      remedy: `add the sites to the study${orOption(work.request, "sites")}`,
    });
  return fail("missing-argument", "no site was given", {
    where: { argument: "--site" },
    expected: '--site "LABEL x y z", such as --site "Fe 0 0 1/2"',
    found: "nothing",
    remedy: "give --site, once for each site",
  });
}

/** The same without the demand that there is one. */
export async function sitesIfGiven(work: Work): Promise<GivenSite[]> {
  const { request, study } = work;
  const options = request.sites ?? [];
  const structure = structureFor(work, "sites", options.length === 0 && (study?.sites ?? []).length > 0);
  if (options.length === 0 && structure !== null) return sitesOfStructure(work, structure);
  if (options.length === 0)
    return (study?.sites ?? []).map((site, index) => ({
      given: studyText(study as NonNullable<typeof study>, `sites[${index}]`, ""),
      site: { label: site.label, position: site.position },
      ion: site.ion,
    }));
  return collected(
    options.map((option, index) => {
      const text = option.trim();
      const where = { argument: "--site", path: options.length > 1 ? `sites[${index}]` : null };
      const given = { text, where, verbatim: false };
      return () => siteOfStructure(structure, given) ?? ownSite(given);
    }),
  );
}

function ownSite(given: Given): GivenSite {
  return { given, site: readingGiven(given, () => parseSite(given.text)), ion: null };
}

/** `--site LABEL` beside a CIF is a site of the CIF; null where the text is no lone label. */
function siteOfStructure(structure: CifStructure | null, given: Given): GivenSite | null {
  if (structure === null || given.text === "" || /\s/.test(given.text)) return null;
  throwPart(structure.problems.sites);
  const found = structure.sites.find(({ label }) => label === given.text);
  if (found?.position)
    return { given, site: { label: found.label, position: found.position }, ion: found.ion?.text ?? null };
  const labels = structure.sites.map(({ label }) => label);
  return fail("invalid-site", `the CIF has no site \`${given.text}\`${found ? " with coordinates" : ""}`, {
    where: given.where,
    expected: labels.length > 0 ? `one of ${labels.slice(0, 20).join(", ")}` : "a CIF with sites",
    found: given.text,
    remedy: "name a site of the CIF, or write LABEL x y z",
  });
}

/** The sites of a CIF that may carry moments; a CIF without sites is no fault of a command that can do without. */
async function sitesOfStructure(work: Work, structure: CifStructure): Promise<GivenSite[]> {
  throwPart(structure.problems.sites);
  const ownGroup = typeof work.request.group !== "string";
  const group = ownGroup ? (structure.symmetry?.group ?? null) : null;
  const { magneticSitesOf } = await import("../../files/index.js");
  const { sites, assumed, warnings } = await magneticSitesOf(structure, group, structure.cell?.cell ?? null);
  remember(work, assumed, warnings);
  return sites.flatMap(({ label, position, ion, place }) =>
    position
      ? [{ given: { text: label, where: place, verbatim: false }, site: { label, position }, ion: ion?.text ?? null }]
      : [],
  );
}

/** The orbits of the sites; moves onto special positions are remembered, sites on one orbit are refused. */
export function orbitsOf(work: Work, group: SpaceGroup, sites: readonly GivenSite[], cell: Cell | null): SiteOrbit[] {
  const orbits = collected(
    sites.map(
      ({ given, site }) =>
        () =>
          readingGiven(given, () => siteOrbit(group, site, cell)),
    ),
  );
  refuseTwice(sites, orbits);
  for (const orbit of orbits) rememberMove(work, orbit, cell);
  return orbits;
}

export function rememberMove(work: Work, { label, position, snapped }: SiteOrbit, cell: Cell | null): void {
  if (snapped === null) return;
  const distance = snapped.distanceAngstrom;
  const far = cell === null || distance === null ? "" : ` ${Number(distance.toPrecision(2))} Å away`;
  remember(
    work,
    [
      {
        what: `position of ${label}`,
        value: `(${position.map(formatRational).join(", ")})`,
        because: `the given (${snapped.from.map(asWritten).join(", ")}) lies${far} beside this special position`,
      },
    ],
    [],
  );
}

/** A coordinate as it was probably typed: a decimal where it is one exactly. */
function asWritten(value: Rational): string {
  const decimal = String(toNumber(value));
  return value[1] > 24 && decimal.length <= 12 && /^-?[\d.]+$/.test(decimal) ? decimal : formatRational(value);
}

/** Two labels alike, or two sites whose orbits share an atom. */
function refuseTwice(sites: readonly GivenSite[], orbits: readonly SiteOrbit[]): void {
  const problems: Problem[] = [];
  orbits.forEach((orbit, index) => {
    const first = orbits.findIndex((other) => other.label === orbit.label || shareAtom(other, orbit));
    if (first === index) return;
    const other = orbits[first]?.label ?? "";
    problems.push(
      problem(
        "duplicate-site",
        other === orbit.label ? `two sites are called ${other}` : `${orbit.label} stands on the orbit of ${other}`,
        {
          where: sites[index]?.given.where ?? {},
          expected: "each orbit once, under a label of its own",
          found: sites[index]?.given.text || orbit.label,
          remedy: "leave one of them out",
        },
      ),
    );
  });
  if (problems.length > 0) throw new KvaneError(problems);
}

function shareAtom(a: SiteOrbit, b: SiteOrbit): boolean {
  const text = (position: SiteOrbit["position"]) => position.map(formatRational).join(" ");
  return b.positions.some((position) => text(position) === text(a.position));
}

/** Runs all, and throws the problems of all at once. */
function collected<T>(actions: readonly (() => T)[]): T[] {
  const problems: Problem[] = [];
  const results = actions.flatMap((action) => {
    try {
      return [action()];
    } catch (error) {
      if (!(error instanceof KvaneError)) throw error;
      problems.push(...error.problems);
      return [];
    }
  });
  if (problems.length > 0) throw new KvaneError(problems);
  return results;
}
