/** The widest line of a text report, in characters. */
export const pageWidth = 100;

/** One column of a table. Numbers stand to the right, words to the left. */
export interface Column {
  readonly title: string;
  readonly align?: "left" | "right";
}

/** Characters, not UTF-16 units; nothing that kvane writes is wider than one place. */
export function widthOf(text: string): number {
  return [...text].length;
}

function pad(text: string, width: number, align: "left" | "right" = "left"): string {
  const blanks = " ".repeat(Math.max(0, width - widthOf(text)));
  return align === "right" ? blanks + text : text + blanks;
}

/** Lines of at most `width` characters, broken at blanks; later lines are indented by `hanging` more. */
export function wrap(text: string, width = pageWidth, hanging = 0): string[] {
  const lines: string[] = [];
  let line = "";
  for (const word of text.split(" ")) {
    const room = width - (lines.length > 0 ? hanging : 0);
    if (line !== "" && widthOf(line) + 1 + widthOf(word) > room) {
      lines.push(line);
      line = word;
    } else line = line === "" ? word : `${line} ${word}`;
  }
  lines.push(line);
  return lines.map((one, index) => (index === 0 ? one : " ".repeat(hanging) + one));
}

export function indented(lines: readonly string[], by = 2): string[] {
  return lines.map((line) => (line === "" ? "" : " ".repeat(by) + line));
}

/** A paragraph, indented and wrapped, its later lines by `hanging` more. */
export function paragraph(text: string, by = 2, hanging = 0): string[] {
  return indented(wrap(text, pageWidth - by, hanging), by);
}

/** A headed part of a report; nothing when it has no lines. */
export function section(title: string, ...parts: readonly (readonly string[])[]): string[] {
  const lines = parts.flat();
  return lines.length === 0 ? [] : [title, ...lines, ""];
}

/** Names and values in two columns, long values wrapped under themselves. */
export function fields(entries: readonly (readonly [string, string])[], by = 2): string[] {
  const left = Math.max(...entries.map(([name]) => widthOf(name))) + 2;
  return entries.flatMap(([name, value]) => {
    const lines = wrap(value, pageWidth - by - left);
    return lines.map((line, index) => " ".repeat(by) + pad(index === 0 ? name : "", left) + line);
  });
}

/**
 * A table with aligned columns, two blanks between them. What is wider than the page has its last column wrapped under
 * itself.
 */
export function table(columns: readonly Column[], rows: readonly (readonly string[])[], by = 2): string[] {
  const widths = columns.map((column, index) =>
    Math.max(widthOf(column.title), ...rows.map((row) => widthOf(row[index] ?? ""))),
  );
  const last = columns.length - 1;
  const before = widths.slice(0, last).reduce((sum, width) => sum + width + 2, by);
  const room = Math.max(20, pageWidth - before);
  const line = (cells: readonly string[]): string[] => {
    const start = cells.slice(0, last).map((cell, index) => pad(cell, widths[index] ?? 0, columns[index]?.align));
    const width = Math.min(widths[last] ?? 0, room);
    return wrap(cells[last] ?? "", room).map((text, index) => {
      const left = index === 0 ? start : start.map((cell) => " ".repeat(widthOf(cell)));
      return (" ".repeat(by) + [...left, pad(text, width, columns[last]?.align)].join("  ")).trimEnd();
    });
  };
  return [line(columns.map(({ title }) => title)), ...rows.map(line)].flat();
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
  let used = pageWidth;
  columns.forEach((column, index) => {
    const width =
      2 +
      widthAt(
        column,
        rows.map((row) => row.cells[index] ?? ""),
      );
    if (used + width > pageWidth + 2) {
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

/** Short texts in as many columns as the page holds, filled row by row. */
export function flow(texts: readonly string[], by = 2): string[] {
  const width = Math.max(...texts.map(widthOf)) + 2;
  const across = Math.max(1, Math.floor((pageWidth - by + 2) / width));
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
