import type { CifVersion } from "./document.js";

export type TokenKind =
  | "name"
  | "bare"
  | "quoted"
  | "triple"
  | "text field"
  | "["
  | "]"
  | "{"
  | "}"
  | "data"
  | "save"
  | "loop"
  | "reserved"
  | "end";

/** Why a token breaks the grammar; `at` is the offset of the fault. */
export interface TokenFault {
  readonly at: number;
  readonly message: string;
  readonly expected: string;
  readonly remedy: string;
}

/**
 * A reader over the text of a CIF, with the token it stands on. It is changed by `nextToken` alone: one record for the
 * whole file, since a token of its own for each of millions of values would cost more than reading them.
 */
export interface Scanner {
  readonly text: string;
  readonly version: CifVersion;
  kind: TokenKind;
  /** Offsets of the first character and behind the last one, delimiters included. */
  start: number;
  end: number;
  fault: TokenFault | null;
}

export function scannerOf(text: string, version: CifVersion): Scanner {
  return { text, version, kind: "end", start: 0, end: 0, fault: null };
}

const tab = 9;
const lineFeed = 10;
const blank = 32;
const doubleQuote = 34;
const hash = 35;
const dollar = 36;
const singleQuote = 39;
const colon = 58;
const semicolon = 59;
const openBracket = 91;
const closeBracket = 93;
const underscore = 95;
const openBrace = 123;
const closeBrace = 125;

/** Goes to the next token at or behind `from`; `nested` is whether a list or table of CIF 2.0 is open. */
export function nextToken(scanner: Scanner, from: number, nested = false): void {
  const { text } = scanner;
  const start = skipBlanks(text, from);
  scanner.start = start;
  scanner.fault = null;
  if (start >= text.length) {
    scanner.kind = "end";
    scanner.end = start;
    return;
  }
  const code = text.charCodeAt(start);
  if (code === underscore) readWord(scanner, "name");
  else if (code === semicolon && (start === 0 || text.charCodeAt(start - 1) === lineFeed)) readTextField(scanner);
  else if (code === singleQuote || code === doubleQuote) readQuoted(scanner, code, nested);
  else if (isBracket(code) && scanner.version === "2.0") readBracket(scanner, code);
  else readWord(scanner, "bare");
  if (scanner.version === "2.0") checkSpacing(scanner, nested);
}

/** The offset of the first character that is neither white space nor in a comment. */
function skipBlanks(text: string, from: number): number {
  let at = from;
  for (; at < text.length; at++) {
    const code = text.charCodeAt(at);
    if (code === blank || code === lineFeed || code === tab) continue;
    if (code !== hash) return at;
    const lineEnd = text.indexOf("\n", at);
    at = lineEnd < 0 ? text.length : lineEnd;
  }
  return Math.min(at, text.length);
}

function isBracket(code: number): boolean {
  return code === openBracket || code === closeBracket || code === openBrace || code === closeBrace;
}

function isBlankOrEnd(text: string, at: number): boolean {
  const code = text.charCodeAt(at);
  return code === blank || code === lineFeed || code === tab || Number.isNaN(code);
}

/** A word up to the next white space; in CIF 2.0 a value ends at a bracket too. */
function readWord(scanner: Scanner, kind: "name" | "bare"): void {
  const { text, start } = scanner;
  const brackets = scanner.version === "2.0" && kind === "bare";
  let end = start + 1;
  while (end < text.length) {
    const code = text.charCodeAt(end);
    if (code === blank || code === lineFeed || code === tab || (brackets && isBracket(code))) break;
    end += 1;
  }
  scanner.end = end;
  scanner.kind = kind;
  if (kind === "name") {
    if (end === start + 1) fault(scanner, start, "a data name has no letters", "a name such as _cell_length_a");
    return;
  }
  const code = text.charCodeAt(start);
  const keyword = keywordAt(text, start, end, code);
  if (keyword) {
    scanner.kind = keyword;
    return;
  }
  if (code === dollar || code === openBracket || code === closeBracket)
    fault(
      scanner,
      start,
      `a value may not begin with \`${text[start]}\``,
      "a word, a number, or a text in quotation marks",
      "put the value into quotation marks",
    );
}

/** Keywords in any case: `data_…`, `save_…`, and `loop_`, `global_`, `stop_` that stand alone. */
function keywordAt(text: string, start: number, end: number, code: number): TokenKind | null {
  const letter = code | blank;
  // d, s, l, g
  if (letter !== 100 && letter !== 115 && letter !== 108 && letter !== 103) return null;
  const head = text.slice(start, Math.min(end, start + 8)).toLowerCase();
  if (head.startsWith("data_")) return "data";
  if (head.startsWith("save_")) return "save";
  if (head === "loop_" && end === start + 5) return "loop";
  return (head === "stop_" && end === start + 5) || (head === "global_" && end === start + 7) ? "reserved" : null;
}

function readTextField(scanner: Scanner): void {
  const { text, start } = scanner;
  const close = text.indexOf("\n;", start);
  scanner.kind = "text field";
  if (close < 0) {
    scanner.end = text.length;
    fault(
      scanner,
      start,
      "a text field is not closed",
      "`;` as the first character of a line",
      "close it with a line that begins with `;`",
    );
    return;
  }
  scanner.end = close + 2;
  if (!isBlankOrEnd(text, scanner.end) && scanner.version === "1.1") noteSpacing(scanner);
}

function readQuoted(scanner: Scanner, quote: number, nested: boolean): void {
  const { text, start, version } = scanner;
  const mark = text[start] as string;
  scanner.kind = "quoted";
  if (version === "2.0" && text.startsWith(mark.repeat(3), start)) {
    const close = text.indexOf(mark.repeat(3), start + 3);
    scanner.kind = "triple";
    scanner.end = close < 0 ? text.length : close + 3;
    if (close < 0) faultOfQuote(scanner, mark.repeat(3), "somewhere below");
    return;
  }
  let end = start + 1;
  for (; end < text.length; end++) {
    const code = text.charCodeAt(end);
    if (code === lineFeed) break;
    // CIF 1.1: a quote ends the value only where white space follows; CIF 2.0: the first one ends it.
    if (code === quote && (version === "2.0" || isBlankOrEnd(text, end + 1))) {
      scanner.end = end + 1;
      return;
    }
  }
  // What was meant ends somewhere in the line; within a list only the first word is taken.
  scanner.end = nested ? Math.max(start + 1, wordEnd(text, start)) : end;
  faultOfQuote(scanner, mark, version === "2.0" ? "in the same line" : "in the same line, with white space behind it");
}

function wordEnd(text: string, start: number): number {
  let end = start;
  while (!isBlankOrEnd(text, end) && !isBracket(text.charCodeAt(end))) end += 1;
  return end;
}

function faultOfQuote(scanner: Scanner, mark: string, where: string): void {
  fault(
    scanner,
    scanner.start,
    "a quotation mark is not closed",
    `a second ${mark} ${where}`,
    "close it, or write longer texts between lines that begin with `;`",
  );
}

function readBracket(scanner: Scanner, code: number): void {
  scanner.kind = String.fromCharCode(code) as TokenKind;
  scanner.end = scanner.start + 1;
}

/** CIF 2.0: between tokens there is white space; brackets need none on their inner side. */
function checkSpacing(scanner: Scanner, nested: boolean): void {
  const { text, end, kind } = scanner;
  if (scanner.fault || kind === "[" || kind === "{" || isBlankOrEnd(text, end)) return;
  const code = text.charCodeAt(end);
  if (nested && (code === closeBracket || code === closeBrace)) return;
  // The key of a table; whether one is due, the reader of tables knows.
  if (nested && code === colon && (kind === "quoted" || kind === "triple")) return;
  if (kind !== "name") noteSpacing(scanner, nested);
}

/** The fault stands where the blank should; what is glued on is passed over, as it would only bring more of them. */
function noteSpacing(scanner: Scanner, nested = false): void {
  const at = scanner.end;
  while (!isBlankOrEnd(scanner.text, scanner.end) && !(nested && isBracket(scanner.text.charCodeAt(scanner.end))))
    scanner.end += 1;
  fault(
    scanner,
    at,
    "white space is missing behind a value",
    "a blank or a line end",
    scanner.version === "2.0"
      ? "put a blank between the values, or quotation marks around the whole"
      : "begin a new line behind the `;`",
  );
}

function fault(scanner: Scanner, at: number, message: string, expected: string, remedy = "correct the name"): void {
  scanner.fault = { at, message, expected, remedy };
}

/** Whether the token is or begins a value. */
export function isValueToken(kind: TokenKind): boolean {
  return (
    kind === "bare" || kind === "quoted" || kind === "triple" || kind === "text field" || kind === "[" || kind === "{"
  );
}
