const widest = 100;

/**
 * JSON text in which every object field starts a line and lists of numbers and short texts stay on one line where they
 * fit. The same value gives the same bytes.
 */
export function jsonText(value: unknown): string {
  return `${write(value, 0)}\n`;
}

function write(value: unknown, depth: number): string {
  if (Array.isArray(value)) return writeList(value, depth);
  if (value !== null && typeof value === "object") return writeObject(value, depth);
  return JSON.stringify(value) ?? "null";
}

function writeObject(value: object, depth: number): string {
  const entries = Object.entries(value).filter(([, entry]) => entry !== undefined);
  if (entries.length === 0) return "{}";
  const flat = oneLine(value);
  if (flat !== null && flat.length <= widest - 2 * depth && depth > 1) return flat;
  const inner = entries.map(
    ([name, entry]) => `${indent(depth + 1)}${JSON.stringify(name)}: ${write(entry, depth + 1)}`,
  );
  return `{\n${inner.join(",\n")}\n${indent(depth)}}`;
}

function writeList(value: readonly unknown[], depth: number): string {
  if (value.length === 0) return "[]";
  const flat = oneLine(value);
  if (flat !== null && flat.length <= widest - 2 * depth) return flat;
  const inner = value.map((entry) => `${indent(depth + 1)}${write(entry, depth + 1)}`);
  return `[\n${inner.join(",\n")}\n${indent(depth)}]`;
}

/** The value on one line, or null when that is longer than any line may be. */
function oneLine(value: unknown): string | null {
  let length = 0;
  const visit = (part: unknown): string | null => {
    if (length > widest) return null;
    if (Array.isArray(part)) {
      const parts = part.map(visit);
      length += 2 * part.length;
      return parts.includes(null) ? null : `[${parts.join(", ")}]`;
    }
    if (part !== null && typeof part === "object") {
      const parts = Object.entries(part).map(([name, entry]) => {
        const text = visit(entry);
        length += name.length + 6;
        return text === null ? null : `${JSON.stringify(name)}: ${text}`;
      });
      return parts.includes(null) ? null : `{${parts.join(", ")}}`;
    }
    const text = JSON.stringify(part) ?? "null";
    length += text.length;
    return text;
  };
  return visit(value);
}

function indent(depth: number): string {
  return "  ".repeat(depth);
}
