import { fail } from "../errors/index.js";

/**
 * The text of a file without its byte-order mark and with `\n` at every line end, so that lines and columns count the
 * same for files of every system. Throws `file-empty` for blank text and `file-unreadable` for a zero byte, which text
 * never has (UTF-16 and spreadsheet files do).
 */
export function readableText(text: string, file: string): string {
  const plain = text.replace(/^\uFEFF/, "").replace(/\r\n?/g, "\n");
  const zeroByte = plain.indexOf("\u0000");
  if (zeroByte >= 0) {
    const before = plain.slice(0, zeroByte).split("\n");
    fail("file-unreadable", "the file is not plain text: it has a zero byte", {
      where: { file, line: before.length, column: (before.at(-1) ?? "").length + 1 },
      expected: "text in UTF-8",
      found: "a zero byte",
      remedy: "export it as plain text (UTF-8), not as a spreadsheet or UTF-16",
    });
  }
  if (plain.trim() === "") {
    fail("file-empty", "the file is empty", {
      where: { file, line: 1, column: 1 },
      expected: "at least one line with content",
      found: "nothing but blanks",
      remedy: "check the name of the file and how it was written",
    });
  }
  return plain;
}
