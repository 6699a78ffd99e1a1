import { fail, nearMiss } from "../errors/index.js";
import { roundNumber } from "../numbers/index.js";
import { type IonState, ionState } from "./ion-states.js";
import { formFactorIons, type IntegralCoefficients, radialIntegral, readIonName, tabulatedIon } from "./ion-table.js";

/** What a magnetic form factor is asked for by: an ion by name, a constant, or coefficients of one's own. */
export type FormFactorRequest =
  | {
      /** `Ni2+`, `Tb3+`. */
      readonly ion: string;
      /** Spectroscopic g of a d ion, or g_J in place of Hund's for an f ion. */
      readonly g?: number;
      /** Spin S where it is not that of Hund's rules: the largest moment is then gS. */
      readonly spin?: number;
    }
  | ({ readonly constant: number } & OwnLimit)
  | ({
      readonly j0: IntegralCoefficients;
      readonly j2?: IntegralCoefficients;
      /** Factor of ⟨j2⟩. */
      readonly j2Factor?: number;
    } & OwnLimit);

/** What the largest moment g S is where no ion tells it; g is 2 where it is left out. */
interface OwnLimit {
  readonly g?: number;
  readonly spin?: number;
}

/** `f(Q) = ⟨j0⟩ + j2Factor ⟨j2⟩`, or a constant where `j0` is null. */
export interface MagneticFormFactor {
  readonly ion: string | null;
  readonly j0: IntegralCoefficients | null;
  readonly j2: IntegralCoefficients | null;
  readonly j2Factor: number;
  readonly constant: number;
  /** Which form was used and why, for the reader. */
  readonly text: string;
  /** gS or g_J J in μB; null where it does not follow from the ion. */
  readonly largestMoment: number | null;
}

/**
 * The dipole approximation by the ion's kind: f shells `⟨j0⟩ + ((2 − g_J)/g_J) ⟨j2⟩`, d ions with quenched orbital moment
 * `⟨j0⟩ + ((g − 2)/g) ⟨j2⟩`, which is ⟨j0⟩ for g = 2 (S. W. Lovesey, Theory of Neutron Scattering from Condensed Matter,
 * volume 2, 1984, chapter 11; International Tables C, section 4.4.5). Throws `invalid-argument` for an ion that the table
 * has not, and for impossible numbers.
 */
export function magneticFormFactor(request: FormFactorRequest): MagneticFormFactor {
  if ("ion" in request) return factorOfIon(request.ion, request.g ?? null, request.spin ?? null);
  if ("constant" in request) {
    checkFinite([request.constant], "a constant form factor");
    const text = `constant ${roundNumber(request.constant)}`;
    const { constant } = request;
    return { ion: null, j0: null, j2: null, j2Factor: 0, constant, text, largestMoment: ownLimit(request) };
  }
  const { j0, j2 = null, j2Factor = 0 } = request;
  checkFinite([...j0, ...(j2 ?? []), j2Factor], "coefficients of a form factor");
  const text = j2 === null ? "own <j0>" : `own ${factorText(j2Factor)}`;
  return { ion: null, j0, j2, j2Factor, constant: 0, text, largestMoment: ownLimit(request) };
}

/** The form factor at Q (Å⁻¹). */
export function formFactorAt({ j0, j2, j2Factor, constant }: MagneticFormFactor, q: number): number {
  if (j0 === null) return constant;
  return radialIntegral(0, j0, q) + (j2 === null || j2Factor === 0 ? 0 : j2Factor * radialIntegral(2, j2, q));
}

function ownLimit({ g = 2, spin }: OwnLimit): number | null {
  checkPositive(g, "g");
  if (spin === undefined) return null;
  checkPositive(spin, "spin");
  return roundNumber(g * spin);
}

function factorOfIon(name: string, g: number | null, spin: number | null): MagneticFormFactor {
  const row = tabulatedIon(name);
  if (row === null) refuseIon(name);
  if (g !== null) checkPositive(g, "g");
  if (spin !== null) checkPositive(spin, "spin");
  const state = ionState(name);
  const { factor, because } = j2FactorOf(state, g);
  const used = row.j2 === null ? 0 : factor;
  return {
    ion: row.ion,
    j0: row.j0,
    j2: used === 0 ? null : row.j2,
    j2Factor: used,
    constant: 0,
    text: `${factorText(used)} (${row.ion}${because}${row.j2 === null && factor !== 0 ? "; no <j2> in the table" : ""})`,
    largestMoment: spin !== null ? roundNumber((g ?? 2) * spin) : state === null ? null : largestMoment(state, g),
  };
}

function factorText(factor: number): string {
  if (factor === 0) return "<j0>";
  return `<j0> ${factor < 0 ? "-" : "+"} ${Math.abs(Number(factor.toPrecision(4)))} <j2>`;
}

function j2FactorOf(state: IonState | null, g: number | null): { readonly factor: number; readonly because: string } {
  if (state !== null && (state.shell === "4f" || state.shell === "5f")) {
    const lande = g ?? state.lande;
    if (lande === null) return { factor: 0, because: ", J = 0 by Hund's rules, no g_J" };
    const origin = g === null ? "Hund's" : "given";
    return { factor: (2 - lande) / lande, because: `, g_J = ${Number(lande.toPrecision(4))}, ${origin}` };
  }
  if (g !== null) return { factor: (g - 2) / g, because: `, g = ${g}, given` };
  return { factor: 0, because: state === null ? "" : ", orbital moment quenched, g = 2" };
}

function largestMoment(state: IonState, g: number | null): number {
  const isF = state.shell === "4f" || state.shell === "5f";
  if (g === null) return roundNumber(state.largestMoment);
  return roundNumber(g * (isF ? state.total : state.spin));
}

function refuseIon(name: string): never {
  const ions = formFactorIons();
  const element = readIonName(name)?.element;
  const same = ions.filter((ion) => readIonName(ion)?.element === element);
  const near = nearMiss(name, ions);
  fail("invalid-argument", `there is no form factor of \`${name}\` in the table`, {
    expected: same.length > 0 ? same.join(", ") : "an ion of the 3d, 4d, 4f or 5f series such as Ni2+",
    found: name,
    remedy:
      same.length === 0 && near !== null
        ? `did you mean ${near}? Else give a constant or coefficients`
        : "take a tabulated ion, or give a constant or coefficients of your own",
  });
}

function checkPositive(value: number, what: string): void {
  if (!(value > 0 && Number.isFinite(value)))
    fail("invalid-argument", `${what} = ${value} cannot be`, { expected: "a number above 0", found: String(value) });
}

function checkFinite(values: readonly number[], what: string): void {
  const wrong = values.find((value) => !Number.isFinite(value));
  if (wrong !== undefined)
    fail("invalid-argument", `${what} cannot hold ${wrong}`, { expected: "finite numbers", found: String(wrong) });
}
