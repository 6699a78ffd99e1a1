import type { CifVersion } from "./document.js";
import type { OpenedText } from "./open-text.js";
import type { Say } from "./parser.js";

// biome-ignore lint/suspicious/noControlCharactersInRegex: which control characters stand in a file is the question
const controls = /[\u0001-\u0008\u000b\u000c\u000e-\u001f\u007f]/g;

/**
 * Neither version has control characters; 2.0 neither those of U+007F–9F, nor half surrogates, non-characters or a
 * byte-order mark within the text (Bernstein et al., 2016, production `allchar`).
 */
const forbiddenIn2 =
  // biome-ignore lint/suspicious/noControlCharactersInRegex: as above
  /[\u0001-\u0008\u000b\u000c\u000e-\u001f\u007f-\u009f\ufdd0-\ufdef\ufeff\ufffe\uffff]|[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]|[\ud83f\ud87f\ud8bf\ud8ff\ud93f\ud97f\ud9bf\ud9ff\uda3f\uda7f\udabf\udaff\udb3f\udb7f\udbbf\udbff][\udffe\udfff]/g;

// biome-ignore lint/suspicious/noControlCharactersInRegex: as above
const beyondAscii = /[^\u0000-\u007f]/g;

/** How many places are named; a file in another encoding has one in every line. */
const namedPlaces = 3;

/** Notes characters that the standard does not know. */
export function checkCharacters(
  text: string,
  version: CifVersion,
  { refuse, lapse }: { refuse: Say; lapse: Say },
): void {
  noteEach(text, version === "2.0" ? forbiddenIn2 : controls, (offset, name, more) =>
    refuse("cif-characters", offset, {
      message: `the character ${name} is not allowed in CIF ${version}${more}`,
      expected:
        version === "2.0"
          ? "printable Unicode characters, tabs and line ends"
          : "printable characters, tabs and line ends",
      found: name,
      remedy: "remove the character",
    }),
  );
  if (version === "2.0") return;
  noteEach(text, beyondAscii, (offset, name, more) =>
    lapse("cif-characters", offset, {
      message: `the character ${name} is no ASCII, which is all that CIF 1.1 has${more}`,
      expected: "ASCII, or a file that begins with #\\#CIF_2.0",
      found: name,
      remedy: "write accented letters in the way of CIF (\\'e), or make the file a CIF 2.0",
    }),
  );
}

function noteEach(text: string, pattern: RegExp, say: (offset: number, name: string, more: string) => void): void {
  const found: { offset: number; name: string }[] = [];
  let count = 0;
  for (const { 0: character, index } of text.matchAll(pattern)) {
    count += 1;
    if (found.length < namedPlaces) found.push({ offset: index, name: nameOf(character) });
  }
  found.forEach(({ offset, name }, index) => {
    const more = index === namedPlaces - 1 && count > namedPlaces ? `, and ${count - namedPlaces} more` : "";
    say(offset, name, more);
  });
}

function nameOf(character: string): string {
  const code = character.codePointAt(0) ?? 0;
  const shown = code > 0xa0 && code !== 0xfeff && !(code >= 0xd800 && code < 0xe000) ? ` (${character})` : "";
  return `U+${code.toString(16).toUpperCase().padStart(4, "0")}${shown}`;
}

/** Characters. CIF 1.1 and 2.0 alike. */
const longestLine = 2048;

/** Warnings about the file as a whole: long lines, a byte-order mark in CIF 1.1, an end mark, a version nobody knows. */
export function checkLines({ plain: text, version, lineStarts, hadMark, hadEndMark }: OpenedText, warn: Say): void {
  if (hadMark && version === "1.1")
    warn("cif-characters", 0, {
      message: "the file begins with a byte-order mark, which CIF 1.1 does not have",
      expected: "the first line without a mark",
      found: "U+FEFF",
      remedy: "save the file as UTF-8 without a mark; kvane leaves it away",
    });
  const other = /^#\\#CIF_(\S*)/i.exec(text);
  if (version === "1.1" && other && !/^1\.[01]$/.test(other[1] ?? ""))
    warn("cif-syntax", 0, {
      message: `CIF version \`${other[1]}\` is none that kvane knows; the file is read as CIF 1.1`,
      expected: "#\\#CIF_1.1 or #\\#CIF_2.0",
      found: other[0],
      remedy: "correct the first line",
    });
  if (hadEndMark)
    warn("cif-characters", text.length, {
      message: "the file ends with the control character U+001A",
      expected: "the end of the file",
      found: "U+001A",
      remedy: "remove it; kvane leaves it away",
    });
  const long: number[] = [];
  lineStarts.forEach((start, index) => {
    if ((lineStarts[index + 1] ?? text.length + 1) - 1 - start > longestLine) long.push(start);
  });
  const [first] = long;
  if (first !== undefined)
    warn("cif-syntax", first, {
      message: `${long.length === 1 ? "a line has" : `${long.length} lines have`} more than ${longestLine} characters`,
      expected: `at most ${longestLine} characters in a line`,
      found: `a line of ${(lineStarts[lineStarts.indexOf(first) + 1] ?? text.length + 1) - 1 - first} characters`,
      remedy: "break the line; other programs may refuse it",
    });
}
