import { atlas, kindOf, nearbyKinds, numericWaveVector, type WaveVector } from "../../kvectors/index.js";
import { type AtlasRecord, atlasRecord, type PlacedK } from "../../reports/index.js";
import type { Cell, SpaceGroup } from "../../spacegroups/index.js";
import { cellFor, cellIfGiven } from "../inputs/cell-input.js";
import { groupOf } from "../inputs/group-input.js";
import { placedK, writtenKIfGiven } from "../inputs/k-input.js";
import { numberOption } from "../inputs/number-input.js";
import { remember, together, type Work } from "../work.js";

/** `kvane atlas`: every kind of k, where a given k belongs, and the special kinds near it. */
export async function atlasCommand(work: Work): Promise<AtlasRecord> {
  const { group, written, givenCell, within } = await together({
    group: () => groupOf(work),
    written: () => writtenKIfGiven(work),
    givenCell: () => cellIfGiven(work),
    within: () => numberOption(work.request, "within", { from: 0 }),
  });
  const { k, cell } = await together({
    k: () => written && placedK(work, group, written),
    cell: () => givenCell && cellFor(group, givenCell),
  });
  const kinds = atlas(group, { withInversion: false });
  const kindsPM = atlas(group, { withInversion: true });
  const given: PlacedK | null = k && {
    k,
    kind: kindOf(group, kinds, k, { withInversion: false }),
    kindPM: kindOf(group, kindsPM, k, { withInversion: true }),
    nearby: nearbyOf(work, { group, cell, k, within }),
  };
  return atlasRecord(group, cell, { kinds, kindsPM, given });
}

/** Å⁻¹. About the width of a powder line at low angles: a k this near to a special one may well be it. */
const usualDistance = 0.05;

interface NearbyQuestion {
  readonly group: SpaceGroup;
  readonly cell: Cell | null;
  readonly k: WaveVector;
  readonly within: number | null;
}

/** k and −k count as one here, as in the search. */
function nearbyOf(work: Work, { group, cell, k, within }: NearbyQuestion): PlacedK["nearby"] {
  if (cell === null || numericWaveVector(k) === null) return null;
  const distance = within ?? usualDistance;
  if (within === null)
    remember(work, [{ what: "nearby", value: `within ${distance} Å⁻¹`, because: "--within was not given" }], []);
  return { within: distance, kinds: nearbyKinds(group, cell, k, { withInversion: true, distance }) };
}
