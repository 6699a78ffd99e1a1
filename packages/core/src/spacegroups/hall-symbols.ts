import { fail } from "../errors/index.js";
import { matrixFrom, type RationalVector, vectorFrom } from "../numbers/index.js";
import { axisDirection, type HallAxis, hallRotation, latticeSymbols, translationLetters } from "./hall-rotations.js";
import { operatorFrom } from "./operators.js";
import type { SymmetryOperator } from "./types.js";

/** A Hall symbol taken apart: what it generates a group from. */
export interface HallGenerators {
  /** Centring vectors besides the integer ones. */
  readonly centring: readonly RationalVector[];
  readonly operators: readonly SymmetryOperator[];
  /** Column of each operator's symbol. */
  readonly columns: readonly number[];
  /** The symbol with single blanks. */
  readonly text: string;
}

interface Token {
  readonly text: string;
  readonly column: number;
}

interface Preceding {
  readonly order: number;
  /** The cell axis that face diagonals refer to. */
  readonly reference: "x" | "y" | "z";
}

/**
 * Reads a Hall symbol without its change-of-basis operator: lattice symbol, `-` before it for an inversion centre at
 * the origin, up to four symbols of operators with their default axes (S. R. Hall, Acta Cryst. A37 (1981) 517;
 * International Tables B, appendix A1.4.2). Letter case of the lattice symbol and of the rest may differ from the
 * usual one.
 *
 * @param column place of the first character, for errors
 * @throws `syntax` with the column
 */
export function parseHallSymbol(text: string, column = 1): HallGenerators {
  const tokens = [...text.matchAll(/\S+/g)].map((found): Token => ({ text: found[0], column: column + found.index }));
  const first = tokens.shift();
  const lattice = /^(-?)([PABCIRHF])/i.exec((first?.text ?? "").replaceAll("\u2212", "-"));
  if (!first || !lattice)
    return refuse(
      first?.column ?? column,
      "one of the lattice symbols P A B C I R H F, with or without `-`",
      first?.text,
    );
  const rest = first.text.slice(lattice[0].length);
  if (rest !== "") tokens.unshift({ text: rest, column: first.column + lattice[0].length });
  if (tokens.length === 0)
    refuse(column + text.length, "at least one operator behind the lattice symbol, for example `1`");
  if (tokens.length > 4) refuse((tokens[4] as Token).column, "at most four operators", tokens[4]?.text);

  const operators: SymmetryOperator[] = [];
  const columns: number[] = [];
  if (lattice[1] === "-") {
    operators.push(operatorFrom(matrixFrom([-1, 0, 0, 0, -1, 0, 0, 0, -1]), vectorFrom([0, 0, 0])));
    columns.push(first.column);
  }
  let preceding: Preceding | null = null;
  tokens.forEach((token, index) => {
    const read = readOperator(token, index, preceding);
    operators.push(read.operator);
    columns.push(token.column);
    preceding = read.preceding;
  });
  const symbol = (lattice[2] as string).toUpperCase();
  return {
    centring: (latticeSymbols[symbol] ?? []).map((vector) => vectorFrom(vector, 12)),
    operators,
    columns,
    text: `${lattice[1]}${symbol} ${tokens.map((token) => token.text.toLowerCase()).join(" ")}`,
  };
}

/** One symbol `N`, axis, translations: `-2ybc`, `31`, `2"c`, `3*`, `-1n`. */
function readOperator(token: Token, index: number, preceding: Preceding | null) {
  const text = token.text.toLowerCase().replaceAll("\u2212", "-").replaceAll("\u2032", "'").replaceAll("\u2033", '"');
  const head = /^(-?)([12346])([xyz]?)(['"*]?)/.exec(text);
  if (!head)
    return refuse(token.column + (text.startsWith("-") ? 1 : 0), "a rotation order 1, 2, 3, 4 or 6", token.text);
  const order = Number(head[2]);
  const axis = axisOf(token, head, index, preceding);
  const rotation = hallRotation(order, axis);
  if (rotation === null) return refuse(token.column, `an axis that a rotation of order ${order} can have`, token.text);
  const shift = readTranslation(token, text, head[0].length, order, axis);
  const sign = head[1] === "-" ? -1 : 1;
  const reference = (/^[xyz]/.exec(axis)?.[0] ?? preceding?.reference ?? "z") as "x" | "y" | "z";
  return {
    operator: operatorFrom(matrixFrom(rotation.map((entry) => sign * entry + 0)), shift),
    preceding: { order, reference: axis === "*" ? "z" : reference } as Preceding,
  };
}

/**
 * The axis as written, or the default: c for the first operator; for a second of order 2 the a axis after order 2 or 4
 * and a − b after order 3 or 6; a + b + c for a third of order 3; order 1 needs none.
 */
function axisOf(token: Token, head: RegExpExecArray, index: number, preceding: Preceding | null): HallAxis {
  const order = Number(head[2]);
  const letter = head[3] ?? "";
  const mark = head[4] ?? "";
  if (mark === "*" && letter === "") return "*";
  if (mark === "*") return refuse(token.column + head[0].length - 1, "one axis symbol", token.text);
  if (mark !== "") return `${letter === "" ? (preceding?.reference ?? "z") : letter}${mark}` as HallAxis;
  if (letter !== "") return letter as HallAxis;
  if (order === 1 || index === 0) return "z";
  if (index === 1 && order === 2 && preceding && preceding.order !== 1)
    return preceding.order === 2 || preceding.order === 4 ? "x" : "z'";
  if (index === 2 && order === 3) return "*";
  return refuse(
    token.column + head[0].length,
    `an axis symbol (x, y, z, ', " or *): order ${order} in this place has no default axis`,
    token.text,
  );
}

/** The sum of translation letters and screw digits; a digit n is n/order along the axis. */
function readTranslation(token: Token, text: string, from: number, order: number, axis: HallAxis): RationalVector {
  // 12ths of the cell hold every letter and every screw of order 2, 3, 4 and 6.
  const sum: [number, number, number] = [0, 0, 0];
  const add = (vector: readonly [number, number, number], factor: number): void => {
    for (const index of [0, 1, 2] as const) sum[index] += factor * vector[index];
  };
  for (let position = from; position < text.length; position++) {
    const character = text[position] as string;
    const letter = translationLetters[character];
    const screw = /[1-5]/.test(character) ? Number(character) : 0;
    if (letter) add(letter, 1);
    else if (screw > 0 && screw < order) add(axisDirection(axis), (screw * 12) / order);
    else
      refuse(
        token.column + position,
        `a translation letter a b c n u v w d${order > 1 ? ` or a screw digit below ${order}` : ""}`,
        character,
      );
  }
  return vectorFrom(sum, 12);
}

function refuse(column: number, expected: string, found?: string): never {
  fail("syntax", `cannot read the Hall symbol${found === undefined ? ": it ends too early" : ` at \`${found}\``}`, {
    where: { column },
    expected,
    found: found ?? "end of the symbol",
  });
}
