import type { WaveVector } from "../kvectors/index.js";
import {
  type Cyclotomic,
  cyclotomicNumbers,
  cyclotomicToRational,
  equalForms,
  formatCyclotomic,
  isCyclotomicZero,
  multiplyCyclotomic,
  negateCyclotomic,
  type Phase,
  rational,
  reducedEchelon,
  reduceOrder,
  reducePhase,
  rootOfUnity,
  roundNumber,
  toNumber,
  zeroForm,
} from "../numbers/index.js";
import { phaseText } from "./phase-text.js";
import type { Mode } from "./types.js";

/** Fourier component that an amplitude, or its complex conjugate, puts on one atom. */
export interface TermMoment {
  readonly phase: Phase;
  readonly vector: readonly Cyclotomic[];
  readonly conjugate?: boolean;
}

/** One free amplitude and what it, or its complex conjugate, puts on each atom. */
export interface Term {
  readonly letter: string;
  /** Component of the order parameter that the letter multiplies, where it has several: `ξ1`, `ξ2`; else empty. */
  readonly component?: string;
  /** Index of the little-group suborbit on which the letter begins, where it is known. */
  readonly suborbit?: number;
  /** What the entries along a, b, c are multiplied with beside their exact factor: 1 each unless given. */
  readonly ratios?: readonly [number, number, number];
  readonly moments: readonly TermMoment[];
}

/**
 * The general arrangement that an irrep allows, one text per atom: `(u, -v, w)`, `(u, v, w)·e^{2πi·ky/2}`. Letters are
 * free amplitudes, u v w first; for irreps of dimension above 1 a digit gives the partner (`u1`, `u2`). They are
 * complex, except with `real`: there 2k ∈ L*, the Fourier components are real, and the table is that of the physically
 * irreducible representation, made with the modes of the conjugate irrep where the irrep is complex.
 */
export function constraintTable(
  k: WaveVector,
  modes: readonly Mode[],
  real: { readonly conjugate: readonly Mode[] } | null,
): string[] {
  return termTable(k, constraintTerms(modes, real), (modes[0] as Mode).moments.length);
}

/** The amplitudes of `constraintTable` and what each puts on the atoms. */
export function constraintTerms(modes: readonly Mode[], real: { readonly conjugate: readonly Mode[] } | null): Term[] {
  return real === null ? complexTerms(modes) : realTerms([...modes, ...real.conjugate]);
}

/** The sum of all terms on each atom, as text. */
export function termTable(k: WaveVector, terms: readonly Term[], atoms: number): string[] {
  return Array.from({ length: atoms }, (_, atom) => atomText(k, terms, atom));
}

const letters = ["u", "v", "w", "p", "q", "r", "s", "t", "f", "g", "h", "l", "m", "n"];

/** The letter of the amplitude with that number, u v w first; primes where the alphabet runs out. */
export function letterOf(index: number): string {
  return `${letters[index % letters.length]}${"'".repeat(Math.floor(index / letters.length))}`;
}

function complexTerms(modes: readonly Mode[]): Term[] {
  const many = modes.some((mode) => mode.partner > 1);
  return modes.map((mode) => ({
    letter: `${letterOf(mode.copy - 1)}${many ? mode.partner : ""}`,
    suborbit: mode.suborbit,
    moments: mode.moments,
  }));
}

/**
 * Where 2k ∈ L* the magnetic representation is real, so the span of an irrep's modes together with those of its conjugate
 * is closed under conjugation and its reduced echelon form is real: one real letter per row.
 */
function realTerms(modes: readonly Mode[]): Term[] {
  const rows = modes.map(({ moments }) =>
    moments.flatMap(({ phase, vector }) =>
      vector.map((entry) => multiplyCyclotomic(rootOfUnity(phase.constant), entry)),
    ),
  );
  return reducedEchelon(rows, cyclotomicNumbers).rows.map((row, index) => ({
    letter: letterOf(index),
    moments: (modes[0] as Mode).moments.map((_, atom) => ({
      phase: zeroForm,
      vector: [0, 1, 2].map((axis) => reduceOrder(row[3 * atom + axis] as Cyclotomic)),
    })),
  }));
}

function atomText(k: WaveVector, terms: readonly Term[], atom: number): string {
  const present = terms
    .map((term) => ({ term, moment: term.moments[atom] as TermMoment }))
    .filter(({ moment }) => !moment.vector.every(isCyclotomicZero));
  if (present.length === 0) return "(0, 0, 0)";
  const phases = present.map(({ moment }) => moment.phase);
  const common = phases.every((phase) => equalForms(phase, phases[0] as Phase)) ? outer(phases[0] as Phase) : null;
  const vector = [0, 1, 2].map((axis) =>
    sumText(
      present.flatMap(({ term, moment }, index) => {
        const entry = moment.vector[axis] as Cyclotomic;
        if (isCyclotomicZero(entry)) return [];
        const phase = common === null ? outer(phases[index] as Phase) : { negative: common.negative, rest: zeroForm };
        const ratio = term.ratios?.[axis as 0 | 1 | 2] ?? 1;
        return [
          coefficientText(
            k,
            phase.negative ? negateCyclotomic(entry) : entry,
            ratio,
            phase.rest,
            `${term.letter}${moment.conjugate ? "*" : ""}${term.component ?? ""}`,
          ),
        ];
      }),
    ),
  );
  const text = `(${vector.join(", ")})`;
  const factor = common === null ? "1" : phaseText(k, common.rest);
  return factor === "1" ? text : `${text}·${factor}`;
}

/** Takes a factor −1 out of a phase whose constant is half a turn, so that it can go into the components. */
function outer(phase: Phase): { negative: boolean; rest: Phase } {
  const reduced = reducePhase(phase);
  const [numerator, denominator] = reduced.constant;
  const beyond = 2 * numerator - denominator;
  if (beyond < 0) return { negative: false, rest: reduced };
  return { negative: true, rest: { ...reduced, constant: rational(beyond, 2 * denominator) } };
}

/** `u`, `-u`, `2u`, `-u/2`, `i·u`, `e^{2πi/3}·u`; with a ratio `0.8u`, `0.8·e^{2πi/3}·u`. */
function coefficientText(k: WaveVector, factor: Cyclotomic, ratio: number, phase: Phase, letter: string): string {
  const number = formatCyclotomic(factor);
  const plain = /^(-?)(\d*)(?:\/(\d+))?$/.exec(number);
  const wave = phaseText(k, phase);
  const tail = wave === "1" ? "" : `·${wave}`;
  if (ratio !== 1) {
    const fraction = cyclotomicToRational(factor);
    if (fraction !== null) return `${ratioText(ratio * toNumber(fraction))}${letter}${tail}`;
    const exact = coefficientText(k, factor, 1, phase, letter);
    return exact.startsWith("-") ? `-${ratioText(ratio)}·${exact.slice(1)}` : `${ratioText(ratio)}·${exact}`;
  }
  if (plain) {
    const size = plain[2] === "1" ? "" : plain[2];
    return `${plain[1]}${size}${letter}${plain[3] ? `/${plain[3]}` : ""}${tail}`;
  }
  const bare = number.replaceAll(/\{[^}]*\}/g, "");
  const sum = /[+-]/.test(bare.slice(1)) && !bare.startsWith("(");
  return `${sum ? `(${number})` : number}·${letter}${tail}`;
}

/** Digits of a ratio of cell lengths, which are measured to four or five. */
const ratioDigits = 6;

function ratioText(value: number): string {
  return String(roundNumber(value, value, ratioDigits));
}

function sumText(parts: readonly string[]): string {
  if (parts.length === 0) return "0";
  return parts.map((part, index) => (index > 0 && !part.startsWith("-") ? `+${part}` : part)).join("");
}
