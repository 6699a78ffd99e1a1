import { fail } from "../../errors/index.js";
import type { CifVersion } from "../../files/index.js";
import {
  type AnyConfiguration,
  type ConfigurationsRecord,
  configurationCif,
  type ExportRecord,
  type WeighRecord,
} from "../../reports/index.js";
import { optionOf } from "../inputs/given.js";
import { argumentNames } from "../request.js";
import type { Work } from "../work.js";
import { configurationsCommand } from "./configurations.js";
import { weighCommand } from "./weigh.js";

/** `kvane export`: the magnetic CIF of one configuration, with moments as an example or as fitted to the intensities of the study. */
export async function exportCommand(work: Work): Promise<ExportRecord> {
  const version = versionOf(work);
  const record = await configurationsCommand(work);
  const one = chosen(work, record);
  const weigh = work.request.fitted === true ? await weighCommand(work) : null;
  if (weigh !== null && !weigh.ranking.some(({ id }) => id === one.id)) refuseUnfitted(weigh, one.id);
  const cif = await configurationCif(record, one, version, weigh);
  if (cif === null) refuseUnwritten(record, one);
  return { configuration: one.id, cifVersion: version, cif };
}

/** Without the cell, with letters in the k of a modulated structure, or with moments too many, there is no CIF. */
function refuseUnwritten({ cell, k }: ConfigurationsRecord, one: AnyConfiguration): never {
  if (cell === null)
    fail("missing-argument", "a CIF needs the unit cell", {
      where: { argument: argumentNames.cell },
      expected: '--cell "a b c alpha beta gamma" in Å and degrees',
      found: "nothing",
      remedy: "give --cell, or the cell in the study",
    });
  if ("superspace" in one.magneticGroup)
    fail("k-needs-values", `a CIF needs a number for every letter of ${k.components.join(",")}`, {
      where: { argument: argumentNames.k },
      expected: "fractions or decimals, such as 0,0.472,0",
      found: k.components.join(","),
      remedy: "give numbers in place of the letters",
    });
  fail("invalid-argument", `the moments of ${one.id} are not written out`, {
    where: { argument: argumentNames.limit },
    expected: "a limit that its atoms and amplitudes do not exceed",
    found: "notWritten" in one ? (one.notWritten ?? one.id) : one.id,
    remedy: "give a higher --limit",
  });
}

function refuseUnfitted({ struckOut, ranking }: WeighRecord, id: string): never {
  const peaks = struckOut.find((struck) => struck.id === id)?.peaks ?? [];
  fail("invalid-argument", `the intensities give no moments for ${id}`, {
    where: { argument: argumentNames.fitted },
    expected: ranking.map((other) => other.id).join(", ") || "a configuration that can give the intensities",
    found: peaks.length > 0 ? `${id}, which makes ${peaks.slice(0, 4).join(", ")} zero` : id,
    remedy: "take one of those, or leave --fitted out for an example of its moments",
  });
}

function versionOf({ request }: Work): CifVersion {
  const given = optionOf(request, "cif");
  if (given === null || given.text === "2.0") return "2.0";
  if (given.text === "1.1") return "1.1";
  return fail("invalid-argument", `there is no CIF ${given.text}`, {
    where: given.where,
    expected: "2.0 or 1.1",
    found: given.text,
    remedy: "leave --cif out for 2.0",
  });
}

/** `Γ2.1`, also written `Gamma2.1`, `G2.1` or `2.1`; the only configuration needs no name. */
function chosen({ request }: Work, { configurations, arms, star }: ConfigurationsRecord): AnyConfiguration {
  const given = optionOf(request, "configuration");
  const expected = configurations.map(({ id }) => id).join(", ");
  const [only, second] = configurations;
  if (given === null && only !== undefined && second === undefined) return only;
  if (given === null)
    return fail("missing-argument", "it is not said which configuration", {
      where: { argument: argumentNames.configuration },
      expected,
      found: "nothing",
      remedy: `give --configuration, for example --configuration ${only?.id ?? "Γ1.1"}`,
    });
  const wanted = plainId(given.text);
  const found = configurations.find(({ id }) => plainId(id) === wanted);
  if (found !== undefined) return found;
  return fail("invalid-argument", `there is no configuration \`${given.text}\``, {
    where: given.where,
    expected: expected || "no configuration: no irrep carries moments on the sites",
    found: given.text,
    // Whether the longer list has it is not tried: it may take ten times as long.
    remedy: `kvane configurations lists them${
      arms === "all" || star.length === 1 ? "" : `; ${argumentNames.arms} all adds those of several arms of the star`
    }`,
  });
}

function plainId(id: string): string {
  return id.replace(/Γ|Gamma|G/gi, "").trim();
}
