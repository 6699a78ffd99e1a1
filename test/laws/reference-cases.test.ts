import { describe, expect, test } from "vitest";
import {
  type CharacterCase,
  characterCaseProblems,
  type DecompositionCase,
  decompositionCaseProblems,
  readCases,
} from "../support/reference-cases.js";

/**
 * All cases of the reference tables (test/fixtures/ORIGIN.md), made without kvane.
 */
describe("reference tables", { timeout: 240_000 }, () => {
  test("898 sets of characters: dimension, reality, −k, arms", () => {
    const cases = readCases<CharacterCase>("characters.jsonl");
    expect(cases).toHaveLength(898);
    const problems = cases.flatMap(characterCaseProblems);
    expect(problems).toEqual([]);
  });

  test("153 decompositions of magnetic representations", () => {
    const cases = readCases<DecompositionCase>("decompositions.jsonl");
    expect(cases).toHaveLength(153);
    const problems = cases.flatMap(decompositionCaseProblems);
    expect(problems).toEqual([]);
  });
});
