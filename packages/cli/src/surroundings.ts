import { writeSync } from "node:fs";
import { type Problem, problem } from "@kvane/core/errors";
import { exitStatusOf } from "@kvane/core/job";
import { boundedBytes } from "./bounded-bytes.js";
import { problemsText } from "./errors.js";
import { systemFault } from "./system-faults.js";

/** Everything outside that the command touches, so that tests can run it without a process of its own. */
export interface Surroundings {
  readonly write: (text: string) => void;
  /** Resolves when what was written has been taken; without it that is at once. */
  readonly drained?: () => Promise<void>;
  readonly writeError: (text: string) => void;
  /** Whether the error output is a terminal, where progress can be shown. */
  readonly showsProgress: boolean;
  /** Columns of the terminal that `write` goes to; null where it goes elsewhere, and pages have their usual width. */
  readonly columns?: number | null;
  readonly standardInput: () => Promise<Uint8Array>;
  /** Standard input as it comes, of any size; without it, it comes whole. */
  readonly inputParts?: () => AsyncIterable<Uint8Array>;
  /** Where relative file names count from. */
  readonly folder: string;
  /** Set when the user wants the work to end. */
  readonly signal: { readonly aborted: boolean };
}

/** Those of this process. */
export function processSurroundings(signal: { readonly aborted: boolean }): Surroundings {
  return {
    write: writer(() => process.stdout),
    drained: async () => {
      if (process.stdout.writableNeedDrain) await new Promise((resolve) => process.stdout.once("drain", resolve));
    },
    writeError: writer(() => process.stderr),
    get showsProgress() {
      return process.stderr.isTTY === true;
    },
    get columns() {
      return process.stdout.isTTY === true ? process.stdout.columns : null;
    },
    standardInput: () => boundedBytes(process.stdin),
    inputParts: () => process.stdin,
    folder: process.cwd(),
    signal,
  };
}

/** Writes to a stream that is made at the first use, because making it takes time. */
function writer(stream: () => NodeJS.WritableStream): (text: string) => void {
  let opened: NodeJS.WritableStream | null = null;
  return (text) => {
    opened ??= stream().on("error", endAfter);
    opened.write(text);
  };
}

/** A reader that has seen enough (`| head`) is no error; a full disk is one. */
function endAfter(error: NodeJS.ErrnoException): void {
  if (error.code === "EPIPE") process.exit(process.exitCode ?? 0);
  try {
    // The stream may be the one that failed.
    writeSync(
      2,
      problemsText([outputFailed(error)], "error", () => null),
    );
  } catch {
    // There is nobody left to tell.
  }
  process.exit(exitStatusOf("output-failed"));
}

function outputFailed({ code }: NodeJS.ErrnoException): Problem {
  return problem("output-failed", "the output could not be written", {
    expected: "an output that takes all of it",
    found: systemFault(code ?? "").found,
    remedy: "make room, or send the output elsewhere with --out",
  });
}
