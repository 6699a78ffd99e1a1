import { KvaneError } from "@kvane/core/errors";
import { answer, argumentNames, commandTable, exitStatusOf, type Request, type RequestField } from "@kvane/core/job";
import {
  type Envelope,
  jsonText,
  type RunRecord,
  reportCsv,
  reportSvg,
  reportText,
  resultFolder,
} from "@kvane/core/reports";
import { schemaErrors } from "../../cli/schemas.js";
import type { Random } from "../../support/random.js";
import { demand, demandProblems } from "../properties.js";
import { type Outcome, target } from "../target.js";
import { corpus, type FileKind } from "../texts/corpus.js";
import { damaged } from "../texts/damage.js";
import { fileNames, goodRequests } from "../texts/requests.js";
import { extremeNumbers, marks } from "../texts/tokens.js";
import type { WordKind } from "../texts/words.js";
import { fileText } from "./files.js";
import { word } from "./words.js";

/** A request with the texts of all files that it may name. */
export interface RequestInput {
  readonly request: Request;
  readonly files: { readonly [name: string]: string };
}

/** What the value of a field is made of, where it is more than a number or a word. */
const wordKinds: { readonly [field in RequestField]?: WordKind } = {
  group: "group",
  k: "k",
  from: "k",
  to: "k",
  cell: "cell",
  sites: "site",
  child: "basis change",
};

const fields = Object.keys(argumentNames) as RequestField[];
const flags = new Set<RequestField>([
  "syntax",
  "full",
  "polar",
  "star",
  "weighIntensities",
  "includesNuclear",
  "files",
]);
const lists = new Set<RequestField>([
  "sites",
  "exclude",
  "impurities",
  "together",
  "onSites",
  "constants",
  "vary",
  "formFactors",
]);
const texts = goodRequests.flatMap((request) => Object.values(request).flat()).filter((one) => typeof one === "string");

/** A value for a field: of its kind mostly, or of any. */
function valueFor(field: RequestField, random: Random): string | boolean | readonly string[] | null {
  if (random.below(12) === 0) return null;
  if (flags.has(field)) return random.below(2) === 0;
  if (lists.has(field)) return Array.from({ length: random.below(4) }, () => textFor(field, random));
  return textFor(field, random);
}

function textFor(field: RequestField, random: Random): string {
  const kind = wordKinds[field];
  const choice = random.below(8);
  if (kind !== undefined && choice < 6) return word(kind, random).slice(0, longestWord);
  if (choice === 0) return random.pick(Object.values(fileNames));
  if (choice < 4) return random.pick(extremeNumbers);
  if (choice < 5) return random.pick(marks);
  const good = goodRequests.flatMap((one) => one[field] ?? []).filter((one) => typeof one === "string");
  const own = good.length > 0 && choice < 7 ? random.pick(good) : random.pick(texts);
  return (random.below(2) === 0 ? own : damaged(own, random, texts)).slice(0, longestWord);
}

/** Characters. What is longer is for the readers of single words, which have loops of their own. */
const longestWord = 2_000;

/** A good request with none to three fields spoilt, added or left out. */
export function spoiltRequest(random: Random): Request {
  const request: { [field: string]: unknown } = { ...random.pick(goodRequests) };
  const takes = commandTable[request["command"] as string]?.takes ?? fields;
  for (let times = random.below(4); times > 0; times -= 1) {
    const field = random.pick(random.below(8) === 0 ? fields : takes);
    if (random.below(4) === 0) delete request[field];
    else if (random.below(20) === 0) request[field] = random.pick([0, Number.NaN, true, [], {}, [1], [[]], ""]);
    else request[field] = valueFor(field, random);
  }
  return request as unknown as Request;
}

const kindsOfFiles: { readonly [name in keyof typeof fileNames]: FileKind } = {
  study: "study",
  structure: "cif",
  peaks: "peaks",
  intensities: "intensities",
  scan: "scan",
  moments: "magnetic-cif",
  "moment list": "moments",
  components: "components",
};

/** Names that the good studies give to their files. */
const namedInStudies = { peaks: "satellites.csv", intensities: "integrated.csv" } as const;

/** Every file good or spoilt: mostly one of them is spoilt, so that the commands behind the readers are reached. */
export function spoiltFiles(random: Random): RequestInput["files"] {
  const spoilt = random.below(3) > 0 ? random.pick(Object.keys(kindsOfFiles)) : null;
  const files: { [name: string]: string } = {};
  for (const [key, kind] of Object.entries(kindsOfFiles) as [keyof typeof fileNames, FileKind][]) {
    const text = key === spoilt ? fileText(kind, random) : goodText(kind, random);
    files[fileNames[key]] = text;
    if (Object.hasOwn(namedInStudies, key)) files[namedInStudies[key as keyof typeof namedInStudies]] = text;
  }
  return files;
}

/** The study of the example rather than one that names files which nobody has; any other good file of the kind. */
function goodText(kind: FileKind, random: Random): string {
  const good = corpus[kind];
  return kind === "study" ? (good.at(-1) as string) : random.pick(good);
}

/**
 * Seconds of processor time after which the work is asked to end. Whole jobs with fits and phase diagrams take some
 * seconds.
 */
export const patience = 30;

/** A signal that asks work to end when its time is over. */
export function patienceSignal(): { readonly aborted: boolean } {
  const before = process.cpuUsage();
  return {
    get aborted() {
      const { user, system } = process.cpuUsage(before);
      return user + system > patience * 1e6;
    },
  };
}

/** The answer to a request whose files are texts, interrupted when it takes too long. */
async function answered({ request, files }: RequestInput): Promise<Envelope<object>> {
  return answer(request, {
    signal: patienceSignal(),
    readText: async (path) => {
      const text = Object.hasOwn(files, path) ? files[path] : undefined;
      if (text === undefined) throw new KvaneError([{ ...missing, where: { ...missing.where, file: path } }]);
      return text;
    },
  });
}

const missing = {
  code: "file-not-found",
  message: "there is no such file",
  where: { file: null, line: null, column: null, path: null, argument: null },
  expected: "a file that exists",
  found: "none",
  remedy: "check the name",
} as const;

/** Holds an answer against all that is promised of it. */
export async function demandAnswer(whole: Envelope<object>, text: string): Promise<Outcome> {
  const { command, errors, warnings, result } = whole;
  const wrong = schemaErrors(command, JSON.parse(text));
  demand(wrong.length === 0, () => `schema: ${wrong.slice(0, 3).join("; ")}`);
  for (const one of [...errors, ...warnings]) {
    demandProblems([one]);
    demand(one.remedy !== null && one.remedy !== "", () => `no remedy: ${JSON.stringify(one)}`);
  }
  demand((result === null) === errors.length > 0, () => "a result beside errors, or neither");
  const [first] = errors;
  if (first === undefined) return "taken";
  demand(first.code !== "interrupted", () => `not done within ${patience} s of processor time`);
  const { file, argument, path } = first.where;
  demand(
    [file, argument, path].some((one) => one !== null) || placeless.has(first.code),
    () => `no place: ${JSON.stringify(first)}`,
  );
  demand([1, 2].includes(exitStatusOf(first.code)), () => `an error with exit status ${exitStatusOf(first.code)}`);
  return "refused";
}

/** What is wrong with the input as a whole stands nowhere in it. */
const placeless = new Set(["number-overflow", "not-built"]);

export const requestTarget = target<RequestInput>({
  name: "request",
  share: 700,
  few: 60,
  // It is asked to end before, and must then end soon.
  patience: patience + 2,
  make: (random) => ({ request: spoiltRequest(random), files: spoiltFiles(random) }),
  run: async (input) => {
    const whole = await answered(input);
    const outcome = await demandAnswer(whole, jsonText(whole));
    if (outcome === "refused") return outcome;
    demand(reportText(whole, { width: null }).trim() !== "", () => "an empty report");
    reportCsv(whole);
    await reportSvg(whole);
    if (input.request.command === "run") await resultFolder(whole as Envelope<RunRecord>);
    return outcome;
  },
});
