import { formatForm, type LinearForm, modulo, type VariableNames } from "../numbers/index.js";

/** A class of H on a flat: H itself (numbers in a*, b*, c*) and whether its satellites vanish. */
export interface MarkedReflection {
  readonly h: readonly number[];
  readonly extinct: boolean;
}

const indexNames: VariableNames = ["h", "k", "l"];

/** Sums of indices as reflection conditions use them, plainest first. */
const sums: readonly (readonly [number, number, number])[] = [
  [1, 0, 0],
  [0, 1, 0],
  [0, 0, 1],
  [1, 1, 0],
  [1, 0, 1],
  [0, 1, 1],
  [1, 1, 1],
  [1, -1, 0],
  [1, 0, -1],
  [0, 1, -1],
  [-1, 1, 1],
  [1, -1, 1],
  [1, 1, -1],
  [2, 1, 0],
  [1, 2, 0],
  [2, 0, 1],
  [1, 0, 2],
  [0, 2, 1],
  [0, 1, 2],
  [2, 1, 1],
  [1, 2, 1],
  [1, 1, 2],
];

const moduli = [2, 3, 4, 6, 8, 12];

/**
 * The extinct classes as a condition on sums of indices: `h+k = 2n+1`, `h+k = 2n and l = 2n`, `except h = 2n and k = 2n`;
 * null when all are extinct; undefined when no such condition divides them from the others.
 */
export function plainCondition(
  marked: readonly MarkedReflection[],
  steps: readonly (readonly number[])[],
): string | null | undefined {
  if (marked.every(({ extinct }) => extinct)) return null;
  if (![...marked.map(({ h }) => h), ...steps].every((h) => h.every(Number.isInteger))) return undefined;
  // A condition that tells classes apart does not change along the steps within a class.
  const usable = moduli.flatMap((modulus) =>
    sums
      .filter((sum) => steps.every((step) => residueOfSum(step, sum, modulus) === 0))
      .map((sum) => ({ modulus, sum })),
  );
  for (const { modulus, sum } of usable) {
    const residues = dividingResidues(marked, sum, modulus);
    const text = residues && residueText(residues, modulus);
    if (text) return `${sumText(sum)} ${text}`;
  }
  const both = jointCondition(marked, usable);
  if (both !== null) return both;
  const others = jointCondition(
    marked.map(({ h, extinct }) => ({ h, extinct: !extinct })),
    usable,
  );
  return others === null ? undefined : `except ${others}`;
}

/** A sum of indices and what it is taken modulo. */
interface ResidueOf {
  readonly modulus: number;
  readonly sum: readonly [number, number, number];
}

/** A congruence `sum ≡ residue` that all extinct classes obey. */
interface Congruence {
  readonly text: string;
  readonly allows: (h: readonly number[]) => boolean;
}

/** Two or three congruences that together hold for the extinct classes alone. */
function jointCondition(marked: readonly MarkedReflection[], usable: readonly ResidueOf[]): string | null {
  const extinct = marked.filter((one) => one.extinct);
  const others = marked.filter((one) => !one.extinct);
  const common = commonCongruences(extinct, usable).filter(({ allows }) => others.some(({ h }) => !allows(h)));
  const left = (chosen: readonly Congruence[]): boolean =>
    others.some(({ h }) => chosen.every(({ allows }) => allows(h)));
  for (let a = 0; a < common.length; a++)
    for (let b = a + 1; b < common.length; b++) {
      const chosen = [common[a] as Congruence, common[b] as Congruence];
      if (!left(chosen)) return chosen.map(({ text }) => text).join(" and ");
    }
  for (let a = 0; a < common.length; a++)
    for (let b = a + 1; b < common.length; b++)
      for (let c = b + 1; c < common.length; c++) {
        const chosen = [common[a] as Congruence, common[b] as Congruence, common[c] as Congruence];
        if (!left(chosen)) return chosen.map(({ text }) => text).join(" and ");
      }
  return null;
}

function commonCongruences(extinct: readonly MarkedReflection[], usable: readonly ResidueOf[]): Congruence[] {
  const [first] = extinct;
  if (!first) return [];
  return usable.flatMap(({ modulus, sum }): Congruence[] => {
    const residue = residueOfSum(first.h, sum, modulus);
    const allows = (h: readonly number[]): boolean => residueOfSum(h, sum, modulus) === residue;
    if (!extinct.every(({ h }) => allows(h))) return [];
    return [{ text: `${sumText(sum)} ${residueText([residue], modulus)}`, allows }];
  });
}

function residueOfSum(h: readonly number[], sum: readonly [number, number, number], modulus: number): number {
  return modulo(sum[0] * (h[0] as number) + sum[1] * (h[1] as number) + sum[2] * (h[2] as number), modulus);
}

/** The residues of the extinct classes, or null when some residue has both kinds. */
function dividingResidues(
  marked: readonly MarkedReflection[],
  sum: readonly [number, number, number],
  modulus: number,
): number[] | null {
  const seen = new Map<number, boolean>();
  for (const { h, extinct } of marked) {
    const residue = residueOfSum(h, sum, modulus);
    const before = seen.get(residue);
    if (before !== undefined && before !== extinct) return null;
    seen.set(residue, extinct);
  }
  return [...seen]
    .filter(([, extinct]) => extinct)
    .map(([residue]) => residue)
    .sort((a, b) => a - b);
}

function residueText(residues: readonly number[], modulus: number): string | null {
  const form = (residue: number): string => (residue === 0 ? `${modulus}n` : `${modulus}n+${residue}`);
  const [first] = residues;
  if (first === undefined) return null;
  if (residues.length === 1) return `= ${form(first)}`;
  if (modulus > 2 && residues.length === modulus - 1) {
    const missing = Array.from({ length: modulus }, (_, residue) => residue).find((one) => !residues.includes(one));
    return `≠ ${form(missing ?? 0)}`;
  }
  return residues.length <= 3 ? `= ${residues.map(form).join(", ")}` : null;
}

function sumText(sum: readonly [number, number, number]): string {
  const form: LinearForm = {
    constant: [0, 1],
    coefficients: [
      [sum[0], 1],
      [sum[1], 1],
      [sum[2], 1],
    ],
  };
  return formatForm(form, indexNames);
}

/** `(h 0 l)`, `(h h+1 l)`, `(2 0 0)`. */
export function familyText(forms: readonly [LinearForm, LinearForm, LinearForm]): string {
  return `(${forms.map((form) => formatForm(form, indexNames)).join(" ")})`;
}
