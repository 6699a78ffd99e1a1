import { breathe, type WorkHost } from "../algorithms/index.js";
import { atlas, formatWaveVector, type KindOfK, kindOf, type WaveVector } from "../kvectors/index.js";
import { roundNumber } from "../numbers/index.js";
import { balancedModel } from "./balanced.js";
import { groundOf } from "./ground.js";
import { withConstants } from "./model.js";
import { type DiagramBoundary, phaseBoundaries } from "./phase-boundaries.js";
import type { ExchangeModel } from "./types.js";
import { zoneWedge } from "./wedge.js";
import { zoneFrame } from "./zone-frame.js";

/** One constant (of a shell or of some classes at once) that runs through a range. */
export interface DiagramAxis {
  /** How it is called, such as `2` or `3b`. */
  readonly name: string;
  readonly classes: readonly string[];
  readonly from: number;
  readonly to: number;
  /** Number of values, at least 2. */
  readonly count: number;
}

/** The k that are least, by their kinds: points in one phase have the same. */
export interface DiagramPhase {
  /** `(1/2, 1/2, 0)`, `(u, u, 0)`; several where several stars are equally low. */
  readonly forms: readonly string[];
  readonly dimension: 0 | 1 | 2 | 3;
}

/** A point of a phase diagram: constants, the set of k of lowest energy and the energy. */
export interface DiagramPoint {
  readonly values: readonly number[];
  /** Per spin. */
  readonly energy: number;
  readonly phase: number;
  readonly k: readonly WaveVector[];
}

/** Which k are preferred while one or two constants run. */
export interface PhaseDiagram {
  /** Directions of k that no bond notices, whatever the constants. */
  readonly freeDirections: number;
  readonly axes: readonly DiagramAxis[];
  readonly phases: readonly DiagramPhase[];
  /** First axis fastest. */
  readonly points: readonly DiagramPoint[];
  /** Null for two axes. */
  readonly boundaries: readonly DiagramBoundary[] | null;
}

/** Each point is a search of its own: what a boundary is refined to needs no more than this. */
const pointOptions = { mostLeaves: 120, leafShare: 1e-3, withoutManifolds: true };

/** The ordering vectors of a model while one or two constants run. */
export async function phaseDiagram(
  model: ExchangeModel,
  axes: readonly DiagramAxis[],
  host: WorkHost = {},
): Promise<PhaseDiagram> {
  const phases: DiagramPhase[] = [];
  // One frame for all points: a constant that passes through zero must not change what k is counted modulo.
  const frame = zoneFrame(
    model.table,
    model.couplings.flatMap(({ bonds }) => bonds.bonds),
  );
  const prepared = frame.rank === 0 ? null : { frame, wedge: zoneWedge(model.table.group, frame) };
  const options = { ...pointOptions, ...prepared };
  const modelAt = (values: readonly number[]) =>
    balancedModel(
      withConstants(
        model,
        Object.fromEntries(axes.flatMap(({ classes }, axis) => classes.map((name) => [name, values[axis] as number]))),
      ),
      prepared,
      host,
    );
  const kinds = atlas(model.table.group, { withInversion: true });
  const kindForm = (k: WaveVector): string => {
    const index = kindOf(model.table.group, kinds, k, { withInversion: true });
    return formatWaveVector((kinds[index] as KindOfK).k);
  };
  const pointAt = async (values: readonly number[]): Promise<DiagramPoint> => {
    await breathe(host);
    const { energy, set } = await groundOf(await modelAt(values), options, host);
    const forms = [...new Set(set.vectors.map(({ k }) => kindForm(k)))].sort();
    const key = `${set.dimension} ${forms.join(" ")}`;
    let phase = phases.findIndex((one) => `${one.dimension} ${one.forms.join(" ")}` === key);
    if (phase < 0) phase = phases.push({ forms, dimension: set.dimension }) - 1;
    return { values: values.map((value) => roundNumber(value)), energy, phase, k: set.vectors.map(({ k }) => k) };
  };
  const points: DiagramPoint[] = [];
  const total = axes.reduce((product, { count }) => product * count, 1);
  for (let index = 0; index < total; index++) {
    let rest = index;
    const values = axes.map(({ from, to, count }) => {
      const place = rest % count;
      rest = Math.floor(rest / count);
      return from + ((to - from) * place) / (count - 1);
    });
    points.push(await pointAt(values));
    host.progress?.(index + 1, total, "phase diagram");
  }
  const freeDirections = 3 - frame.rank;
  const isDegenerate = (phase: number) => (phases[phase]?.dimension ?? 0) > freeDirections;
  const one = axes.length === 1 && frame.rank > 0;
  const boundaries = one
    ? await phaseBoundaries(points, { group: model.table.group, frame, modelAt, pointAt, kindForm, isDegenerate })
    : axes.length === 1
      ? []
      : null;
  return { freeDirections, axes, ...withoutUnused({ phases, points, boundaries }) };
}

/** Phases that the search for boundaries met without staying there have no letter. */
function withoutUnused({
  phases,
  points,
  boundaries,
}: Pick<PhaseDiagram, "phases" | "points" | "boundaries">): Pick<PhaseDiagram, "phases" | "points" | "boundaries"> {
  const used = new Set([
    ...points.map(({ phase }) => phase),
    ...(boundaries ?? []).flatMap(({ from, to }) => [from, to]),
  ]);
  const kept = phases.flatMap((_, index) => (used.has(index) ? [index] : []));
  const place = (index: number) => kept.indexOf(index);
  return {
    phases: kept.map((index) => phases[index] as DiagramPhase),
    points: points.map((point) => ({ ...point, phase: place(point.phase) })),
    boundaries: boundaries?.map((one) => ({ ...one, from: place(one.from), to: place(one.to) })) ?? null,
  };
}
