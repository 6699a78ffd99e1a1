import { type Rational, rational } from "../../numbers/index.js";
import type { CifValue } from "./document.js";

/** A number of a CIF: its value, its standard uncertainty, and how many digits stand behind the point. */
export interface CifNumber {
  readonly value: number;
  /** In units of the value; null where there are no brackets. */
  readonly uncertainty: number | null;
  /** The place value of the last digit written. */
  readonly lastDigit: number;
}

const pattern = /^([+-]?)(\d*)(?:\.(\d*))?(?:[eE]([+-]?\d+))?(?:\((\d+)\))?$/;

/**
 * Reads a number by the grammar of CIF: `[+-]? digits [.digits] [e±digits] [(digits)]`. The brackets count units of the
 * last digit shown, times the exponent: `1.234(12)` = 1.234 ± 0.012, `1.2e2(3)` = 120 ± 30. Null for all else: `(3)`,
 * `1.2(3)e2`, `1,5`, `0x1F`, `3/4`.
 */
export function readCifNumber(text: string): CifNumber | null {
  const found = pattern.exec(text);
  if (!found) return null;
  const [, sign = "", whole = "", decimals = "", exponent = "0", counted] = found;
  if (whole === "" && decimals === "") return null;
  const power = Number(exponent) - decimals.length;
  const value = Number(`${sign}${whole}.${decimals}e${exponent}`);
  const uncertainty = counted === undefined ? null : Number(`${counted}e${power}`);
  if (!Number.isFinite(value) || (uncertainty !== null && !Number.isFinite(uncertainty))) return null;
  return { value: value + 0, uncertainty, lastDigit: Number(`1e${power}`) };
}

/** The number of a value; a text in quotation marks is none. */
export function numberOf(value: CifValue | null): CifNumber | null {
  return value !== null && value.shape === "text" && value.form === "bare" ? readCifNumber(value.text) : null;
}

/**
 * Averages over operators of coordinates with nine decimals leave the exact integers (2^53) in trigonal groups; seven
 * have a margin, and 1e-7 of an axis is far below what any measurement tells.
 */
const mostDecimals = 7;
const largestCoordinate = 100;

/**
 * The exact value of a coordinate as it is written, without its uncertainty; digits beyond the seventh decimal are
 * rounded. Null for what is no number, or beyond ±100.
 */
export function readCifRational(text: string): Rational | null {
  const number = readCifNumber(text);
  if (number === null || Math.abs(number.value) > largestCoordinate) return null;
  const decimals = Math.min(mostDecimals, Math.max(0, Math.ceil(-Math.log10(number.lastDigit) - 1e-9)));
  const scale = 10 ** decimals;
  return rational(Math.round(number.value * scale) + 0, scale);
}
