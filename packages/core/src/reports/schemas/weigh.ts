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

const measured = { value: number, su: nullable(number) };

const candidate = record({
  id: text,
  irreps: list(text),
  direction: text,
  chiSquared: number,
  reducedChiSquared: nullable(number),
  rFactor: number,
  parameters: count,
  criterion: number,
  amplitudes: list(record({ label: text, ...measured, determined: flag })),
  freePhase: flag,
  moments: list(
    record({
      label: text,
      position: tuple(3, number),
      momentCrystal: tuple(3, number),
      size: nullable(number),
      sizeSu: nullable(number),
      largest: number,
      limit: nullable(number),
      aboveLimit: flag,
    }),
  ),
  factorToLimit: nullable(number),
  scale: nullable(number),
  domains: list(record({ operator: text, fraction: number, su: nullable(number) })),
  calculated: list(number, "one for each of data.list"),
  sameAs: list(text),
  identicalTo: list(text),
  separations: list(
    record({
      from: text,
      by: oneOf("powder line", "single crystal", "polarised neutrons", "not by diffraction"),
      hkl: nullable(tuple(3, number)),
      q: nullable(number),
      text,
    }),
  ),
  minima: list(record({ chiSquared: number, amplitudes: list(number) })),
  starts: count,
  hits: count,
});

export const weighSchema: JsonSchema = record({
  group: shared("group"),
  cell: shared("cell"),
  k: shared("k"),
  ions: list(record({ label: text, ion: text, formFactor: text, limit: nullable(number) })),
  data: record({
    file: text,
    sample: oneOf("powder", "single crystal"),
    wavelengthAngstrom: nullable(number),
    lorentz: flag,
    scale: nullable(number),
    resolution: number,
    uncertaintySource: text,
    list: list(
      record({ label: text, q: nullable(number), hkl: nullable(tuple(3, number)), observed: number, su: number }),
    ),
  }),
  ranking: list(candidate, "best criterion first"),
  struckOut: list(record({ id: text, irreps: list(text), peaks: list(text) })),
  unassigned: list(text),
  relative: flag,
  criterion: text,
  remarks: list(text),
  bounded: list(text),
});
