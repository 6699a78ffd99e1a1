import { configurationSpaces, type MagneticFormFactor } from "../../diffraction/index.js";
import { fail, problem } from "../../errors/index.js";
import { type WeighRecord, weighRecord } from "../../reports/index.js";
import type { Cell } from "../../spacegroups/index.js";
import { type Weighing, weigh } from "../../weighing/index.js";
import type { GivenIntensities } from "../inputs/intensities-input.js";
import { parentSitesOf } from "../inputs/parent-sites.js";
import { remember, type Work } from "../work.js";
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
  warnLeftOut(work, given.file, found);
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

/** Share of the intensity above which leaving it out is more than an impurity line. */
const muchLeftOut = 0.05;

function warnLeftOut(work: Work, file: string, { leftOut, leftOutShare }: Weighing): void {
  if (leftOutShare <= muchLeftOut) return;
  remember(
    work,
    [],
    [
      problem("intensities-left-out", `${Math.round(100 * leftOutShare)} % of the intensity was left out of the fits`, {
        where: { file },
        expected: "every peak on a line of its own",
        found: `${leftOut.length} without one: ${leftOut
          .slice(0, 4)
          .map(({ label, reason }) => `${label} (${reason})`)
          .join(", ")}${leftOut.length > 4 ? ", …" : ""}`,
        remedy:
          "check the wavelength, the cell, k, the zero of the angle and the resolution before trusting the ranking",
      }),
    ],
  );
}
