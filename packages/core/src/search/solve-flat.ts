import { breathe, type WorkHost } from "../algorithms/index.js";
import type { WaveVector } from "../kvectors/index.js";
import { roundNumber } from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import type { KindBudget, KindFindings } from "./explanation.js";
import { type FlatFrame, flatFrame, lettersAt } from "./flat-frame.js";
import type { AcceptedInterval } from "./peak-pairs.js";
import { mergeLeaves } from "./regions.js";
import { decideBox, distinctPoints, type FlatFindings, searchFlat } from "./search-flat.js";
import { type Wedge, wedgeOf } from "./wedge.js";

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
  const first = await searchFlat(
    frame,
    wedge,
    problem.intervals,
    { wanted: budget.wanted, leafRadius, budget: budget.boxes, mostLeaves: saturatingLeaves },
    host,
  );
  const findings = await decideOpenRegions(frame, wedge, problem.intervals, budget.wanted, first, host);
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

/** Undecided boxes that get a closer look; in a kind with more of them the list says nothing anyway. */
const mostCloserLooks = 5000;

/** Boxes beside a settled leaf belong to its region; where a region has none, its boxes are looked at more closely. */
async function decideOpenRegions(
  frame: FlatFrame,
  wedge: Wedge,
  intervals: readonly AcceptedInterval[],
  wanted: number,
  findings: FlatFindings,
  host: WorkHost,
): Promise<FlatFindings> {
  const { regions, ofUndecided } = mergeLeaves(frame, wedge, findings);
  const isOpen = (index: number): boolean => regions[ofUndecided[index] as number]?.decided === false;
  if (findings.undecided.filter((_, index) => isOpen(index)).length > mostCloserLooks) return findings;
  const points = [...findings.points];
  const leaves = [...findings.leaves];
  const undecided: Float64Array[] = [];
  let { boxes } = findings;
  for (const [index, centre] of findings.undecided.entries()) {
    if (!isOpen(index)) {
      undecided.push(centre);
      continue;
    }
    await breathe(host);
    const looked = decideBox(frame, wedge, intervals, wanted, centre, findings.openHalf);
    boxes += looked.boxes;
    if (looked.decision === "open") undecided.push(centre);
    else if (looked.decision !== "excluded") {
      points.push(looked.decision);
      leaves.push(centre);
    }
  }
  return { ...findings, points, leaves, undecided, boxes };
}
