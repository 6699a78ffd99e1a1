import { roundNumber } from "../numbers/index.js";
import { dot, type Line } from "./level-slope.js";
import type { ExchangeModel, NamedConstant } from "./types.js";

/** `factor · cos(2π · multiple · letter)`. */
export interface CosineTerm {
  readonly factor: number;
  readonly multiple: number;
}

/**
 * For one atom in the primitive cell: `∂λ/∂u = −4π Σ m sin(2πmu)`, each sine over that of the smallest multiple as a sum
 * of cosines (Chebyshev polynomials of the second kind), for each constant; null where the slope has not this form.
 *
 * @param value of the letter that runs
 */
export function cosineForm(
  { table, couplings }: ExchangeModel,
  constants: readonly NamedConstant[],
  { at, direction }: Line,
  value: number,
): CosineTerm[][] | null {
  if (table.atoms.length !== 1) return null;
  const origin = at(-value);
  const sines = constants.map(({ classes }) => {
    const sums = new Map<number, number>();
    const bonds = couplings.filter((one) => classes.includes(one.bonds.name)).flatMap((one) => one.bonds.bonds);
    for (const { translation } of bonds) {
      const multiple = Math.round(Math.abs(dot(translation, direction)) * 1e6) / 1e6;
      if (multiple === 0) continue;
      const sign = Math.sign(dot(translation, direction));
      const turns = dot(translation, origin);
      // sin(2π(mu + c)): the odd part counts, the even one must cancel within the constant.
      sums.set(multiple, (sums.get(multiple) ?? 0) + multiple * Math.cos(2 * Math.PI * turns));
      const key = -multiple;
      sums.set(key, (sums.get(key) ?? 0) + sign * Math.sin(2 * Math.PI * turns));
    }
    return sums;
  });
  if (sines.some((sums) => [...sums].some(([key, sum]) => key < 0 && Math.abs(sum) > 1e-9))) return null;
  const multiples = sines.flatMap((sums) =>
    [...sums].filter(([key, sum]) => key > 0 && Math.abs(sum) > 1e-9).map(([key]) => key),
  );
  if (multiples.length === 0) return null;
  const smallest = Math.min(...multiples);
  if (multiples.some((one) => Math.abs(one / smallest - Math.round(one / smallest)) > 1e-9)) return null;
  return sines.map((sums) => {
    const terms = new Map<number, number>();
    for (const [multiple, sum] of sums) {
      if (multiple < 0) continue;
      const order = Math.round(multiple / smallest);
      for (let s = order - 1; s >= 0; s -= 2) terms.set(s, (terms.get(s) ?? 0) + (s === 0 ? 1 : 2) * sum);
    }
    return [...terms]
      .filter(([, factor]) => Math.abs(factor) > 1e-9)
      .sort(([a], [b]) => a - b)
      .map(([s, factor]) => ({ factor: roundNumber(factor), multiple: roundNumber(s * smallest) }));
  });
}
