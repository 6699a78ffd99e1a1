import { readFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { describedCommands } from "@kvane/core/reports";
import { describe, expect, test } from "vitest";
import { longNumbers } from "../support/long-numbers.js";
import { kvane, scratchFolder } from "./command.js";
import { schemaErrors } from "./schemas.js";

/** Cell, wavelength and lines are invented; the lines are those of (0,1/2,0), 2θ = 2 asin(λ|H+k|/2), to 0.01°. */
const folder = scratchFolder({
  "study.yaml": `title: Test (invented)
group: P n m a
cell: {a: 10.21, b: 6.05, c: 4.71, alpha: 90, beta: 90, gamma: 90}
sites:
  - {label: Fe1, ion: Fe3+, at: [0, 0, 0], spin: 5/2}
peaks: {file: peaks.csv, as: two-theta, wavelength: 2.41}
`,
  "peaks.csv": "11.43 0.05\n17.77 0.05\n29.69 0.05\n31.87 0.05\n34.77 0.05\n",
  "intensities.csv": "two-theta intensity intensity-su\n11.43 90 4\n17.77 60 3\n29.69 25 3\n31.87 40 4\n",
  "crystal.csv": "h k l intensity intensity-su\n0 0.5 0 90 4\n1 0.5 0 60 3\n0 0.5 1 25 3\n",
  "hkl.csv": "h k l\n0 0.47 0\n1 0.47 0\n1 0.53 1\n",
});

const doubled = fileURLToPath(new URL("../fixtures/magnetic-cif/doubled-spherical.cif", import.meta.url));
const cell = ["--cell", "10.21 6.05 4.71 90 90 90"];
/** Every command and every kind of k: exact, measured, with open letters; complex irreps; crystal peaks. */
const lines: readonly (readonly string[])[] = [
  ["ops", "62"],
  ["study", "--example"],
  ["ops", "F m -3 m"],
  ["ops", "x,y,z;-x,-y,-z (a,b,2c;0,0,1/4)"],
  ["atlas", "62"],
  ["atlas", "P 21 3", "--k", "0,0.2,0.3", "--cell", "4.6 4.6 4.6 90 90 90", "--within", "0.3"],
  ["atlas", "62", "--k", "0,u,0"],
  ["atlas", "x,y,z; -x,-y,z; z,x,y (a+b,b,c)", "--k", "1/2,0,0"],
  ["atlas", "study.yaml"],
  ["star", "62", "--k", "0,1/2,0"],
  ["star", "62", "--k", "0,0.472,0"],
  ["star", "62", "--k", "u,v,0"],
  ["star", "P 31", "--k", "1/3,1/3,1/4"],
  ["irreps", "P 63", "--k", "1/3,1/3,1/4"],
  ["irreps", "P 21 3", "--k", "1/4,1/4,1/4"],
  ["irreps", "R 3 c:H", "--k", "0,0,u"],
  ["irreps", "P 21 3", "--k", "u,u,u", "--full"],
  ["irreps", "62", "--k", "0,1/2,1/2", "--full"],
  ["compatibility", "P m -3 m", "--from", "0,0,0", "--to", "u,u,u"],
  ["compatibility", "62", "--from", "0,1/2,0", "--to", "u,1/2,v"],
  ["compatibility", "62", "--from", "0,1/2,0", "--to", "0,1/2,0"],
  ["modes", "62", "--k", "0,0,0", "--site", "Fe 0 0 1/2", "--site", "R 0.05 1/4 0.98"],
  ["modes", "P 63", "--k", "0,0,u", "--site", "A 1/3 2/3 1/4"],
  ["modes", "P 4/n m m:2", "--k", "0,0,0.31", "--site", "A 1/4 1/4 0.2", "--polar"],
  ["modes", "P b n m", "--k", "0,0.28,0", "--site", "Tb -0.017 0.07 1/4", "--star", "--phase", "position"],
  ["modes", "62", ...cell, "--k", "0,0.28,0", "--site", "A 0 0 0", "--components", "crystal", "--exponent", "plus"],
  ["modes", "study.yaml", "--k", "0,1/2,0", "--components", "cartesian", "--factor", "half"],
  ["modes", "62 (a,b,a+c)", "--k", "0,1/2,0", "--site", "A 0 0 0", "--cell", "10.21 6.05 11.24403 90 24.7662 90"],
  ["configurations", "study.yaml", "--k", "0,1/2,0"],
  ["configurations", "F m -3 m", "--k", "1/2,1/2,1/2", "--site", "Mn 0 0 0"],
  ["configurations", "62", ...cell, "--k", "0,0,0", "--site", "Fe 0 0 1/2", "--together", "1+3"],
  ["configurations", "study.yaml", "--k", "0,0.472,0"],
  ["export", "study.yaml", "--k", "0,1/2,0", "--configuration", "1.1"],
  ["export", "study.yaml", "--k", "0,1/2,0", "--configuration", "G1.1", "--cif", "1.1"],
  ["decompose", doubled, "--parent", "study.yaml"],
  ["satellites", "62", ...cell, "--k", "0,1/2,0"],
  ["satellites", "62", ...cell, "--k", "0,0.47,0", "--wavelength", "2.41", "--q-max", "1.5"],
  ["satellites", "study.yaml", "--k", "0,1/2,0"],
  ["weigh", "study.yaml", "--k", "0,1/2,0", "--intensities", "intensities.csv"],
  ["weigh", "study.yaml", "--k", "0,1/2,0", "--intensities", "intensities.csv", "--pattern", "0.3"],
  ["weigh", "study.yaml", "--k", "0,1/2,0", "--intensities", "crystal.csv", "--scale", "10", "--lorentz", "no"],
  ["index", "study.yaml", "--k", "0,1/2,0"],
  ["index", "62", ...cell, "--k", "0,0.469,0", "--peaks", "hkl.csv", "--as", "hkl"],
  ["locate", "study.yaml"],
  ["exchange", "62", ...cell, "--site", "Fe 0 0 0", "--shells", "3"],
  [
    "exchange",
    "62",
    ...cell,
    "--site",
    "Fe 0 0 0",
    "--j",
    "1 1",
    "--j",
    "2 0.4",
    "--k",
    "0,0.47,0",
    "--vary",
    "2 0 1 3",
  ],
  ["onset", "--example"],
  ["locate", "study.yaml", "--max-dimension", "2", "--zero-shift", "0.1"],
  ["check", "study.yaml"],
  ["run", "study.yaml"],
  ["run", "study.yaml", "--k", "0,v,0"],
  ["run", "--example"],
  ["report", "study.yaml", "--k", "0,1/2,0"],
  ["explain"],
  ["explain", "invalid-k"],
  ["help"],
  ["help", "peaks"],
];
const wrong: readonly (readonly string[])[] = [
  ["ops", "P n q a"],
  ["star", "62"],
  ["irreps", "62", "--k", "0,x,0"],
  ["modes", "62", "--k", "0,0,0", "--site", "Fe 0 0"],
  ["satellites", "62", "--cell", "1 2 3 90 90 200", "--k", "0,0,0"],
  ["index", "62", ...cell, "--k", "0,0,0", "--peaks", "none.csv"],
  ["locate", "62", ...cell],
  ["check", "none.yaml"],
  ["run"],
  ["explain", "nonsense"],
  ["help", "nonsense"],
  ["atlas", "62", "--within", "-1"],
  ["compatibility", "62", "--from", "0,0,0"],
  ["configurations", "62"],
  ["export", "study.yaml", "--k", "0,1/2,0", "--configuration", "9.9"],
  ["export", "study.yaml", "--k", "0,1/2,0"],
  ["decompose"],
  ["weigh", "study.yaml", "--k", "0,1/2,0"],
  ["weigh", "study.yaml", "--k", "0,1/2,0", "--intensities", "peaks.csv"],
  ["weigh", "study.yaml", "--k", "u,0,0", "--intensities", "intensities.csv"],
];

describe("--json gives the shape of the schema", () => {
  test.each(lines.map((words) => [words.join(" "), words] as const))("%s", async (_line, words) => {
    const { status, stdout, stderr } = await kvane([...words, "--json"], { cwd: folder });
    expect(stderr).toBe("");
    expect(status).toBe(0);
    const answer = JSON.parse(stdout);
    expect(schemaErrors(words[0] as string, answer)).toEqual([]);
    expect(answer.errors).toEqual([]);
    expect(longNumbers(answer)).toEqual([]);
  });

  test.each(wrong.map((words) => [words.join(" "), words] as const))("wrong input: %s", async (_line, words) => {
    const { status, stdout } = await kvane([...words, "--json"], { cwd: folder });
    expect(status).toBeGreaterThan(0);
    const answer = JSON.parse(stdout);
    expect(schemaErrors(words[0] as string, answer)).toEqual([]);
    expect(answer.result).toBeNull();
    expect(answer.errors.length).toBeGreaterThan(0);
  });

  test("every described command is among them (a line in `lines` above)", () => {
    expect(new Set(lines.map(([command]) => command))).toEqual(new Set(describedCommands));
  });

  test("the validator sees a missing field, a wrong type and an unknown field", async () => {
    const { stdout } = await kvane(["star", "62", "--k", "0,0,0", "--json"]);
    const answer = JSON.parse(stdout);
    const { dimension: _gone, ...without } = answer.result;
    expect(schemaErrors("star", { ...answer, result: without }).join()).toContain("dimension");
    expect(schemaErrors("star", { ...answer, result: { ...answer.result, dimension: "0" } })).not.toEqual([]);
    expect(schemaErrors("star", { ...answer, result: { ...answer.result, extra: 1 } })).not.toEqual([]);
    expect(schemaErrors("star", { ...answer, result: null })).not.toEqual([]);
  });
});

/** Values that the contract of the interface spells out. */
describe("names and forms of the contract", () => {
  const resultOf = async (...words: string[]) =>
    JSON.parse((await kvane([...words, "--json"], { cwd: folder })).stdout).result;

  test("a group, an exact k and a measured k", async () => {
    const exact = await resultOf("star", "62", "--k", "0,1/2,0");
    expect(exact.group).toEqual({
      number: 62,
      hall: "-P 2ac 2n",
      hermannMauguin: "P n m a",
      choice: "",
      basisChange: "a,b,c;0,0,0",
    });
    expect(exact.k).toEqual({ components: ["0", "1/2", "0"], values: {}, su: {}, numeric: [0, 0.5, 0] });
    const measured = await resultOf("star", "62", "--k", "0,0.472,0");
    expect(measured.k.values).toEqual({ u: 0.472 });
    expect(measured.k.components).toEqual(["0", "u", "0"]);
    expect(measured.k.numeric).toEqual([0, 0.472, 0]);
  });

  test("numeric fields are null with an open letter, exact ones are not", async () => {
    const irreps = await resultOf("irreps", "R 3 c:H", "--k", "0,0,u");
    expect(irreps.k.numeric).toBeNull();
    expect(irreps.irreps[0].characters).toBeNull();
    expect(irreps.irreps[0].matrices).toBeNull();
    expect(irreps.irreps[0].exact.characters[0]).toBe("1");
    const modes = await resultOf("modes", "P 63", "--k", "0,0,u", "--site", "A 1/3 2/3 1/4");
    expect(modes.sites[0].irreps[0].modes[0].moments).toBeNull();
  });

  test("D of a printed operator is its phase times Δ: 6₃ at (0,0,1/2) has characters ±i or of modulus 1", async () => {
    // D({R|t})⁶ = D({1|6t}) = exp(2πi·k·(0,0,3)) = −1 for the screw axis {6|0,0,1/2} and k = (0,0,1/2).
    const { irreps, littleGroup } = await resultOf("irreps", "P 63", "--k", "0,0,1/2");
    const screw = littleGroup.operators.indexOf("x-y,x,z+1/2");
    expect(screw).toBeGreaterThan(0);
    for (const { characters } of irreps) {
      let [re, im] = [1, 0];
      const [a, b] = characters[screw];
      for (let power = 0; power < 6; power++) [re, im] = [re * a - im * b, re * b + im * a];
      expect(re).toBeCloseTo(-1, 9);
      expect(im).toBeCloseTo(0, 9);
    }
  });

  test("the echo of the input holds no path of the machine, only what was typed", async () => {
    for (const words of [
      ["run", "--example"],
      ["check", "study.yaml"],
    ]) {
      const { stdout } = await kvane([...words, "--json"], { cwd: folder });
      expect(stdout).not.toContain(folder);
      expect(stdout).not.toContain(process.cwd());
    }
  });

  test("a folder of results holds the same answer", async () => {
    const { status } = await kvane(["run", "study.yaml", "--out", "results", "--quiet"], { cwd: folder });
    expect(status).toBe(0);
    const answer = JSON.parse(readFileSync(join(folder, "results/result.json"), "utf8"));
    expect(schemaErrors("run", answer)).toEqual([]);
    expect(answer.result.files).toContain("report.txt");
  });
});
