import { type JsonSchema, list, nothing, nullable, shared, text } from "./building.js";
import { commonDefinitions } from "./common.js";
import { configurationsSchema, exportSchema } from "./configurations.js";
import { decomposeSchema } from "./decompose.js";
import { exchangeSchema, onsetSchema } from "./exchange.js";
import { atlasSchema, compatibilitySchema } from "./kinds.js";
import { satellitesSchema, searchSchema } from "./peaks.js";
import { checkSchema, explainSchema, helpSchema, runSchema, studySchema } from "./study.js";
import { irrepsSchema, modesSchema, opsSchema, starSchema } from "./symmetry.js";
import { weighSchema } from "./weigh.js";

/** Schema of `result` by command; null for commands that are named but not built in this version. */
const resultSchemas: { readonly [command: string]: JsonSchema } = {
  run: runSchema,
  report: runSchema,
  study: studySchema,
  check: checkSchema,
  ops: opsSchema,
  atlas: atlasSchema,
  star: starSchema,
  irreps: irrepsSchema,
  compatibility: compatibilitySchema,
  modes: modesSchema,
  configurations: configurationsSchema,
  decompose: decomposeSchema,
  export: exportSchema,
  satellites: satellitesSchema,
  index: searchSchema,
  locate: searchSchema,
  weigh: weighSchema,
  exchange: exchangeSchema,
  onset: onsetSchema,
  explain: explainSchema,
  help: helpSchema,
};

/** The commands whose answers have a schema. */
export const describedCommands: readonly string[] = Object.keys(resultSchemas);

/**
 * The JSON Schema (draft 2020-12) of the whole answer to `command`: plain data, without references to other files.
 * For a command that is not built the result can only be null.
 */
export function answerSchema(command: string): JsonSchema {
  const resultSchema = Object.hasOwn(resultSchemas, command) ? resultSchemas[command] : undefined;
  return {
    $schema: "https://json-schema.org/draft/2020-12/schema",
    // What is no command has no name to be known by: it may have any letters.
    ...(resultSchema === undefined ? {} : { $id: `urn:kvane:format-1:${command}` }),
    title: `answer to kvane ${command}`,
    type: "object",
    required: ["kvane", "format", "command", "input", "result", "errors", "warnings", "assumed"],
    properties: {
      kvane: text,
      format: { const: 1 },
      command: { const: command },
      input: {
        type: "object",
        additionalProperties: { anyOf: [{ type: ["string", "number", "boolean", "null"] }, list(text)] },
      },
      result: nullable(resultSchema ?? nothing),
      errors: list(shared("problem")),
      warnings: list(shared("problem")),
      assumed: list(shared("assumed")),
    },
    // A result and errors exclude each other.
    if: { properties: { result: nothing } },
    // biome-ignore lint/suspicious/noThenProperty: a keyword of JSON Schema
    then: { properties: { errors: { minItems: 1 } } },
    else: { properties: { errors: { maxItems: 0 } } },
    $defs: commonDefinitions,
  };
}
