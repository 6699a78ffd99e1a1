import { isCyclotomicZero } from "../numbers/index.js";
import type { FixedVectors } from "./fixed-vectors.js";
import { directionLetter, sumText } from "./form-text.js";

/**
 * The direction of the order parameter in real components, `(a, 0)`, `(a, b)`, `(a, a)`; the components of one ±k pair
 * stand together and pairs are separated by `;`, several order parameters by `|`. Letters run through all of them.
 */
export function directionText(parts: readonly FixedVectors[]): string {
  let used = 0;
  const texts = parts.map(({ parameter, real }) => {
    const first = used;
    used += real.length;
    const components = Array.from({ length: parameter.size }, (_, column) =>
      sumText(
        real.flatMap((row, index) => {
          const factor = row[column];
          return factor === undefined || isCyclotomicZero(factor)
            ? []
            : [{ factor, letter: directionLetter(first + index) }];
        }),
      ),
    );
    const pairs: string[] = [];
    for (let start = 0; start < components.length; start += parameter.perPair)
      pairs.push(components.slice(start, start + parameter.perPair).join(", "));
    return pairs.join("; ");
  });
  return `(${texts.join(" | ")})`;
}

/** Places of the ±k pairs on which a direction has components. */
export function pairsTaken(parts: readonly FixedVectors[]): number[] {
  const taken = new Set<number>();
  for (const { parameter, real } of parts)
    for (const row of real)
      row.forEach((entry, column) => {
        if (!isCyclotomicZero(entry)) taken.add(Math.floor(column / parameter.perPair));
      });
  return [...taken].sort((a, b) => a - b);
}
