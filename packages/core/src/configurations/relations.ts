import { breathe, type WorkHost } from "../algorithms/index.js";
import type { IsotropyClass } from "./isotropy.js";
import { elementAt, type ParentQuotient } from "./parent-quotient.js";
import { generatorsOfSubgroup, quotientProducts } from "./quotient-products.js";
import { directSum, type ResidueAction } from "./residue-action.js";
import { fixedPart, isInside, multiplyResidues, type Subspace, wholeSpace } from "./subspaces.js";

/** One configuration as the graph of subgroups sees it. */
export interface GraphEntry {
  readonly actions: readonly ResidueAction[];
  readonly found: IsotropyClass;
}

/**
 * For every entry the places of its minimal supergroups among the entries, up to conjugation in the group that permutes
 * the arms. H lies in a conjugate of H' exactly when H fixes one of the images of the direction of H'.
 */
export async function minimalSupergroups(
  quotient: ParentQuotient,
  entries: readonly GraphEntry[],
  host: WorkHost,
): Promise<number[][]> {
  const product = quotientProducts(quotient);
  const generators: number[][] = [];
  for (const { found } of entries) {
    await breathe(host);
    generators.push(generatorsOfSubgroup(found.elements, product));
  }
  const sums = new Map<string, ReturnType<typeof directSum>>();
  const sumOf = (entry: GraphEntry) => {
    const key = entry.actions.map(({ parameter }) => parameter.irrep.label).join();
    const made = sums.get(key) ?? directSum(entry.actions);
    sums.set(key, made);
    return made;
  };
  const above: Set<number>[] = [];
  for (const [index, entry] of entries.entries()) {
    const found = new Set<number>();
    const order = entry.found.elements.length;
    const fixedOf = new Map<object, Subspace>();
    for (const [other, larger] of entries.entries()) {
      await breathe(host);
      const size = larger.found.elements.length;
      if (size <= order || size % order !== 0) continue;
      const sum = sumOf(larger);
      const prime = (larger.actions[0] as ResidueAction).field.prime;
      const fixed = fixedOf.get(sum) ?? fixedBy(quotient, generators[index] as number[], sum, prime);
      fixedOf.set(sum, fixed);
      if (fixed.rows >= larger.found.space.rows && larger.found.orbit.some((space) => isInside(space, fixed, prime)))
        found.add(other);
    }
    above.push(found);
  }
  return above.map((found) =>
    [...found].filter((candidate) => ![...found].some((between) => above[between]?.has(candidate) === true)),
  );
}

function fixedBy(
  quotient: ParentQuotient,
  generators: readonly number[],
  { size, operators, translations }: ReturnType<typeof directSum>,
  prime: number,
): Subspace {
  let space = wholeSpace(size);
  for (const index of generators) {
    if (space.rows === 0) break;
    const { place, translation, timeReversal } = elementAt(quotient, index);
    const matrix = multiplyResidues(
      translations[translation] as Float64Array,
      operators[place] as Float64Array,
      size,
      prime,
    );
    space = fixedPart(space, matrix, timeReversal, prime);
  }
  return space;
}
