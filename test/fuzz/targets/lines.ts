import { mkdtempSync, readdirSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { argumentNames, type Request, type RequestField } from "@kvane/core/job";
import { runCommand } from "../../../packages/cli/src/run-command.js";
import type { Random } from "../../support/random.js";
import { demand } from "../properties.js";
import { type Outcome, target } from "../target.js";
import { damaged } from "../texts/damage.js";
import { extremeNumbers, marks } from "../texts/tokens.js";
import { demandAnswer, patience, patienceSignal, type RequestInput, spoiltFiles, spoiltRequest } from "./requests.js";

/** A command line with the files of its folder and what standard input has, as Latin-1 for bytes. */
export interface LineInput {
  readonly words: readonly string[];
  readonly files: RequestInput["files"];
  readonly input: string;
}

/** What came of a command line. */
export interface LineResult {
  readonly status: number | null;
  readonly stdout: string;
  readonly stderr: string;
}

/** The request as words; values that are no texts cannot be typed. */
function wordsOf({ command, ...fields }: Request): string[] {
  const first: string[] = [];
  const options: string[] = [];
  for (const [field, value] of Object.entries(fields)) {
    const option = argumentNames[field as RequestField] ?? "";
    if (option === "--out") continue;
    const texts = [value].flat().filter((one) => typeof one === "string");
    if (!option.startsWith("--")) first.push(...texts.slice(0, 1));
    else if (value === true) options.push(option);
    else options.push(...texts.flatMap((text) => [option, text]));
  }
  return [command, ...first.slice(0, 1), ...options];
}

/** A word lost, doubled, moved, spoilt or put in; most lines stay as they are. */
function garbled(words: readonly string[], random: Random): string[] {
  const result = [...words];
  for (let times = Math.max(0, random.below(5) - 2); times > 0 && result.length > 0; times -= 1) {
    const at = random.below(result.length);
    const change = random.below(5);
    if (change === 0) result.splice(at, 1);
    else if (change === 1) result.splice(at, 0, result[at] as string);
    else if (change === 2) result[at] = damaged(result[at] as string, random, words).slice(0, 2_000);
    else result.splice(at, 0, random.pick(random.pick([extremeNumbers, marks, Object.values(argumentNames)])));
  }
  // A zero byte ends a word before any program sees it, and only texts of the computer's own are words.
  return result
    .map((word) => word.replaceAll("\u0000", "").replace(/\p{Surrogate}/gu, "\uFFFD"))
    .filter((word) => word !== "--out");
}

const endings = [
  [],
  ["--json"],
  ["--json"],
  ["--json"],
  ["--csv"],
  ["--svg"],
  ["--quiet"],
  ["--json", "--csv"],
  ["--help"],
];

export function spoiltLine(random: Random): LineInput {
  const words = garbled(wordsOf(spoiltRequest(random)), random);
  const out = random.below(4) === 0 ? ["--out", random.pick(["result", "result.html", "result.txt"])] : [];
  return {
    words: [...words, ...random.pick(endings), ...out],
    files: spoiltFiles(random),
    input:
      random.below(2) === 0
        ? ""
        : String.fromCharCode(...Array.from({ length: random.below(40) }, () => random.below(256))),
  };
}

/** Runs a line in a folder of its own with its files, and holds what it leaves there against the promise. */
export async function inFolder(
  { words, files }: LineInput,
  run: (folder: string) => Promise<LineResult>,
): Promise<Outcome> {
  const folder = mkdtempSync(join(tmpdir(), "kvane-fuzz-"));
  try {
    for (const [name, text] of Object.entries(files)) writeFileSync(join(folder, name), text);
    const result = await run(folder);
    const left = readdirSync(folder).filter((name) => !Object.hasOwn(files, name));
    const wanted = words.includes("--out") && result.status === 0 ? words.at(-1) : undefined;
    demand(
      left.every((name) => name === wanted),
      () => `left over: ${left.join(", ")}`,
    );
    return await demandLine(result, wanted !== undefined);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

async function demandLine({ status, stdout, stderr }: LineResult, toFile: boolean): Promise<Outcome> {
  demand(status === 0 || status === 1 || status === 2, () => `exit status ${status}: ${stderr.slice(0, 500)}`);
  demand(status === 0 || stderr !== "", () => `exit status ${status} without a word`);
  demand(!/^ {4}at |internal-fault/m.test(stderr), () => stderr.slice(0, 500));
  if (!stdout.startsWith("{")) return status === 0 ? "taken" : "refused";
  const whole = JSON.parse(stdout);
  const outcome = await demandAnswer(whole, stdout);
  // Writing may fail on a good answer.
  demand(toFile || (outcome === "taken") === (status === 0), () => `exit status ${status} with ${outcome} answer`);
  return outcome;
}

export const lineTarget = target<LineInput>({
  name: "line",
  share: 350,
  few: 60,
  patience: patience + 2,
  make: spoiltLine,
  run: (input) =>
    inFolder(input, async (folder) => {
      let stdout = "";
      let stderr = "";
      const status = await runCommand(input.words, {
        write: (text) => {
          stdout += text;
        },
        writeError: (text) => {
          stderr += text;
        },
        showsProgress: false,
        standardInput: async () => Buffer.from(input.input, "latin1"),
        folder,
        signal: patienceSignal(),
      });
      return { status, stdout, stderr };
    }),
});
