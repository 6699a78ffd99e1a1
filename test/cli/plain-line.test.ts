import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { commandSpecs } from "../../packages/cli/src/commands/index.ts";
import { flagOf, optionSpecs, takesValue } from "../../packages/cli/src/options.ts";
import { parseLine } from "../../packages/cli/src/parse-line.ts";
import { plainLine } from "../../packages/cli/src/plain-line.ts";
import { shellWords } from "./command.js";

/** As the parser reads it, in plain objects; its refusals and its help are "no line". */
function parsed(words: readonly string[]) {
  try {
    const line = parseLine(words, { write: () => {}, writeError: () => {} });
    return line === null ? "no line" : { ...line, options: { ...line.options } };
  } catch {
    return "no line";
  }
}

const names = commandSpecs.map(({ name }) => name);
const flags = [...new Set(Object.values(optionSpecs).map(flagOf))];
const values = [
  "62",
  "study.yaml",
  "-P 2ac 2n",
  "0,1/2,0",
  "-1/2,0,0",
  "-1",
  "-h",
  "-",
  "",
  " ",
  "Fe 0 0 0",
  "ops",
  "modes",
];
const strange = ["--help", "--version", "--", "--k=0,0,0", "--nonsense", "--star", "--no-star", "---", "-x", "help"];

describe("a plain line", () => {
  const word = fc.oneof(
    { weight: 4, arbitrary: fc.constantFrom(...flags) },
    { weight: 5, arbitrary: fc.constantFrom(...values) },
    { weight: 1, arbitrary: fc.constantFrom(...strange) },
  );
  /** Mostly options that the command takes, mostly with a value where one belongs. */
  const line = fc.constantFrom(...commandSpecs).chain((spec) => {
    const option = fc.constantFrom(...spec.options, "json" as const).chain((name): fc.Arbitrary<string[]> => {
      const flag = flagOf(optionSpecs[name]);
      return takesValue(optionSpecs[name])
        ? fc.constantFrom(...values).map((value) => [flag, value])
        : fc.constant([flag]);
    });
    const piece = fc.oneof({ weight: 8, arbitrary: option }, { weight: 1, arbitrary: word.map((one) => [one]) });
    return fc.array(piece, { maxLength: 5 }).map((pieces) => [spec.name, ...pieces.flat()]);
  });

  test("is read as the parser reads it", () => {
    let plain = 0;
    fc.assert(
      fc.property(fc.oneof(line, fc.array(fc.oneof(fc.constantFrom(...names), word), { maxLength: 6 })), (words) => {
        const found = plainLine(words);
        if (found === null) return;
        plain += 1;
        expect(found).toEqual(parsed(words));
      }),
      { numRuns: 3000, seed: 20261202 },
    );
    expect(plain).toBeGreaterThan(500);
  });

  test("is every example of a command but help; not so an option with = and a group that begins like one", () => {
    const others = commandSpecs
      .flatMap(({ examples }) => examples.map((one) => shellWords(one.replace(/ [|>].*/, "")).slice(1)))
      .filter((words) => plainLine(words) === null);
    expect(others.filter(([name]) => name !== "help")).toEqual([]);
    expect(plainLine(["modes", "62", "--k=0,0,0"])).toBeNull();
    expect(plainLine(["ops", "-P 2ac 2n"])).toBeNull();
  });
});
