import { describe, expect, test } from "vitest";
import { kvane, scratchFolder } from "./command.js";

const folder = scratchFolder({
  "hkl.csv": "h k l\n0 0.47 0\n1 0.47 0\n1 0.53 1\n2 1.47 0\n",
  "d.csv": "d su\n12.10 0.02\n7.803 0.01\n4.703 0.01\n",
});
const cell = ["--cell", "10.21 6.05 4.71 90 90 90"];

/** Results of every size: many operators, long phases, matrices in Q(ζ₂₄), 48 atoms. */
const lines: readonly (readonly string[])[] = [
  ["ops", "F d -3 m:2"],
  ["star", "F m -3 m", "--k", "u,v,w"],
  ["irreps", "P 21 3", "--k", "1/2,1/2,1/2"],
  ["irreps", "I 41/a m d:2", "--k", "0,0,0"],
  ["irreps", "R 3 c:H", "--k", "0,0,u"],
  ["modes", "F d -3 m:2", "--k", "u,v,w", "--site", "A 0.1 0.2 0.3"],
  ["modes", "P 63", "--k", "u,0,w", "--site", "A 0.123456 0.2 0.345678"],
  ["modes", "F d -3 m:2", "--k", "0.2,0.2,0.2", "--site", "A 1/2 1/2 1/2", "--cell", "10 10 10 90 90 90", "--star"],
  [
    "modes",
    "P 63",
    "--k",
    "0.1,0.2,0.3",
    "--site",
    "A 0.123456 0.2 0.345678",
    "--phase",
    "position",
    "--exponent",
    "plus",
  ],
  [
    "modes",
    "62",
    ...cell,
    "--k",
    "0,0.28,0",
    "--site",
    "A 0.1 0.2 0.3",
    "--components",
    "cartesian",
    "--factor",
    "half",
  ],
  ["irreps", "F m -3 m", "--k", "1/2,1/2,1/2", "--full"],
  ["irreps", "P n m a", "--k", "0,u,1/2", "--full"],
  ["atlas", "F d -3 m:2"],
  ["atlas", "F m -3 m", "--k", "0.48,0.49,0.5", "--cell", "4.43 4.43 4.43 90 90 90", "--within", "0.2"],
  ["compatibility", "F d -3 m:2", "--from", "0,1,0", "--to", "0,u,0"],
  ["satellites", "62", ...cell, "--k", "0,0.4723,0", "--wavelength", "2.41"],
  ["index", "62", ...cell, "--k", "0,0.469,0", "--peaks", "hkl.csv", "--as", "hkl"],
  ["locate", "62", ...cell, "--peaks", "d.csv"],
  ["check", "--example"],
  ["run", "--example"],
  ["explain"],
  ["explain", "no-candidate"],
  ["irreps", "227:2", "--k", "1/2,1/2,1/2"],
  ["irreps", "230", "--k", "1/2,0,0", "--full"],
  ["modes", "62", "--k", "0,0,0", "--site", `${"Fe".repeat(60)} 0 0 0`],
  ["satellites", "62", ...cell, "--k", "0,0.4723,0", "--q-max", "12"],
];

describe("text reports", () => {
  test.each(lines.map((words) => [words.join(" "), words] as const))("%s fits 100 columns", async (_line, words) => {
    const { status, stdout } = await kvane(words, { cwd: folder });
    expect(status).toBe(0);
    for (const line of stdout.split("\n")) {
      expect([...line].length, line).toBeLessThanOrEqual(100);
      expect(line).toBe(line.trimEnd());
    }
    // The page of the codes speaks of NaN; a result never does.
    expect(stdout).not.toMatch(words[0] === "explain" ? /undefined|\[object/ : /undefined|NaN|\[object|null/);
    expect(stdout.endsWith("\n")).toBe(true);
    expect(stdout.endsWith("\n\n")).toBe(false);
  });

  test("exponents of modes are in the components of k: letters beside them are amplitudes", async () => {
    const { stdout } = await kvane(["modes", "62", "--k", "0,u,0", "--site", "A 0 0 0"]);
    expect(stdout).toContain("e^{-2πi·ky/2}, 0, 0)");
    expect(stdout).not.toMatch(/e\^\{[^}]*[uvw]/);
    // u is no component of (u/2, 0, 1/4) by itself, and stays.
    const half = await kvane(["modes", "P 1", "--k", "1/2u,0,1/4", "--site", "A 0 0 0", "--json"]);
    expect(half.status).toBe(0);
  });

  test("modes say which conventions they use, once", async () => {
    const { stdout } = await kvane(["modes", "62", "--k", "0,1/2,0", "--site", "Fe 0 0 0"]);
    expect(stdout.match(/without a factor 1\/2/g)).toHaveLength(1);
    expect(stdout).toContain("exp(−2πi k·T)");
    expect(stdout).toContain("along a, b, c");
  });

  test("the whole job goes in the order of the questions, and names its cautions once", async () => {
    const { stdout } = await kvane(["run", "--example"]);
    const heads = stdout.split("\n").filter((line) => /^[A-Z]/.test(line));
    const order = ["Peaks", "Wave vector", "Symmetry", "Modes", "Satellites", "Next", "Caution"];
    const places = order.map((word) => heads.findIndex((head) => head.replace(/^Branch 1: /, "").startsWith(word)));
    expect(places.every((place) => place > 0)).toBe(true);
    expect([...places].sort((a, b) => a - b)).toEqual(places);
    expect(stdout.match(/until a structure is refined/g)).toHaveLength(1);
  });

  test("what was assumed stands under Assumed, once", async () => {
    const { stdout } = await kvane(["modes", "P 3", "--k", "0.33333,0.33333,0", "--site", "A 0.3333 0.6667 0"]);
    expect(stdout.match(/^Assumed$/gm)).toHaveLength(1);
    expect(stdout).toMatch(/position of A +\(1\/3, 2\/3, 0\)/);
  });

  test("0.333 is not moved to 1/3, and the report says how to mean it", async () => {
    const { stdout } = await kvane(["star", "P -3", "--k", "0.333,0.333,0"]);
    expect(stdout).toContain("[measured-k-ambiguous]");
    expect(stdout).toContain("1/3,1/3,0");
  });
});
