import { spacedSymbol } from "./symbols.js";

/**
 * A Hermann–Mauguin symbol in the form in which symbols are compared: letters and digits alone in lower case, and the
 * places of the blanks and of the `_` between them.
 */
export interface ComparableSymbol {
  readonly letters: string;
  readonly blanks: ReadonlySet<number>;
  readonly underscores: ReadonlySet<number>;
}

export function comparableSymbol(text: string): ComparableSymbol {
  let letters = "";
  const blanks = new Set<number>();
  const underscores = new Set<number>();
  for (const character of text.trim().replaceAll("\u2212", "-")) {
    if (/\s/.test(character)) blanks.add(letters.length);
    else if (character === "_") underscores.add(letters.length);
    else letters += character.toLowerCase();
  }
  return { letters, blanks, underscores };
}

/** `letters` of a tabulated symbol. */
export function symbolLetters(table: string): string {
  return table.replaceAll(" ", "").replaceAll("_", "").toLowerCase();
}

/**
 * True when `written` is the tabulated symbol `table` (with its `_`, and all blanks or none), some or all blanks and `_`
 * left out. A blank or `_` in another place is another symbol: `P 3 2` is not `P 3_2`.
 */
export function isWrittenAs(written: ComparableSymbol, table: string): boolean {
  if (written.letters !== symbolLetters(table)) return false;
  const { blanks, underscores } = comparableSymbol(spacedSymbol(table));
  return isSubset(written.blanks, blanks) && isSubset(written.underscores, underscores);
}

function isSubset(part: ReadonlySet<number>, whole: ReadonlySet<number>): boolean {
  for (const entry of part) if (!whole.has(entry)) return false;
  return true;
}
