import type { ProblemCode } from "../../errors/index.js";
import { formatWaveVector } from "../../kvectors/index.js";
import { fixedNumber } from "../../numbers/index.js";
import { qToTwoThetaDeg } from "../../reflections/index.js";
import { type BranchRecord, physicalSets, type RunRecord } from "../../reports/index.js";
import type { FoundKs } from "./find-k.js";
import { physicsSteps } from "./physics-steps.js";
import type { StudyInputs } from "./read-study.js";
import { separatingLine } from "./separating-line.js";
import { weightStep } from "./weight-steps.js";

/** What to measure or to look at next, most useful first; drawn from the results alone. */
export function nextSteps(
  inputs: StudyInputs,
  found: FoundKs,
  branches: readonly BranchRecord[],
  { coincidences, exchange, onset }: Pick<RunRecord, "coincidences" | "exchange" | "onset">,
  warned: readonly ProblemCode[],
): string[] {
  return [
    ...givenSteps(found),
    ...noCandidate(found),
    ...tieSteps(inputs, found),
    ...evidenceSteps(found),
    ...onNuclearSteps(found),
    ...coincidenceSteps(inputs, found, branches, coincidences, warned),
    ...roughStep(found),
    ...physicsSteps(exchange, onset),
    ...weightStep(branches),
    ...irrepStep(branches),
  ];
}

/** A given k that the peaks do not speak for: it was followed because it was asked for. */
function givenSteps({ searched, candidates, followed }: FoundKs): string[] {
  if (searched) return [];
  const several = followed.length > 1;
  return followed.flatMap(({ candidate }) => {
    const one = candidate === null ? undefined : candidates[candidate];
    if (one === undefined || (one.evidence.reading !== "not informative" && 2 * one.matched >= one.total)) return [];
    const name = several ? `The given k ${(candidate ?? 0) + 1}` : "This k";
    const figures = `${one.matched} of ${one.total} matched, evidence ${fixedNumber(one.evidence.value, 1)}`;
    return [
      `${name} does not explain your peaks (${figures}): leave k out, so that it is searched for, or check the cell and the list.`,
    ];
  });
}

function noCandidate({ searched, candidates, followed }: FoundKs): string[] {
  if (!searched || candidates.length > 0) return [];
  if (followed.length > 0)
    return followed.length > 1
      ? [
          `No single k explains enough of the peaks; ${followed.map(({ k }) => formatWaveVector(k)).join(" and ")} together do. Measure whether all peaks vanish at one temperature: if not, they belong to different orders or phases.`,
        ]
      : [
          `The k that is followed, ${formatWaveVector((followed[0] as (typeof followed)[number]).k)}, leaves more peaks over than allowed: find out what they are (impurities, harmonics), or allow them with --unmatched.`,
        ];
  return [
    "No k of those searched explains enough of the peaks. Look for peaks that are not magnetic (--unmatched), and check the cell, the wavelength and what the positions are (--as).",
  ];
}

/** The line that would tell tied candidates apart. */
function tieSteps(inputs: StudyInputs, { candidates, followed }: FoundKs): string[] {
  const tied = followed.flatMap(({ candidate }) => (candidate === null ? [] : [candidate]));
  const [first, second] = tied;
  if (first === undefined || second === undefined || inputs.cell === null) return [];
  const a = candidates[first];
  const b = candidates[second];
  if (a === undefined || b === undefined || !a.tiedWith.includes(second)) return [];
  const names = `candidates ${first + 1} and ${second + 1}`;
  const line = separatingLine(inputs, a.k, b.k);
  if (line === null) return [`No powder line tells ${names} apart: look at a single crystal, or compare intensities.`];
  const { wavelengthAngstrom } = inputs;
  const angle = wavelengthAngstrom === null ? null : qToTwoThetaDeg(line.q, wavelengthAngstrom);
  const other = wavelengthAngstrom === null ? null : qToTwoThetaDeg(line.nearest, wavelengthAngstrom);
  const owner = formatWaveVector(line.of === 0 ? a.k : b.k);
  return [
    `To tell ${names} apart, look at Q = ${fixedNumber(line.q, 4)} Å⁻¹${angle === null ? "" : ` (2θ = ${fixedNumber(angle, 2)}°)`}: k = ${owner} has a satellite there, the other one none nearer than ${fixedNumber(line.nearest, 4)} Å⁻¹${other === null ? "" : ` (${fixedNumber(other, 2)}°)`}. The position has to be known to ${fixedNumber(Math.abs(line.nearest - line.q) / 3, 5)} Å⁻¹ or better.`,
  ];
}

function evidenceSteps({ candidates, searched }: FoundKs): string[] {
  const best = candidates[0];
  if (!searched || best === undefined || best.evidence.reading === "found") return [];
  return [
    `The evidence for candidate 1 is ${best.evidence.reading}: more peaks, above all at small Q, would decide more than better ones.`,
  ];
}

function onNuclearSteps({ candidates, followed }: FoundKs): string[] {
  const onNuclear = followed.some(({ candidate }) => candidate !== null && candidates[candidate]?.onNuclearLines);
  return onNuclear
    ? ["With k = 0 the satellites lie on nuclear lines: make sure that the peaks grow below the ordering temperature."]
    : [];
}

/** Peaks that may hold something else: what to measure so that they can be told. */
function coincidenceSteps(
  { peaks }: StudyInputs,
  { candidates, followed }: FoundKs,
  branches: readonly BranchRecord[],
  coincidences: RunRecord["coincidences"],
  warned: readonly ProblemCode[],
): string[] {
  const total = peaks?.list.peaks.length ?? 0;
  const on = (kind: string) => coincidences.filter(({ overlaps }) => overlaps.some((one) => one.with === kind)).length;
  const [nuclear, half] = [on("nuclear"), on("half wavelength")];
  // A k with 2k ∈ L*: H + k is half of the vector 2H + 2k of L*.
  const allHalf = branches.length > 0 && branches.every(({ star }) => star.minusK === "equivalent");
  const said = followed.some(({ candidate }) => candidate !== null && candidates[candidate]?.onNuclearLines);
  return [
    ...(total > 0 && 2 * nuclear >= total && !said
      ? [
          `${nuclear} of ${total} peaks lie on nuclear lines: subtract the pattern measured above the ordering temperature, or leave them out.`,
        ]
      : []),
    ...(half === 0 || warned.includes("half-wavelength")
      ? []
      : allHalf
        ? [
            "2k is a reciprocal lattice vector, so every satellite lies where half the wavelength would put a nuclear line: make sure that the peaks vanish above the ordering temperature.",
          ]
        : [
            `${half} of ${total} peaks lie where half the wavelength would put a nuclear line: check with a filter, or above the ordering temperature.`,
          ]),
  ];
}

/** χ² per degree of freedom above this calls for larger uncertainties or a line off its place. */
const roughFit = 4;

function roughStep({ candidates }: FoundKs): string[] {
  const reduced = candidates[0]?.residuals.reducedChiSquared ?? null;
  if (reduced === null || reduced < roughFit) return [];
  return [
    `The peaks scatter about their lines ${fixedNumber(Math.sqrt(reduced), 1)} times as much as their uncertainties say: check the cell, the zero of the angle and the uncertainties.`,
  ];
}

function irrepStep(branches: readonly BranchRecord[]): string[] {
  const [first] = branches;
  if (first === undefined) return [];
  const allowed = new Set(
    first.modes.sites.flatMap(({ irreps }) =>
      irreps.filter(({ multiplicity }) => multiplicity > 0).map(({ label }) => label),
    ),
  );
  const sets = physicalSets(first.irreps).filter((set) => set.some((label) => allowed.has(label)));
  const { sites } = first.modes;
  const carries = (set: readonly string[], site: (typeof sites)[number]) =>
    site.irreps.some(({ label, multiplicity }) => multiplicity > 0 && set.includes(label));
  if (sites.length > 1 && sets.length > 0 && !sets.some((set) => sites.every((site) => carries(set, site))))
    return [
      `No irrep alone puts moments on all of ${sites.map(({ label }) => label).join(", ")}: if they all order with this k, two irreps are at work (kvane configurations --together).`,
    ];
  if (sets.length < 2 || first.weigh !== null) return [];
  const pairs = sets.some(({ length }) => length > 1) ? ", a conjugate pair counted once," : "";
  return [
    `${sets.length} irreps${pairs} can carry moments${branches.length > 1 ? " with the first k" : ""}: refine each one alone against the intensities before mixing them.`,
  ];
}
