import {
  count,
  flag,
  type JsonSchema,
  list,
  nullable,
  number,
  oneOf,
  pattern,
  record,
  shared,
  text,
  tuple,
} from "./building.js";

const property = nullable(record({ form: list(text), inParent: flag, induced: flag }));
const change = pattern("^[^;]+,[^;]+,[^;]+;[^;]+,[^;]+,[^;]+$", "(P, p) of International Tables A");
const operator = pattern("^[^,]+,[^,]+,[^,]+,[+-]1$", "a coordinate triplet with time reversal");

const superspaceOperator = pattern("^[^,]+,[^,]+,[^,]+,[^,]+,[+-]1$", "x1,x2,x3,x4 with time reversal");

const magneticGroup = record({
  type: { type: "integer", minimum: 1, maximum: 4 },
  bns: record({ number: pattern("^\\d+\\.\\d+$", "a text: 1.10 is not 1.1"), symbol: text }),
  og: record({ number: pattern("^\\d+\\.\\d+\\.\\d+$") }),
  pointGroup: text,
  cellFromParent: change,
  cell: nullable(shared("cell")),
  toBns: change,
  operators: list(operator),
  centrings: list(operator),
});

const site = record({
  label: text,
  parentSite: text,
  multiplicity: count,
  positionLattice: shared("exactPosition"),
  momentLattice: text,
  symmformLattice: text,
  symmformCrystal: nullable(text),
  exampleLattice: tuple(3, number),
  exampleCrystal: nullable(tuple(3, number)),
});

const otherAtom = record({
  label: text,
  parentSite: text,
  multiplicity: count,
  positionLattice: shared("exactPosition"),
});

const configuration = record({
  id: text,
  irreps: list(text),
  direction: text,
  arms: list(count),
  index: count,
  domains: record({ total: count, k: count, orientation: count }),
  freeParameters: record({ irreps: count, group: count }),
  freePhases: count,
  secondaryIrreps: list(record({ label: text, k: shared("k"), parameters: count })),
  subgroupOf: list(text),
  severalIrreps: flag,
  magneticGroup,
  sites: list(site),
  otherAtoms: list(otherAtom),
  notWritten: nullable(text),
  constantMoment: nullable(oneOf("always", "possible", "impossible")),
  netMoment: property,
  polarization: property,
  magnetoelectric: property,
  piezomagnetic: property,
});

const vector = tuple(3, number);

const modulated = record({
  id: text,
  irreps: list(text),
  direction: text,
  arms: list(count),
  index: count,
  domains: record({ total: count, k: count, orientation: count }),
  freeParameters: record({ irreps: count, group: count }),
  freePhases: count,
  needsSecondOrderParameter: flag,
  secondaryIrreps: list(record({ label: text, k: shared("k"), parameters: count })),
  subgroupOf: list(text),
  severalIrreps: flag,
  magneticGroup: record({
    pointGroup: text,
    superspace: record({ k: shared("k"), operators: list(superspaceOperator), centrings: list(superspaceOperator) }),
  }),
  sites: list(
    record({
      label: text,
      parentSite: text,
      multiplicity: count,
      positionLattice: shared("exactPosition"),
      meanMoment: text,
      cosineLattice: text,
      sineLattice: text,
      symmformCosine: text,
      symmformSine: text,
      exampleCosine: vector,
      exampleSine: vector,
      exampleCosineCrystal: nullable(vector),
      exampleSineCrystal: nullable(vector),
    }),
  ),
  netMoment: property,
  polarization: property,
  magnetoelectric: property,
  piezomagnetic: property,
});

export const configurationsSchema: JsonSchema = record({
  group: shared("group"),
  cell: nullable(shared("cell")),
  k: shared("k"),
  kind: oneOf("commensurate", "incommensurate"),
  arms: { anyOf: [oneOf("pair", "all"), list(count)] },
  star: list(shared("k")),
  parentStandard: record({ number: { type: "integer", minimum: 1, maximum: 230 }, change }),
  parentSites: list(
    record({ label: text, ion: nullable(text), occupancy: number, magnetic: flag, largestMoment: nullable(number) }),
  ),
  configurations: list({ anyOf: [configuration, modulated] }),
  bounded: list(text),
});

export const exportSchema: JsonSchema = record({
  configuration: text,
  cifVersion: oneOf("1.1", "2.0"),
  cif: pattern("^#\\\\#CIF_", "the text of the file"),
});
