import type { PeakKind } from "../search/index.js";

/** Without blanks, hyphens, underscores and points, in lower case. */
export function plainName(name: string): string {
  return name
    .normalize("NFKC")
    .toLowerCase()
    .replace(/[\s\-_.]/g, "");
}

const kindNames: Readonly<Record<string, PeakKind>> = {
  d: "d",
  dspacing: "d",
  q: "q",
  twotheta: "two-theta",
  "2theta": "two-theta",
  "2θ": "two-theta",
  hkl: "hkl",
};

/** The kind that a word such as `d`, `q`, `two-theta`, `2theta`, `hkl` names, in any case, or null. */
export function readPeakKind(word: string): PeakKind | null {
  const name = plainName(word);
  return Object.hasOwn(kindNames, name) ? (kindNames[name] ?? null) : null;
}

/** What every message about the kind expects. */
export const peakKindWords = "d, q, two-theta or hkl";
