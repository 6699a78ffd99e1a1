import { answerSchema } from "@kvane/core/reports";
import { Ajv2020, type ValidateFunction } from "ajv/dist/2020.js";

const ajv = new Ajv2020({ strict: true, strictTypes: false, allErrors: true });
const validators = new Map<string, ValidateFunction>();

/** What is wrong with an answer by the exported schema of its command, and fields that the schema does not know. */
export function schemaErrors(command: string, answer: unknown): string[] {
  let validate = validators.get(command);
  if (validate === undefined) {
    validate = ajv.compile(closed(answerSchema(command)) as object);
    validators.set(command, validate);
  }
  if (validate(answer)) return [];
  return (validate.errors ?? []).map(
    ({ instancePath, message, params }) => `${instancePath} ${message} ${JSON.stringify(params)}`,
  );
}

/**
 * The schema with every object closed: the exported ones let fields be added within one format, but here an unknown
 * field is one that somebody forgot to describe.
 */
function closed(schema: unknown): unknown {
  if (Array.isArray(schema)) return schema.map(closed);
  if (schema === null || typeof schema !== "object") return schema;
  const inner = Object.fromEntries(Object.entries(schema).map(([key, value]) => [key, closed(value)]));
  const isRecord = "properties" in schema && "required" in schema && !("additionalProperties" in schema);
  return isRecord ? { ...inner, additionalProperties: false } : inner;
}
