import type { Random } from "../../support/random.js";
import { extremeNumbers, marks } from "./tokens.js";

/** One way to spoil a text. @param others texts to take pieces of */
type Change = (text: string, random: Random, others: readonly string[]) => string;

/** The text with one change in most cases, seldom with more than three. */
export function damaged(text: string, random: Random, others: readonly string[]): string {
  let result = text;
  do result = random.pick(changes)(result, random, others);
  while (random.below(3) === 0);
  // Changes that double each other would make a long text of a short one.
  return result.slice(0, longestDamaged);
}

/** Characters: beyond it an input is no small one any more. */
const longestDamaged = 60_000;

/** A piece of the text: where it begins and ends. */
function piece(text: string, random: Random): readonly [number, number] {
  const from = random.below(text.length + 1);
  const length = random.below(random.below(3) === 0 ? 200 : 8);
  return [from, Math.min(text.length, from + length)];
}

function replaced(text: string, [from, to]: readonly [number, number], by: string): string {
  return text.slice(0, from) + by + text.slice(to);
}

/** Replaces one of the matches of a pattern. */
function replacedMatch(text: string, pattern: RegExp, random: Random, by: (found: string) => string): string {
  const found = [...text.matchAll(pattern)];
  if (found.length === 0) return text;
  const one = random.pick(found);
  return replaced(text, [one.index, one.index + one[0].length], by(one[0]));
}

const flipBit: Change = (text, random) => {
  const at = random.below(text.length + 1);
  const code = at < text.length ? text.charCodeAt(at) : 32;
  return replaced(text, [at, at + 1], String.fromCharCode(code ^ (1 << random.below(random.below(4) === 0 ? 16 : 7))));
};
const remove: Change = (text, random) => replaced(text, piece(text, random), "");
const double: Change = (text, random) => {
  const [from, to] = piece(text, random);
  const copied = text.slice(from, to).repeat(1 + random.below(3));
  return replaced(text, [to, to], copied);
};
const splice: Change = (text, random, others) => {
  const other = others.length === 0 ? text : random.pick(others);
  const [from, to] = piece(other, random);
  return replaced(text, piece(text, random), other.slice(from, to));
};
const insertMark: Change = (text, random) => {
  const at = random.below(text.length + 1);
  return replaced(text, [at, at], random.pick(marks));
};
const replaceMark: Change = (text, random) => replaced(text, piece(text, random), random.pick(marks));
const spoilNumber: Change = (text, random) =>
  replacedMatch(text, /[\d.]+(?:e[+-]?\d+)?/gi, random, () => random.pick(extremeNumbers));
const spoilWord: Change = (text, random) =>
  replacedMatch(text, /[A-Za-z_]\w*/g, random, () => random.pick(extremeNumbers));
const cutOff: Change = (text, random) => text.slice(0, random.below(text.length + 1));
const swapLines: Change = (text, random) => {
  const lines = text.split("\n");
  const [first, second] = [random.below(lines.length), random.below(lines.length)];
  [lines[first], lines[second]] = [lines[second] as string, lines[first] as string];
  return lines.join("\n");
};
const doubleLine: Change = (text, random) => {
  const lines = text.split("\n");
  const at = random.below(lines.length);
  lines.splice(random.below(lines.length + 1), 0, lines[at] as string);
  return lines.join("\n");
};
const removeLine: Change = (text, random) => {
  const lines = text.split("\n");
  lines.splice(random.below(lines.length), 1);
  return lines.join("\n");
};
const otherLineEnds: Change = (text, random) => {
  const ends = random.pick([["\r\n"], ["\r"], ["\n", "\r\n", "\r"]]);
  return text.replace(/\r\n|\r|\n/g, () => random.pick(ends));
};
const markOfOrder: Change = (text, random) => (random.below(2) === 0 ? `\uFEFF${text}` : `${text}\uFEFF`);
const longRun: Change = (text, random) => {
  const at = random.below(text.length + 1);
  return replaced(text, [at, at], random.pick(marks).repeat(10 ** (1 + random.below(3))));
};

/** The small ones stand more than once: they lead deepest. */
const changes: readonly Change[] = [
  flipBit,
  flipBit,
  remove,
  remove,
  double,
  splice,
  splice,
  insertMark,
  insertMark,
  replaceMark,
  spoilNumber,
  spoilNumber,
  spoilNumber,
  spoilWord,
  cutOff,
  swapLines,
  doubleLine,
  removeLine,
  otherLineEnds,
  markOfOrder,
  longRun,
];
