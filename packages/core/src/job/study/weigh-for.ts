import { configurationSpaces, type MagneticFormFactor } from "../../diffraction/index.js";
import { fail } from "../../errors/index.js";
import { type WeighRecord, weighRecord } from "../../reports/index.js";
import type { Cell } from "../../spacegroups/index.js";
import { weigh } from "../../weighing/index.js";
import type { GivenIntensities } from "../inputs/intensities-input.js";
import { parentSitesOf } from "../inputs/parent-sites.js";
import type { Work } from "../work.js";
import type { ConfigurationInput, MadeConfigurations } from "./configurations-for.js";
import { formFactorsOf } from "./form-factors-of.js";
import { intensityData } from "./intensity-data.js";
import { patternOf } from "./pattern-of.js";

/** The configurations of one k, ranked by how well they fit the intensities. Throws for sites without a usable ion. */
export async function weighFor(
  work: Work,
  input: ConfigurationInput & { readonly cell: Cell },
  given: GivenIntensities,
  { set, modes }: MadeConfigurations,
): Promise<WeighRecord> {
  const { group, cell, k } = input;
  const parent = parentSitesOf(work, group, cell, input.sites, input.orbits);
  const factors = formFactorsOf(work, input.sites, parent.magnetic);
  const spaces = configurationSpaces(
    set,
    cell,
    modes.map((one, index) => ({
      modes: one,
      formFactor: factors[index] as MagneticFormFactor,
      occupancy: parent.magnetic[index]?.occupancy ?? 1,
    })),
  );
  if (spaces.length === 0)
    fail("invalid-argument", "no arrangement of moments is allowed with this k on these sites", {
      expected: "sites that can carry moments",
      found: input.orbits.map(({ label }) => label).join(", "),
      remedy: "check k and the sites: `kvane modes` lists what each irrep allows",
    });
  const data = intensityData(work, group, k, given, parent);
  const { patternWidthDeg, domains } = given;
  const found = await weigh(group, cell, k, data, spaces, { domains }, work.host);
  const ions = input.orbits.map(({ label }, index) => ({
    label,
    formFactor: factors[index] as MagneticFormFactor,
  }));
  const { list, file, nuclear, lorentz, scale, resolution, displacement, scatteringAngleDeg, includesNuclear } = given;
  const how = {
    file,
    sample: data.sample,
    wavelengthAngstrom: list.wavelengthAngstrom,
    scatteringAngleDeg,
    lorentz,
    scale,
    resolution,
    displacement,
    nuclearFile: nuclear?.file ?? null,
    includesNuclear,
    domains,
    uncertaintySource: list.uncertaintySource,
  };
  const pattern = patternWidthDeg === null ? null : patternOf(group, cell, k, data, spaces, found, patternWidthDeg);
  return weighRecord({ set, cell, spaces, ions, data: { ...how, intensities: data.data }, pattern }, found);
}
