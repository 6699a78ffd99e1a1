import { KvaneError, type Place, type Problem, problem } from "../../errors/index.js";
import { commandTable } from "../commands.js";
import type { Request } from "../request.js";
import { fieldKind } from "../request-fields.js";
import { isGiven, untakenField } from "../untaken-field.js";
import { jsonFault } from "./json-fault.js";

/** What identifies a request to whoever sent it; given back with the answer. */
export type LineId = string | number;

/** A line as it was understood; `request` is whole only where there are no problems. */
export interface ReadLine {
  readonly id: LineId | null;
  readonly request: Request;
  /** Files that came along, by name. */
  readonly texts: { readonly [name: string]: string };
  readonly problems: readonly Problem[];
}

/** Fields of a line that are no fields of a request. */
const besideFields = ["texts", "id"] as const;
const ownFields = ["command", ...besideFields] as const;

const kindTexts = { text: "a text in quotation marks", flag: "true or false", list: "a list of texts" } as const;

/** Reads one line of JSON. All that is wrong with it is found at once, and what could be read is there beside it. */
export function readLine(text: string, place: Partial<Place>): ReadLine {
  const empty: Omit<ReadLine, "problems"> = { id: null, request: { command: "" }, texts: {} };
  try {
    return readObject(parsed(text, place), place);
  } catch (error) {
    if (error instanceof KvaneError) return { ...empty, problems: error.problems };
    throw error;
  }
}

type Fields = { readonly [field: string]: unknown };

function parsed(text: string, place: Partial<Place>): Fields {
  if (text.trim() === "")
    throw new KvaneError([invalid("the line is empty", place, "a request in JSON", "nothing", "leave the line out")]);
  const fault = jsonFault(text);
  if (fault !== null) {
    const where = { ...place, column: fault.column };
    const remedy = "write each request as one object of JSON on one line; a library for JSON does it best";
    throw new KvaneError([invalid("the line is no JSON", where, fault.expected, fault.found, remedy)]);
  }
  const value: unknown = JSON.parse(text);
  if (value === null || typeof value !== "object" || Array.isArray(value)) {
    const remedy = 'write an object such as {"command": "star", "group": "P n m a", "k": "0,u,0"}';
    throw new KvaneError([invalid("the line is no request", place, "an object", kindOf(value), remedy)]);
  }
  return value as Fields;
}

function readObject(fields: Fields, place: Partial<Place>): ReadLine {
  const problems: Problem[] = [];
  const complain = (path: string, message: string, expected: string, found: string, remedy: string) => {
    problems.push(invalid(message, { ...place, path }, expected, found, remedy));
  };
  const id = readId(fields["id"], complain);
  const command = readCommand(fields["command"], complain);
  const texts = readTexts(fields["texts"], complain);
  const request: { [field: string]: unknown } = { command };
  // An unknown command is the answer's to refuse; which fields it takes cannot be said.
  const takes = Object.hasOwn(commandTable, command) ? (commandTable[command]?.takes ?? []) : null;
  for (const [field, value] of Object.entries(fields)) {
    if (!isGiven(field, value) || ownFields.some((one) => one === field) || takes === null) continue;
    const known = takes.find((one) => one === field);
    if (known === undefined) {
      const untaken = untakenField(command, field, takes, besideFields);
      problems.push({ ...untaken, where: { ...untaken.where, ...place, path: field } });
    } else {
      const kind = fieldKind(known);
      if (fits(value, kind)) request[field] = value;
      else {
        const remedy =
          kind === "text" ? "write numbers as texts too, as on the command line" : `give ${kindTexts[kind]}`;
        complain(field, `\`${field}\` is of the wrong kind`, kindTexts[kind], kindOf(value), remedy);
      }
    }
  }
  return { id, request: request as unknown as Request, texts, problems };
}

type Complain = (path: string, message: string, expected: string, found: string, remedy: string) => void;

function readId(value: unknown, complain: Complain): LineId | null {
  if (value === undefined || value === null || typeof value === "string") return value ?? null;
  // Beyond 2^53 a number would come back as another one.
  const exact =
    typeof value === "number" && (Number.isInteger(value) ? Number.isSafeInteger(value) : Number.isFinite(value));
  if (exact) return value;
  complain(
    "id",
    "`id` cannot be given back as it is",
    "a text, or a number of up to 2^53",
    kindOf(value),
    "make it a text",
  );
  return null;
}

function readCommand(value: unknown, complain: Complain): string {
  if (typeof value === "string") return value;
  const names = Object.keys(commandTable).join(", ");
  const found = value === undefined ? "nothing" : kindOf(value);
  complain("command", "the request has no command", `one of ${names}`, found, 'say which: "command": "star"');
  return "";
}

function readTexts(value: unknown, complain: Complain): ReadLine["texts"] {
  if (value === undefined || value === null) return {};
  const expected = "an object with the texts of files by their names";
  const remedy = 'write it as {"study.yaml": "group: P n m a"}';
  if (typeof value !== "object" || Array.isArray(value)) {
    complain("texts", "`texts` is of the wrong kind", expected, kindOf(value), remedy);
    return {};
  }
  for (const [name, text] of Object.entries(value))
    if (typeof text !== "string")
      complain(`texts.${name}`, `the text of \`${name}\` is none`, kindTexts.text, kindOf(text), remedy);
  return value as ReadLine["texts"];
}

function fits(value: unknown, kind: keyof typeof kindTexts): boolean {
  if (kind === "list") return Array.isArray(value) && value.every((one) => typeof one === "string");
  return typeof value === (kind === "text" ? "string" : "boolean");
}

function kindOf(value: unknown): string {
  if (value === null) return "null";
  if (Array.isArray(value))
    return value.every((one) => typeof one === "string") ? "a list" : "a list that holds other things";
  if (typeof value === "object") return "an object";
  return typeof value === "string" ? "a text" : String(value);
}

function invalid(message: string, where: Partial<Place>, expected: string, found: string, remedy: string): Problem {
  return problem("invalid-request", message, { where, expected, found, remedy });
}
