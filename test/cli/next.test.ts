import { readFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { kvane, scratchFolder } from "./command.js";

/** d in Å of H + k in an orthorhombic cell: 1/d² = h²/a² + k²/b² + l²/c². */
const [a, b, c] = [10.21, 6.05, 4.71];
const d = (h: number, k: number, l: number) => 1 / Math.sqrt((h / a) ** 2 + (k / b) ** 2 + (l / c) ** 2);
const listOf = (lines: readonly (readonly [number, number, number])[]) =>
  `d su\n${lines.map((line) => `${d(...line).toFixed(4)} 0.002\n`).join("")}`;
const head = (group: string) =>
  `group: ${group}\ncell: {a: ${a}, b: ${b}, c: ${c}, alpha: 90, beta: 90, gamma: 90}\nsites: [{label: A, at: [0, 0, 0]}]\n`;

const folder = scratchFolder({
  "half.yaml": `${head("P n m a")}peaks: {file: half.txt}\n`,
  "half.txt": listOf([
    [0, 0.5, 0],
    [1, 0.5, 0],
    [2, 0.5, 0],
    [0, 0.5, 1],
    [1, 0.5, 1],
    [2, 0.5, 1],
  ]),
  "nuclear.yaml": `${head("P n m a")}k: [[0, 1/2, 0]]\npeaks: {file: nuclear.txt}\n`,
  "nuclear.txt": listOf([
    [2, 0, 0],
    [1, 0, 1],
    [0, 1, 1],
    [0, 2, 0],
    [0, 0.5, 0],
  ]),
  "third.yaml":
    "group: P 3\ncell: {a: 7, b: 7, c: 5, alpha: 90, beta: 90, gamma: 120}\nsites: [{label: A, at: [0.1, 0.2, 0.3]}]\nk: [[0, 0, 1/2]]\n",
  "none.yaml": `${head("P n m a")}peaks: {file: half.txt}\nsearch: {unmatched: 0, max-dimension: 0}\n`,
  "many.yaml": `${head("P n m a")}peaks: {file: many.txt}\nsearch: {unmatched: 0, max-dimension: 0}\n`,
  "many.txt": "d su\n9.317 0.001\n8.011 0.001\n7.553 0.001\n6.211 0.001\n5.087 0.001\n",
});

async function next(...words: string[]): Promise<string> {
  const { status, stdout } = await kvane(["run", ...words, "--json"], { cwd: folder });
  expect(status).toBe(0);
  return JSON.parse(stdout).result.next.join("\n");
}

describe("what to do next", () => {
  test("a given k that the peaks do not speak for comes first", async () => {
    const steps = await next("half.yaml", "--k", "1/2,0,1/2");
    expect(steps).toMatch(/^This k does not explain your peaks \(\d of 6 matched/);
    expect(await next("half.yaml", "--k", "0,1/2,0")).not.toContain("does not explain");
    expect(await next("half.yaml")).not.toContain("does not explain");
  });

  test("a k that the peaks moved is listed under Assumed", async () => {
    const { stdout } = await kvane(["run", "half.yaml", "--k", "0,0.4987,0"], { cwd: folder });
    expect(stdout).toMatch(/wave vector \(0, 0\.4987, 0\) +\(0, 0\.(5|49|50)\d*, 0\) +it was refined against/);
  });

  test("peaks on nuclear lines: subtract the paramagnetic pattern", async () => {
    expect(await next("nuclear.yaml")).toMatch(/[45] of 5 peaks lie on nuclear lines: subtract/);
    expect(await next("half.yaml")).not.toContain("subtract");
  });

  test("λ/2 is spoken of once", async () => {
    const { stdout } = await kvane(["run", "half.yaml"], { cwd: folder });
    const said = stdout.replace(/\s+/g, " ").match(/half the wavelength would put|every satellite lies halfway/g);
    expect(said).toHaveLength(1);
  });

  test("a conjugate pair is one choice where 2k is a reciprocal lattice vector", async () => {
    // P 3 has the characters 1, ω, ω* at (0,0,1/2): real moments carry ω with ω* (Bradley & Cracknell 1972, section 3.6).
    expect(await next("third.yaml")).toMatch(/^2 irreps, a conjugate pair counted once, can carry moments/m);
    const { stdout } = await kvane(["run", "third.yaml"], { cwd: folder });
    expect(stdout).toContain("Γ2 ⊕ Γ3");
    // At (0,0,w) 2k is none, and all three stand alone.
    expect(await next("third.yaml", "--k", "0,0,0.31")).toMatch(/^3 irreps can carry moments/m);
  });

  test("nothing found is a warning with exit status 0, and names no peaks one by one", async () => {
    const { status, stdout } = await kvane(["locate", "many.yaml"], { cwd: folder });
    expect(status).toBe(0);
    expect(stdout).toContain("[no-candidate]");
    expect(stdout).toContain("--max-dimension");
    expect(stdout).not.toContain("No candidate explains peak");
    const explained = JSON.parse((await kvane(["explain", "no-candidate", "--json"])).stdout).result.codes[0];
    expect(explained).toMatchObject({ exitStatus: 0 });
    expect(explained.remedy).toContain("--unmatched");
  });
});

describe("tables and pages", () => {
  test("CSV marks nuclear lines that a glide plane forbids, which the text leaves out", async () => {
    const words = ["satellites", "62", "--cell", `${a} ${b} ${c} 90 90 90`, "--k", "0,0,0", "--q-max", "1.6"];
    const csv = (await kvane([...words, "--csv"])).stdout.split("\n");
    // h00 only with h even in P n m a (International Tables A).
    expect(csv[1]).toContain("nuclear 1 0 0 extinct");
    expect((await kvane(words)).stdout).not.toContain("nuclear (1 0 0)");
    const { status } = await kvane(["run", "half.yaml", "--k", "0,0,0", "--out", "results", "--quiet"], {
      cwd: folder,
    });
    expect(status).toBe(0);
    expect(readFileSync(join(folder, "results/branch-1-satellites.csv"), "utf8")).toContain("nuclear 1 0 0 extinct");
  });

  test("coincidences far out are counted, not all named", async () => {
    const words = ["satellites", "194", "--cell", "7.61 7.61 6.52 90 90 120", "--k", "0.1,0.2,0.3", "--q-max", "8"];
    const { stdout } = await kvane(words);
    expect(stdout.replace(/\s+/g, " ")).toMatch(/\) and \d+ more/);
    for (const line of stdout.split("\n")) expect([...line].length, line).toBeLessThanOrEqual(100);
    // A triple of indices is never broken.
    expect(stdout).not.toMatch(/\((-?\d+ ?){1,2}\n/);
    const { reflections } = JSON.parse((await kvane([...words, "--json"])).stdout).result;
    for (const { overlaps } of reflections) expect(overlaps.length).toBeLessThanOrEqual(16);
    expect(reflections.some(({ moreOverlaps }: { moreOverlaps: number }) => moreOverlaps > 0)).toBe(true);
  });

  test.each([
    [["star", "62", "--k", "0,5,0"], "(0, 0, 0)", ["0", "0", "0"]],
    [["irreps", "F m -3 m", "--k", "1,1,1"], "(0, 0, 0)", ["0", "0", "0"]],
    [["star", "P 3", "--k", "4/3,1/3,0"], "(1/3, 1/3, 0)", ["1/3", "1/3", "0"]],
    [["star", "62", "--k", "0,1.28,0"], "(0, 0.28, 0)", ["0", "u-1", "0"]],
  ] as const)("%s says which plainer k it is", async (words, text, components) => {
    expect((await kvane(words)).stdout).toMatch(new RegExp(`Equivalent to +${text.replace(/[()]/g, "\\$&")}`));
    expect(JSON.parse((await kvane([...words, "--json"])).stdout).result.reduced.components).toEqual(components);
  });

  test("a k that is plain already is not said twice", async () => {
    for (const [group, k] of [
      ["62", "0,1/2,0"],
      ["F m -3 m", "1,0,0"],
      ["R -3 m:H", "0,0,3/2"],
      ["62", "0,-0.3,0"],
    ] as const)
      expect((await kvane(["star", group, "--k", k])).stdout).not.toContain("Equivalent to");
  });

  test("the numbers of irreps are said to be kvane's own, once", async () => {
    const { stdout } = await kvane(["irreps", "62", "--k", "0,0,0"]);
    expect(stdout.replace(/\s+/g, " ").match(/identified by its characters/g)).toHaveLength(1);
  });

  test("no two blank lines follow one another", async () => {
    for (const words of [
      ["run", "half.yaml", "--k", "0,1/2,0"],
      ["run", "half.yaml"],
      ["locate", "half.yaml"],
    ])
      expect((await kvane(words, { cwd: folder })).stdout).not.toContain("\n\n\n");
  });
});
