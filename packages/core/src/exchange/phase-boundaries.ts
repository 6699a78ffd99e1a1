import type { WaveVector } from "../kvectors/index.js";
import { roundNumber } from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import { interactionOf, lowestBranch } from "./interaction.js";
import type { DiagramPoint } from "./phase-diagram.js";
import { kappaOfVector, placedVector } from "./placing.js";
import { type Descent, descend } from "./polish.js";
import type { ExchangeModel } from "./types.js";
import { zoneActions } from "./wedge.js";
import { fromCartesian, fromZone, toCartesian, toZone, type ZoneFrame } from "./zone-frame.js";

/** Where one phase ends and the next begins, along one constant. */
export interface DiagramBoundary {
  readonly value: number;
  /** Indices of the phases on both sides. */
  readonly from: number;
  readonly to: number;
  /** Whether k jumps; else it moves away gradually. */
  readonly sudden: boolean;
}

/** What the search for boundaries needs of its diagram. */
export interface DiagramAccess {
  readonly frame: ZoneFrame;
  readonly group: SpaceGroup;
  readonly modelAt: (values: readonly number[]) => Promise<ExchangeModel>;
  readonly pointAt: (values: readonly number[]) => Promise<DiagramPoint>;
  /** The kind of k, as its form. */
  readonly kindForm: (k: WaveVector) => string;
  /** Whether the k of a phase are a whole line, surface or zone, besides the directions that no bond notices. */
  readonly isDegenerate: (phase: number) => boolean;
}

const halvings = 40;
const mostPhasesBetween = 3;
/** Share of the scale below which two energies tell nothing. */
const noise = 1e-13;
/** Reciprocal lattice units. A minimum this near to a simpler k may be on it: where k moves away, it does so like a root. */
const nearlyThere = 1e-4;

/**
 * Boundaries between neighbouring points of different phases. The minima of both sides are followed by descents while
 * the constant is halved down: the lower one wins; where both descents end alike the kind of k decides, for a k
 * that moves away from a simple one has its energy only to second order.
 */
export async function phaseBoundaries(
  points: readonly DiagramPoint[],
  access: DiagramAccess,
): Promise<DiagramBoundary[]> {
  const boundaries: DiagramBoundary[] = [];
  const range = Math.abs((points.at(-1)?.values[0] ?? 0) - (points[0]?.values[0] ?? 0));
  const between = async (low: DiagramPoint, high: DiagramPoint, depth: number): Promise<void> => {
    if (low.phase === high.phase) return;
    const degenerate = access.isDegenerate(low.phase) && access.isDegenerate(high.phase);
    const within = holds(low, high, access) || holds(high, low, access);
    const found = await (degenerate || within ? bisected : followed)(low, high, access);
    const boundary = await atLonePoint(found, [low, high], lonelyShare * range, access);
    const span = (high.values[0] as number) - (low.values[0] as number);
    // A third phase may lie between: it shows beside the boundary.
    for (const side of [-1, 1]) {
      const value = boundary.value + side * 0.02 * span;
      const inside = (value - (low.values[0] as number)) / span;
      if (depth >= mostPhasesBetween || inside <= 0 || inside >= 1) continue;
      const beside = await access.pointAt([value]);
      if (beside.phase === low.phase || beside.phase === high.phase) continue;
      await between(low, beside, depth + 1);
      await between(beside, high, depth + 1);
      return;
    }
    boundaries.push({ ...boundary, from: low.phase, to: high.phase });
  };
  const plain = points.filter((_, index) => !isMeeting(points, index));
  for (let index = 1; index < plain.length; index++)
    await between(plain[index - 1] as DiagramPoint, plain[index] as DiagramPoint, 0);
  return boundaries;
}

/** Whether all k of one phase are among those of another, which has more: a descent from a shared k tells nothing. */
function holds(many: DiagramPoint, few: DiagramPoint, { kindForm }: DiagramAccess): boolean {
  const forms = new Set(many.k.map(kindForm));
  return many.k.length > few.k.length && few.k.every((k) => forms.has(kindForm(k)));
}

/** Share of the whole range within which a boundary may be one of the points beside it. */
const lonelyShare = 1e-3;

/**
 * A set of k that is degenerate at a single value, such as that at which a constant vanishes, ends there: the k beside it
 * can be told from its own only some way off.
 */
async function atLonePoint(
  found: Pick<DiagramBoundary, "value" | "sudden">,
  ends: readonly DiagramPoint[],
  near: number,
  { pointAt, isDegenerate }: DiagramAccess,
): Promise<Pick<DiagramBoundary, "value" | "sudden">> {
  for (const end of ends) {
    const own = end.values[0] as number;
    const away = found.value - own;
    if (!isDegenerate(end.phase) || away === 0 || Math.abs(away) > near) continue;
    if ((await pointAt([own + 0.3 * away])).phase !== end.phase) return { ...found, value: own };
  }
  return found;
}

/** A single point that has the k of both its neighbours, or more: it lies on the boundary itself. */
function isMeeting(points: readonly DiagramPoint[], index: number): boolean {
  const [before, here, after] = [points[index - 1], points[index], points[index + 1]];
  if (!before || !here || !after) return false;
  return here.phase !== before.phase && here.phase !== after.phase && before.phase !== after.phase && here.k.length > 1;
}

/** Of the range; where two sets of k touch their energies differ to second order only, and nearer than this they are one. */
const degenerateShare = 1e-5;

/**
 * With a degenerate set on both sides one of its k tells nothing about the set: the whole minimum is looked for at each
 * halving. The change is sudden where the energy has a kink, so that its change of slope stays when the step shrinks.
 */
async function bisected(low: DiagramPoint, high: DiagramPoint, { pointAt }: DiagramAccess) {
  let [left, right] = [low.values[0] as number, high.values[0] as number];
  const span = right - left;
  // A range may run downwards.
  const length = Math.abs(span);
  while (Math.abs(right - left) > 0.1 * degenerateShare * length) {
    const middle = (left + right) / 2;
    if ((await pointAt([middle])).phase === low.phase) left = middle;
    else right = middle;
  }
  const value = (left + right) / 2;
  const turn = async (step: number) => {
    const [before, here, after] = await Promise.all([-step, 0, step].map((shift) => pointAt([value + shift])));
    return Math.abs((before?.energy ?? 0) - 2 * (here?.energy ?? 0) + (after?.energy ?? 0)) / step;
  };
  const step = 0.01 * length;
  return { value: rounded(value, degenerateShare * length), sudden: (await turn(step / 8)) > 0.5 * (await turn(step)) };
}

/** Without the digits that are smaller than the uncertainty. */
function rounded(value: number, uncertainty: number): number {
  const unit = 10 ** Math.ceil(Math.log10(uncertainty));
  return roundNumber(Number((Math.round(value / unit) * unit).toPrecision(9)) + 0);
}

async function followed(low: DiagramPoint, high: DiagramPoint, { group, frame, modelAt, kindForm }: DiagramAccess) {
  const place = ({ k }: DiagramPoint) => toCartesian(frame, toZone(frame, kappaOfVector(group, k[0] as WaveVector)));
  const size = Math.max(...frame.metric.map((entry) => Math.sqrt(Math.abs(entry))));
  const form = (x: ArrayLike<number>, tolerance = nearlyThere) =>
    kindForm(placedVector(group, fromZone(frame, fromCartesian(frame, x)), tolerance));
  let [left, right] = [low.values[0] as number, high.values[0] as number];
  let [fromLow, fromHigh] = [place(low), place(high)] as [ArrayLike<number>, ArrayLike<number>];
  const [startLow, startHigh] = [fromLow, fromHigh];
  const lowForm = form(fromLow);
  const actions = zoneActions(group, frame);
  // A point on the boundary itself: its k is as good as that of the other side.
  if (lowForm === form(fromHigh)) return { value: form(fromLow, 0) === lowForm ? right : left, sudden: false };
  let sudden = false;
  for (let halving = 0; halving < halvings; halving++) {
    const middle = (left + right) / 2;
    const interaction = interactionOf(await modelAt([middle]), frame);
    const branch = lowestBranch(interaction);
    const ends = [fromLow, startLow].map((x) => descend(branch, x, size, interaction.scale));
    const others = [fromHigh, startHigh].map((x) => descend(branch, x, size, interaction.scale));
    const [a, b] = [lowest(ends), lowest(others)];
    const step = a.value - b.value;
    const lowWins = Math.abs(step) > noise * interaction.scale ? step < 0 : form(b.x) === lowForm;
    sudden = starDistance(frame, actions, a.x, b.x) > apart * size;
    if (lowWins) {
      left = middle;
      fromLow = a.x;
    } else {
      right = middle;
      fromHigh = b.x;
    }
  }
  return { value: roundNumber(Number(((left + right) / 2).toPrecision(9)) + 0), sudden };
}

function lowest(ends: readonly Descent[]): Descent {
  return ends.reduce((least, end) => (end.value < least.value ? end : least));
}

/** Share of the zone beyond which two k at a boundary are not one. */
const apart = 0.01;

/** Distance of the nearest images of two places, Å⁻¹. */
function starDistance(
  frame: ZoneFrame,
  actions: readonly (readonly number[])[],
  a: ArrayLike<number>,
  b: ArrayLike<number>,
): number {
  const [from, to] = [fromCartesian(frame, a), fromCartesian(frame, b)];
  const rank = from.length;
  return Math.min(
    ...actions.map((action) => {
      const step = to.map((entry, row) => {
        const image = from.reduce((sum, part, column) => sum + (action[row * rank + column] as number) * part, 0);
        return entry - image - Math.round(entry - image);
      });
      return Math.hypot(...toCartesian(frame, step));
    }),
  );
}
