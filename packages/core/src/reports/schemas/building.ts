/** A JSON Schema (2020-12) as plain data. */
export type JsonSchema = { readonly [keyword: string]: unknown };

export const text: JsonSchema = { type: "string" };
export const number: JsonSchema = { type: "number" };
export const integer: JsonSchema = { type: "integer" };
export const count: JsonSchema = { type: "integer", minimum: 0 };
export const flag: JsonSchema = { type: "boolean" };
export const nothing: JsonSchema = { type: "null" };

/** An object whose fields are all present; fields may be added within one format, so others are not forbidden. */
export function record(properties: { readonly [name: string]: JsonSchema }, description?: string): JsonSchema {
  return { type: "object", ...(description ? { description } : {}), required: Object.keys(properties), properties };
}

/** An object with free names and values of one kind. */
export function dictionary(values: JsonSchema, names?: JsonSchema): JsonSchema {
  return { type: "object", ...(names ? { propertyNames: names } : {}), additionalProperties: values };
}

export function list(items: JsonSchema, description?: string): JsonSchema {
  return { type: "array", ...(description ? { description } : {}), items };
}

/** A list of exactly so many items. */
export function tuple(length: number, items: JsonSchema): JsonSchema {
  return { type: "array", items, minItems: length, maxItems: length };
}

/** The same or null, for what may not apply or was not computed. */
export function nullable(schema: JsonSchema): JsonSchema {
  return { anyOf: [schema, nothing] };
}

export function oneOf(...values: readonly (string | number)[]): JsonSchema {
  return { enum: values };
}

export function pattern(expression: string, description?: string): JsonSchema {
  return { type: "string", pattern: expression, ...(description ? { description } : {}) };
}

/** A schema of the common part by its name. */
export function shared(name: string): JsonSchema {
  return { $ref: `#/$defs/${name}` };
}
