import { KvaneError, type Problem, problem } from "../errors/index.js";
import { argumentNames, type Request, type RequestField } from "./request.js";
import { type FieldKind, fieldKind } from "./request-fields.js";
import { isGiven, untakenField } from "./untaken-field.js";

const kindTexts: { readonly [kind in FieldKind]: string } = {
  text: "a text",
  flag: "true or false",
  list: "a list of texts",
};

/**
 * Refuses fields that the command does not take (null for a command that there is not) and values of a wrong type, all at once: a request may come from a program that no compiler checked, and a number where a text is due must not pass
 * for something that was not given.
 */
export function checkShape(request: Request, takes: readonly RequestField[] | null): void {
  // That there is no such command is said elsewhere, and which fields it takes cannot be said.
  if (takes === null) return;
  const problems: Problem[] = [];
  for (const [field, value] of Object.entries(request)) {
    if (field === "command" || takes.some((one) => one === field)) continue;
    if (isGiven(field, value)) problems.push(untakenField(request.command, field, takes));
  }
  for (const field of takes) {
    const value: unknown = request[field] ?? null;
    if (value === null || fits(field, value)) continue;
    problems.push(
      problem("invalid-argument", `the field \`${field}\` of the request has a value of the wrong type`, {
        where: { argument: argumentNames[field] },
        expected: kindTexts[fieldKind(field)],
        found: Array.isArray(value) ? "a list" : typeof value === "object" ? "a record" : `a ${typeof value}`,
        remedy: "give the value as a user would type it, a number too",
      }),
    );
  }
  if (problems.length > 0) throw new KvaneError(problems);
}

function fits(field: RequestField, value: unknown): boolean {
  const kind = fieldKind(field);
  if (kind === "list") return Array.isArray(value) && value.every((one) => typeof one === "string");
  return typeof value === (kind === "flag" ? "boolean" : "string");
}
