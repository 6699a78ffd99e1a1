import { fail } from "../../errors/index.js";
import { readableText } from "../readable-text.js";
import type { CifVersion } from "./document.js";

/** Characters. A larger file holds images or raw data; what is sought in it is a page. */
const longestCif = 256 * 1024 * 1024;

/** The text of a CIF with what is to be known before it is read. */
export interface OpenedText {
  readonly plain: string;
  readonly version: CifVersion;
  readonly lineStarts: readonly number[];
  /** Whether a byte-order mark was taken off. */
  readonly hadMark: boolean;
  /** Whether U+001A was taken off the end, which old systems left there. */
  readonly hadEndMark: boolean;
}

/**
 * CIF 2.0 is what begins with `#\#CIF_2.0` as its very first characters, behind a byte-order mark if there is one;
 * everything else is CIF 1.1. Throws `file-too-large`, `file-empty`, `file-unreadable`.
 */
export function openCifText(text: string, file: string): OpenedText {
  if (text.length > longestCif)
    fail("file-too-large", `the file has ${Math.round(text.length / 1024 / 1024)} million characters`, {
      where: { file },
      expected: "a CIF of at most 256 MB",
      found: `${text.length} characters`,
      remedy: "cut out the data block with the structure and leave images and raw data away",
    });
  const whole = readableText(text, file);
  const plain = withoutEndMark(whole);
  const version = /^#\\#CIF_2\.0(?:[ \t\n]|$)/.test(plain) ? "2.0" : "1.1";
  return {
    plain,
    version,
    lineStarts: startsOfLines(plain),
    hadMark: text.charCodeAt(0) === 0xfeff,
    hadEndMark: plain.length < whole.length,
  };
}

function withoutEndMark(text: string): string {
  let end = text.length;
  while (end > 0 && /\s/.test(text[end - 1] as string)) end -= 1;
  return text[end - 1] === "\u001a" ? text.slice(0, end - 1) : text;
}

function startsOfLines(text: string): number[] {
  const starts = [0];
  for (let at = text.indexOf("\n"); at >= 0; at = text.indexOf("\n", at + 1)) starts.push(at + 1);
  return starts;
}
