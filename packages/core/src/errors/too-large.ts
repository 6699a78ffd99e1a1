/** A decimal number as files and users write it, perhaps with an uncertainty in brackets; U+2212 is a minus sign too. */
const decimal = /^[+\-\u2212]?((?:\d+(?:\.\d*)?|\.\d+)(?:e[+-]?\d+)?)(?:\(\d+\))?$/i;

/** Whether a text is written as a number should be and is beyond the largest there is, such as `1e400`. */
export function isTooLarge(text: string): boolean {
  return Number(decimal.exec(text)?.[1] ?? 0) === Number.POSITIVE_INFINITY;
}

/**
 * What is wrong with a text that could not be read as a number, to be said behind the text.
 *
 * @param otherwise what to say where the number is not just too large
 */
export function whyNoNumber(text: string, otherwise = "is no number"): string {
  return isTooLarge(text) ? "is too large for a number of this kind (beyond 1.8e308)" : otherwise;
}
