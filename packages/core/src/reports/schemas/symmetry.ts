import { count, flag, integer, type JsonSchema, list, nullable, record, shared, text, tuple } from "./building.js";

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

export const irrepsSchema: JsonSchema = record({
  group: shared("group"),
  k: shared("k"),
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
});

const mode = record({
  copy: count,
  partner: count,
  suborbit: count,
  moments: nullable(list(tuple(3, shared("complex")), "lattice components, one triple per orbit atom")),
  exact: list(tuple(3, text)),
});

export const modesSchema: JsonSchema = record({
  group: shared("group"),
  k: shared("k"),
  minusK: shared("minusK"),
  arms: count,
  axial: flag,
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
          constraint: list(text),
          freeParameters: integer,
          freeParametersWithMinusK: nullable(integer),
          vanishingAtoms: list(count),
          equalAmplitude: nullable(flag),
          constantMoment: nullable(flag),
        }),
      ),
    }),
  ),
});
