import { type FormFactorRequest, type MagneticFormFactor, magneticFormFactor } from "../../diffraction/index.js";
import { fail, KvaneError, type Problem } from "../../errors/index.js";
import type { StudySite } from "../../files/index.js";
import { toNumber } from "../../numbers/index.js";
import type { NamedSite } from "../../reports/index.js";
import type { SiteOrbit } from "../../spacegroups/index.js";
import { type Given, readingGiven, studyText } from "../inputs/given.js";
import type { GivenSite } from "../inputs/site-input.js";
import type { Work } from "../work.js";

/**
 * The form factor of every magnetic site: of `--form-factor`, else the site's own in the study, else that of its ion. The
 * problems of all sites at once.
 */
export function formFactorsOf(
  work: Work,
  sites: readonly GivenSite[],
  magnetic: readonly NamedSite[],
): MagneticFormFactor[] {
  const asked = askedFactors(
    work,
    magnetic.map(({ orbit }) => orbit),
  );
  const problems: Problem[] = [];
  const factors = magnetic.map((named, index): MagneticFormFactor | null => {
    const given = sites[index] as GivenSite;
    try {
      return factorOf(work, named, given, asked.get(named.orbit.label) ?? null);
    } catch (error) {
      if (!(error instanceof KvaneError)) throw error;
      problems.push(...error.problems);
      return null;
    }
  });
  if (problems.length > 0) throw new KvaneError(problems);
  return factors.filter((one) => one !== null);
}

/** What `--form-factor` says of a site. */
interface AskedFactor {
  readonly request: { readonly ion: string } | { readonly constant: number };
  readonly given: Given;
}

function askedFactors({ request }: Work, orbits: readonly SiteOrbit[]): Map<string, AskedFactor> {
  const found = new Map<string, AskedFactor>();
  for (const option of request.formFactors ?? []) {
    const text = option.trim();
    const given: Given = { text, where: { argument: "--form-factor" }, verbatim: false };
    const parts = /^(\S+)\s*:\s*(\S+)$/.exec(text);
    const [, label = "", what = ""] = parts ?? [];
    if (!parts || !orbits.some((orbit) => orbit.label === label) || found.has(label))
      fail("invalid-argument", `--form-factor \`${text}\` cannot be used`, {
        where: given.where,
        expected: `a site (${orbits.map((orbit) => orbit.label).join(", ")}), a colon, and an ion or a constant, once for a site`,
        found: text,
        remedy: 'write for example --form-factor "Fe1: Fe2+"',
      });
    const number = /^[+-]?(\d+(?:\.\d*)?|\.\d+)$/.test(what) ? Number(what) : null;
    found.set(label, { request: number === null ? { ion: what } : { constant: number }, given });
  }
  return found;
}

function factorOf(
  work: Work,
  { orbit, ion, spin }: NamedSite,
  site: GivenSite,
  asked: AskedFactor | null,
): MagneticFormFactor {
  const own = work.study?.sites.find(({ label }) => label === orbit.label) ?? null;
  const limit = limitOf(own, spin);
  if (asked !== null)
    return readingGiven(asked.given, () => namingSite(orbit, () => magneticFormFactor({ ...asked.request, ...limit })));
  const { formFactor = null } = own ?? {};
  if (formFactor !== null) return magneticFormFactor({ ...formFactor, ...limit });
  if (ion === null)
    fail("missing-key", `the site ${orbit.label} has no ion, and without one it has no form factor`, {
      where: site.given.where,
      expected: "an ion such as `ion: Fe3+`",
      found: "none",
      remedy: `say in the study which ion stands on ${orbit.label}, or give --form-factor "${orbit.label}: ION" to kvane weigh`,
    });
  return readingGiven(placeOfIon(work, site), () =>
    namingSite(orbit, () => magneticFormFactor({ ion, ...limit } satisfies FormFactorRequest)),
  );
}

/** g and S, where the study has them. */
function limitOf(own: StudySite | null, spin: NamedSite["spin"]): { readonly g?: number; readonly spin?: number } {
  return {
    ...(own?.g == null ? {} : { g: own.g }),
    ...(spin === null ? {} : { spin: toNumber(spin) }),
  };
}

function namingSite<T>({ label }: SiteOrbit, action: () => T): T {
  try {
    return action();
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    throw new KvaneError(
      error.problems.map((one) => ({
        ...one,
        message: `site ${label}: ${one.message}`,
        remedy: "write one of the tabulated ions, or give `form-factor:` of your own",
      })),
    );
  }
}

/** In a study the word itself, in a CIF the site. */
function placeOfIon({ study }: Work, { given }: GivenSite): Given {
  const path = `${given.where.path ?? ""}.ion`;
  return study !== null && Object.hasOwn(study.places, path) ? studyText(study, path, "") : given;
}
