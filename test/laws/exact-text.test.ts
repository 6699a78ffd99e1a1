import { type SmallIrreps, smallIrreps } from "@kvane/core/irreps";
import { manifold } from "@kvane/core/kvectors";
import { siteModes } from "@kvane/core/modes";
import { siteOrbit } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { formatCyclotomic, formatPhased, type Phase } from "#core/numbers/index.js";
import { evaluateText, parameters } from "../support/evaluate-text.js";
import { letterValues } from "../support/float-group.js";
import { cyclotomicValue, phasedValue } from "../support/float-irreps.js";
import { groupOf } from "../support/parsed-groups.js";
import { seeded } from "../support/random.js";
import { generalSite, randomWaveVector } from "../support/random-cases.js";
import { wave } from "../support/written.js";

type Exact = SmallIrreps["irreps"][number]["matrices"][number][number][number];

const tolerance = 1e-9;

describe("the reader of exact texts", () => {
  // Values worked out by hand, so that the reader is not judged by what it reads.
  test.for([
    ["-1/2", -0.5, 0],
    ["(1+i)/2", 0.5, 0.5],
    ["-3i/4", 0, -0.75],
    ["e^{iπ/3}", 0.5, Math.sqrt(3) / 2],
    ["√3·e^{iπ/6}/2", 0.75, Math.sqrt(3) / 4],
    ["-e^{2πi·(u/2+1/4)}", 1, 0],
    ["(1-i)·e^{2πi·u}", -1, 1],
    ["2√2", Math.sqrt(8), 0],
  ] as const)("%s", ([text, re, im]) => {
    const [x, y] = evaluateText(text, parameters([0.5]));
    expect(Math.hypot(x - re, y - im)).toBeLessThan(1e-12);
  });

  test.for(["1+", "(1", "e^{2", "x", "1/", ""])("refuses %s", (text) => {
    expect(() => evaluateText(text)).toThrow();
  });
});

/** Texts of a number with a phase against the sum of the record's roots of unity. */
function textProblems(phase: Phase, factor: Exact, letters: readonly number[]): string[] {
  const text = formatPhased({ phase, factor });
  const [re, im] = evaluateText(text, parameters(letters));
  const [x, y] = phasedValue(phase, factor, letters);
  return Math.hypot(re - x, im - y) < tolerance ? [] : [`${text} is ${re}, ${im} and not ${x}, ${y}`];
}

/** Groups whose irreps and modes need roots of unity and of integers, with dimensions from 1 to 6. */
const groups = ["P 61", "P 21 3", "I 41", "R 3 c:H", "P 63 c m", "I 21 3"];

describe("the irreps of P 21 3 and P n -3 n at (1/2,1/2,1/2), dimensions 2 and 6", () => {
  test.for(["P 21 3", "P n -3 n:2"])("%s", (name) => {
    const irreps = smallIrreps(groupOf(name), wave("1/2 1/2 1/2"));
    for (const entry of irreps.irreps.flatMap((irrep) => irrep.matrices.flat(2))) {
      const [re, im] = evaluateText(formatCyclotomic(entry));
      const [x, y] = cyclotomicValue(entry);
      expect(Math.hypot(re - x, im - y), formatCyclotomic(entry)).toBeLessThan(tolerance);
    }
  });
});

describe("exact texts say what the records hold", () => {
  test.for(groups)("%s, seeded k (seed 7), rational and with letters", (name) => {
    const group = groupOf(name);
    const random = seeded(7);
    const problems: string[] = [];
    let texts = 0;
    for (let sample = 0; sample < 2; sample++) {
      const point = randomWaveVector(group, random);
      for (const k of [point, manifold(group, point, { withInversion: false }).form]) {
        const irreps = smallIrreps(group, k);
        for (const irrep of irreps.irreps) {
          for (const { phase, factor } of irrep.characters) problems.push(...textProblems(phase, factor, letterValues));
          for (const entry of irrep.matrices.flat(2)) {
            const [re, im] = evaluateText(formatCyclotomic(entry));
            const [x, y] = cyclotomicValue(entry);
            if (!(Math.hypot(re - x, im - y) < tolerance))
              problems.push(`${formatCyclotomic(entry)} is not ${x}, ${y}`);
            texts += 1;
          }
        }
        const modes = siteModes(group, irreps, siteOrbit(group, generalSite(random), null));
        for (const mode of modes.irreps.flatMap((entry) => entry.modes))
          for (const { phase, vector } of mode.moments)
            for (const factor of vector) {
              problems.push(...textProblems(phase, factor, letterValues));
              texts += 1;
            }
      }
    }
    expect(problems.slice(0, 10)).toEqual([]);
    expect(texts).toBeGreaterThan(100);
  });
});
