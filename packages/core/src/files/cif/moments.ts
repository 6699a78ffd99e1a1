import type { Ion } from "./ions.js";

/** Whether an atom may carry a moment, judged by its element and charge alone. */
export type MomentChance = "likely" | "possible" | "none";

/** Elements whose ions mostly have a partly filled 3d, 4d, 5d, 4f or 5f shell. */
const likely = new Set("V Cr Mn Fe Co Ni Cu Ru Os Ir Ce Pr Nd Pm Sm Eu Gd Tb Dy Ho Er Tm Yb U Np Pu Am Cm".split(" "));

/** Elements that carry moments in some of their compounds. */
const possible = new Set("Ti Nb Mo Tc Rh Pd W Re Pt Zr Ta Sc".split(" "));

/** Charges that leave no partly filled shell (or a singlet of it, as Eu3+ with J = 0). */
const closedShells = new Set(
  (
    "Sc3+ Ti4+ V5+ Cr6+ Mn7+ Cu+ Zr4+ Nb5+ Mo6+ Tc7+ Ru8+ Pd0 Hf4+ Ta5+ W6+ Re7+ Os8+ Ce4+ Yb2+ Lu3+ La3+ U6+ Th4+ " +
    "Zn2+ Ga3+ Ag+ Cd2+ Au+ Hg2+"
  ).split(" "),
);

/**
 * Where the ion is not known to have a closed shell, its element decides. It is a guess for the first draft of a study,
 * said as such; covalency, low spin and metals are beyond it.
 */
export function momentChance(ion: Ion | null): MomentChance {
  if (ion === null || closedShells.has(ion.text)) return "none";
  if (likely.has(ion.element)) return "likely";
  return possible.has(ion.element) ? "possible" : "none";
}

/** Why an atom is thought to carry none, or perhaps one. */
export function momentReason(ion: Ion | null): string {
  if (ion === null) return "no element is named";
  if (closedShells.has(ion.text)) return `${ion.text} has closed shells`;
  if (likely.has(ion.element)) return "mostly a partly filled d or f shell";
  if (possible.has(ion.element)) return `${ion.element} carries a moment in some compounds`;
  return "no partly filled d or f shell";
}
