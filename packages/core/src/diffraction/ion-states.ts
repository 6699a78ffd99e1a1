import { readIonName } from "./ion-table.js";

/** The open shell of an ion in its ground state by Hund's rules. */
export interface IonState {
  readonly shell: "3d" | "4d" | "5d" | "4f" | "5f";
  /** Electrons in that shell. */
  readonly electrons: number;
  readonly spin: number;
  readonly orbital: number;
  readonly total: number;
  /** Landé's factor of the ground multiplet; null for J = 0. */
  readonly lande: number | null;
  /** Largest ordered moment in μB: 2S for d shells, whose orbital moment the crystal field quenches, g_J J for f shells. */
  readonly largestMoment: number;
}

/** First element of each series, its atomic number there, and the electrons of the closed core before it. */
const series = [
  { shell: "3d", orbital: 2, core: 18, elements: "Sc Ti V Cr Mn Fe Co Ni Cu Zn", first: 21 },
  { shell: "4d", orbital: 2, core: 36, elements: "Y Zr Nb Mo Tc Ru Rh Pd Ag Cd", first: 39 },
  { shell: "4f", orbital: 3, core: 54, elements: "La Ce Pr Nd Pm Sm Eu Gd Tb Dy Ho Er Tm Yb Lu", first: 57 },
  { shell: "5d", orbital: 2, core: 68, elements: "Hf Ta W Re Os Ir Pt Au Hg", first: 72 },
  { shell: "5f", orbital: 3, core: 86, elements: "Ac Th Pa U Np Pu Am Cm Bk Cf Es Fm Md No Lr", first: 89 },
] as const;

/**
 * Hund's ground state of an ion, all valence electrons in the open d or f shell. Null for other elements, for ions
 * without electrons in it, and for charges below 2 (1 for d ions), where the outer s electrons are not settled.
 */
export function ionState(name: string): IonState | null {
  const read = readIonName(name);
  if (read === null) return null;
  for (const { shell, orbital: l, core, elements, first } of series) {
    const place = elements.split(" ").indexOf(read.element);
    if (place < 0) continue;
    const isF = l === 3;
    const electrons = first + place - core - read.charge;
    if (read.charge < (isF ? 2 : 1) || electrons < 1 || electrons >= 4 * l + 2) return null;
    return { shell, electrons, ...hund(l, electrons) };
  }
  return null;
}

/** Largest S, then largest L, then J = |L − S| up to half filling and L + S beyond. */
function hund(l: number, electrons: number): Omit<IonState, "shell" | "electrons"> {
  const half = 2 * l + 1;
  const spin = (electrons <= half ? electrons : 2 * half - electrons) / 2;
  const inSpin = electrons <= half ? electrons : electrons - half;
  const orbital = (inSpin * (half - inSpin)) / 2;
  const total = electrons < half ? Math.abs(orbital - spin) : orbital + spin;
  const lande = total === 0 ? null : 1.5 + (spin * (spin + 1) - orbital * (orbital + 1)) / (2 * total * (total + 1));
  return { spin, orbital, total, lande, largestMoment: l === 3 ? (lande ?? 0) * total : 2 * spin };
}
