import type { IrrepModes, SiteModes } from "@kvane/core/modes";
import type { SpaceGroup } from "@kvane/core/spacegroups";
import type { Complex } from "./complex.js";
import type { FloatOperator } from "./float-group.js";
import { type Random, seeded } from "./random.js";
import { kLetters, lettersIn, type Vector, vectorOf } from "./validate-constraints.js";
import { floatReversal, reversedField } from "./validate-minus-k.js";
import { type FloatModes, floatModes, rankOf } from "./validate-modes.js";

/** The order parameter's components in a text. */
const component = /^ξ\d+$/;

/**
 * One order parameter of a real irrep, −k in the star: with couplings λ_c, `S = Σ λ_c ξ_p e_{c,p}`, the relation Θ may
 * only change ξ. So for fixed couplings ΘS lies in the span of the S of all ξ (of S itself where the irrep is
 * one-dimensional). It has 2 × dimension + multiplicity − 1 real parameters: ξ, the couplings, less a common factor.
 */
export function orderParameterProblems(group: SpaceGroup, modes: SiteModes): string[] {
  const read = floatModes(group, modes);
  const reversal = floatReversal(group, modes);
  const random = seeded(12);
  return modes.irreps.flatMap((entry, irrep) => {
    if (entry.multiplicity === 0) return [];
    const { label, dimension, reality } = entry.irrep;
    const real = reversal !== null && reality === "real";
    const wanted = real ? 2 * dimension + entry.multiplicity - 1 : entry.freeParameters;
    const problems =
      (real || dimension === 1) && entry.freeParametersWithMinusK !== wanted
        ? [`${label}: ${entry.freeParametersWithMinusK} parameters of one order parameter instead of ${wanted}`]
        : [];
    const texts = entry.minusK?.constraint ?? null;
    if ((texts !== null) !== real)
      return [...problems, `${label}: a table of one order parameter where there is none, or none`];
    if (texts === null || reversal === null) return problems;
    const found = tableProblems(entry, texts, { read, operator: reversal.operator, irrep, modes, random });
    return [...problems, ...found.map((problem) => `${label}, one order parameter: ${problem}`)];
  });
}

interface Context {
  readonly read: FloatModes;
  readonly operator: FloatOperator;
  readonly irrep: number;
  readonly modes: SiteModes;
  readonly random: Random;
}

function tableProblems(entry: IrrepModes, texts: readonly string[], context: Context): string[] {
  const { read, random } = context;
  const names = lettersIn(texts);
  const couplings = names.filter((name) => !component.test(name));
  const components = names.filter((name) => component.test(name));
  // A letter that occurs with a star is complex, any other real.
  const complex = couplings.filter((name) => texts.some((text) => text.includes(`${name}*`)));
  const values = couplings.map((name): [string, Complex] => [
    name,
    [random.next() - 0.5, complex.includes(name) ? random.next() - 0.5 : 0],
  ]);
  const fixed = { ...kLetters(context.modes), ...Object.fromEntries(values) };
  const at = (parts: readonly Complex[]): Vector =>
    vectorOf(texts, {
      ...fixed,
      ...Object.fromEntries(components.map((name, index) => [name, parts[index] as Complex])),
    });
  const general = at(components.map(() => [random.next() - 0.5, random.next() - 0.5]));
  const span =
    components.length === 0
      ? [general]
      : components.map((_, one) => at(components.map((_, other) => [one === other ? 1 : 0, 0])));
  const size = 3 * texts.length;
  const problems: string[] = [];
  if (components.length !== (entry.irrep.dimension === 1 ? 0 : entry.irrep.dimension))
    problems.push(`${components.length} components for dimension ${entry.irrep.dimension}`);
  if (couplings.length + complex.length !== entry.multiplicity)
    problems.push(`${couplings.length} letters, ${complex.length} of them complex, for ${entry.multiplicity} copies`);
  const own = read.modes[context.irrep] ?? [];
  if (rankOf([...own, general], size) !== own.length) problems.push("leads out of the span of the modes");
  const rank = rankOf(span, size);
  if (rank !== entry.irrep.dimension) problems.push(`the arrangements of fixed couplings span ${rank} dimensions`);
  if (rankOf([...span, general, reversedField(read, context.operator, general)], size) !== rank)
    problems.push("the relation between k and −k changes the couplings");
  return problems;
}
