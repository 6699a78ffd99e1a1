import { type CifDocument, type CifText, type CifValue, placeAt } from "./document.js";
import { isValueToken, nextToken, type Scanner, scannerOf } from "./scanner.js";
import { textFieldContent } from "./text-fields.js";

/** The value that stands at an offset of a document that was parsed, so that nothing can be wrong with it. */
export function valueAt(document: CifDocument, start: number): CifValue {
  const scanner = scannerOf(document.text, document.version);
  nextToken(scanner, start);
  return readValue(document, scanner);
}

/** Reads the value that the scanner stands on; the scanner ends on its last token. */
function readValue(document: CifDocument, scanner: Scanner): CifValue {
  const { start, kind } = scanner;
  const place = placeAt(document.lineStarts, start);
  if (kind === "[") {
    const items: CifValue[] = [];
    while (hasNext(scanner)) items.push(readValue(document, scanner));
    return { shape: "list", items, raw: document.text.slice(start, scanner.end), ...place };
  }
  if (kind === "{") {
    const entries: { key: string; value: CifValue }[] = [];
    while (hasNext(scanner)) {
      const key = textOf(document.text, scanner);
      nextToken(scanner, scanner.end + 1, true);
      entries.push({ key, value: readValue(document, scanner) });
    }
    return { shape: "table", entries, raw: document.text.slice(start, scanner.end), ...place };
  }
  const form = kind === "bare" || kind === "text field" ? kind : "quoted";
  const raw = document.text.slice(start, scanner.end);
  return { shape: "text", form, text: textOf(document.text, scanner), raw, ...place };
}

/** Goes to the next value or key of an open list or table; false at its closing bracket. */
function hasNext(scanner: Scanner): boolean {
  nextToken(scanner, scanner.end, true);
  return isValueToken(scanner.kind);
}

/** The content of the token, without its delimiters. */
export function textOf(text: string, { kind, start, end }: Scanner): string {
  if (kind === "quoted") return text.slice(start + 1, end - 1);
  if (kind === "triple") return text.slice(start + 3, end - 3);
  if (kind === "text field") return textFieldContent(text.slice(start + 1, Math.max(start + 1, end - 2)));
  return text.slice(start, end);
}

/** A bare `?`: the value is not known. */
export function isUnknown(value: CifValue): boolean {
  return value.shape === "text" && value.form === "bare" && value.text === "?";
}

/** A bare `.`: the item does not apply, or has its default. */
export function isInapplicable(value: CifValue): boolean {
  return value.shape === "text" && value.form === "bare" && value.text === ".";
}

/** The text of a value that says something: neither `?` nor `.`, and no list or table. */
export function saidText(value: CifValue | null): CifText | null {
  return value === null || value.shape !== "text" || isUnknown(value) || isInapplicable(value) ? null : value;
}
