/**
 * The source line and a caret below the column, both cut to `width` characters around the column, for error messages.
 *
 * @param line the whole source line, without its line end
 * @param column counted from 1
 */
export function caretLine(line: string, column: number, width = 76): string {
  const shown = line.replaceAll("\t", " ");
  const start = Math.max(0, Math.min(column - 1 - Math.floor(width / 2), shown.length - width));
  const cut = shown.slice(start, start + width);
  return `${cut}\n${" ".repeat(Math.max(0, column - 1 - start))}^`;
}
