import type { WorkHost } from "../algorithms/index.js";
import type { WaveVector } from "../kvectors/index.js";
import { roundNumber } from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import type { KindBudget, KindFindings } from "./explanation.js";
import { flatFrame, lettersAt } from "./flat-frame.js";
import type { AcceptedInterval } from "./peak-pairs.js";
import { mergeLeaves } from "./regions.js";
import { distinctPoints, searchFlat } from "./search-flat.js";
import { wedgeOf } from "./wedge.js";

/** Distinct solutions of a kind that are weighed; more than that is said. */
export const mostSolutionsOfKind = 24;

/** Leaves beyond which the list of solutions of a kind says nothing: the peaks hardly restrict k. */
export const saturatingLeaves = 50_000;

/** Times the tolerance. Solutions of a kind nearer than this are one find: their lines differ by less than can be seen. */
const apartTolerances = 2;

/** Å⁻¹. A leaf is not made smaller, however small the tolerance: positions are not known better by rounding. */
const leastLeaf = 1e-5;

/** What the flat of a kind is searched with. */
export interface FlatProblem {
  /** Metric of the dual of the primitive basis, Å⁻² with 4π². */
  readonly metric: readonly number[];
  readonly intervals: readonly AcceptedInterval[];
  readonly leafRadius: number;
}

/** The k of one line, plane or the general kind where enough peaks may match. */
export async function solveFlat(
  group: SpaceGroup,
  form: WaveVector,
  problem: FlatProblem,
  budget: KindBudget,
  host: WorkHost,
): Promise<KindFindings> {
  const frame = flatFrame(group, form, problem.metric);
  const wedge = wedgeOf(group, frame);
  const leafRadius = Math.max(leastLeaf, problem.leafRadius);
  const findings = await searchFlat(
    frame,
    wedge,
    problem.intervals,
    { wanted: budget.wanted, leafRadius, budget: budget.boxes, mostLeaves: saturatingLeaves },
    host,
  );
  const { regions, ofLeaf } = mergeLeaves(frame, wedge, findings);
  const order = findings.points
    .map((point, leaf) => ({ ...point, region: ofLeaf[leaf] as number }))
    .sort((a, b) => b.score - a.score);
  const { kept, complete } = distinctPoints(wedge, order, apartTolerances * leafRadius, mostSolutionsOfKind);
  return {
    solutions: kept.map(({ t, matched, region }) => ({
      k: {
        components: form.components,
        values: lettersAt(frame, t).map((value) => roundNumber(value)),
        uncertainties: frame.originLetters.map(() => null),
      },
      matched,
      region,
    })),
    regions,
    boxes: findings.boxes,
    smallestBox: findings.smallestBox,
    leaves: findings.leaves.length + findings.undecided.length,
    unexplored: findings.unexplored,
    stopped: findings.stopped,
    complete,
  };
}
