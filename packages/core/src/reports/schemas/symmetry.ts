import {
  count,
  flag,
  integer,
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

export const opsSchema: JsonSchema = record({
  group: shared("group"),
  order: count,
  pointGroupOrder: count,
  pointGroup: text,
  operators: list(text, "coordinate triplets modulo integer translations, centring written out"),
});

const dimension: JsonSchema = { type: "integer", minimum: 0, maximum: 3 };

export const starSchema: JsonSchema = record({
  group: shared("group"),
  k: shared("k"),
  reduced: shared("k"),
  manifold: shared("k"),
  dimension,
  manifoldPM: shared("k"),
  dimensionPM: dimension,
  minusK: shared("minusK"),
  arms: list(shared("k")),
  littleGroup: shared("littleGroup"),
});

const numericIrrep = {
  characters: nullable(list(shared("complex"), "in the order of the little group's operators")),
  matrices: nullable(list(list(list(shared("complex"))))),
  exact: shared("exactIrrep"),
};

const complexMatrix = list(list(shared("complex")));
const exactMatrix = list(list(text));

const minusKRelation = record(
  {
    operator: text,
    links: list(record({ label: text, partner: text, matrix: complexMatrix, exact: exactMatrix })),
  },
  "the operator that takes k to -k and the matrices N of D(g0^-1 g g0)* = N^-1 D'(g) N",
);

const fullIrreps = record(
  {
    arms: list(shared("k")),
    representatives: list(text, "the operator that takes k to each arm"),
    operators: list(text, "one per coset of the lattice, in the order of the matrices"),
    irreps: list(
      record({
        label: text,
        dimension: count,
        matrices: nullable(list(complexMatrix)),
        exact: record({ matrices: list(exactMatrix) }),
      }),
    ),
  },
  "irreps of the whole space group; rows and columns run over (arm, partner)",
);

export const irrepsSchema: JsonSchema = record({
  group: shared("group"),
  k: shared("k"),
  reduced: shared("k"),
  minusK: shared("minusK"),
  arms: count,
  littleGroup: shared("littleGroup"),
  irreps: list(
    record({
      label: text,
      dimension: count,
      reality: shared("reality"),
      conjugateOf: nullable(text),
      physicalDimension: count,
      ...numericIrrep,
    }),
  ),
  minusKRelation: nullable(minusKRelation),
  full: nullable(fullIrreps),
});

const mode = record({
  copy: count,
  partner: count,
  suborbit: count,
  moments: nullable(
    list(tuple(3, shared("complex")), "one triple per orbit atom, in the components of the convention"),
  ),
  exact: list(tuple(3, text), "lattice components"),
});

const minusKModes = record(
  {
    operator: text,
    partner: text,
    suborbitImages: list(count),
    matrix: nullable(complexMatrix),
    exact: exactMatrix,
    constraint: nullable(list(text)),
    constraintCrystal: nullable(list(text)),
  },
  "how the operator that takes k to -k acts on the copies, and the arrangement of one order parameter",
);

const armModes = record({
  arm: shared("k"),
  operator: text,
  irreps: list(record({ label: text, modes: list(mode) })),
});

const readComponents = record(
  {
    file: text,
    components: list(tuple(3, shared("complex"))),
    irreps: list(
      record({
        label: text,
        share: number,
        amplitudes: list(record({ copy: count, partner: count, value: shared("complex") })),
      }),
    ),
  },
  "Fourier components from a file, in kvane's own convention, and their parts by irrep",
);

export const modesSchema: JsonSchema = record({
  group: shared("group"),
  k: shared("k"),
  minusK: shared("minusK"),
  arms: count,
  axial: flag,
  convention: record(
    {
      exponent: oneOf("minus", "plus"),
      phase: oneOf("lattice", "position"),
      factor: oneOf("one", "half"),
      components: oneOf("lattice", "crystal", "cartesian"),
    },
    "how Fourier components are written",
  ),
  cell: nullable(shared("cell")),
  littleGroup: shared("littleGroup"),
  sites: list(
    record({
      label: text,
      position: shared("exactPosition"),
      multiplicity: count,
      siteSymmetry: text,
      orbit: list(shared("exactPosition"), "one atom per atom of the primitive cell"),
      suborbits: list(list(count)),
      irreps: list(
        record({
          label: text,
          dimension: count,
          reality: shared("reality"),
          multiplicity: count,
          ...numericIrrep,
          modes: list(mode),
          constraint: list(text, "lattice components"),
          constraintCrystal: nullable(list(text, "moments along the crystal axes")),
          freeParameters: integer,
          freeParametersWithMinusK: integer,
          minusK: nullable(minusKModes),
          vanishingAtoms: list(count),
          equalAmplitude: nullable(flag),
          constantMoment: nullable(flag),
          collinear: nullable(flag),
        }),
      ),
      starModes: nullable(list(armModes, "one per arm of the star")),
      read: nullable(readComponents),
    }),
  ),
});
