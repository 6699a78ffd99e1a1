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
  tuple,
} from "./building.js";

const exactNumber = pattern("^-?\\d+(/\\d+)?$", "an exact fraction");

/** Parts that several results share, by the names that `$ref` uses. */
export const commonDefinitions: { readonly [name: string]: JsonSchema } = {
  group: record(
    {
      number: nullable({ type: "integer", minimum: 1, maximum: 230 }),
      hall: nullable(text),
      hermannMauguin: nullable(text),
      choice: text,
      basisChange: pattern("^[^;]+,[^;]+,[^;]+;[^;]+,[^;]+,[^;]+$", "(P, p) of International Tables A"),
    },
    "how a space group is called",
  ),
  k: record(
    {
      components: tuple(3, pattern("^[-+uvw0-9/]+$", "a fraction or a linear form in u, v, w")),
      values: dictionary(number, oneOf("u", "v", "w")),
      su: dictionary(nullable(number), oneOf("u", "v", "w")),
      numeric: nullable(tuple(3, number)),
    },
    "a wave vector in the reciprocal basis of the setting's axes; components alone decide symmetry",
  ),
  cell: record(
    { a: number, b: number, c: number, alpha: number, beta: number, gamma: number },
    "lengths in Å, angles in degrees",
  ),
  littleGroup: record(
    { order: count, symbol: text, operators: list(text) },
    "order and symbol are of the little co-group",
  ),
  minusK: oneOf("equivalent", "in star", "not in star"),
  reality: oneOf("real", "pseudoreal", "complex"),
  complex: tuple(2, number),
  exactPosition: tuple(3, exactNumber),
  exactIrrep: record({ characters: list(text), matrices: list(list(list(text))) }),
  place: record({
    file: nullable(text),
    line: nullable(count),
    column: nullable(count),
    path: nullable(text),
    argument: nullable(text),
  }),
  problem: record(
    {
      code: pattern("^[a-z][a-z0-9]*(-[a-z0-9]+)*$"),
      message: text,
      where: shared("place"),
      expected: nullable(text),
      found: nullable(text),
      remedy: nullable(text),
    },
    "one thing that is wrong or doubtful",
  ),
  assumed: record({ what: text, value: text, because: text }, "something taken that was not said"),
};
