import {
  constantForm,
  evaluateFormNumber,
  formatForm,
  isConstantForm,
  isInteger,
  parameterNames,
  type RationalVector,
  roundNumber,
  toNumber,
} from "../numbers/index.js";
import { type SpaceGroup, toPrimitiveRow } from "../spacegroups/index.js";
import type { WaveVector } from "./types.js";

/** The exact wave vector with these components in the reciprocal basis of the setting. */
export function exactWaveVector(components: RationalVector): WaveVector {
  return {
    components: [constantForm(components[0]), constantForm(components[1]), constantForm(components[2])],
    values: [],
    uncertainties: [],
  };
}

/** Whether every component is a fraction, with no letter. */
export function isExactWaveVector(k: WaveVector): boolean {
  return k.components.every(isConstantForm);
}

/** The exact components, or null when a letter occurs. */
export function exactComponents(k: WaveVector): RationalVector | null {
  return isExactWaveVector(k) ? [k.components[0].constant, k.components[1].constant, k.components[2].constant] : null;
}

/** Which of u, v, w occur, as indices 0 to 2. */
export function usedParameters(k: WaveVector): number[] {
  return [0, 1, 2].filter((index) => k.components.some((form) => form.coefficients[index as 0 | 1 | 2][0] !== 0));
}

/** The components as floats, or null while a letter is left open. */
export function numericWaveVector(k: WaveVector): readonly [number, number, number] | null {
  if (k.values === null) return null;
  const values = parameterValues(k);
  const at = (index: 0 | 1 | 2): number =>
    isConstantForm(k.components[index])
      ? toNumber(k.components[index].constant)
      : evaluateFormNumber(k.components[index], values ?? []);
  return [at(0), at(1), at(2)];
}

/** Values for u, v, w by position (NaN for letters that do not occur), or null while a letter is left open. */
export function parameterValues(k: WaveVector): readonly number[] | null {
  const { values } = k;
  if (values === null) return null;
  const filled = [Number.NaN, Number.NaN, Number.NaN];
  usedParameters(k).forEach((parameter, position) => {
    filled[parameter] = values[position] ?? Number.NaN;
  });
  return filled;
}

/** `(0, u, 1/2)`; with `withValues` also ` u = 0.472`. */
export function formatWaveVector(k: WaveVector, withValues = false): string {
  const text = `(${k.components.map((form) => formatForm(form, parameterNames)).join(", ")})`;
  if (!withValues || k.values === null || k.values.length === 0) return text;
  const letters = usedParameters(k).map((index) => parameterNames[index as 0 | 1 | 2]);
  return `${text} with ${letters.map((letter, index) => `${letter} = ${roundNumber(k.values?.[index] ?? Number.NaN)}`).join(", ")}`;
}

/** The record `K` of the JSON contract. */
export interface WaveVectorJson {
  readonly components: readonly [string, string, string];
  readonly values: Readonly<Record<string, number>>;
  readonly su: Readonly<Record<string, number>>;
  readonly numeric: readonly [number, number, number] | null;
}

/** `k` as the JSON contract writes it: `components` alone decide symmetry. */
export function waveVectorToJson(k: WaveVector): WaveVectorJson {
  const letters = usedParameters(k).map((index) => parameterNames[index as 0 | 1 | 2]);
  const record = (list: readonly (number | null)[] | null): Record<string, number> =>
    Object.fromEntries(
      letters.flatMap((letter, index) => {
        const value = list?.[index];
        return value === null || value === undefined ? [] : [[letter, roundNumber(value)] as const];
      }),
    );
  const numeric = numericWaveVector(k);
  const texts = k.components.map((form) => formatForm(form, parameterNames));
  return {
    components: texts as [string, string, string],
    values: record(k.values),
    su: record(k.uncertainties),
    numeric: numeric === null ? null : [roundNumber(numeric[0]), roundNumber(numeric[1]), roundNumber(numeric[2])],
  };
}

/** Whether an exact row of the reciprocal basis is a vector of L*. */
export function isReciprocalLatticeVector(group: SpaceGroup, row: RationalVector): boolean {
  return toPrimitiveRow(group.lattice, row).every(isInteger);
}
