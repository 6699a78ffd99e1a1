import type { Place } from "../../errors/index.js";
import type { Envelope } from "../../reports/index.js";
import { answer, refusal } from "../answer.js";
import type { JobHost } from "../request.js";
import { hostOfTexts } from "./host-of-texts.js";
import { readLine } from "./read-line.js";

/** The answer to a line: as a line, and as a record. */
export interface AnsweredLine {
  /**
   * The envelope in JSON on one line, without a line end: the JSON that the same command prints with `--json`, less the
   * blanks and line ends between its parts. Where the request has an `id`, that is the first field.
   */
  readonly text: string;
  readonly answer: Envelope<object>;
}

/**
 * Answers one line of JSON: an object with the fields of `Request` that its command takes, and beside them `id` (given
 * back) and `texts` (files by name, looked up before those of the host). What is no request is answered too, with
 * `invalid-request`; it does not throw.
 *
 * @param place where the line stands, for problems of the line itself
 */
export async function answerLine(text: string, host: JobHost, place: Partial<Place> = {}): Promise<AnsweredLine> {
  const { id, request, texts, problems } = readLine(text, place);
  const answered =
    problems.length > 0 ? refusal(request.command, problems) : await answer(request, hostOfTexts(texts, host));
  const line = JSON.stringify(answered);
  return { text: id === null ? line : `{"id":${JSON.stringify(id)},${line.slice(1)}`, answer: answered };
}
