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
import { fieldKind } from "#core/job/request-fields.js";
import { schemaErrors } from "../../cli/schemas.js";
import { longNumbers } from "../../support/long-numbers.js";
import type { Random } from "../../support/random.js";
import { demand, demandProblems } from "../properties.js";
import { type Outcome, target } from "../target.js";
import { corpus, exampleTexts, type FileKind } from "../texts/corpus.js";
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

/** Files that a field may name, so that mostly one is read that there is. */
const filesOf: { readonly [field in RequestField]?: readonly string[] } = {
  study: [fileNames.study, fileNames.structure],
  structure: [fileNames.structure],
  peaks: [fileNames.peaks],
  nuclear: [fileNames.intensities],
  intensities: [fileNames.intensities],
  scan: [fileNames.scan],
  moments: [fileNames.moments, fileNames["moment list"]],
  read: [fileNames.components],
};

const allFields = Object.keys(argumentNames) as RequestField[];
const texts = goodRequests.flatMap((request) => Object.values(request).flat()).filter((one) => typeof one === "string");

/** A value for a field: of its kind mostly, or of any. */
function valueFor(field: RequestField, random: Random): string | boolean | readonly string[] | null {
  if (random.below(12) === 0) return null;
  const kind = fieldKind(field);
  if (kind === "flag") return random.below(2) === 0;
  if (kind === "list") return Array.from({ length: random.below(4) }, () => textFor(field, random));
  return textFor(field, random);
}

function textFor(field: RequestField, random: Random): string {
  const choice = random.below(12);
  const files = filesOf[field];
  if (files !== undefined && choice > 0) return random.pick(files);
  const good = goodRequests.flatMap((one) => one[field] ?? []).filter((one) => typeof one === "string");
  // What another good request says is as good here, and often at odds with the rest.
  if (good.length > 0 && choice < 4) return random.pick(good);
  const kind = wordKinds[field];
  if (kind !== undefined && choice < 10) return word(kind, random).slice(0, longestWord);
  if (choice < 7) return random.pick(extremeNumbers);
  if (choice < 8) return random.pick(marks);
  const own = good.length > 0 && choice < 11 ? random.pick(good) : random.pick(texts);
  return (random.below(2) === 0 ? own : damaged(own, random, texts)).slice(0, longestWord);
}

/** Characters. What is longer is for the readers of single words, which have loops of their own. */
const longestWord = 2_000;

/**
 * A good request with none to three of the fields spoilt, added or left out that its command takes. What would be refused
 * before any work is done comes seldom: one in twelve has a field that the command does not take.
 */
export function spoiltRequest(random: Random): Request {
  const request: { [field: string]: unknown } = { ...random.pick(goodRequests) };
  const takes = commandTable[request["command"] as string]?.takes ?? [];
  for (let times = random.below(4); times > 0; times -= 1) {
    // A field that is not there yet is often at odds with those that are: a block without a CIF, two kinds of bonds.
    const held = takes.filter((field) => request[field] !== undefined);
    const field = random.pick(held.length > 0 && random.below(3) > 0 ? held : takes);
    if (random.below(6) === 0) delete request[field];
    else if (random.below(20) === 0) request[field] = random.pick([0, Number.NaN, true, [], {}, [1], [[]], ""]);
    else request[field] = valueFor(field, random);
  }
  if (random.below(12) === 0) addUntaken(request, takes, random);
  return request as unknown as Request;
}

/** Adds a field of other commands, or one that no command takes. */
function addUntaken(request: { [field: string]: unknown }, takes: readonly RequestField[], random: Random): void {
  const field = random.pick(allFields.filter((one) => !takes.includes(one)));
  request[random.below(4) === 0 ? damaged(field, random, allFields) : field] = valueFor(field, random);
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

/**
 * The study of the example rather than one that names files which nobody has, mostly with its own lists, whose units it
 * names; any other good file of the kind.
 */
function goodText(kind: FileKind, random: Random): string {
  const example = exampleTexts[kind];
  return example !== undefined && (kind === "study" || random.below(4) > 0) ? example : random.pick(corpus[kind]);
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
  const long = longNumbers(result);
  demand(long.length === 0, () => `not rounded: ${long.slice(0, 3).join(", ")}`);
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
    demand((await reportText(whole, { width: null })).trim() !== "", () => "an empty report");
    await reportCsv(whole);
    await reportSvg(whole);
    if (input.request.command === "run") await resultFolder(whole as Envelope<RunRecord>);
    return outcome;
  },
});
