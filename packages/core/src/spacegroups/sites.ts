import { KvaneError, type Problem, problem } from "../errors/index.js";
import { parseRational, type Rational, vectorOf } from "../numbers/index.js";
import type { Site } from "./types.js";

/**
 * Reads `LABEL x y z`: fractions or decimals, taken exactly as written, with blanks or commas between them.
 *
 * @throws `invalid-site` with the column, all problems at once
 */
export function parseSite(text: string): Site {
  const words = [...text.matchAll(/[^\s,]+/g)];
  const label = words[0]?.[0] ?? "";
  const coordinates = words.slice(1);
  const problems: Problem[] = [];
  if (label === "" || readNumber(label) !== null)
    problems.push(
      problem("invalid-site", label === "" ? "the site is empty" : "the site has no label", {
        where: { column: (words[0]?.index ?? 0) + 1 },
        expected: "a label and three coordinates, for example Fe1 0 0 1/2",
        found: label === "" ? "nothing" : label,
      }),
    );
  else if (coordinates.length !== 3)
    problems.push(
      problem("invalid-site", `site ${label} has ${coordinates.length} coordinates instead of three`, {
        where: { column: coordinates.length > 3 ? (coordinates[3]?.index ?? 0) + 1 : text.trimEnd().length + 1 },
        expected: "three coordinates, for example Fe1 0 0 1/2",
        found: text.trim(),
      }),
    );
  const values = coordinates.slice(0, 3).map((word) => {
    const value = readNumber(word[0]);
    if (value === null)
      problems.push(
        problem("invalid-site", `\`${word[0]}\` is no coordinate`, {
          where: { column: word.index + 1 },
          expected: `a fraction, or a decimal with at most ${mostDecimals} digits behind the point`,
          found: word[0],
          ...(tooLong.test(word[0]) ? { remedy: "write 1/3 for 0.3333…, or leave digits out" } : {}),
        }),
      );
    return value;
  });
  if (problems.length > 0) throw new KvaneError(problems);
  const [x, y, z] = values as [Rational, Rational, Rational];
  return { label, position: vectorOf(x, y, z) };
}

/** Coordinates are exact as written; with more digits, sums of them would leave the range of exact integers. */
const mostDecimals = 12;
const tooLong = /\d{13}/;

function readNumber(word: string): Rational | null {
  if (tooLong.test(word)) return null;
  return parseRational(word.replaceAll("\u2212", "-"));
}
