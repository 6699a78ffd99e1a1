import type { ProblemCode } from "../../errors/index.js";
import { note, type ProblemList, problemList, throwProblems } from "../problem-list.js";
import { checkCharacters, checkLines } from "./characters.js";
import { skipContainer } from "./containers.js";
import { type CifDocument, type CifName, placeAt } from "./document.js";
import { comparable } from "./names.js";
import { openCifText } from "./open-text.js";
import { advance, type OpenBlock, type Parser, type Said, wordAt } from "./parser.js";
import { isValueToken, nextToken, scannerOf } from "./scanner.js";

/**
 * Reads the grammar of a CIF, 1.1 or 2.0 (S. R. Hall, F. H. Allen & I. D. Brown, Acta Cryst. A47 (1991) 655;
 * International Tables G, chapter 2.2; H. J. Bernstein et al., J. Appl. Cryst. 49 (2016) 277). What the names mean is
 * not looked at. Takes time and memory in proportion to the length of the text.
 *
 * Throws all problems at once, each with line and column: `file-empty`, `file-unreadable`, `file-too-large`,
 * `cif-syntax`, `cif-characters`, `cif-incomplete`, `cif-duplicate`.
 *
 * @param file name of the file, for messages
 * @param options.strict also what has one meaning all the same is a problem, not a warning: characters beyond ASCII and
 *   names of more than 75 characters in CIF 1.1
 */
export function parseCif(text: string, file: string, options: { readonly strict?: boolean } = {}): CifDocument {
  const opened = openCifText(text, file);
  const { plain, version, lineStarts } = opened;
  const problems = problemList(file);
  const warnings = problemList(file);
  const scanner = scannerOf(plain, version);
  const say = (list: ProblemList) => (code: ProblemCode, offset: number, said: Said) => {
    // A file of another kind has a problem in every word; only the first few are listed.
    if (list.more > 0) list.more += 1;
    else note(list, code, said.message, { ...said, where: placeAt(lineStarts, offset) });
  };
  const parser: Parser = {
    scanner,
    refuse: say(problems),
    lapse: say(options.strict ? problems : warnings),
    lineOf: (offset) => placeAt(lineStarts, offset).line,
    blocks: [],
    block: null,
    frame: null,
    strayBefore: false,
  };
  checkCharacters(plain, version, parser);
  checkLines(opened, say(warnings));
  if (isCif(plain)) parseBlocks(parser);
  else refuseWhole(parser);
  throwProblems(problems);
  return { file, version, text: plain, lineStarts, blocks: parser.blocks, warnings: warnings.listed };
}

/** A file that nowhere opens a block is another kind of file, or holds comments alone. */
function isCif(text: string): boolean {
  return /(?:^|\s)data_/i.test(text) || !/^[^\S\n]*[^\s#]/m.test(text);
}

function refuseWhole({ scanner, refuse }: Parser): void {
  nextToken(scanner, 0);
  refuse("cif-syntax", scanner.start, {
    message: "the file is no CIF: no data block begins anywhere",
    expected: "a line such as data_name before the first data name",
    found: scanner.text.slice(scanner.start, scanner.start + 40).split("\n")[0] ?? "",
    remedy: "check that this is the CIF; if it is one, add a line data_name at its top",
  });
}

function parseBlocks(parser: Parser): void {
  const { scanner } = parser;
  const codes = new Map<string, number>();
  advance(parser, 0);
  while (scanner.kind !== "end") {
    if (scanner.kind === "data") openBlock(parser, codes);
    else if (scanner.kind === "save") readFrame(parser);
    else if (scanner.kind === "loop") readLoop(parser);
    else if (scanner.kind === "name") readItem(parser);
    else if (isValueToken(scanner.kind)) readStray(parser);
    else refuseToken(parser);
  }
  closeFrame(parser);
}

function newBlock(code: string, start: number): OpenBlock {
  return { record: { code, start, items: [], loops: [], frames: [] }, seen: new Map(), codes: new Map() };
}

function openBlock(parser: Parser, codes: Map<string, number>): void {
  const { scanner } = parser;
  closeFrame(parser);
  const code = headingCode(parser, "data_", codes);
  const block = newBlock(code, scanner.start);
  parser.block = block;
  parser.blocks.push(block.record);
  advance(parser, scanner.end);
}

/** The code behind `data_` or `save_`, noted where it is missing, too long or taken. */
function headingCode(parser: Parser, keyword: "data_" | "save_", codes: Map<string, number>): string {
  const { scanner, refuse } = parser;
  const { start, end, text } = scanner;
  const code = text.slice(start + keyword.length, end);
  const what = keyword === "data_" ? "data block" : "save frame";
  if (code === "")
    refuse("cif-syntax", start, {
      message: `a ${what} has no name`,
      expected: `${keyword}name in one word`,
      found: text.slice(start, end),
      remedy: `write a name directly behind ${keyword}`,
    });
  checkLength(parser, start, code.length);
  const earlier = codes.get(comparable(code));
  if (earlier !== undefined)
    refuse("cif-duplicate", start, {
      message: `two ${what}s are called ${code}`,
      expected: "names that differ by more than their case",
      found: `${code}, which line ${parser.lineOf(earlier)} has already`,
      remedy: "give the second another name",
    });
  else codes.set(comparable(code), start);
  return code;
}

/** Characters of a data name, block or frame code in CIF 1.1 (International Tables G, 2.2.7.1). */
const longestName = 75;

function checkLength({ scanner, lapse }: Parser, start: number, length: number): void {
  if (scanner.version !== "1.1" || length <= longestName) return;
  lapse("cif-syntax", start, {
    message: `a name has ${length} characters, too many for CIF 1.1`,
    expected: `at most ${longestName} characters`,
    found: wordAt(scanner.text, start),
    remedy: "shorten the name, or begin the file with #\\#CIF_2.0",
  });
}

function readFrame(parser: Parser): void {
  const { scanner, refuse } = parser;
  const { start, end, text } = scanner;
  const opens = end > start + 5;
  if (!opens && parser.frame === null)
    refuse("cif-syntax", start, {
      message: "a save frame is closed, and none is open",
      expected: "save_name before save_",
      found: text.slice(start, end),
      remedy: "remove the save_",
    });
  else if (!opens) parser.frame = null;
  else {
    closeFrame(parser);
    const block = container(parser, start);
    const frame = newBlock(headingCode(parser, "save_", block.codes), start);
    block.record.frames.push(frame.record);
    parser.frame = frame;
  }
  advance(parser, scanner.end);
}

/** Notes a save frame that is still open where a block, another frame or the file ends. */
function closeFrame(parser: Parser): void {
  const { frame, refuse } = parser;
  if (frame === null) return;
  refuse("cif-syntax", frame.record.start, {
    message: `the save frame ${frame.record.code} is not closed`,
    expected: "save_ behind its last value; frames are not nested",
    found: "none before the next block, frame or the end of the file",
    remedy: "close it with save_",
  });
  parser.frame = null;
}

/** Where names and values belong: the open frame or block; before the first block that is noted, once. */
function container(parser: Parser, start: number): OpenBlock {
  if (parser.frame) return parser.frame;
  if (parser.block) return parser.block;
  if (!parser.strayBefore)
    parser.refuse("cif-syntax", start, {
      message: "something stands before the first data block",
      expected: "comments alone before the first data_name",
      found: wordAt(parser.scanner.text, start),
      remedy: "move data_name to the top of the file",
    });
  parser.strayBefore = true;
  const block = newBlock("", start);
  parser.block = block;
  return block;
}

function readItem(parser: Parser): void {
  const { scanner, refuse } = parser;
  const { start, end, text } = scanner;
  const block = container(parser, start);
  const name = text.slice(start, end);
  noteName(parser, block, name, start);
  advance(parser, end);
  if (!isValueToken(scanner.kind)) {
    refuse("cif-incomplete", start, {
      message: `${name} has no value`,
      expected: "a value behind the name",
      found: scanner.kind === "end" ? "the end of the file" : text.slice(scanner.start, scanner.end),
      remedy: "write the value, or ? where it is not known",
    });
    return;
  }
  block.record.items.push({ name, start, value: scanner.start });
  skipValue(parser);
}

/** Goes behind the value that the scanner stands on. */
function skipValue(parser: Parser): void {
  if (parser.scanner.kind === "[" || parser.scanner.kind === "{") skipContainer(parser);
  advance(parser, parser.scanner.end);
}

function noteName(parser: Parser, block: OpenBlock, name: string, start: number): void {
  checkLength(parser, start, name.length);
  const key = comparable(name);
  const earlier = block.seen.get(key);
  if (earlier === undefined) block.seen.set(key, start);
  else
    parser.refuse("cif-duplicate", start, {
      message: `${name} stands twice in one block`,
      expected: "every data name once",
      found: `${name}, which line ${parser.lineOf(earlier)} has already`,
      remedy: "leave one of them out",
    });
}

function readLoop(parser: Parser): void {
  const { scanner, refuse } = parser;
  const { start, text } = scanner;
  const block = container(parser, start);
  const names: CifName[] = [];
  for (advance(parser, scanner.end); scanner.kind === "name"; advance(parser, scanner.end)) {
    const name = text.slice(scanner.start, scanner.end);
    noteName(parser, block, name, scanner.start);
    names.push({ name, start: scanner.start });
  }
  const values: number[] = [];
  while (isValueToken(scanner.kind)) {
    values.push(scanner.start);
    skipValue(parser);
  }
  const found = scanner.kind === "end" ? "the end of the file" : text.slice(scanner.start, scanner.end);
  if (names.length === 0)
    refuse("cif-incomplete", start, {
      message: "loop_ has no data names",
      expected: "data names, then values",
      found: values.length > 0 ? wordAt(text, values[0] as number) : found,
      remedy: "write the names of the columns behind loop_",
    });
  else if (values.length === 0)
    refuse("cif-incomplete", start, {
      message: "loop_ has no values",
      expected: `at least one row of ${names.length} values`,
      found,
      remedy: "write a row of values, or remove the loop",
    });
  else if (values.length % names.length > 0) refuseRow(parser, names, values);
  else block.record.loops.push({ start, names, values });
}

function refuseRow({ refuse, lineOf }: Parser, names: readonly CifName[], values: readonly number[]): void {
  const count = names.length;
  const rest = values.length % count;
  const first = values[values.length - rest] as number;
  refuse("cif-incomplete", first, {
    message: `the last row of a loop has ${rest} of ${count} values`,
    expected: `a multiple of ${count} values, one for each data name of the loop of line ${lineOf(names[0]?.start ?? 0)}`,
    found: `${values.length} values`,
    remedy: "look for a value that is missing, or for a text with blanks that needs quotation marks",
  });
}

/** Values that no name asks for: one problem for all that follow each other. */
function readStray(parser: Parser): void {
  const { scanner, refuse } = parser;
  const { start, text } = scanner;
  container(parser, start);
  const faulty = scanner.fault !== null;
  let count = 0;
  while (isValueToken(scanner.kind)) {
    count += 1;
    skipValue(parser);
  }
  // What is wrong with the value itself was said.
  if (faulty) return;
  refuse("cif-syntax", start, {
    message: `${count === 1 ? "a value stands" : `${count} values stand`} behind no data name`,
    expected: "a data name, which begins with _",
    found: wordAt(text, start),
    remedy: "put a text with blanks into quotation marks",
  });
}

function refuseToken(parser: Parser): void {
  const { scanner, refuse } = parser;
  const word = scanner.text.slice(scanner.start, scanner.end);
  const bracket = scanner.kind === "]" || scanner.kind === "}";
  refuse("cif-syntax", scanner.start, {
    message: bracket ? `\`${word}\` closes a bracket that was not opened` : `${word} is no word of CIF`,
    expected: bracket ? "an opening bracket before it" : "a data name, loop_ or data_name",
    found: word,
    remedy: bracket ? "remove it, or put quotation marks around the value" : "remove it",
  });
  advance(parser, scanner.end);
}
