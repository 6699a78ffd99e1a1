import { goldenSection } from "../algorithms/index.js";
import { atlas, type KindOfK, numericWaveVector, specialPoints, type WaveVector } from "../kvectors/index.js";
import { evaluateFormNumber } from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import type { Interaction, LowestBranch } from "./interaction.js";
import type { ZoneMinima } from "./minimum-set.js";
import { kappaOf, kappaOfVector, placedVector } from "./placing.js";
import type { ExchangeModel, MinimumSet, OrderingVector } from "./types.js";
import { sameZonePoint, starOfZone, zoneActions } from "./wedge.js";
import { fromZone, toCartesian, toZone } from "./zone-frame.js";

/** What counts as a minimum. */
export interface MinimumTest {
  readonly branch: (x: ArrayLike<number>) => LowestBranch;
  /** Eigenvalues up to here are the lowest. */
  readonly limit: number;
  readonly withoutManifolds: boolean;
}

/** Minima of the zone as wave vectors of the setting; of a continuous set what lies on elements of symmetry. */
export function minimumSet(
  model: ExchangeModel,
  interaction: Interaction,
  minima: ZoneMinima,
  test: MinimumTest,
): MinimumSet {
  const { group } = model.table;
  const { frame } = interaction;
  const free = 3 - frame.rank;
  const actions = zoneActions(group, frame);
  const at = (kappa: readonly number[]) => test.branch(toCartesian(frame, toZone(frame, kappa))).value;
  const dimension = Math.min(3, minima.dimension + free) as 0 | 1 | 2 | 3;
  const vectorAt = (q: readonly number[]): OrderingVector => {
    const kappa = fromZone(frame, q);
    const limit = at(kappa) + roundingShare * interaction.scale;
    // Where the second derivative vanishes too, a computed minimum is no better known than this.
    const simple = placedVector(group, kappa, flatSnap);
    const k = at(kappaOfVector(group, simple)) <= limit ? simple : placedVector(group, kappa);
    return { k, pairs: pairsOf(actions, toZone(frame, kappaOfVector(group, k))) };
  };
  const symmetric = minima.dimension === 0 ? [] : onSymmetry(group, interaction, at, test.limit);
  const chosen = symmetric.length > 0 ? symmetric : minima.points.slice(0, minima.dimension === 0 ? undefined : 6);
  return {
    dimension,
    vectors: ordered(chosen.map(vectorAt)),
    manifolds:
      dimension === 0 || dimension === 3 || test.withoutManifolds
        ? []
        : wholeManifolds(group, at, test.limit, dimension),
    free: frame.dual.slice(frame.rank),
  };
}

/** Reciprocal lattice units; only where the energy is the same to rounding. */
const flatSnap = 1e-3;
const roundingShare = 2e-14;

/** Number of ±k pairs in the star of q. */
function pairsOf(actions: readonly (readonly number[])[], q: readonly number[]): number {
  const star = starOfZone(actions, q);
  const own = star.filter((one) =>
    sameZonePoint(
      one,
      one.map((entry) => -entry),
    ),
  ).length;
  return own + (star.length - own) / 2;
}

/** Fewest arms first, then by the components. */
function ordered(vectors: readonly OrderingVector[]): OrderingVector[] {
  const seen = new Set<string>();
  return [...vectors]
    .sort((a, b) => a.pairs - b.pairs || compareNumbers(a.k, b.k))
    .filter(({ k }) => {
      const key = (numericWaveVector(k) ?? []).map((entry) => entry.toFixed(6)).join();
      if (seen.has(key)) return false;
      seen.add(key);
      return true;
    });
}

function compareNumbers(a: WaveVector, b: WaveVector): number {
  const [left, right] = [numericWaveVector(a) ?? [], numericWaveVector(b) ?? []];
  const at = left.findIndex((entry, axis) => Math.abs(entry - (right[axis] as number)) > 1e-9);
  return at < 0 ? 0 : (left[at] as number) - (right[at] as number);
}

type EigenvalueAt = (kappa: readonly number[]) => number;

/** Special points in the set, and where it crosses lines of symmetry. */
function onSymmetry(group: SpaceGroup, interaction: Interaction, at: EigenvalueAt, limit: number): number[][] {
  const found: number[][] = [];
  const actions = zoneActions(group, interaction.frame);
  const keep = (kappa: readonly number[]) => {
    const q = toZone(interaction.frame, kappa);
    const star = starOfZone(actions, q);
    if (!found.some((one) => star.some((image) => sameZonePoint(image, one, 1e-5)))) found.push(q);
  };
  for (const { k } of specialPoints(group)) {
    const kappa = kappaOf(group, numericWaveVector(k) ?? []);
    if (at(kappa) <= limit) keep(kappa);
  }
  for (const { k, dimensionPM } of atlas(group, { withInversion: true })) {
    if (dimensionPM !== 1) continue;
    const along = (value: number) => kappaAt(group, k, value);
    for (const value of lowestAlong((u) => at(along(u)), limit)) keep(along(value));
  }
  return found;
}

function kappaAt(group: SpaceGroup, { components }: WaveVector, ...values: readonly number[]): number[] {
  const [u = 0, v = u, w = u] = values;
  return kappaOf(
    group,
    components.map((form) => evaluateFormNumber(form, [u, v, w])),
  );
}

const samplesAlong = 240;

/** Isolated minima along a line that are as low as the limit; nothing where the whole line is. */
function lowestAlong(value: (u: number) => number, limit: number): number[] {
  const step = 2 / samplesAlong;
  const values = Array.from({ length: samplesAlong + 1 }, (_, n) => value(-1 + n * step + 0.37 * step));
  if (values.every((one) => one <= limit)) return [];
  const found: number[] = [];
  for (let n = 1; n < samplesAlong; n++) {
    const [left, middle, right] = [values[n - 1], values[n], values[n + 1]] as [number, number, number];
    if (middle > left || middle > right) continue;
    const centre = -1 + (n + 0.37) * step;
    const u = goldenSection(value, centre - step, centre + step);
    if (value(u) <= limit) found.push(u);
  }
  return found;
}

/** Lines and planes of symmetry that lie in the set as a whole; planes alone where there are some. */
function wholeManifolds(group: SpaceGroup, at: EigenvalueAt, limit: number, largest: number): WaveVector[] {
  const kinds: KindOfK[] = atlas(group, { withInversion: true }).filter(
    ({ dimensionPM }) => dimensionPM >= 1 && dimensionPM <= Math.min(largest, 2),
  );
  const whole = kinds.filter(({ k }) =>
    Array.from({ length: 9 }, (_, n) => [0.071 + 0.1117 * n, 0.413 - 0.0931 * n, 0.237 + 0.1313 * n]).every(
      (values) => at(kappaAt(group, k, ...values)) <= limit,
    ),
  );
  const dimension = Math.max(0, ...whole.map(({ dimensionPM }) => dimensionPM));
  return whole.filter(({ dimensionPM }) => dimensionPM === dimension).map(({ k }) => k);
}
