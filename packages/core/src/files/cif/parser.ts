import type { ProblemCode } from "../../errors/index.js";
import type { CifBlock, CifItem, CifLoop } from "./document.js";
import { nextToken, type Scanner } from "./scanner.js";

/** What is said about a place. */
export interface Said {
  readonly message: string;
  readonly expected?: string;
  readonly found?: string;
  readonly remedy?: string;
}

export type Say = (code: ProblemCode, offset: number, said: Said) => void;

/** A block that is being read. */
export interface OpenBlock {
  readonly record: CifBlock & {
    readonly items: CifItem[];
    readonly loops: CifLoop[];
    readonly frames: CifBlock[];
  };
  /** Offset of every data name, by the form in which names are compared. */
  readonly seen: Map<string, number>;
  /** Offsets of the codes of its frames. */
  readonly codes: Map<string, number>;
}

export interface Parser {
  readonly scanner: Scanner;
  readonly refuse: Say;
  readonly lapse: Say;
  readonly lineOf: (offset: number) => number;
  readonly blocks: CifBlock[];
  block: OpenBlock | null;
  frame: OpenBlock | null;
  /** Whether something before the first block was noted. */
  strayBefore: boolean;
}

/** The next token; what is wrong with it is noted. */
export function advance(parser: Parser, from: number, nested = false): void {
  const { scanner, refuse } = parser;
  nextToken(scanner, from, nested);
  if (scanner.fault === null) return;
  const { at, message, expected, remedy } = scanner.fault;
  const found = wordAt(scanner.text, at);
  refuse("cif-syntax", at, { message, expected, found, remedy });
}

/** What stands at an offset, for messages. */
export function wordAt(text: string, at: number): string {
  return /^\S*/.exec(text.slice(at, at + 61))?.[0] || "nothing";
}
