import { fail, KvaneError, type Problem, problem } from "../errors/index.js";
import type { Envelope, InputRecord } from "../reports/index.js";
import { type CommandEntry, commandTable } from "./commands.js";
import { withRemedy } from "./remedies.js";
import type { JobHost, Request, RequestField } from "./request.js";
import { fieldKind } from "./request-fields.js";
import { checkShape } from "./request-shape.js";
import type { CommandResults } from "./results.js";
import { version } from "./version.js";
import type { Work } from "./work.js";

/**
 * Answers a request: does the work and gives the one JSON envelope. Wrong input and interruptions come back as
 * `errors` beside a null result, a fault of kvane itself as `internal-fault`; it does not throw. The same request and
 * the same files give the same answer.
 */
export async function answer<Command extends keyof CommandResults>(
  request: Request & { readonly command: Command },
  host: JobHost,
): Promise<Envelope<CommandResults[Command]>>;
/** The same for a command that is known only when the program runs. */
export async function answer(request: Request, host: JobHost): Promise<Envelope<object>>;
export async function answer(request: Request, host: JobHost): Promise<Envelope<object>> {
  if (typeof request !== "object" || request === null) return refusal("", [noRequest(request)]);
  if (typeof host?.readText !== "function") return refusal(String(request.command ?? ""), [noHost(host)]);
  const command = String(request.command ?? "");
  const entry = Object.hasOwn(commandTable, command) ? commandTable[command] : undefined;
  const work: Work = { request, host, study: null, structure: null, assumed: [], warnings: [] };
  const frame = { kvane: version, format: 1, command, input: {} as InputRecord } as const;
  try {
    checkShape(request, entry?.takes ?? null);
    Object.assign(frame.input, inputRecord(request, entry));
    if (entry === undefined) return refuse(command);
    const files = await readFiles(request, host);
    const result = await (await entry.load())({ ...work, ...files });
    return { ...frame, result, errors: [], warnings: work.warnings, assumed: work.assumed };
  } catch (error) {
    return { ...frame, result: null, errors: problemsOf(error), warnings: work.warnings, assumed: work.assumed };
  }
}

/** The envelope of a request that could not be understood. */
export function refusal(command: string, errors: readonly Problem[]): Envelope<object> {
  return { kvane: version, format: 1, command, input: {}, result: null, errors, warnings: [], assumed: [] };
}

function noRequest(found: unknown): Problem {
  return problem("invalid-request", "this is no request", {
    expected: "an object with a `command`",
    found: found === null ? "null" : typeof found,
    remedy: "give the fields that stand under `input` of an answer, and the command",
  });
}

function noHost(found: unknown): Problem {
  return problem("invalid-request", "the host cannot read files", {
    expected: "a host with a function `readText`",
    found: found === null ? "null" : typeof found === "object" ? "an object without it" : typeof found,
    remedy: "give a host, for example hostOfTexts({})",
  });
}

/** The study and the CIF are read once, before the command, and their readers are loaded only then. */
async function readFiles(request: Request, host: JobHost): Promise<Pick<Work, "study" | "structure">> {
  const named = [request.study, request.structure, request.block].some((one) => typeof one === "string");
  return named
    ? (await import("./inputs/structure-input.js")).filesOf(request, host)
    : { study: null, structure: null };
}

/** What was asked, tidied: blanks collapsed, null for what was not given, false for a flag that was not. */
function inputRecord(request: Request, entry: CommandEntry | undefined): InputRecord {
  const fields = entry?.takes ?? [];
  return Object.fromEntries(fields.map((field) => [field, tidy(field, request[field])]));
}

function tidy(field: RequestField, value: Request[RequestField]): InputRecord[string] {
  if (typeof value === "string") return tidyText(value);
  if (Array.isArray(value)) return value.map(tidyText);
  return fieldKind(field) === "flag" ? value === true : null;
}

function tidyText(text: string): string {
  return text.trim().replace(/\s+/g, " ");
}

function refuse(command: string): never {
  fail("unknown-command", command === "" ? "no command is named" : `there is no command \`${command}\``, {
    where: { argument: "COMMAND" },
    expected: `one of ${Object.keys(commandTable).join(", ")}`,
    found: command || "nothing",
    remedy: "see `kvane --help`",
  });
}

function problemsOf(error: unknown): readonly Problem[] {
  if (error instanceof KvaneError) return error.problems.map(withRemedy);
  const found = error instanceof Error ? `${error.name}: ${error.message}` : String(error);
  return [
    problem("internal-fault", "kvane met a fault of its own; the input is not to blame", {
      found,
      remedy: "please report it, with the command and the files that led to it",
    }),
  ];
}
