import { formFactorRows } from "./generated/form-factors.js";

/** `A a B b C c D` of a radial integral (International Tables C, section 4.4.5). */
export type IntegralCoefficients = readonly [number, number, number, number, number, number, number];

/** What the table has of one ion; an integral that it lacks is null. */
export interface TabulatedIon {
  /** `Mn2+`; `Fe0` is the neutral atom. */
  readonly ion: string;
  readonly j0: IntegralCoefficients;
  readonly j2: IntegralCoefficients | null;
  readonly j4: IntegralCoefficients | null;
  readonly j6: IntegralCoefficients | null;
}

/** Element and charge of the name of an ion: `Fe3+`, `Ag+`, `Fe0`; `Fe` alone is the neutral atom. */
export function readIonName(name: string): { readonly element: string; readonly charge: number } | null {
  const found = /^([A-Z][a-z]?)(?:(\d{0,2})\+|0)?$/.exec(name.trim());
  if (found === null) return null;
  const [whole, element = "", charge] = found;
  return { element, charge: charge === undefined ? 0 : Number(charge || (whole.endsWith("+") ? 1 : 0)) };
}

/** The ions of the table in its order. */
export function formFactorIons(): readonly string[] {
  return formFactorRows.split("\n").map((row) => row.slice(0, row.indexOf("|")));
}

/** The row of an ion, or null when the table has none. */
export function tabulatedIon(name: string): TabulatedIon | null {
  const read = readIonName(name);
  if (read === null) return null;
  const ion = `${read.element}${read.charge === 0 ? "0" : `${read.charge}+`}`;
  const row = formFactorRows.split("\n").find((text) => text.startsWith(`${ion}|`));
  if (row === undefined) return null;
  const [j0, j2, j4, j6] = row.split("|").slice(1).map(coefficients);
  if (!j0) throw new Error(`the table of form factors has no <j0> of ${ion}`);
  return { ion, j0, j2: j2 ?? null, j4: j4 ?? null, j6: j6 ?? null };
}

function coefficients(text: string): IntegralCoefficients | null {
  return text === "" ? null : (text.split(" ").map(Number) as unknown as IntegralCoefficients);
}

/** ⟨j_n⟩ at Q (Å⁻¹): the three exponentials and the constant, for n above 0 times s², s = Q/4π. */
export function radialIntegral(order: 0 | 2 | 4 | 6, coefficients: IntegralCoefficients, q: number): number {
  const [a1, b1, a2, b2, a3, b3, constant] = coefficients;
  const square = (q / (4 * Math.PI)) ** 2;
  const sum = a1 * Math.exp(-b1 * square) + a2 * Math.exp(-b2 * square) + a3 * Math.exp(-b3 * square) + constant;
  return order === 0 ? sum : square * sum + 0;
}
