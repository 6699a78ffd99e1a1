/** The widest line of a text report, in characters. */
export const pageWidth = 100;
/** The narrowest one: below it tables can no longer be read. */
const narrowestPage = 60;

/** The width of the page that is being written; set for the time of one report, which is made in one go. */
let current = pageWidth;

/** The widest line of the page that is being written. */
export function lineWidth(): number {
  return current;
}

/** What `write` gives, for a page of that width, 60 to 100; null stands for the usual 100. */
export function onPage<Result>(width: number | null, write: () => Result): Result {
  current = Math.min(Math.max(width ?? pageWidth, narrowestPage), pageWidth);
  try {
    return write();
  } finally {
    current = pageWidth;
  }
}

/** One column of a table. Numbers stand to the right, words to the left. */
export interface Column {
  readonly title: string;
  readonly align?: "left" | "right";
}

/** Characters, not UTF-16 units; nothing that kvane writes is wider than one place. */
export function widthOf(text: string): number {
  return text.length - (text.match(surrogatePairs)?.length ?? 0);
}

/** Characters of two UTF-16 units. */
const surrogatePairs = /[\ud800-\udbff][\udc00-\udfff]/g;

function pad(text: string, width: number, align: "left" | "right" = "left"): string {
  const blanks = " ".repeat(Math.max(0, width - widthOf(text)));
  return align === "right" ? blanks + text : text + blanks;
}

/** A blank at which no line is broken unless it must be; the report writes it as a blank. */
const joint = "\u00a0";

/** The text as one word for `wrap`: index triples, a number and what it counts. */
export function unbroken(text: string): string {
  return text.replaceAll(" ", joint);
}

/** The finished lines, without the marks for `wrap`. */
export function plainBlanks(text: string): string {
  return text.replaceAll(joint, " ");
}

/** Lines of at most `width` characters, broken at blanks; later lines are indented by `hanging` more. */
export function wrap(text: string, width = lineWidth(), hanging = 0): string[] {
  const lines: string[] = [];
  let line = "";
  let taken = 0;
  for (const word of text.split(" ").flatMap((one) => parts(one, width - hanging))) {
    const room = width - (lines.length > 0 ? hanging : 0);
    const wide = widthOf(word);
    if (taken + 1 + wide > room && line.trim() !== "") {
      lines.push(line.trimEnd());
      line = word;
      taken = wide;
    } else {
      taken = line === "" ? wide : taken + 1 + wide;
      line = line === "" ? word : `${line} ${word}`;
    }
  }
  lines.push(line);
  return lines.map((one, index) => (index === 0 ? one : " ".repeat(hanging) + one));
}

/** A word that is wider than a line, in pieces: broken where it was joined, or else anywhere. */
function parts(word: string, room: number): string[] {
  if (word.length <= room || widthOf(word) <= room) return [word];
  if (word.includes(joint)) return word.split(joint).flatMap((one) => parts(one, room));
  const letters = [...word];
  const pieces: string[] = [];
  for (let start = 0; start < letters.length; start += room) pieces.push(letters.slice(start, start + room).join(""));
  return pieces;
}

export function indented(lines: readonly string[], by = 2): string[] {
  return lines.map((line) => (line === "" ? "" : " ".repeat(by) + line));
}

/** A paragraph, indented and wrapped, its later lines by `hanging` more. */
export function paragraph(text: string, by = 2, hanging = 0): string[] {
  return indented(wrap(text, lineWidth() - by, hanging), by);
}

/** A headed part of a report; nothing when it has no lines. */
export function section(title: string, ...parts: readonly (readonly string[])[]): string[] {
  const lines = parts.flat();
  return lines.length === 0 ? [] : [...wrap(title, lineWidth(), 2), ...lines, ""];
}

/** Names and values in two columns, long values wrapped under themselves. */
export function fields(entries: readonly (readonly [string, string])[], by = 2): string[] {
  const left = Math.max(...entries.map(([name]) => widthOf(name))) + 2;
  // A name that leaves no room stands above its value.
  if (left > lineWidth() / 2)
    return entries.flatMap(([name, value]) => [...paragraph(name, by), ...paragraph(value, by + 2)]);
  return entries.flatMap(([name, value]) => {
    const lines = wrap(value, lineWidth() - by - left);
    return lines.map((line, index) => " ".repeat(by) + pad(index === 0 ? name : "", left) + line);
  });
}

/** A column is not made narrower than that to fit the page, unless it is by itself. */
const narrowest = 20;

/**
 * A table with aligned columns, two blanks between them. What is wider than the page has its last column wrapped under
 * itself, and where that does not do the widest others too.
 */
export function table(columns: readonly Column[], rows: readonly (readonly string[])[], by = 2): string[] {
  const widths = columns.map((column, index) =>
    Math.max(widthOf(column.title), ...rows.map((row) => widthOf(row[index] ?? ""))),
  );
  if (widthOfAll(widths, by) > lineWidth())
    fitPage(widths, narrowTitles(columns, rows), longestWords(columns, rows), by);
  const line = (cells: readonly string[]): string[] => {
    const wrapped = columns.map((_, index) => wrap(cells[index] ?? "", widths[index]));
    const height = Math.max(...wrapped.map(({ length }) => length));
    return Array.from({ length: height }, (_, row) => {
      const texts = columns.map(({ align }, index) => pad(wrapped[index]?.[row] ?? "", widths[index] ?? 0, align));
      return (" ".repeat(by) + texts.join("  ")).trimEnd();
    });
  };
  return [line(columns.map(({ title }) => title)), ...rows.map(line)].flat();
}

function widthOfAll(widths: readonly number[], by: number): number {
  return by - 2 + widths.reduce((sum, width) => sum + width + 2, 0);
}

/** The widths of columns whose titles may be broken at blanks. */
function narrowTitles(columns: readonly Column[], rows: readonly (readonly string[])[]): number[] {
  return columns.map(({ title }, index) =>
    Math.max(...title.split(" ").map(widthOf), ...rows.map((row) => widthOf(row[index] ?? ""))),
  );
}

/** The widths of columns that are broken at blanks only. */
function longestWords(columns: readonly Column[], rows: readonly (readonly string[])[]): number[] {
  return columns.map(({ title }, index) =>
    Math.max(...[title, ...rows.map((row) => row[index] ?? "")].flatMap((text) => text.split(" ").map(widthOf))),
  );
}

/** Makes columns narrower until the table fits: their titles, then the last column, then the widest, words last. */
function fitPage(widths: number[], narrow: readonly number[], words: readonly number[], by: number): void {
  const last = widths.length - 1;
  const excess = () => Math.max(0, widthOfAll(widths, by) - lineWidth());
  const shrink = (index: number, floor: number) => {
    const width = widths[index] ?? 0;
    widths[index] = Math.max(Math.min(width, floor), width - excess());
  };
  if (widthOfAll(narrow, by) <= lineWidth()) for (const index of narrow.keys()) shrink(index, narrow[index] ?? 0);
  shrink(last, narrowest);
  for (const index of narrow.keys()) shrink(index, narrow[index] ?? 0);
  while (excess() > 0) {
    const spare = widths.map((width, index) => width - (words[index] ?? 0));
    const roomiest = spare.indexOf(Math.max(...spare));
    if ((spare[roomiest] ?? 0) <= 0) break;
    shrink(roomiest, (widths[roomiest] ?? 0) - 1);
  }
  while (excess() > 0) {
    const widest = widths.indexOf(Math.max(...widths));
    if ((widths[widest] ?? 0) <= 1) return;
    shrink(widest, Math.min(narrowest, (widths[widest] ?? 0) - 1));
  }
}

/**
 * A table with many columns of numbers: as many of `columns` as fit the page stand beside the `fixed` ones, the rest
 * in further blocks below.
 */
export function wideTable(
  fixed: readonly Column[],
  columns: readonly Column[],
  rows: readonly { readonly fixed: readonly string[]; readonly cells: readonly string[] }[],
  by = 2,
): string[] {
  const widthAt = (column: Column, cells: readonly string[]) => Math.max(widthOf(column.title), ...cells.map(widthOf));
  const left = fixed.reduce(
    (sum, column, index) =>
      sum +
      2 +
      widthAt(
        column,
        rows.map((row) => row.fixed[index] ?? ""),
      ),
    by,
  );
  const blocks: number[][] = [];
  let used = lineWidth();
  columns.forEach((column, index) => {
    const width =
      2 +
      widthAt(
        column,
        rows.map((row) => row.cells[index] ?? ""),
      );
    if (used + width > lineWidth() + 2) {
      blocks.push([]);
      used = left;
    }
    blocks.at(-1)?.push(index);
    used += width;
  });
  return blocks.flatMap((block, number) => [
    ...(number > 0 ? [""] : []),
    ...table(
      [...fixed, ...block.map((index) => columns[index] as Column)],
      rows.map((row) => [...row.fixed, ...block.map((index) => row.cells[index] ?? "")]),
      by,
    ),
  ]);
}

/** Short texts in as many columns as the page holds, filled row by row; what is wider than the page is wrapped. */
export function flow(texts: readonly string[], by = 2): string[] {
  const width = Math.max(...texts.map(widthOf)) + 2;
  if (width > lineWidth() - by + 2) return texts.flatMap((text) => paragraph(text, by, 4));
  const across = Math.max(1, Math.floor((lineWidth() - by + 2) / width));
  const lines: string[] = [];
  for (let start = 0; start < texts.length; start += across)
    lines.push(
      (
        " ".repeat(by) +
        texts
          .slice(start, start + across)
          .map((text) => pad(text, width))
          .join("")
      ).trimEnd(),
    );
  return lines;
}

/** The texts with their number from 1 in front, in columns. */
export function numbered(texts: readonly string[], by = 2): string[] {
  const places = String(texts.length).length;
  return flow(
    texts.map((text, index) => `${String(index + 1).padStart(places)}  ${text}`),
    by,
  );
}
