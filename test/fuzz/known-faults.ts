/**
 * An input without what meets a known fault that is not mended yet. Translations and fractions of large denominators: one
 * beyond 2^53 makes the reader of linear forms loop for ever, and a lattice of millions of points in a cell is listed whole.
 */
export function withoutKnownFaults(input: unknown): unknown {
  if (typeof input === "string") return input.replace(/\/\s*\d{4,}/g, "/12");
  if (Array.isArray(input)) return input.map(withoutKnownFaults);
  if (input === null || typeof input !== "object") return input;
  return Object.fromEntries(Object.entries(input).map(([key, value]) => [key, withoutKnownFaults(value)]));
}
