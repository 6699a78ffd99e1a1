import { readFileSync } from "node:fs";
import { join } from "node:path";
import { configurationsOf } from "@kvane/core/configurations";
import {
  configurationSpaces,
  lineForms,
  lorentzFactor,
  type MomentSpace,
  magneticFormFactor,
  quadraticForm,
} from "@kvane/core/diffraction";
import { smallIrreps } from "@kvane/core/irreps";
import { siteModes } from "@kvane/core/modes";
import { siteOrbit } from "@kvane/core/spacegroups";
import { beforeAll, describe, expect, test } from "vitest";
import { groupOf } from "../support/parsed-groups.js";
import { seeded } from "../support/random.js";
import { site, wave } from "../support/written.js";
import { kvane, scratchFolder } from "./command.js";

/** An invented compound with one site, and one with two. */
const cell = { a: 10.21, b: 6.05, c: 4.71, alpha: 90, beta: 90, gamma: 90 };
const head = `group: P n m a
cell: {a: 10.21, b: 6.05, c: 4.71, alpha: 90, beta: 90, gamma: 90}
k: [[0, 0, 0]]
`;
const iron = "sites:\n  - {label: Fe1, ion: Fe3+, at: [0, 0, 0], spin: 5/2}\n";

/** Exact powder intensities of one configuration with normal errors of 3 % and 0.3 % of the strongest. */
function listOf(space: MomentSpace, amplitudes: readonly number[], scale: number, seed: number): string {
  const random = seeded(seed);
  const peaks = new Map<string, number>();
  for (const { line, matrix } of lineForms(groupOf("P n m a"), cell, wave("0 0 0"), space, { qMax: 4 })) {
    const factor = lorentzFactor({ kind: "powder", wavelengthAngstrom: 1.5 }, line.q);
    const key = line.q.toFixed(6);
    peaks.set(key, (peaks.get(key) ?? 0) + scale * factor * quadraticForm(matrix, amplitudes));
  }
  const strongest = Math.max(...peaks.values());
  return ["q intensity intensity-su"]
    .concat(
      [...peaks].map(([q, value]) => {
        const su = Math.hypot(0.03 * value, 0.003 * strongest);
        const error = Math.sqrt(-2 * Math.log(1 - random.next())) * Math.cos(2 * Math.PI * random.next());
        return `${q} ${(value + su * error).toFixed(4)} ${su.toFixed(4)}`;
      }),
    )
    .join("\n");
}

async function spacesOf(): Promise<readonly MomentSpace[]> {
  const group = groupOf("P n m a");
  const irreps = smallIrreps(group, wave("0 0 0"));
  const modes = siteModes(group, irreps, siteOrbit(group, site("Fe1", "0 0 0"), null));
  const set = await configurationsOf(group, irreps, [modes], cell);
  return configurationSpaces(set, cell, [{ modes, formFactor: magneticFormFactor({ ion: "Fe3+" }) }]);
}

const spaces = await spacesOf();
const truth = spaces.find(({ basis }) => basis.length === 3) as MomentSpace;
const amplitudes = [3.1, -1.4, 2.2];

const section = "intensities: {file: list.csv, wavelength: 1.5, lorentz: true, scale: 20, resolution: 0.002}\n";
const folder = scratchFolder({
  "study.yaml": `${head}${iron}${section}`,
  "relative.yaml": `${head}${iron}${section.replace(" scale: 20,", "")}`,
  "bare.yaml": `${head}${iron}`,
  "no-ion.yaml": `${head}sites:\n  - {label: Fe1, at: [0, 0, 0]}\n${section}`,
  "odd-ion.yaml": `${head}sites:\n  - {label: Fe1, ion: Fe9+, at: [0, 0, 0]}\n${section}`,
  "missing.yaml": `${head}${iron}intensities: {file: gone.csv, scale: nothing}\n`,
  "list.csv": listOf(truth, amplitudes, 20, 41),
  "elsewhere.csv": "q intensity intensity-su\n0.11 10 1\n",
  "bare.csv": "q su\n1.2 0.01\n",
});

interface Ranked {
  readonly id: string;
  readonly chiSquared: number;
  readonly calculated: readonly number[];
  readonly sameAs: readonly string[];
  readonly moments: readonly { size: number; sizeSu: number | null; limit: number; momentCrystal: number[] }[];
  readonly factorToLimit: number | null;
}

async function weighed(...words: string[]) {
  const { stdout } = await kvane(["weigh", ...words, "--json"], { cwd: folder });
  const { result, errors, assumed, warnings } = JSON.parse(stdout);
  return { result, errors, assumed, warnings, ranking: (result?.ranking ?? []) as Ranked[] };
}

describe("kvane weigh", () => {
  let answer: Awaited<ReturnType<typeof weighed>>;
  beforeAll(async () => {
    answer = await weighed("study.yaml");
  });

  test("the configuration that the data were made from is first, with its moments", () => {
    const { ranking, result } = answer;
    const first = ranking[0] as Ranked;
    expect([first.id, ...first.sameAs]).toContain(truth.id);
    expect(first.sameAs.length).toBeLessThan(3);
    expect(result.relative).toBe(false);
    const own = ranking.find(({ id }) => id === truth.id) as Ranked;
    // Every atom of the site has one size; amplitudes are along the axes, which are orthogonal.
    const size = Math.hypot(...amplitudes);
    const moment = own.moments[0] as Ranked["moments"][number];
    expect(moment.limit).toBe(5);
    expect(Math.abs(moment.size - size)).toBeLessThan(4 * (moment.sizeSu as number));
    expect(moment.sizeSu).toBeLessThan(0.2);
    expect(result.data.list).toHaveLength(own.calculated.length);
  });

  test("those that cannot give an observed peak are struck out with the peak", () => {
    const { ranking, result } = answer;
    const all = [...ranking.map(({ id }) => id), ...result.struckOut.map(({ id }: Ranked) => id)];
    expect(all.sort()).toEqual(spaces.map(({ id }) => id).sort());
    expect(result.struckOut.length).toBeGreaterThan(0);
    const seen = new Map<string, number>(
      result.data.list.map((one: { label: string; observed: number; su: number }) => [
        one.label,
        one.observed / one.su,
      ]),
    );
    for (const { peaks } of result.struckOut) {
      expect(peaks.length).toBeGreaterThan(0);
      for (const peak of peaks) expect(seen.get(peak)).toBeGreaterThan(5);
    }
  });

  test("without a scale sizes are relative, with the factor to what the ion can have", async () => {
    const { ranking, result } = await weighed("relative.yaml");
    expect(result.relative).toBe(true);
    const first = ranking[0] as Ranked;
    const largest = Math.max(...first.moments.map(({ size }) => size));
    expect((first.factorToLimit as number) * largest).toBeCloseTo(5, 4);
    // Sizes grow with √scale: relative ones are those of scale 1.
    const own = answer.ranking.find(({ id }) => id === first.id) as Ranked;
    expect(first.moments[0]?.size).toBeCloseTo(Math.sqrt(20) * (own.moments[0] as { size: number }).size, 1);
    expect(result.remarks.join(" ")).toContain("relative");
  });

  test("options stand for the section", async () => {
    const words = [
      "bare.yaml",
      "--intensities",
      "list.csv",
      "--wavelength",
      "1.5",
      "--lorentz",
      "yes",
      "--scale",
      "20",
    ];
    const { ranking } = await weighed(...words, "--resolution", "0.002");
    expect(ranking).toEqual(answer.ranking);
  });

  test("what the list does not say is listed under Assumed", async () => {
    const { assumed } = await weighed("bare.yaml", "--intensities", "list.csv");
    const what = assumed.map((one: { what: string }) => one.what);
    expect(what).toEqual(expect.arrayContaining(["Lorentz factor", "resolution"]));
  });

  test("text and CSV have the ranking, and say that it is no refinement", async () => {
    const { stdout } = await kvane(["weigh", "study.yaml"], { cwd: folder });
    expect(stdout).toContain("it is not a refinement");
    expect(stdout).toContain("Observed and calculated");
    for (const line of stdout.split("\n")) expect([...line].length).toBeLessThanOrEqual(100);
    const { stdout: csv } = await kvane(["weigh", "study.yaml", "--csv"], { cwd: folder });
    const rows = csv.trim().split("\n");
    expect(rows).toHaveLength(1 + answer.ranking.length * answer.result.data.list.length);
    expect(rows[1]).toContain(`1,${answer.ranking[0]?.id}`);
  });

  test.each([
    [["bare.yaml"], "missing-key", "bare.yaml", "intensities"],
    [["no-ion.yaml"], "missing-key", "no-ion.yaml", "site Fe1 has no ion"],
    [["odd-ion.yaml"], "invalid-argument", "odd-ion.yaml:5:23 (sites[0].ion)", "Fe2[+], Fe3[+]"],
    [["missing.yaml"], "invalid-number", "missing.yaml:6:38 (intensities.scale)", "above 0"],
    [["study.yaml", "--intensities", "gone.csv"], "file-not-found", "gone.csv", "check the name"],
    [["bare.yaml", "--intensities", "bare.csv"], "invalid-peak", "bare.csv:2:1", "no intensities"],
    [["bare.yaml", "--intensities", "elsewhere.csv"], "invalid-argument", "", "lies on a satellite"],
    [["study.yaml", "--k", "u,0,0"], "k-needs-values", "", "letter"],
    [["study.yaml", "--lorentz", "maybe"], "invalid-argument", "--lorentz", "yes or no"],
    [["study.yaml", "--scale", "0"], "invalid-number", "--scale", "above 0"],
  ])("%j: %s at its place", async (words, code, place, part) => {
    const { status, stderr } = await kvane(["weigh", ...words], { cwd: folder });
    expect(status).toBe(2);
    expect(stderr).toContain(`error[${code}]`);
    expect(stderr).toContain(place);
    expect(stderr).toMatch(new RegExp(part));
  });
});

describe("the bundled example", () => {
  test("the arrangement of moments.mcif, from which the intensities were made, is first; another irrep is far off", async () => {
    const named = JSON.parse((await kvane(["decompose", "--example", "--json"])).stdout).result;
    const { stdout } = await kvane(["weigh", "--example", "--k", "1/2,0,0", "--json"]);
    const { ranking } = JSON.parse(stdout).result as { ranking: (Ranked & { irreps: string[] })[] };
    expect(JSON.stringify(named)).toContain(ranking[0]?.id);
    // The other irrep of the two that this k has on these sites.
    const other = ranking.filter(({ irreps }) => irreps.join() !== ranking[0]?.irreps.join());
    expect(other.length).toBeGreaterThan(0);
    for (const { chiSquared } of other) expect(chiSquared).toBeGreaterThan(100 * (ranking[0] as Ranked).chiSquared);
    // moments.mcif: Mn1 (4.757, 1.213, 0.950) in its cell at the origin, up to a common sign; s.u. about 0.1.
    const moment = ranking[0]?.moments[0]?.momentCrystal as number[];
    const sign = Math.sign(moment[0] as number);
    [4.757, 1.213, 0.95].forEach((value, axis) => {
      expect(Math.abs(sign * (moment[axis] as number) - value)).toBeLessThan(0.35);
    });
  });
});

describe("kvane run with intensities", () => {
  test("each branch has the ranking of kvane weigh, and the text its section", async () => {
    const { stdout } = await kvane(["run", "study.yaml", "--json"], { cwd: folder });
    const { ranking } = await weighed("study.yaml");
    const { branches, next } = JSON.parse(stdout).result;
    expect(branches[0].weigh.ranking).toEqual(ranking);
    expect(next.join(" ")).toContain(ranking[0]?.id);
    const text = (await kvane(["run", "study.yaml"], { cwd: folder })).stdout;
    expect(text).toMatch(/^Fits to intensities$/m);
  });

  test("what stands in the way of weights is a warning, not the end of the job", async () => {
    const { stdout, status } = await kvane(["run", "no-ion.yaml", "--json"], { cwd: folder });
    expect(status).toBe(0);
    const { result, warnings } = JSON.parse(stdout);
    expect(result.branches[0].weigh).toBeNull();
    expect(warnings.map(({ code }: { code: string }) => code)).toContain("missing-key");
  });

  test("a folder has the table, the drawing and the section of the report", async () => {
    const { status } = await kvane(["run", "study.yaml", "--out", "results", "--quiet"], { cwd: folder });
    expect(status).toBe(0);
    const text = (name: string) => readFileSync(join(folder, "results", name), "utf8");
    expect(text("branch-1-weights.csv").split("\n")[0]).toContain("observed,su,calculated");
    expect(text("branch-1-weights.svg")).toContain("Observed and calculated intensities");
    expect(text("report.html")).toContain("branch-1-weights");
    expect(text("report.md")).toContain("Fits to intensities");
  });
});

describe("satellites with sites", () => {
  const words = ["satellites", "P n m a", "--cell", "10.21 6.05 4.71 90 90 90", "--k", "0,0,0", "--q-max", "3"];

  test("every line names the irreps that make it zero: those whose pattern is zero there for all amplitudes", async () => {
    const { stdout } = await kvane([...words, "--site", "Fe1 0 0 0", "--json"]);
    const { reflections } = JSON.parse(stdout).result;
    expect(reflections.length).toBeGreaterThan(10);
    // Independent of the exact test: the sizes of the quadratic forms of the configurations, one irrep each.
    for (const line of reflections) {
      for (const space of spaces) {
        const label = space.id.split(".")[0] as string;
        const form = lineForms(groupOf("P n m a"), cell, wave("0 0 0"), space, { qMax: 3 }).find(
          (one) => one.line.h.join() === line.h.join(),
        );
        const largest = Math.max(...(form?.matrix ?? [0]).map(Math.abs));
        expect(line.extinctFor.includes(label), `${label} at ${line.h}`).toBe(largest < 1e-12);
      }
    }
  });

  test("without sites nothing is said, and a wrong site is refused", async () => {
    const { stdout } = await kvane([...words, "--json"]);
    const { reflections } = JSON.parse(stdout).result;
    expect(reflections.every((line: { extinctFor: unknown }) => line.extinctFor === null)).toBe(true);
    const { status, stderr } = await kvane([...words, "--site", "Fe1 0 0"]);
    expect(status).toBe(2);
    expect(stderr).toContain("error[invalid-site]");
  });

  test("the text has a column where a line is zero", async () => {
    const { stdout } = await kvane([...words, "--site", "Fe1 0 0 0"]);
    expect(stdout).toContain("Zero for");
    expect((await kvane(words)).stdout).not.toContain("Zero for");
  });
});
