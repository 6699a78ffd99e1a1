import { describe, expect, test } from "vitest";
import { findMutants } from "../mutation/find-mutants.js";
import { mutantName, mutated } from "../mutation/mutant.js";
import { withNotes } from "../mutation/reach-points.js";
import { scores } from "../mutation/results.js";
import { sampleOf } from "../mutation/rooms.js";
import { scoreTable } from "../mutation/write-page.js";

/** The texts that the mutants of a piece of code make of it. */
function changesTo(text: string): string[] {
  return findMutants("piece.ts", text).map((mutant) => mutated(text, mutant));
}

describe("mutants", () => {
  test.each<[string, string[]]>([
    ["a + b;", [";", "a - b;"]],
    ["if (a < b) c();", ["if (true) c();", "if (false) c();", "if (a >= b) c();", "if (a <= b) c();", "if (a < b) ;"]],
    ["const x = a?.b ?? 1;", ["const x = (a?.b);", "const x = (1);", "const x = a.b ?? 1;", "const x = a?.b ?? 0;"]],
    ["const x = !a;", ["const x = (a);"]],
    ["const x = a.filter(b).some(c);", ["const x = (a).some(c);", "const x = a.filter(b).every(c);"]],
    ["const x = [...a, 2];", ["const x = [...[], 2];", "const x = [...a, 3];"]],
    ["const x = `\\n`;", ['const x = "";']],
    ["while (a) break;", ["while (false) break;", "while (a) ;"]],
  ])("of %s", (text, changes) => {
    expect(changesTo(text).sort()).toEqual(changes.sort());
  });

  test.each([
    'import { a } from "./a.js";',
    "type A = { b: 1 };",
    "interface A { readonly b: 'c' }",
    "const a = (b as 1)!;",
    "for (const a of b) {}",
    "const a = { 'b-c': d };",
    "const a = /b+/;",
    "const a = 0.5;",
    "const a = () => new Error('words');",
  ])("are not made of %s", (text) => {
    expect(changesTo(text)).toEqual([]);
  });

  test("spare the words of an error, not its code and place", () => {
    const text = 'const a = () => fail("code", `words`, { where: { column: 1 }, expected: "words" });';
    expect(findMutants("piece.ts", text).map(({ change }) => change)).toEqual(['"code" → ""', "1 → 0"]);
  });

  test("have a name that stays when lines are put above", () => {
    const names = (text: string) => findMutants("piece.ts", text).map((mutant) => mutantName(text, mutant));
    expect(names("a;\n  const b = c - 1;").slice(1)).toEqual(names("const b = c - 1;"));
    expect(new Set(names("const b = 1 - 1;")).size).toBe(3);
  });

  test("are sampled once each, and the same again", () => {
    const { all, mutants } = sampleOf("modes");
    const places = mutants.map(({ file, start, end, replacement }) => `${file} ${start} ${end} ${replacement}`);
    expect(new Set(places).size).toBe(300);
    expect(all).toBeGreaterThan(300);
    expect(sampleOf("modes").mutants).toEqual(mutants);
  });
});

describe("notes at reach points", () => {
  test("tell which statements and bodies of arrow functions ran, and change nothing else", () => {
    const text = `
      const double = (n) => ({ value: 2 * n });
      const sign = (n) => { if (n < 0) return -1; else if (n > 0) return 1; return 0; };
      const results = [double(4).value, sign(-1)];
      for (const n of []) results.push(n);
      return results;`;
    const starts: number[] = [];
    const noted = withNotes(text, (start) => starts.push(start) - 1);
    const reachNotes = new Uint8Array(starts.length);
    const run = new Function("reachNotes", noted) as (notes: Uint8Array) => number[];
    expect(run(reachNotes)).toEqual([8, -1]);
    const reached = starts.filter((_, at) => reachNotes[at] === 1).map((start) => text.slice(start).split(/[ (]/)[0]);
    const missed = starts.filter((_, at) => reachNotes[at] === 0).map((start) => text.slice(start).split("(")[0]);
    expect(reached.filter((word) => word === "return")).toHaveLength(2);
    expect(missed.map((word) => word?.split(";")[0])).toEqual(["if ", "return 1", "return 0", "results.push"]);
  });
});

describe("scores", () => {
  const survivor = { place: "a.ts:1:1", code: "a + 0", change: "+ → -", reason: "−0 cannot occur" };
  const result = {
    room: "numbers",
    seed: 1,
    mutants: 900,
    sampled: 20,
    killed: 15,
    stopped: 2,
    survivors: [
      { ...survivor, equivalent: true },
      { ...survivor, equivalent: false },
      { ...survivor, equivalent: false },
    ],
  };

  test("count what was noticed, and leave equivalent mutants out", () => {
    expect(scores(result).raw).toBeCloseTo(85, 9);
    expect(scores(result).real).toBeCloseTo((100 * 17) / 19, 9);
  });

  test("are rounded down", () => {
    expect(scoreTable([result]).at(-1)).toBe("| numbers | 1 | 900 | 20 | 15 | 2 | 3 | 1 | 85.0 % | 89.4 % |");
    expect(scoreTable([result])[1]).toMatch(/^\| --- \|(?: ---: \|){9}$/);
  });
});
