import { fail } from "../../errors/index.js";
import { formatWaveVector, numericWaveVector, type WaveVector } from "../../kvectors/index.js";
import type { WeighRecord } from "../../reports/index.js";
import { cellFor, writtenCell } from "../inputs/cell-input.js";
import { configurationOptionsOf } from "../inputs/configurations-input.js";
import { intensitiesOf } from "../inputs/intensities-input.js";
import { argumentNames } from "../request.js";
import { madeConfigurations } from "../study/configurations-for.js";
import { findK } from "../study/find-k.js";
import { readStudy, type StudyInputs } from "../study/read-study.js";
import { weighFor } from "../study/weigh-for.js";
import { remember, together, type Work } from "../work.js";

/** `kvane weigh`: the configurations of the study's k, ranked by how well they fit intensities. */
export async function weighCommand(work: Work): Promise<WeighRecord> {
  // The options on positions are those of the intensities here, not of the peaks.
  const onPeaks: Work = { ...work, request: { ...work.request, as: null, wavelength: null, nuclear: null } };
  const { inputs, given, options } = await together({
    inputs: () => readStudy(onPeaks),
    given: () => intensitiesOf(work),
    options: () => configurationOptionsOf(work.request),
  });
  const cell = inputs.cell ?? cellFor(inputs.group, writtenCell(work));
  const k = await oneK(work, inputs);
  const input = { ...inputs, cell, k };
  return weighFor(work, input, given, await madeConfigurations(work, input, options));
}

/** The k of the study, refined or found as `run` does; of several the first, and that is said. */
async function oneK(work: Work, inputs: StudyInputs): Promise<WaveVector> {
  const { followed, notFollowed, searched } = await findK(work, inputs, 1);
  const [first] = followed;
  if (first === undefined)
    fail("missing-argument", "no wave vector was found to weigh configurations of", {
      where: { argument: argumentNames.k },
      expected: "a k in the study, or peaks that one explains",
      found: "none",
      remedy: "give --k, or look at `kvane locate` first",
    });
  const { k } = first;
  const text = formatWaveVector(k);
  if (numericWaveVector(k) === null)
    fail("k-needs-values", `intensities need a number for every letter of ${text}`, {
      where: { argument: argumentNames.k },
      expected: "fractions or decimals, such as 0,0.472,0",
      found: text,
      remedy: "give numbers in place of the letters",
    });
  const others = notFollowed.length + followed.length - 1;
  if (others > 0 || searched) {
    const because =
      others === 0
        ? "the peaks give it"
        : `it is the first of ${others + 1} that ${searched ? "the peaks do not tell apart" : "the study has"}; --k takes another`;
    remember(work, [{ what: "wave vector", value: text, because }], []);
  }
  return k;
}
