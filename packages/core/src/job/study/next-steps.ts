import { formatWaveVector } from "../../kvectors/index.js";
import { fixedNumber } from "../../numbers/index.js";
import { qToTwoThetaDeg } from "../../reflections/index.js";
import type { BranchRecord } from "../../reports/index.js";
import type { FoundKs } from "./find-k.js";
import type { StudyInputs } from "./read-study.js";
import { separatingLine } from "./separating-line.js";

/** What to measure or to look at next, most useful first; drawn from the results alone. */
export function nextSteps(inputs: StudyInputs, found: FoundKs, branches: readonly BranchRecord[]): string[] {
  return [
    ...noCandidate(found),
    ...tieSteps(inputs, found),
    ...evidenceSteps(found),
    ...onNuclearSteps(found),
    ...roughStep(found),
    ...irrepStep(branches),
  ];
}

function noCandidate({ searched, candidates }: FoundKs): string[] {
  if (!searched || candidates.length > 0) return [];
  return [
    "No special point explains enough of the peaks. Look for peaks that are not magnetic (--unmatched), or try a k on a line or plane: kvane index STUDY.yaml --k 0,0.47,0.",
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
  const allowed = branches[0]?.modes.sites.flatMap(({ irreps }) =>
    irreps.filter(({ multiplicity }) => multiplicity > 0).map(({ label }) => label),
  );
  const count = new Set(allowed).size;
  if (count < 2) return [];
  return [
    `${count} irreps can carry moments${branches.length > 1 ? " with the first k" : ""}: refine each one alone against the intensities before mixing them.`,
  ];
}
