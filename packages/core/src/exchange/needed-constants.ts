import { breathe, type WorkHost } from "../algorithms/index.js";
import { roundNumber } from "../numbers/index.js";
import { balancedModel, type PreparedZone } from "./balanced.js";
import { groundOf } from "./ground.js";
import { interactionOf } from "./interaction.js";
import { branchesAt } from "./lattice-matrix.js";
import { curvatureAt, type Line, slopeAt } from "./level-slope.js";
import { namedConstants, withConstants } from "./model.js";
import type { ExchangeModel, NamedConstant } from "./types.js";
import { zoneWedge } from "./wedge.js";
import { zoneFrame } from "./zone-frame.js";

/** The value that one constant would need for k to be stationary, all others as they are. */
export interface NeededConstant extends Omit<NamedConstant, "j"> {
  /** Null where none was found. */
  readonly j: number | null;
  /** What k then is along its letter; `level` where the energy does not change to second order. */
  readonly along: "minimum" | "maximum" | "level";
  /** Whether it is the lowest of the whole zone, by the certified search; null where that is not decided. */
  readonly lowest: boolean | null;
  /** Whether it then is one of a continuous set of lowest k, besides directions that no bond notices. */
  readonly oneOfMany: boolean;
}

/**
 * The site potentials with which the needed constants were worked out: there are none where symmetry relates all atoms;
 * `balanced anew` for each value of a constant; `those of the model`, which another constant would change.
 */
export type NeededPotentials = "none" | "balanced anew" | "those of the model";

/**
 * Two kinds of atoms have one potential, of which the bound is a concave function, so that its maximum is found for
 * every value of a constant. With more kinds it may be missed, and a verdict on the whole zone would be one on the miss.
 */
export function neededPotentials({ table }: ExchangeModel): NeededPotentials {
  const orbits = new Set(table.atoms.map(({ orbit }) => orbit)).size;
  return orbits === 1 ? "none" : orbits === 2 ? "balanced anew" : "those of the model";
}

/** For each constant the value that makes k stationary along its one letter. */
export async function neededConstants(
  model: ExchangeModel,
  line: Line,
  host: WorkHost = {},
): Promise<NeededConstant[]> {
  const potentials = neededPotentials(model);
  const prepared = potentials === "balanced anew" ? preparedFor(model) : null;
  const settled = async (changed: ExchangeModel): Promise<ExchangeModel> =>
    prepared === null ? changed : balancedModel(changed, prepared, host);
  const result: NeededConstant[] = [];
  for (const constant of namedConstants(model)) {
    const { name, classes } = constant;
    const withValue = (j: number) => withConstants(model, Object.fromEntries(classes.map((one) => [one, j])));
    let best: NeededConstant = { name, classes, j: null, along: "level", lowest: null, oneOfMany: false };
    for (const near of candidates(withValue, line, constant.j, model)) {
      await breathe(host);
      const j = prepared === null ? near : await refined(async (one) => settled(withValue(one)), line, near, model);
      // Without any constant every k is as good as another.
      if (j === null || interactionOf(withValue(j)).count === 0) continue;
      const changed = await settled(withValue(j));
      const { scale } = interactionOf(changed);
      const bend = curvatureAt(changed, line);
      const along = bend > level * scale ? "minimum" : bend < -level * scale ? "maximum" : "level";
      const verdict =
        potentials === "those of the model" ? undecided : await heldAgainstZone(changed, line, scale, host);
      const found = { name, classes, j: roundNumber(j), along, ...verdict } as const;
      if (rank(found) > rank(best)) best = found;
      if (rank(found) === bestRank) break;
    }
    result.push(best);
  }
  return result;
}

/** One frame for all values: a constant that passes through zero must not change what k is counted modulo. */
function preparedFor({ table, couplings }: ExchangeModel): PreparedZone | null {
  const frame = zoneFrame(
    table,
    couplings.flatMap(({ bonds }) => bonds.bonds),
  );
  return frame.rank === 0 ? null : { frame, wedge: zoneWedge(table.group, frame) };
}

/** Share of the scale: second differences are no better than this. */
const level = 1e-6;
const undecided = { lowest: null, oneOfMany: false } as const;

/** A k that is the only lowest is what was asked for; next to it come one of many, and a mere minimum. */
function rank({ j, along, lowest, oneOfMany }: NeededConstant): number {
  if (j === null) return 0;
  if (lowest === true) return oneOfMany ? bestRank - 1 : bestRank;
  return along === "minimum" ? 2 : 1;
}

const bestRank = 4;

async function heldAgainstZone(model: ExchangeModel, line: Line, scale: number, host: WorkHost) {
  const { energy, set, certificate } = await groundOf(model, { mostLeaves: 300, leafShare: 1e-3 }, host);
  const lowest = (branchesAt(model, line.at(0)).values[0] as number) / 2 <= energy + 1e-7 * scale;
  return { lowest, oneOfMany: lowest && set.dimension > certificate.freeDirections };
}

/** In units of the sum of all constants: how far values are sought, in how many steps, and how many are looked at. */
const reach = 4;
const steps = 160;
const mostCandidates = 3;
const mostBalanced = 2;

/**
 * Values at which the slope of the lowest level vanishes, the potentials being those of the model: minima along the line
 * first, then the nearest. Where symmetry fixes the eigenvector the slope is linear and there is one at most.
 */
function candidates(
  withValue: (j: number) => ExchangeModel,
  line: Line,
  start: number,
  model: ExchangeModel,
): number[] {
  const unit = interactionOf(model).scale;
  const slope = (j: number): number => {
    const changed = withValue(j);
    return slopeAt(changed, line, interactionOf(changed).scale);
  };
  const found: number[] = [];
  const straight = secant(slope, start, unit);
  if (straight !== null) found.push(straight);
  const value = (step: number) => start + ((2 * step) / steps - 1) * reach * unit;
  for (let step = 0, before = slope(value(0)); step < steps; step++) {
    const after = slope(value(step + 1));
    const root = before * after < 0 ? bisected(slope, value(step), value(step + 1), unit) : null;
    if (root !== null && !found.some((one) => Math.abs(one - root) < 1e-6 * unit)) found.push(root);
    before = after;
  }
  const bends = (j: number) => curvatureAt(withValue(j), line) > level * unit;
  return found
    .map((j) => ({ j, order: (bends(j) ? 0 : 10 * reach * unit) + Math.abs(j - start) }))
    .sort((a, b) => a.order - b.order)
    .slice(0, neededPotentials(model) === "balanced anew" ? mostBalanced : mostCandidates)
    .map(({ j }) => j);
}

/** Null where the sign changes by a jump: there two levels cross. */
function bisected(slope: (j: number) => number, from: number, to: number, unit: number): number | null {
  let [low, high] = [from, to];
  const sign = Math.sign(slope(low));
  for (let round = 0; round < 52; round++) {
    const middle = (low + high) / 2;
    if (Math.sign(slope(middle)) === sign) low = middle;
    else high = middle;
  }
  const root = (low + high) / 2;
  return Math.abs(slope(root)) < 1e-7 * unit ? root : null;
}

function secant(slope: (j: number) => number, start: number, unit: number): number | null {
  let [a, b] = [start, start + 0.1 * unit];
  let [fa, fb] = [slope(a), slope(b)];
  if (Math.abs(fa) < 1e-12 * unit) return a;
  for (let round = 0; round < 60; round++) {
    if (fb === fa) return null;
    const next = b - (fb * (b - a)) / (fb - fa);
    if (!Number.isFinite(next) || Math.abs(next) > 1e6 * unit) return null;
    [a, fa, b, fb] = [b, fb, next, slope(next)];
    if (Math.abs(b - a) <= 1e-13 * (Math.abs(b) + unit)) return Math.abs(fb) < 1e-7 * unit ? b : null;
  }
  return Math.abs(fb) < 1e-9 * unit ? b : null;
}

const mostRefinements = 8;

/** The same with potentials balanced for each value; every value costs a balance. */
async function refined(
  settled: (j: number) => Promise<ExchangeModel>,
  line: Line,
  near: number,
  model: ExchangeModel,
): Promise<number | null> {
  const unit = interactionOf(model).scale;
  const slope = async (j: number) => slopeAt(await settled(j), line, unit);
  let [a, b] = [near, near + 0.01 * unit];
  let [fa, fb] = [await slope(a), await slope(b)];
  for (let round = 0; round < mostRefinements; round++) {
    if (Math.abs(fa) < 1e-9 * unit) return a;
    if (fb === fa) return null;
    const next = b - (fb * (b - a)) / (fb - fa);
    if (!Number.isFinite(next) || Math.abs(next - near) > 10 * reach * unit) return null;
    [a, fa, b, fb] = [b, fb, next, await slope(next)];
  }
  return Math.abs(fb) < 1e-7 * unit ? b : null;
}
