import { type JsonSchema, list, nullable, number, oneOf, record, shared, text } from "./building.js";

const amplitudes = record({ label: text, amplitudes: list(shared("complex")) });

export const decomposeSchema: JsonSchema = record({
  file: text,
  block: nullable(text),
  group: shared("group"),
  cell: shared("cell"),
  childFromParent: text,
  furthest: number,
  moments: list(
    record({
      site: text,
      ion: nullable(text),
      largest: number,
      limit: nullable(number),
      verdict: nullable(oneOf("beyond the ion", "usual", "low")),
    }),
  ),
  parts: list(
    record({
      k: shared("k"),
      label: text,
      share: number,
      arms: list(record({ k: shared("k"), sites: list(amplitudes) })),
    }),
    "largest share first",
  ),
  magneticGroup: record({
    type: { type: "integer", minimum: 1, maximum: 4 },
    bns: record({ number: text, symbol: text }),
    og: record({ number: text }),
    pointGroup: text,
    toBns: text,
  }),
  declared: record({ bns: nullable(text), operators: text }),
  primary: record({ k: shared("k"), irreps: list(text), arms: list({ type: "integer", minimum: 1 }) }),
  recognised: nullable(record({ id: text, direction: text, operator: text })),
  listed: list(text),
});
