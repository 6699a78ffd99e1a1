import {
  formatPhased,
  modeSignificantDigits,
  type PhasedNumber,
  phasedToComplex,
  roundNumber,
} from "../../numbers/index.js";
import type { ComplexRecord } from "../records/common.js";

/** An exact number as `[re, im]` with the digits of mode data, seen against `scale`. */
export function complexRecord(value: PhasedNumber, values: readonly number[], scale = 1): ComplexRecord {
  const numbers = phasedToComplex(value, values);
  if (numbers === null) throw new RangeError("a phase has a letter without a value");
  const [real, imaginary] = numbers;
  return [roundNumber(real, scale, modeSignificantDigits), roundNumber(imaginary, scale, modeSignificantDigits)];
}

/** A matrix in numbers, null while a letter of k is open, and exactly. */
export function matrixRecords(
  matrix: readonly (readonly PhasedNumber[])[],
  values: readonly number[] | null,
): { readonly numbers: ComplexRecord[][] | null; readonly exact: string[][] } {
  return {
    numbers: values && matrix.map((row) => row.map((entry) => complexRecord(entry, values))),
    exact: matrix.map((row) => row.map(formatPhased)),
  };
}
