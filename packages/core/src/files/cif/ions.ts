import { isElement } from "../ion-names.js";

/** Short-lived elements of which no structure is known: in capitals `NH4` and `NO3` are groups of atoms, not they. */
const neverInCapitals = new Set("Es Fm Md No Lr Rf Db Sg Bh Hs Mt Ds Rg Cn Nh Fl Mc Lv Ts Og".split(" "));

/** An element and its charge where it has one, from a type symbol or a label. */
export interface Ion {
  readonly element: string;
  /** In units of e; null where none is written. */
  readonly charge: number | null;
  /** As a study writes it: `Fe3+`, `O2-`, `Al`. */
  readonly text: string;
}

const written = /^([A-Za-z]{1,2}?)(?:\(?([+-]?)(\d*(?:\.\d*)?)([+-]?)\)?)$/;

/** No ion of any element comes near it; a study takes charges of two digits. */
const largestCharge = 99;

/**
 * Reads a type symbol: `Fe3+`, `O2-`, `Fe+3`, `FE`, `D`, `Al0+` (which is `Al`). A charge that is no whole number,
 * or that no ion has, is left away. Null for what is no element: `Wat`, `OH`, `X`.
 */
export function ionOfSymbol(symbol: string): Ion | null {
  const found = written.exec(symbol.trim().replaceAll("\u2212", "-"));
  if (!found) return null;
  const [, letters = "", front = "", size = "", back = ""] = found;
  const element = properCase(letters);
  if (!isElement(element) || (front !== "" && back !== "")) return null;
  if (element !== letters && neverInCapitals.has(element)) return null;
  const sign = front || back;
  if (sign === "") return ionOf(element, null);
  const charge = Number(size === "" ? 1 : size) * (sign === "-" ? -1 : 1);
  return ionOf(element, Number.isInteger(charge) ? charge + 0 : null);
}

export function ionOf(element: string, charge: number | null): Ion {
  const size = Math.abs(charge ?? 0);
  if (size > largestCharge) return ionOf(element, null);
  const sign = charge === null || charge === 0 ? "" : charge > 0 ? "+" : "-";
  return { element, charge, text: sign === "" ? element : `${element}${size === 1 ? "" : size}${sign}` };
}

/**
 * The element that a label begins with (core dictionary: a label starts with the type symbol). Two letters that make an
 * element are it, in capitals too, `FE2` and `CO1`, unless the file names only the element of the first one. Letters
 * that go on in lower case beyond an element are a word: `Wat` is no tungsten. Null where none can be told.
 *
 * @param known elements that the file names in its formula or list of types
 */
export function ionOfLabel(label: string, known: ReadonlySet<string>): Ion | null {
  const letters = /^[A-Za-z]+/.exec(label.trim())?.[0] ?? "";
  if (/^[A-Za-z][a-z]{2}/.test(letters)) return null;
  const two = properCase(letters.slice(0, 2));
  const one = two.slice(0, 1);
  const oneNamed = isElement(one) && known.has(one);
  const small = /^.[a-z]/.test(letters);
  // Three capitals such as `HOH` and `WAT` spell a residue as often as an element: the file has to name it.
  const word = /^[A-Z]{3}/.test(letters);
  if (two.length === 2 && isElement(two)) {
    if (known.has(two)) return ionOf(two, null);
    if (!oneNamed && !word && (small || !neverInCapitals.has(two))) return ionOf(two, null);
  }
  if (oneNamed) return ionOf(one, null);
  return isElement(one) && !small && !word ? ionOf(one, null) : null;
}

/** The elements of a formula such as `Fe2 O3` or `C12 H8 (Fe O4)2`. */
export function elementsOfFormula(formula: string): string[] {
  return (formula.match(/[A-Z][a-z]?/g) ?? []).filter(isElement);
}

function properCase(letters: string): string {
  return `${letters.charAt(0).toUpperCase()}${letters.slice(1).toLowerCase()}`;
}
