import { advance, type Parser } from "./parser.js";
import { isValueToken } from "./scanner.js";
import { textOf } from "./values.js";

/** Deeper lists than this nobody writes, and every reader has some depth at which it gives up. */
const deepest = 200;

/**
 * Goes through the list or table of CIF 2.0 that the scanner stands on, to its closing bracket, and notes what is wrong
 * in it. Where it is not closed the scanner ends before the token that cannot belong to it.
 */
export function skipContainer(parser: Parser, depth = 1): void {
  const { scanner, refuse } = parser;
  const { start } = scanner;
  const table = scanner.kind === "{";
  const closing = table ? "}" : "]";
  if (depth > deepest) {
    refuse("cif-syntax", start, {
      message: `brackets are nested more than ${deepest} deep`,
      expected: `at most ${deepest} levels`,
      remedy: "close the brackets",
    });
    scanner.end = scanner.text.length;
    return;
  }
  const keys = new Set<string>();
  let before = scanner.end;
  for (advance(parser, scanner.end, true); scanner.kind !== closing; advance(parser, scanner.end, true)) {
    if (!isValueToken(scanner.kind)) {
      noteOpen(parser, start, closing, scanner.kind === "end" ? "the end of the file" : wordOf(parser));
      // The closing bracket of the other kind was meant for this one; anything else is not ours.
      if (scanner.kind !== "]" && scanner.kind !== "}") scanner.end = before;
      return;
    }
    if (table && !readKey(parser, keys)) {
      scanner.end = before;
      skipToClosing(parser);
      return;
    }
    if (scanner.kind === "[" || scanner.kind === "{") skipContainer(parser, depth + 1);
    before = scanner.end;
  }
}

function wordOf({ scanner }: Parser): string {
  return scanner.text.slice(scanner.start, scanner.end);
}

function noteOpen({ refuse }: Parser, start: number, closing: string, found: string): void {
  refuse("cif-syntax", start, {
    message: "a bracket is not closed",
    expected: `\`${closing}\` behind the last value`,
    found,
    remedy: "close the bracket, or put quotation marks around the value",
  });
}

/** Reads `"key":` and goes to the value; false where there is none, which is noted. */
function readKey(parser: Parser, keys: Set<string>): boolean {
  const { scanner, refuse } = parser;
  const { start, end, text, kind } = scanner;
  if ((kind !== "quoted" && kind !== "triple") || text[end] !== ":") {
    refuse("cif-syntax", start, {
      message: "an entry of a table has no key",
      expected: 'a key in quotation marks and a colon: "key":value',
      found: wordOf(parser),
      remedy: "write the key, without a blank before the colon",
    });
    return false;
  }
  const key = textOf(text, scanner).normalize("NFC");
  if (keys.has(key))
    refuse("cif-duplicate", start, {
      message: `the key ${key} stands twice in one table`,
      expected: "every key once",
      found: key,
      remedy: "leave one of them out",
    });
  keys.add(key);
  advance(parser, end + 1, true);
  if (isValueToken(scanner.kind)) return true;
  refuse("cif-incomplete", start, {
    message: `the key ${key} has no value`,
    expected: "a value behind the colon",
    found: scanner.kind === "end" ? "the end of the file" : wordOf(parser),
    remedy: "write the value, or ? where it is not known",
  });
  return false;
}

/** After a fault within a table: to the first closing brace of the line, or its end. */
function skipToClosing({ scanner }: Parser): void {
  const found = /[}\n]/.exec(scanner.text.slice(scanner.end, scanner.end + 2048));
  scanner.end = found ? scanner.end + found.index + (found[0] === "}" ? 1 : 0) : scanner.text.length;
}
