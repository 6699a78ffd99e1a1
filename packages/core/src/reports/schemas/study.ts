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
import { configurationsSchema } from "./configurations.js";
import { exchangeSchema, onsetSchema } from "./exchange.js";
import { overlapSchema, peaksSchema, satellitesSchema, searchSchema } from "./peaks.js";
import { irrepsSchema, modesSchema, starSchema } from "./symmetry.js";
import { weighSchema } from "./weigh.js";

export const checkSchema: JsonSchema = record({
  kind: oneOf("study", "cif"),
  blocks: nullable(list(text)),
  title: nullable(text),
  cell: nullable(shared("cell")),
  group: nullable(shared("group")),
  sites: list(
    record({
      label: text,
      ion: nullable(text),
      position: shared("exactPosition"),
      multiplicity: count,
      siteSymmetry: text,
      freeCoordinates: tuple(3, text),
      allowedMoment: tuple(3, text),
      snapped: nullable(record({ from: shared("exactPosition"), distanceAngstrom: nullable(number) })),
    }),
  ),
  k: list(shared("k")),
  peaks: nullable(record({ file: text, kind: text, count })),
  missing: list(text),
  cif: nullable(
    record({
      version: oneOf("1.1", "2.0"),
      block: nullable(text),
      symmetryFrom: nullable(text),
      siteCount: nullable(count),
      structures: list(
        record({
          block: text,
          title: nullable(text),
          group: nullable(shared("group")),
          cell: nullable(shared("cell")),
          sites: count,
        }),
      ),
      items: count,
      loops: count,
    }),
  ),
});

export const studySchema: JsonSchema = record({
  study: text,
  block: text,
  group: shared("group"),
  cell: nullable(shared("cell")),
  sites: list(record({ label: text, ion: nullable(text), active: flag, because: text })),
});

export const runSchema: JsonSchema = record({
  title: nullable(text),
  group: shared("group"),
  cell: nullable(shared("cell")),
  peaks: nullable(peaksSchema),
  coincidences: list(record({ peak: count, overlaps: list(overlapSchema) })),
  search: nullable(searchSchema),
  branches: list(
    record({
      k: shared("k"),
      candidate: nullable(count),
      star: starSchema,
      irreps: irrepsSchema,
      modes: modesSchema,
      configurations: nullable(configurationsSchema),
      satellites: nullable(satellitesSchema),
      weigh: nullable(weighSchema),
    }),
  ),
  exchange: nullable(exchangeSchema),
  onset: nullable(onsetSchema),
  notFollowed: list(count),
  next: list(text),
  files: list(text),
});

export const explainSchema: JsonSchema = record({
  codes: list(record({ code: text, meaning: text, exitStatus: count, remedy: nullable(text) })),
});

export const helpSchema: JsonSchema = record({ topic: text, title: text, text, topics: list(text) });
