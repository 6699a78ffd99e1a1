import { commandTable } from "../commands.js";
import { argumentNames, type RequestField } from "../request.js";
import { type FieldKind, fieldKind } from "../request-fields.js";

const kindSchemas: { readonly [kind in FieldKind]: object } = {
  text: { type: ["string", "null"] },
  flag: { type: ["boolean", "null"] },
  list: { type: ["array", "null"], items: { type: "string" } },
};

/**
 * The JSON Schema (draft 2020-12) of a line of `kvane batch`: for each command the fields that it takes. What a value
 * must say is checked by the command, as on the command line. Stricter than the reader in one thing: fields that the command
 * does not take are refused here even where they are null or a flag that is false.
 */
export function requestSchema(): { readonly [keyword: string]: unknown } {
  return {
    $schema: "https://json-schema.org/draft/2020-12/schema",
    $id: "urn:kvane:format-1:request",
    title: "a request to kvane, one line of kvane batch",
    oneOf: Object.entries(commandTable).map(([command, { takes }]) => ({
      title: `kvane ${command}`,
      type: "object",
      required: ["command"],
      properties: {
        id: { type: ["string", "number", "null"], description: "given back with the answer" },
        command: { const: command },
        texts: {
          type: ["object", "null"],
          additionalProperties: { type: "string" },
          description: "texts of files by name, looked up before the disk",
        },
        ...Object.fromEntries(takes.map((field) => [field, fieldSchema(field)])),
      },
      additionalProperties: false,
    })),
  };
}

function fieldSchema(field: RequestField): object {
  return { ...kindSchemas[fieldKind(field)], description: `on the command line ${argumentNames[field]}` };
}
