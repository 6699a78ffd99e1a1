import type { PeakKind } from "../search/index.js";

/** Factors from a unit to that of the kind: Å for d, Å⁻¹ for Q, degrees for 2θ, r.l.u. for h k l. */
const unitFactors: Readonly<Record<PeakKind, ReadonlyMap<string, number>>> = {
  d: new Map([
    ["å", 1],
    ["a", 1],
    ["angstrom", 1],
    ["ångström", 1],
    ["nm", 10],
    ["pm", 0.01],
  ]),
  q: new Map([
    ["1/å", 1],
    ["å-1", 1],
    ["1/a", 1],
    ["a-1", 1],
    ["1/angstrom", 1],
    ["angstrom-1", 1],
    ["1/nm", 0.1],
    ["nm-1", 0.1],
  ]),
  "two-theta": new Map([
    ["deg", 1],
    ["degree", 1],
    ["degrees", 1],
    ["°", 1],
    ["rad", 180 / Math.PI],
  ]),
  hkl: new Map([
    ["rlu", 1],
    ["r.l.u.", 1],
  ]),
};

/** How the unit of a kind is shown behind a number. */
export const kindUnits: Readonly<Record<PeakKind, string>> = {
  d: " Å",
  q: " Å⁻¹",
  "two-theta": "°",
  hkl: " r.l.u.",
};

/**
 * Factor from the unit that is written to that of the kind, or null for a unit that the kind has not.
 * `Å`, `A`, `Angstrom`, `nm`, `pm`; `1/Å`, `Å^-1`, `Å⁻¹`, `1/nm`; `deg`, `°`, `rad`; `r.l.u.`.
 */
export function unitFactor(kind: PeakKind, unit: string): number | null {
  // NFKC makes one Å of its three encodings and plain digits of superscripts.
  const plain = unit
    .normalize("NFKC")
    .toLowerCase()
    .replaceAll("\u2212", "-")
    .replace(/[\s^*]/g, "");
  return unitFactors[kind].get(plain) ?? null;
}

/** Units of a kind as an error message lists them. */
export function unitNames(kind: PeakKind): string {
  return { d: "Å, nm or pm", q: "1/Å or 1/nm", "two-theta": "deg or rad", hkl: "r.l.u." }[kind];
}
