import { configurationSpaces, type MagneticFormFactor, magneticFormFactor } from "../../diffraction/index.js";
import { fail, KvaneError, type Problem, problem } from "../../errors/index.js";
import { toNumber } from "../../numbers/index.js";
import { type WeighRecord, weighRecord } from "../../reports/index.js";
import type { Cell } from "../../spacegroups/index.js";
import { type IntensityData, weigh } from "../../weighing/index.js";
import { readingGiven, studyText } from "../inputs/given.js";
import type { GivenIntensities } from "../inputs/intensities-input.js";
import { parentSitesOf } from "../inputs/parent-sites.js";
import type { GivenSite } from "../inputs/site-input.js";
import type { Work } from "../work.js";
import type { ConfigurationInput, MadeConfigurations } from "./configurations-for.js";

/** The configurations of one k, ranked by how well they fit the intensities. Throws for sites without a usable ion. */
export async function weighFor(
  work: Work,
  input: ConfigurationInput & { readonly cell: Cell },
  given: GivenIntensities,
  { set, modes }: MadeConfigurations,
): Promise<WeighRecord> {
  const { group, cell, k } = input;
  const factors = formFactorsOf(work, input);
  const spaces = configurationSpaces(
    set,
    cell,
    modes.map((one, index) => ({ modes: one, formFactor: factors[index] as MagneticFormFactor })),
  );
  if (spaces.length === 0)
    fail("invalid-argument", "no arrangement of moments is allowed with this k on these sites", {
      expected: "sites that can carry moments",
      found: input.orbits.map(({ label }) => label).join(", "),
      remedy: "check k and the sites: `kvane modes` lists what each irrep allows",
    });
  const data = dataOf(given);
  const found = await weigh(group, cell, k, data, spaces, {}, work.host);
  const ions = input.orbits.map(({ label }, index) => ({
    label,
    formFactor: factors[index] as MagneticFormFactor,
  }));
  const { list, file, lorentz, scale, resolution } = given;
  const { wavelengthAngstrom, uncertaintySource } = list;
  const how = { file, sample: data.sample, wavelengthAngstrom, lorentz, scale, resolution, uncertaintySource };
  return weighRecord({ set, cell, spaces, ions, data: { ...how, intensities: data.data } }, found);
}

function dataOf({ list, lorentz, scale, resolution }: GivenIntensities): IntensityData {
  const sample = list.kind === "hkl" ? "single crystal" : "powder";
  const { wavelengthAngstrom } = list;
  return {
    sample,
    data: list.intensities.map(({ label, q, hkl, observed, uncertainty }) => ({
      label,
      q,
      hkl,
      observed,
      uncertainty,
    })),
    geometry: lorentz && wavelengthAngstrom !== null ? { kind: sample, wavelengthAngstrom } : { kind: "none" },
    scale,
    nuclear: [],
    displacement: 0,
    resolution,
  };
}

/** The form factor of every site, by its ion; the problems of all sites at once. */
function formFactorsOf(work: Work, { group, cell, sites, orbits }: ConfigurationInput): MagneticFormFactor[] {
  const { magnetic } = parentSitesOf(work, group, cell, sites, orbits);
  const problems: Problem[] = [];
  const factors = magnetic.map(({ orbit, ion, spin }, index): MagneticFormFactor | null => {
    const site = sites[index] as GivenSite;
    if (ion === null) {
      problems.push(
        problem("missing-key", `the site ${orbit.label} has no ion, and without one it has no form factor`, {
          where: site.given.where,
          expected: "an ion such as `ion: Fe3+`",
          found: "none",
          remedy: `say in the study which ion stands on ${orbit.label}`,
        }),
      );
      return null;
    }
    try {
      return readingGiven(placeOfIon(work, site), () =>
        magneticFormFactor({ ion, ...(spin === null ? {} : { spin: toNumber(spin) }) }),
      );
    } catch (error) {
      if (!(error instanceof KvaneError)) throw error;
      problems.push(
        ...error.problems.map((one) => ({
          ...one,
          message: `site ${orbit.label}: ${one.message}`,
          remedy: "write one of the tabulated ions",
        })),
      );
      return null;
    }
  });
  if (problems.length > 0) throw new KvaneError(problems);
  return factors.filter((one) => one !== null);
}

/** In a study the word itself, in a CIF the site. */
function placeOfIon({ study }: Work, { given }: GivenSite): GivenSite["given"] {
  const path = `${given.where.path ?? ""}.ion`;
  return study !== null && Object.hasOwn(study.places, path) ? studyText(study, path, "") : given;
}
