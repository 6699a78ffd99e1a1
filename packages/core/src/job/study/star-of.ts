import { littleGroup, manifold, star, type WaveVector } from "../../kvectors/index.js";
import { type StarRecord, starRecord } from "../../reports/index.js";
import type { SpaceGroup } from "../../spacegroups/index.js";

/** Everything that symmetry says about a k before representations are asked for. */
export function starOf(group: SpaceGroup, k: WaveVector): StarRecord {
  return starRecord(group, k, {
    star: star(group, k),
    littleGroup: littleGroup(group, k),
    manifold: manifold(group, k, { withInversion: false }),
    manifoldPM: manifold(group, k, { withInversion: true }),
  });
}
