/** A number as it is written, with the standard uncertainty of the trade's short form, `1.234(5)`. */
export interface NumberWithUncertainty {
  readonly value: number;
  /** Null where there are no brackets. */
  readonly uncertainty: number | null;
}

// One way to part the digits: with two a long row of them would be tried at every one.
const plain = /^[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:e[+-]?\d+)?$/i;
const bracketed = /^([+-]?(\d+(?:\.\d*)?|\.\d+))\((\d+)\)$/;

/**
 * Reads a finite decimal number, with an exponent or with an uncertainty in brackets that counts units of its last
 * digit: 3.214(12) is 3.214 ± 0.012 (Acta Crystallographica, notes for authors). Null for everything else: `NaN`, `1,5`.
 */
export function readNumber(text: string): NumberWithUncertainty | null {
  // U+2212 is what word processors and web pages make of a minus sign.
  const written = text.charCodeAt(0) === 0x2212 ? `-${text.slice(1)}` : text;
  if (plain.test(written)) {
    const value = Number(written);
    return Number.isFinite(value) ? { value, uncertainty: null } : null;
  }
  const found = bracketed.exec(written);
  if (!found) return null;
  const [, value = "", digits = "", counted] = found;
  const decimals = digits.includes(".") ? digits.length - digits.indexOf(".") - 1 : 0;
  const read = { value: Number(value), uncertainty: Number(`${counted}e-${decimals}`) };
  return Number.isFinite(read.value) && Number.isFinite(read.uncertainty) ? read : null;
}
