import { nearMiss, type Problem, problem } from "../errors/index.js";
import { argumentNames, type RequestField } from "./request.js";
import { fieldKind } from "./request-fields.js";

/**
 * Whether a value asks for something: null never does, nor does false where a flag is due, so that a record may hold
 * every field there is.
 */
export function isGiven(field: string, value: unknown): boolean {
  return value !== null && value !== undefined && !(value === false && fieldKind(field as RequestField) === "flag");
}

/**
 * A field that the command does not take: a slip of the pen must not pass for something that was not given.
 *
 * @param beside fields that may stand there too, though they are none of a request
 */
export function untakenField(
  command: string,
  field: string,
  takes: readonly RequestField[],
  beside: readonly string[] = [],
): Problem {
  const near = ofOption(field, takes) ?? nearMiss(field, [...takes, "command", ...beside]);
  return problem("invalid-request", `\`${command}\` takes no field \`${field}\``, {
    where: { path: field },
    expected: `one of ${[...takes, ...beside].join(", ")}`,
    found: field,
    remedy: near === null ? "leave it out, or set it to null" : `did you mean \`${near}\`?`,
  });
}

/** The field whose option has that name, as in `--j` for `constants`: remedies and pages of help name options. */
function ofOption(field: string, takes: readonly RequestField[]): RequestField | null {
  const option = `--${field.replace(/[A-Z]/g, (letter) => `-${letter.toLowerCase()}`)}`;
  if (field === "parent" && takes.includes("moments")) return "study";
  return takes.find((one) => argumentNames[one] === option) ?? null;
}
