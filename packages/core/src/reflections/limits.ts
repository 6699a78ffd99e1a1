import { fail } from "../errors/index.js";
import type { PositionLimits } from "./types.js";

/** Throws `invalid-argument` unless 0 ≤ qMin ≤ qMax, qMax above 0 and finite. */
export function checkLimits({ qMax, qMin = 0 }: PositionLimits): void {
  if (!Number.isFinite(qMax) || qMax <= 0)
    fail("invalid-argument", `the limit of Q is ${qMax}`, {
      expected: "a number above 0 in Å⁻¹",
      found: String(qMax),
      remedy: "give a limit such as 5",
    });
  if (!(qMin >= 0 && qMin <= qMax))
    fail("invalid-argument", `the lower limit of Q is ${qMin}`, {
      expected: `a number from 0 to ${qMax} in Å⁻¹`,
      found: String(qMin),
    });
}
