import { fail, type Place, problem } from "@kvane/core/errors";
import { answerLine, exitStatusOf, type JobHost, refusal } from "@kvane/core/job";
import type { Envelope } from "@kvane/core/reports";
import { commandHost } from "../host.js";
import { partsOf } from "../read-text.js";
import type { Surroundings } from "../surroundings.js";
import { type InputLine, linesOf } from "./lines-of.js";

/** Bytes. Beyond any request with the texts of its files; a file without line feeds is stopped by it. */
const longestLine = 64 * 1024 * 1024;

/**
 * Answers one request after the other, each line as soon as it is read, and gives the exit status: 0 when every line
 * was answered, whatever the answers say. An answer is written whole or not at all; none is written behind an
 * interruption.
 *
 * @param file of the requests; `-` for standard input
 */
export async function runBatch(file: string, surroundings: Surroundings, quiet: boolean): Promise<number> {
  const count = { lines: 0, wrong: 0, firstWrong: 0 };
  for await (const line of linesOf(partsOf(file, surroundings), longestLine)) {
    const { text, answer } = await answered(line, file, surroundings);
    // Quick answers follow one another without a pause; here a cancel and a closed output are heard.
    await new Promise((resolve) => setImmediate(resolve));
    if (surroundings.signal.aborted) return exitStatusOf("interrupted");
    surroundings.write(`${text}\n`);
    await surroundings.drained?.();
    count.lines = line.number;
    if (answer.errors.length > 0) {
      count.wrong += 1;
      count.firstWrong ||= line.number;
    }
  }
  if (count.wrong > 0 && !quiet)
    surroundings.writeError(
      `${count.wrong} of ${count.lines} answers hold errors, the first is that of line ${count.firstWrong}\n`,
    );
  return 0;
}

async function answered(
  { number, bytes }: InputLine,
  file: string,
  surroundings: Surroundings,
): Promise<{ readonly text: string; readonly answer: Envelope<object> }> {
  const place = { file, line: number };
  if (bytes === null)
    return refused(place, "the line is too long", "at most 64 MB", "more", "name large files instead of sending them");
  const text = decoded(bytes, number === 1);
  if (text === null)
    return refused(
      place,
      "the line is not text in UTF-8",
      "text in UTF-8",
      "other bytes",
      "write the requests in UTF-8",
    );
  // A host remembers what it has read, so each request has its own.
  return answerLine(text, withoutStandardInput(commandHost(surroundings, undefined)), place);
}

function refused(where: Partial<Place>, message: string, expected: string, found: string, remedy: string) {
  const answer = refusal("", [problem("invalid-request", message, { where, expected, found, remedy })]);
  return { text: JSON.stringify(answer), answer };
}

/** Null where it is no UTF-8. A byte order mark may stand before the first line alone. */
function decoded(bytes: Uint8Array, first: boolean): string | null {
  try {
    return new TextDecoder("utf-8", { fatal: true, ignoreBOM: !first }).decode(bytes);
  } catch {
    return null;
  }
}

/** A request cannot read what the requests come from. */
function withoutStandardInput(host: JobHost): JobHost {
  return {
    ...host,
    readText: async (path) =>
      path === "-"
        ? fail("file-unreadable", "a request of a batch cannot read standard input", {
            where: { file: path },
            expected: "a file, or a text that comes along in `texts`",
            found: "-",
            remedy: "name a file, or give its text in `texts`",
          })
        : host.readText(path),
  };
}
