/** Attributes of an element; null leaves one out, numbers are written to two decimals. */
export interface Attributes {
  readonly [name: string]: string | number | null | undefined;
}

/**
 * Text from anywhere as text of HTML or XML, in content and in quoted attributes: mark-up characters as references, and
 * what XML 1.0 does not allow (control characters, halves of surrogate pairs; section 2.2) replaced.
 */
export function escapeMarkup(text: string): string {
  return wellFormed(text)
    .replaceAll("&", "&amp;")
    .replaceAll("<", "&lt;")
    .replaceAll(">", "&gt;")
    .replaceAll('"', "&quot;")
    .replaceAll("'", "&#39;");
}

function wellFormed(text: string): string {
  let out = "";
  for (const letter of text) {
    const code = letter.codePointAt(0) ?? 0;
    const control = code < 0x20 && code !== 0x09 && code !== 0x0a && code !== 0x0d;
    const forbidden = control || (code >= 0xd800 && code <= 0xdfff) || code === 0xfffe || code === 0xffff;
    out += forbidden ? "\ufffd" : letter;
  }
  return out;
}

/** A length of a drawing: two decimals are a fiftieth of a pixel; never −0. */
export function coordinate(value: number): string {
  return String(Math.round(value * 100) / 100 + 0);
}

/** Elements of drawings that hold nothing. HTML knows no short form: every other element gets its end. */
const marks = new Set(["path", "circle", "rect"]);

/** An element with finished mark-up inside; `null` children are left out. */
export function element(name: string, attributes: Attributes, ...children: readonly (string | null)[]): string {
  const written = Object.entries(attributes)
    .filter((entry): entry is [string, string | number] => entry[1] !== null && entry[1] !== undefined)
    .map(([key, value]) => ` ${key}="${typeof value === "number" ? coordinate(value) : escapeMarkup(value)}"`)
    .join("");
  const inner = children.filter((child) => child !== null).join("");
  return inner === "" && marks.has(name) ? `<${name}${written}/>` : `<${name}${written}>${inner}</${name}>`;
}
