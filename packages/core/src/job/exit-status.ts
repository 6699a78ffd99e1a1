import type { ProblemCode } from "../errors/index.js";

/** Codes that are not the fault of the input: valid input on which the job failed, or output that cannot be written. */
const failedOnValidInput: readonly ProblemCode[] = ["not-built", "number-overflow", "output-exists", "output-failed"];

/** Codes that are said as warnings alone: the answer stands, with this beside it. */
const warningsOnly: readonly ProblemCode[] = [
  "measured-k-ambiguous",
  "k-not-determined",
  "uncertainties-understated",
  "search-stopped",
  "search-saturated",
  "half-wavelength",
  "no-candidate",
  "cif-contradiction",
  "cif-doubtful",
];

/**
 * The exit status that a problem ends the command with: 0 for what is only a warning, 1 the job failed on valid input or
 * output could not be written, 2 the input or the usage is wrong, 70 an internal fault, 130 interrupted.
 */
export function exitStatusOf(code: ProblemCode): number {
  if (code === "internal-fault") return 70;
  if (code === "interrupted") return 130;
  if (warningsOnly.includes(code)) return 0;
  return failedOnValidInput.includes(code) ? 1 : 2;
}
