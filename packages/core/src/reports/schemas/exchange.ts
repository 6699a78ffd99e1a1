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

const dimension: JsonSchema = { type: "integer", minimum: 0, maximum: 3 };
const irreps = list(record({ label: text, dimension: count, multiplicity: count }));

const bondClass = record({
  name: text,
  labels: tuple(2, text),
  bonds: count,
  neighbours: list(record({ label: text, count: number })),
  vector: tuple(3, number),
  j: nullable(number),
});

const ground = record({
  energy: number,
  dimension,
  vectors: list(record({ k: shared("k"), pairs: count })),
  manifolds: list(shared("k"), "lines and planes of symmetry that lie in the set as a whole"),
  freeDirections: count,
  certificate: record({
    boxes: count,
    smallestBox: number,
    leaves: count,
    exhaustive: flag,
    lowerBound: number,
    stopped: nullable(text),
  }),
  constantMoments: record({
    answer: oneOf("reached", "only a bound", "not found"),
    k: list(shared("k")),
    spins: nullable(oneOf("collinear", "coplanar", "non-coplanar")),
    short: list(text),
  }),
});

const atK = record({
  k: shared("k"),
  from: oneOf("minimum", "given"),
  above: number,
  levels: list(
    record({
      energy: number,
      degeneracy: count,
      irreps,
      magneticIrreps: irreps,
      weights: list(number),
      phases: nullable(list(nullable(number))),
    }),
  ),
});

const configuration = record({
  id: text,
  k: shared("k"),
  irreps: list(text),
  direction: text,
  amplitudes: count,
  lowest: number,
  highest: number,
});

const stationary = record({
  k: shared("k"),
  constants: list(record({ name: text, classes: list(text), j: number })),
  relations: list(
    record({ letter: oneOf("u", "v", "w"), slopes: list(number), curvatures: list(number), text: nullable(text) }),
  ),
  fixedBySymmetry: flag,
  slopes: list(number),
  needed: list(
    record({
      name: text,
      classes: list(text),
      j: nullable(number),
      along: oneOf("minimum", "maximum", "level"),
      lowest: nullable(flag),
      oneOfMany: flag,
    }),
  ),
  potentials: oneOf("none", "balanced anew", "those of the model"),
});

const diagram = record({
  freeDirections: count,
  axes: list(record({ name: text, classes: list(text), from: number, to: number, count })),
  phases: list(record({ forms: list(text), dimension })),
  points: list(record({ values: list(number), energy: number, phase: count, k: list(shared("k")) })),
  boundaries: nullable(list(record({ value: number, from: count, to: count, sudden: flag }))),
});

export const exchangeSchema: JsonSchema = record({
  group: shared("group"),
  cell: shared("cell"),
  energy: text,
  atoms: list(record({ label: text, position: tuple(3, text), length: number, potential: number })),
  shells: list(record({ number: count, distance: number, classes: list(bondClass) })),
  ground: nullable(ground),
  atK: list(atK),
  configurations: list(configuration),
  stationary: nullable(stationary),
  diagram: nullable(diagram),
});

const measured = record({ value: number, su: nullable(number) });
const data = record({ temperatures: list(number), values: list(number), uncertainties: nullable(list(number)) });
const source = oneOf("given", "scatter");

const law = record({
  transition: measured,
  beta: measured,
  amplitude: measured,
  background: measured,
  chiSquared: number,
  degreesOfFreedom: { type: "integer" },
  uncertaintySource: source,
  points: count,
  pointsBelow: count,
  from: number,
  to: number,
  reducedRange: number,
  fits: flag,
});

export const onsetSchema: JsonSchema = record({
  file: text,
  columns: list(record({ name: text, as: oneOf("temperature", "intensity", "k", "uncertainty"), of: nullable(text) })),
  rows: count,
  peaks: list(
    record({
      name: text,
      behaviour: oneOf("onset", "loss", "constant", "gradual", "absent", "undecided"),
      evidence: number,
      onBackground: flag,
      fit: nullable(law),
      data,
    }),
  ),
  transitions: list(record({ temperature: measured, peaks: list(count), probability: nullable(number) })),
  k: list(
    record({
      name: text,
      behaviour: oneOf("constant", "sliding", "lock-in", "undecided"),
      plateaus: list(record({ from: number, to: number, points: count, mean: measured, fraction: nullable(text) })),
      slope: nullable(measured),
      uncertaintySource: source,
      data,
    }),
  ),
});
