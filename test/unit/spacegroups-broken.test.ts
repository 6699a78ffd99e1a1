import { KvaneError } from "@kvane/core/errors";
import { parseBasisChange, parseCell, parseGroup, parseSite, parseTriplet } from "@kvane/core/spacegroups";
import { describe, expect, it } from "vitest";
import { type Random, seeded } from "../support/random.js";

const seed = 20_261_202;

const good: readonly (readonly [(text: string) => unknown, readonly string[]])[] = [
  [
    parseGroup,
    [
      "62",
      "R -3 m:H",
      "P 1 21/c 1",
      "hall:-P 2ac 2n (0 0 1)",
      "-F 4vw 2vw 3",
      "x,y,z; -x+1/2,y+1/2,-z; -x,-y,-z",
      "P n m a (a,b,2c;0,0,1/4)",
      'hall:P 3 2" (x-y/2,x/2+y,z+1/4) (a-b,a+b,c)',
    ],
  ],
  [parseTriplet, ["-x,y+1/2,-z", "x-y, 0.5 + x, 2*z/3"]],
  [parseBasisChange, ["a,b,2c;0,0,1/4", "(a/2+b/2,-a/2+b/2,c)"]],
  [parseSite, ["Fe1 0 1/2 0.3333"]],
  [parseCell, ["10.21 6.05 4.71 90 95.5 90"]],
];

const noise = "abcxyzPIFRH0123456789/;:,.()-+_*'\" \n\t\u2212\u00e9Q";

function mutated(text: string, random: Random): string {
  let result = text;
  for (let count = 1 + random.below(3); count > 0; count--) {
    const at = random.below(result.length + 1);
    const removed = random.below(3);
    const added = random.below(2) === 0 ? "" : noise[random.below(noise.length)];
    result = result.slice(0, at) + added + result.slice(at + removed);
  }
  return result;
}

/** What comes of a text: "read", the code of a refusal with its place, or the fault that broke out. */
function outcome(read: (text: string) => unknown, text: string): string {
  try {
    read(text);
    return "read";
  } catch (error) {
    if (!(error instanceof KvaneError)) return `fault: ${String(error)}`;
    const unplaced = error.problems.some(({ where, code }) => (where.column ?? 0) < 1 && code !== "number-overflow");
    return unplaced ? `without a column: ${error.message}` : error.code;
  }
}

describe(`broken input (seed ${seed})`, () => {
  it("is read or refused with a code and a column, never anything else, when cut after any character", () => {
    const bad = good.flatMap(([read, texts]) =>
      texts.flatMap((text) =>
        [...text].flatMap((_, end) => {
          const found = outcome(read, text.slice(0, end));
          return /^(?:fault|without)/.test(found) ? [`${text.slice(0, end)} → ${found}`] : [];
        }),
      ),
    );
    expect(bad).toEqual([]);
  });

  it("and when characters are lost, replaced or put in", () => {
    const random = seeded(seed);
    const bad = good.flatMap(([read, texts]) =>
      texts.flatMap((text) =>
        Array.from({ length: 25 }, () => mutated(text, random)).flatMap((broken) => {
          const found = outcome(read, broken);
          return /^(?:fault|without)/.test(found) ? [`${JSON.stringify(broken)} → ${found}`] : [];
        }),
      ),
    );
    expect(bad).toEqual([]);
  });

  it("reads what is whole", () => {
    for (const [read, texts] of good) expect(texts.map((text) => outcome(read, text))).toEqual(texts.map(() => "read"));
  });
});
