import { fail } from "../../errors/index.js";
import { compatibility } from "../../irreps/index.js";
import { isExactWaveVector } from "../../kvectors/index.js";
import { type CompatibilityRecord, compatibilityRecord } from "../../reports/index.js";
import { readingGiven } from "../inputs/given.js";
import { groupOf } from "../inputs/group-input.js";
import { placedK, writtenOption } from "../inputs/k-input.js";
import { together, type Work } from "../work.js";

/** `kvane compatibility`: how the irreps of a k split along a line or plane through it. */
export async function compatibilityCommand(work: Work): Promise<CompatibilityRecord> {
  const { group, from, to } = await together({
    group: () => groupOf(work),
    from: () => writtenOption(work, "from", "the k where to start, such as --from 0,1/2,0"),
    to: () => writtenOption(work, "to", "a line or plane through it, such as --to 0,u,0"),
  });
  const { start, end } = await together({
    start: () => placedK(work, group, from),
    end: () => placedK(work, group, to),
  });
  if (!isExactWaveVector(start))
    fail("invalid-k", "compatibility starts at an exact k", {
      where: from.given.where,
      expected: "three fractions",
      found: from.given.text,
      remedy: "write fractions; for a line or plane take one that is not special on it, such as 1/7",
    });
  return compatibilityRecord(
    group,
    start,
    readingGiven(to.given, () => compatibility(group, start, end)),
  );
}
