import { isTooLarge, KvaneError, type ProblemCode, whyNoNumber } from "../errors/index.js";
import { parseRational, type Rational } from "../numbers/index.js";
import { readNumber } from "./number-text.js";
import { note, type ProblemList } from "./problem-list.js";
import { where } from "./yaml-convert.js";
import type { TreeList, TreeNode, TreeRecord, TreeText } from "./yaml-tree.js";

/** Notes that a value has not the form that its key wants. Values that were refused before are not noted again. */
export function noteType(problems: ProblemList, node: TreeNode, expected: string, remedy?: string): void {
  if (node.shape === "nothing" && node.refused) return;
  if (node.shape === "nothing") {
    note(problems, "missing-key", `\`${node.place.path ?? "the file"}\` has no value`, {
      where: where(node.place),
      expected,
      found: "nothing",
      remedy: "fill it in, or remove the key",
    });
    return;
  }
  note(problems, "wrong-type", `\`${node.place.path ?? "the file"}\` is not ${expected}`, {
    where: where(node.place),
    expected,
    found: describe(node),
    remedy: remedy ?? `write ${expected}`,
  });
}

/** The value as messages show it. */
export function describe(node: TreeNode): string {
  if (node.shape === "text") return node.text;
  if (node.shape === "list") return node.items.length === 0 ? "an empty list" : "a list";
  return node.shape === "record" ? "a section with keys" : "nothing";
}

export function asRecord(problems: ProblemList, node: TreeNode, expected: string, remedy?: string): TreeRecord | null {
  if (node.shape === "record") return node;
  noteType(problems, node, expected, remedy);
  return null;
}

export function asList(problems: ProblemList, node: TreeNode, expected: string, remedy?: string): TreeList | null {
  if (node.shape === "list") return node;
  noteType(problems, node, expected, remedy);
  return null;
}

/** A text that is not blank. */
export function asText(problems: ProblemList, node: TreeNode, expected = "a text"): string | null {
  if (node.shape === "text" && node.text !== "") return node.text;
  noteType(problems, node, expected);
  return null;
}

/** `true` or `false`. */
export function asFlag(problems: ProblemList, node: TreeNode): boolean | null {
  if (node.shape === "text" && (node.text === "true" || node.text === "false")) return node.text === "true";
  noteType(problems, node, "true or false");
  return null;
}

/** What a number may be besides finite. */
export interface NumberLimits {
  /** In words, e.g. `a length in Å above 0`. */
  readonly expected: string;
  readonly allows: (value: number) => boolean;
  /** Code of a number that is not allowed, `invalid-number` unless said. */
  readonly code?: ProblemCode;
}

/** A finite number within its limits, as a float. */
export function asNumber(problems: ProblemList, node: TreeNode, limits: NumberLimits): number | null {
  if (node.shape !== "text") {
    noteType(problems, node, limits.expected);
    return null;
  }
  const number = readNumber(node.text);
  if (number && number.uncertainty === null && limits.allows(number.value)) return number.value;
  noteNumber(problems, node, limits.expected, number?.uncertainty === null ? limits.code : undefined);
  return null;
}

/** The exact value of an integer, a fraction or a decimal as it is written. */
export function asRational(problems: ProblemList, node: TreeNode, expected: string): Rational | null {
  if (node.shape !== "text") {
    noteType(problems, node, expected);
    return null;
  }
  try {
    const value = parseRational(node.text.replace("\u2212", "-"));
    if (value) return value;
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    note(problems, error.code, `\`${node.place.path}\`: ${error.message}`, {
      where: where(node.place),
      expected,
      found: describe(node),
      remedy: "write fewer digits, or a fraction",
    });
    return null;
  }
  noteNumber(problems, node, expected);
  return null;
}

/** Notes that a text is no number, or not one within its limits, with the likeliest reason. */
export function noteNumber(
  problems: ProblemList,
  node: TreeText,
  expected: string,
  code: ProblemCode = "invalid-number",
): void {
  const number = readNumber(node.text);
  const remedy =
    number?.uncertainty != null
      ? `write it without the uncertainty in brackets: ${node.text.replace(/\(.*/, "")}`
      : /^[+-]?\d+,\d+$/.test(node.text)
        ? `write a decimal point: ${node.text.replace(",", ".")}`
        : isTooLarge(node.text)
          ? `correct the number: it ${whyNoNumber(node.text)}`
          : "correct the number";
  note(problems, code, `\`${node.place.path}\` cannot be ${describe(node)}`, {
    where: where(node.place),
    expected,
    found: describe(node),
    remedy,
  });
}
