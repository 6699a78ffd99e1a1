import { describe, expect, test } from "vitest";
import { kvane, scratchFolder } from "./command.js";
import { schemaErrors } from "./schemas.js";

/** Q of h k l in a cell with right angles, Å⁻¹. */
function lengthOf(cell: readonly number[], ...h: readonly number[]): number {
  return 2 * Math.PI * Math.hypot(...h.map((entry, axis) => entry / (cell[axis] as number)));
}
const abc = [10.21, 6.05, 4.71] as const;
const cubic = [4.445, 4.445, 4.445] as const;
/** Satellites of (0, 1/2, 0), invented intensities. */
const satellites = [
  [0, 0.5, 0],
  [1, 0.5, 0],
  [0, 0.5, 1],
  [2, 0.5, 0],
  [1, 0.5, 1],
  [0, 1.5, 0],
].map((h, index) => `${lengthOf(abc, ...h).toFixed(4)} 0.0015 ${100 - 10 * index}`);
/** Lines 111 and 200 of a cubic F phase, a stray at 1.234. */
const others = [
  `${lengthOf(cubic, 1, 1, 1).toFixed(4)} 0.0015 900`,
  `${lengthOf(cubic, 2, 0, 0).toFixed(4)} 0.0015 800`,
  "1.2340 0.0015 5",
];
const header = "q su intensity su_intensity";
const rows = [...satellites, ...others].map((row) => `${row} 2`);
const phase = { text: "MnO; F m -3 m; 4.445 4.445 4.445 90 90 90" };
const folder = scratchFolder({
  "peaks.txt": `${header}\n${rows.join("\n")}\n`,
  "nuclear.txt": `${header}\n${lengthOf(abc, 2, 1, 2).toFixed(4)} 0.002 5000 10\n`,
  "study.yaml": [
    "group: P n m a",
    "cell: {a: 10.21, b: 6.05, c: 4.71, alpha: 90, beta: 90, gamma: 90}",
    "peaks: {file: peaks.txt, as: q, nuclear: nuclear.txt}",
    "search: {unmatched: 0, weigh-intensities: true}",
    "exclude: [[1.23, 1.24]]",
    "impurities:",
    "  - {name: MnO, group: F m -3 m, cell: {a: 4.445, b: 4.445, c: 4.445, alpha: 90, beta: 90, gamma: 90}}",
    "",
  ].join("\n"),
  "wrong.yaml": [
    "group: P n m a",
    "peaks: {file: peaks.txt, as: q}",
    "search: {weigh-intensities: maybe}",
    "impurities:",
    "  - {name: MnO, group: F m -3 q, cell: {a: 4, b: 5, c: 4, alpha: 90, beta: 90, gamma: 90}}",
    "  - {name: MnO}",
    "",
  ].join("\n"),
});
const options = ["62", "--cell", "10.21 6.05 4.71 90 90 90", "--peaks", "peaks.txt", "--as", "q", "--unmatched", "0"];
const aside = ["--exclude", "1.23 1.24", "--impurity", phase.text, "--nuclear", "nuclear.txt"];

describe("what is listed is set aside, by options or by the study", () => {
  for (const [name, words] of [
    ["options", ["locate", ...options, ...aside, "--weigh-intensities"]],
    ["study", ["locate", "study.yaml"]],
  ] as const)
    test(name, async () => {
      const { status, stdout } = await kvane([...words, "--json"], { cwd: folder });
      expect(status).toBe(0);
      const answer = JSON.parse(stdout);
      expect(schemaErrors("locate", answer)).toEqual([]);
      const { setAside, candidates, flags } = answer.result;
      expect(setAside.map(({ peak }: { peak: number }) => peak)).toEqual([6, 7, 8]);
      expect(setAside[0].because).toContain("MnO");
      expect(setAside[2].because).toContain("1.23 to 1.24");
      expect(candidates[0].k.components).toEqual(["0", "1/2", "0"]);
      expect(candidates[0].matched).toBe(6);
      const parent = flags.find((flag: { h: number[]; with: string }) => flag.h.map(Math.abs).join() === "2,1,2");
      expect(parent).toMatchObject({ with: "half wavelength", peak: 4, parentIntensity: 5000 });
      const text = await kvane(words, { cwd: folder });
      expect(text.stdout).toContain("peak 5 has 1.20 % of 2 1 2");
    });

  test("without them the search says that no k explains enough", async () => {
    const { stdout } = await kvane(["locate", ...options, "--max-dimension", "1", "--json"], { cwd: folder });
    const { result, warnings } = JSON.parse(stdout);
    expect(result.setAside).toEqual([]);
    expect(result.candidates).toEqual([]);
    expect(warnings.map(({ code }: { code: string }) => code)).toContain("no-candidate");
  });

  test("what cannot be read is refused with place and remedy", async () => {
    const bad = await kvane(["locate", ...options, "--exclude", "1.3 1.2", "--impurity", "MnO", "--json"], {
      cwd: folder,
    });
    expect(bad.status).toBe(2);
    const wheres = JSON.parse(bad.stdout).errors.map(({ where }: { where: { argument: string } }) => where.argument);
    expect(wheres).toEqual(["--exclude"]);
    const phaseOnly = await kvane(["locate", ...options, "--impurity", "MnO; F m -3 m; 4 5 4 90 90 90"], {
      cwd: folder,
    });
    expect(phaseOnly.stderr).toContain("cell-contradicts-group");
    const study = await kvane(["check", "wrong.yaml", "--json"], { cwd: folder });
    const problems = JSON.parse(study.stdout).errors;
    const found = problems.map(({ code, where }: { code: string; where: { path: string } }) => `${code} ${where.path}`);
    expect(found).toContain("wrong-type search.weigh-intensities");
    expect(found).toContain("unknown-group impurities[0].group");
    expect(found).toContain("missing-key impurities[1].group");
  });
});

test("two vectors: text, JSON and the whole job go on with both", async () => {
  const second = [
    [0.5, 0, 0.5],
    [0.5, 1, 0.5],
    [1.5, 0, 0.5],
    [0.5, 0, 1.5],
    [1.5, 1, 0.5],
  ].map((h) => `${lengthOf(abc, ...h).toFixed(4)} 0.0015 50 2`);
  const two = scratchFolder({
    "two.txt": `${header}\n${[...satellites.map((row) => `${row} 2`), ...second].join("\n")}\n`,
    "two.yaml": [
      "group: P n m a",
      "cell: {a: 10.21, b: 6.05, c: 4.71, alpha: 90, beta: 90, gamma: 90}",
      "sites: [{label: Fe1, at: [0, 0, 0]}]",
      "peaks: {file: two.txt, as: q}",
      "",
    ].join("\n"),
  });
  const found = await kvane(["locate", "two.yaml", "--json"], { cwd: two });
  const answer = JSON.parse(found.stdout);
  expect(schemaErrors("locate", answer)).toEqual([]);
  expect(answer.result.severalVectors.found[0].evidence.reading).toBe("found");
  const run = await kvane(["run", "two.yaml", "--json"], { cwd: two });
  const whole = JSON.parse(run.stdout);
  expect(schemaErrors("run", whole)).toEqual([]);
  const ks = whole.result.branches.map(({ k }: { k: { components: string[] } }) => k.components.join());
  expect(ks.sort()).toEqual(["0,1/2,0", "1/2,0,1/2"]);
  const text = await kvane(["run", "two.yaml"], { cwd: two });
  expect(text.stdout).toContain("k1 = ");
  expect(text.stdout).toContain("No single k explains enough of the peaks");
});
