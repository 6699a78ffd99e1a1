import { KvaneError, nearMiss, type Problem, problem } from "../errors/index.js";
import { argumentNames, type Request, type RequestField } from "./request.js";

/** Fields whose values are of a type; the compiler holds the records below against it. */
type FieldsOf<T> = { [field in RequestField]-?: NonNullable<Request[field]> extends T ? field : never }[RequestField];

const flags: { readonly [field in FieldsOf<boolean>]: true } = {
  syntax: true,
  full: true,
  polar: true,
  star: true,
  weighIntensities: true,
  includesNuclear: true,
  fitted: true,
  files: true,
};
const lists: { readonly [field in FieldsOf<readonly string[]>]: true } = {
  sites: true,
  exclude: true,
  impurities: true,
  together: true,
  onSites: true,
  constants: true,
  vary: true,
  formFactors: true,
};

/**
 * Refuses fields that the command does not take (null for a command that there is not) and values of a wrong type, all at once: a request may come from a program that no compiler checked, and a number
 * where a text is due must not pass for something that was not given.
 */
export function checkShape(request: Request, takes: readonly RequestField[] | null): void {
  const problems: Problem[] = [];
  for (const [field, value] of Object.entries(request)) {
    const given = value !== null && value !== undefined && value !== false;
    if (!given || takes === null || field === "command" || takes.some((one) => one === field)) continue;
    const near = nearMiss(field, takes);
    problems.push(
      problem("invalid-request", `\`${request.command}\` takes no field \`${field}\``, {
        where: { path: field },
        expected: `one of ${takes.join(", ")}`,
        found: field,
        remedy: near === null ? "leave it out, or set it to null" : `did you mean \`${near}\`?`,
      }),
    );
  }
  for (const field of Object.keys(argumentNames) as RequestField[]) {
    const value: unknown = request[field] ?? null;
    if (value === null || fits(field, value)) continue;
    problems.push(
      problem("invalid-argument", `the field \`${field}\` of the request has a value of the wrong type`, {
        where: { argument: argumentNames[field] },
        expected: field in flags ? "true or false" : field in lists ? "a list of texts" : "a text",
        found: Array.isArray(value) ? "a list" : typeof value === "object" ? "a record" : `a ${typeof value}`,
        remedy: "give the value as a user would type it, a number too",
      }),
    );
  }
  if (problems.length > 0) throw new KvaneError(problems);
}

function fits(field: RequestField, value: unknown): boolean {
  if (field in flags) return typeof value === "boolean";
  if (field in lists) return Array.isArray(value) && value.every((one) => typeof one === "string");
  return typeof value === "string";
}
