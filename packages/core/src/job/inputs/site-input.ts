import { fail, KvaneError, type Problem, problem } from "../../errors/index.js";
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

/** A site as it was written, with where, and its ion if the study names one. */
export interface GivenSite {
  readonly given: Given;
  readonly site: Site;
  readonly ion: string | null;
}

/** The sites of the options or of the study; throws the problems of all of them at once. */
export function writtenSites(work: Work): GivenSite[] {
  const sites = sitesIfGiven(work);
  if (sites.length > 0) return sites;
  if (work.study !== null)
    fail("missing-key", "the study has no sites", {
      where: { file: work.study.file, path: "sites" },
      expected: "a list such as `sites: [{label: Fe1, ion: Fe3+, at: [0, 0, 0]}]`",
      found: "none",
      remedy: `add the sites to the study${orOption(work.request, "--site")}`,
    });
  return fail("missing-argument", "no site was given", {
    where: { argument: "--site" },
    expected: '--site "LABEL x y z", such as --site "Fe 0 0 1/2"',
    found: "nothing",
    remedy: "give --site, once for each site",
  });
}

/** The same without the demand that there is one. */
export function sitesIfGiven({ request, study }: Work): GivenSite[] {
  const options = request.sites ?? [];
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
      return () => ({ given, site: readingGiven(given, () => parseSite(text)), ion: null });
    }),
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

function rememberMove(work: Work, { label, position, snapped }: SiteOrbit, cell: Cell | null): void {
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
