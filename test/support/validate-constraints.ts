import type { IrrepModes, SiteModes } from "@kvane/core/modes";
import type { SpaceGroup } from "@kvane/core/spacegroups";
import type { Complex } from "./complex.js";
import { evaluateText, type Letters } from "./evaluate-text.js";
import { componentsOf } from "./float-group.js";
import { type Random, seeded } from "./random.js";
import { type FloatMode, floatModes, rankOf } from "./validate-modes.js";

/** Names that stand for something else than an amplitude: e and i, and the components of k. */
const reserved = new Set(["e", "i", "kx", "ky", "kz"]);

/** Constraint tables with more letters than this are not taken apart letter by letter. */
const mostLetters = 60;

export type Vector = Pick<FloatMode, "real" | "imaginary">;

/**
 * The general arrangement in symbols, read back as numbers: with any letters it lies in the span of the irrep's modes
 * (with their conjugates where 2k ∈ L* and S is real), and its letters are as many and as independent as
 * `freeParameters` says, one real number each where 2k ∈ L*, else one complex.
 */
export function constraintProblems(group: SpaceGroup, modes: SiteModes): string[] {
  const read = floatModes(group, modes);
  const half = modes.representations.minusK === "equivalent";
  const random = seeded(11);
  return modes.irreps.flatMap((entry, irrep) => {
    const own: readonly Vector[] = read.modes[irrep] ?? [];
    if (own.length === 0) return [];
    const span = half ? [...own, ...own.map(conjugated)] : own;
    return entryProblems(entry, span, half, kLetters(modes), random).map(
      (problem) => `${entry.irrep.label}: ${problem}`,
    );
  });
}

function entryProblems(
  entry: IrrepModes,
  span: readonly Vector[],
  half: boolean,
  fixed: Letters,
  random: Random,
): string[] {
  const names = lettersIn(entry.constraint);
  const size = 3 * entry.constraint.length;
  if (names.length * (half ? 1 : 2) !== entry.freeParameters)
    return [`${names.length} letters for ${entry.freeParameters} free parameters`];
  if (names.length > mostLetters) return [];
  const at = (values: readonly Complex[]): Vector =>
    vectorOf(entry.constraint, {
      ...fixed,
      ...Object.fromEntries(names.map((name, index) => [name, values[index] as Complex])),
    });
  const units = names.map((_, letter) => at(names.map((_, index) => [index === letter ? 1 : 0, 0])));
  const general = at(names.map(() => [random.next() - 0.5, half ? 0 : random.next() - 0.5]));
  const dimension = rankOf(span, size);
  const problems: string[] = [];
  if (rankOf(units, size) !== names.length) problems.push("the letters of the constraint are not independent");
  if (rankOf([...span, ...units, general], size) !== dimension)
    problems.push("the constraint leads out of the span of the modes");
  if (half && general.imaginary.some((value) => Math.abs(value) > 1e-9))
    problems.push("2k ∈ L*, and the constraint is not real for real letters");
  return problems;
}

function conjugated(vector: Vector): Vector {
  return { real: vector.real, imaginary: vector.imaginary.map((value) => -value) };
}

/** kx, ky, kz in the texts. */
export function kLetters(modes: SiteModes): Letters {
  const [kx, ky, kz] = componentsOf(modes.representations.k) as [number, number, number];
  return { kx: [kx, 0], ky: [ky, 0], kz: [kz, 0] };
}

/** Names of amplitudes in the texts, in order of appearance. */
export function lettersIn(texts: readonly string[]): string[] {
  const names = texts.flatMap((text) => text.match(/[a-zξ][a-z0-9_']*/g) ?? []);
  return [...new Set(names.filter((name) => !reserved.has(name)))];
}

/** The Fourier components of all atoms from `(a, b, c)` or `(a, b, c)·phase` for each of them. */
export function vectorOf(texts: readonly string[], letters: Letters): Vector {
  const numbers = texts.flatMap((text) => {
    const { components, phase } = splitMoment(text);
    const [re, im] = phase === null ? [1, 0] : evaluateText(phase, letters);
    return components.map((component): Complex => {
      const [x, y] = evaluateText(component, letters);
      return [x * re - y * im, x * im + y * re];
    });
  });
  return {
    real: Float64Array.from(numbers, ([re]) => re),
    imaginary: Float64Array.from(numbers, ([, im]) => im),
  };
}

/** `(a, b, c)·phase` taken apart at the bracket that closes the first one; a, b, c may hold brackets of their own. */
function splitMoment(text: string): { components: string[]; phase: string | null } {
  let depth = 0;
  const close = [...text].findIndex((character) => {
    if (character === "(") depth += 1;
    if (character === ")") depth -= 1;
    return depth === 0;
  });
  const components = text.slice(1, close).split(", ");
  const rest = text.slice(close + 1);
  if (!text.startsWith("(") || components.length !== 3 || !/^(?:·.+)?$/.test(rest))
    throw new Error(`no moment: ${text}`);
  return { components, phase: rest === "" ? null : rest.slice(1) };
}
