import { fstatSync, writeSync } from "node:fs";
import { type Problem, problem } from "@kvane/core/errors";
import { exitStatusOf } from "@kvane/core/job";
import { boundedBytes } from "./bounded-bytes.js";
import { problemsText } from "./errors.js";
import { systemFault } from "./system-faults.js";

/** Everything outside that the command touches, so that tests can run it without a process of its own. */
export interface Surroundings {
  readonly write: (text: string) => void;
  /** Writes all that is still to come, at once where that is quicker; without it `write` does. */
  readonly finish?: (text: string) => void;
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

/**
 * Those of this process.
 * @param release leaves signals to the system again: with nothing left to tidy up they may end the process
 */
export function processSurroundings(signal: { readonly aborted: boolean }, release: () => void): Surroundings {
  const write = writer(() => process.stdout);
  const plain = isPlain(standardOutput);
  return {
    write,
    finish: (text) => {
      const bytes = Buffer.from(text);
      if (!plain || bytes.length > atOnce) return write(bytes);
      // A pipe that is full all the same makes it wait, and no handler of ours would run meanwhile.
      release();
      writeAtOnce(bytes, write);
    },
    drained: async () => {
      if (process.stdout.writableNeedDrain) await new Promise((resolve) => process.stdout.once("drain", resolve));
    },
    writeError: writer(() => process.stderr),
    get showsProgress() {
      return process.stderr.isTTY === true;
    },
    get columns() {
      return !plain && process.stdout.isTTY === true ? process.stdout.columns : null;
    },
    standardInput: () => boundedBytes(process.stdin),
    inputParts: () => process.stdin,
    folder: process.cwd(),
    signal,
  };
}

const standardOutput = 1;

/** Bytes that a pipe holds, so that writing them does not wait for a reader. */
const atOnce = 65536;

/**
 * Whether it is a file or a pipe and no terminal, and can be written to without a stream: making a stream takes a
 * twentieth of a quick command's time.
 */
function isPlain(descriptor: number): boolean {
  if (process.platform === "win32") return false;
  try {
    const kind = fstatSync(descriptor);
    return kind.isFile() || kind.isFIFO() || kind.isSocket();
  } catch {
    // It is closed; the stream says so in its way.
    return false;
  }
}

/** What a pipe that others have set not to wait does not take goes through `rest`. */
function writeAtOnce(bytes: Uint8Array, rest: (bytes: Uint8Array) => void): void {
  let written = 0;
  try {
    while (written < bytes.length) written += writeSync(standardOutput, bytes, written);
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === "EAGAIN") rest(bytes.subarray(written));
    else endAfter(error as NodeJS.ErrnoException);
  }
}

/** Writes to a stream that is made at the first use, because making it takes time. */
function writer(stream: () => NodeJS.WritableStream): (text: string | Uint8Array) => void {
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
