import {
  count,
  dictionary,
  type JsonSchema,
  list,
  nullable,
  number,
  oneOf,
  pattern,
  record,
  shared,
  text,
} from "./building.js";

const dimension: JsonSchema = { type: "integer", minimum: 0, maximum: 3 };

const kind = record({
  k: shared("k"),
  dimension,
  dimensionPM: dimension,
  littleCoGroup: record({ symbol: text, order: count }),
  arms: count,
  minusK: shared("minusK"),
  halfLattice: list(shared("k"), "the k on it with 2k a reciprocal lattice vector"),
});

export const atlasSchema: JsonSchema = record({
  group: shared("group"),
  cell: nullable(shared("cell")),
  kinds: list(kind, "under the point group"),
  kindsPM: list(kind, "under the point group extended by -1"),
  given: nullable(
    record({
      k: shared("k"),
      kind: count,
      kindPM: count,
      within: nullable(number),
      nearby: nullable(
        list(record({ kindPM: count, nearest: shared("k"), distance: number }), "distances in 1/Å with 2 pi"),
      ),
    }),
  ),
});

const parts = list(record({ label: text, multiplicity: { type: "integer", minimum: 1 } }));

const namedIrreps = list(
  record({
    label: text,
    dimension: count,
    characters: nullable(list(shared("complex"), "in the order of the little group's operators")),
    exact: record({ characters: list(text) }),
  }),
);

export const compatibilitySchema: JsonSchema = record({
  group: shared("group"),
  from: record({
    k: shared("k"),
    arm: shared("k"),
    operator: text,
    littleGroup: shared("littleGroup"),
    irreps: namedIrreps,
  }),
  to: record({
    k: shared("k"),
    dimension,
    values: dictionary(pattern("^-?\\d+(/\\d+)?$"), oneOf("u", "v", "w")),
    littleGroup: shared("littleGroup"),
    irreps: namedIrreps,
  }),
  splitting: list(record({ label: text, dimension: count, dimensionOfParts: count, parts })),
  joining: list(record({ label: text, ends: parts })),
});
