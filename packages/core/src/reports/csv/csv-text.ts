export type CsvCell = string | number | boolean | null;

/**
 * Rows as comma-separated text after RFC 4180, a header first, lines ended by a line feed. Null is an empty cell.
 */
export function csvText(header: readonly string[], rows: readonly (readonly CsvCell[])[]): string {
  return [header, ...rows].map((row) => `${row.map(cell).join(",")}\n`).join("");
}

function cell(value: CsvCell): string {
  if (value === null) return "";
  const text = String(value);
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}
