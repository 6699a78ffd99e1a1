import {
  count,
  flag,
  type JsonSchema,
  list,
  nullable,
  number,
  oneOf,
  record,
  shared,
  text,
  tuple,
} from "./building.js";

/** Integers wherever all integer vectors are lattice vectors; an unusual basis may give fractions. */
const h = tuple(3, number);
const sign = oneOf(1, -1, 0);

export const overlapSchema: JsonSchema = record({
  with: oneOf("nuclear", "half wavelength"),
  h,
  q: number,
  separation: number,
  allowed: flag,
});

export const satellitesSchema: JsonSchema = record({
  group: shared("group"),
  cell: shared("cell"),
  k: shared("k"),
  wavelengthAngstrom: nullable(number),
  qMax: number,
  overlapWithin: number,
  reflections: list(
    record({
      h,
      sign,
      arm: count,
      q: number,
      d: number,
      twoThetaDeg: nullable(number),
      multiplicity: count,
      multiplicityAllArms: count,
      overlaps: list(overlapSchema),
      moreOverlaps: count,
      extinctFor: nullable(list(text)),
      intensity: nullable(number),
    }),
    "by rising Q",
  ),
});

export const peaksSchema: JsonSchema = record({
  file: nullable(text),
  kind: oneOf("d", "q", "two-theta", "hkl"),
  wavelengthAngstrom: nullable(number),
  uncertaintySource: text,
  list: list(
    record({
      index: count,
      position: nullable(number),
      hkl: nullable(tuple(3, number)),
      q: nullable(number),
      uncertainty: number,
      intensity: nullable(number),
    }),
  ),
});

const line = { h, sign, arm: count, residual: number };

const evidence = record({
  value: number,
  reading: oneOf("found", "weak", "not informative"),
  charges: record({ dimensions: number, kinds: number, tuning: number }),
});

const reference = record({ k: shared("k"), evidence: number, matched: count, total: count });

const stageName = oneOf("harmonics", "second vector", "sums");

const candidate = record({
  k: shared("k"),
  reduced: shared("k"),
  manifold: shared("k"),
  dimension: { type: "integer", minimum: 0, maximum: 3 },
  arms: count,
  onNuclearLines: flag,
  evidence,
  matched: count,
  total: count,
  deWolff: nullable(number),
  smithSnyder: nullable(number),
  nearFractions: list(record({ letter: oneOf("u", "v", "w"), fraction: text, deviation: number })),
  tiedWith: list(count),
  assignments: list(
    record({
      ...line,
      peak: count,
      q: number,
      residualHkl: nullable(tuple(3, number)),
      alternatives: list(record(line)),
    }),
  ),
  unmatched: list(count),
  residuals: record({
    rootMeanSquare: number,
    largest: number,
    chiSquared: number,
    degreesOfFreedom: { type: "integer" },
    reducedChiSquared: nullable(number),
  }),
  refinement: nullable(
    record({
      from: shared("k"),
      determined: flag,
      converged: flag,
      rescaledSu: nullable(list(number)),
    }),
  ),
  corrections: list(
    record({ name: { enum: ["zeroShift", "cellScale"] }, value: number, su: nullable(number), limit: number }),
  ),
  region: nullable(count),
  merged: list(record({ k: shared("k"), dimension: count, evidence: number, matched: count })),
  separations: list(
    record({
      candidate: nullable(count),
      k: shared("k"),
      q: number,
      distance: number,
      resolution: nullable(number),
      toldApart: flag,
    }),
  ),
});

export const searchSchema: JsonSchema = record({
  group: shared("group"),
  cell: shared("cell"),
  peaks: peaksSchema,
  candidates: list(candidate, "best evidence first"),
  certificate: nullable(
    record({
      minimumMatched: count,
      boxes: count,
      smallestBox: number,
      exhaustive: flag,
      maxDimension: { type: "integer", minimum: 0, maximum: 3 },
      zeroShift: number,
      cellScale: number,
      stopped: nullable(text),
      kinds: list(
        record({
          kind: shared("k"),
          dimension: count,
          boxes: count,
          leaves: count,
          regions: count,
          undecided: count,
          unexplored: number,
          saturated: flag,
          allWeighed: flag,
        }),
      ),
    }),
  ),
  setAside: list(record({ peak: count, because: text })),
  unmatched: list(count),
  regions: list(record({ kind: shared("k"), from: list(number), to: list(number), leaves: count, decided: flag })),
  flags: list(
    record({
      peak: count,
      with: { enum: ["nuclear", "half wavelength"] },
      h: list(number),
      state: text,
      separation: number,
      parentIntensity: nullable(number),
    }),
  ),
  severalVectors: nullable(
    record({
      stages: list(
        record({
          stage: stageName,
          tried: count,
          boxes: count,
          exhaustive: flag,
          minimumMatched: list(count),
        }),
      ),
      found: list(
        record({
          stage: stageName,
          vectors: list(shared("k")),
          members: list(record({ name: text, k: shared("k"), peaks: list(count) })),
          evidence,
          gain: number,
          matched: count,
          total: count,
          unmatched: list(count),
        }),
        "best evidence first",
      ),
      single: reference,
    }),
  ),
  references: list(reference),
  dropped: count,
});
