import type { CifVersion } from "../cif/document.js";

/** Decimals of what is measured or made for an example; a cell or a moment is never known better. */
const decimalsOfFraction = 8;

/** A number as both standards write it: plain decimals, no exponent, no trailing zeros, no −0. */
export function cifNumber(value: number, decimals = decimalsOfFraction): string {
  const text = value.toFixed(decimals);
  const short = text.includes(".") ? text.replace(/\.?0+$/, "") : text;
  return short === "-0" ? "0" : short;
}

/** A list of numbers, which only CIF 2.0 has. */
export function cifNumberList(values: readonly number[]): string {
  return `[${values.map((value) => cifNumber(value)).join(" ")}]`;
}

const reserved = /^(?:data_|save_|loop_$|stop_$|global_$)/i;

/**
 * A text as a value: bare where it may be, else in quotation marks, else as a text field. What is a number or `?` or `.`
 * is quoted, so that it stays a text.
 */
export function cifText(text: string, version: CifVersion): string {
  const bare = version === "2.0" ? /^[^\s_#$'"[\]{};][^\s[\]{}]*$/ : /^[^\s_#$'"[\];][^\s]*$/;
  if (bare.test(text) && !reserved.test(text) && !isNumberLike(text)) return text;
  const oneLine = !/[\n\r]/.test(text);
  for (const quote of ["'", '"'])
    if (
      oneLine &&
      (version === "2.0" ? !text.includes(quote) : !new RegExp(`${quote}\\s`).test(`${text}`)) &&
      !text.endsWith(quote)
    )
      return `${quote}${text}${quote}`;
  // A line that begins with a semicolon would end the field: it is moved in by a blank.
  return `\n;${text.replace(/\n;/g, "\n ;")}\n;`;
}

/** A code that is a text by its type and looks like a number, such as a magnetic group's: always in quotation marks. */
export function cifQuoted(text: string): string {
  return text.includes("'") ? `"${text}"` : `'${text}'`;
}

function isNumberLike(text: string): boolean {
  return text === "?" || text === "." || /^[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?(?:\(\d+\))?$/.test(text);
}

/** `_name value`, the values in one column. */
export function cifItems(items: readonly (readonly [string, string])[]): string[] {
  const width = Math.max(...items.map(([name]) => name.length)) + 2;
  return items.map(([name, value]) => (value.startsWith("\n") ? `${name}${value}` : `${name.padEnd(width)}${value}`));
}

/** A loop with a row a line, columns lined up. */
export function cifLoop(names: readonly string[], rows: readonly (readonly string[])[]): string[] {
  const widths = names.map((_, column) => Math.max(...rows.map((row) => (row[column] ?? "").length)));
  return [
    "loop_",
    ...names,
    ...rows.map((row) =>
      row
        .map((value, column) => value.padEnd(widths[column] ?? 0))
        .join("  ")
        .trimEnd(),
    ),
    "",
  ];
}
