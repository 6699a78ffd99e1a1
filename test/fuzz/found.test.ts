import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { problem } from "@kvane/core/errors";
import {
  parseCif,
  parseFourierComponents,
  parseIntensityList,
  parseMomentList,
  parsePeakList,
  parseScanTable,
  parseStudy,
  readCifStructure,
  readMagneticCif,
} from "@kvane/core/files";
import { answer, exitStatusOf, type Request, version } from "@kvane/core/job";
import { operatorsModuloIntegers, parseGroup } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { kvane, scratchFolder } from "../cli/command.js";
import { schemaErrors } from "../cli/schemas.js";
import { places, problemsOf } from "../support/problems-of.js";
import { root } from "../tools/paths.mjs";

/** Inputs that the fuzz loops found, made small: each once broke a promise. */
describe("found by fuzzing: files", () => {
  test("coordinates in different loops are no atoms", async () => {
    const text =
      "data_a\nloop_\n_atom_site_fract_x\n0\nloop_\n_atom_site_label\n_atom_site_fract_y\n_atom_site_fract_z\nFe 0 0\n";
    const { problems } = await readCifStructure(await parseCif(text, "a.cif"));
    expect(places(problems.sites)).toEqual(["cif-missing 7:1"]);
  });

  test("a block whose code begins with a blank of another script is found", async () => {
    const document = await parseCif("#\\#CIF_2.0\ndata_\u00a0two\n_cell_length_a 5\n", "a.cif");
    expect((await readCifStructure(document, "\u00a0two")).block).toBe("\u00a0two");
  });

  test("a wrong Hall symbol of a CIF is refused where it is wrong", async () => {
    const { problems } = await readCifStructure(await parseCif("data_a\n_space_group_name_Hall 'P 4q'\n", "a.cif"));
    expect(places(problems.symmetry)).toEqual(["syntax 2:28"]);
  });

  test.each(["1e-320", "1e308"])("no peak is at d = %s", async (position) => {
    const problems = await problemsOf(() => parsePeakList(`d\n${position}\n`, { file: "p.txt" }));
    expect(places(problems)).toEqual(["peak-out-of-range 2:1"]);
  });

  test("a tolerance as wide as the positions is refused", async () => {
    for (const tolerance of [3, 2 ** 53]) {
      const problems = await problemsOf(() => parsePeakList("d\n3\n2\n", { file: "p.txt", tolerance }));
      expect(problems).toMatchObject([{ code: "invalid-number", where: { argument: "--tolerance" } }]);
    }
    expect(parsePeakList("d\n3\n2\n", { file: "p.txt", tolerance: 0.05 }).peaks).toHaveLength(2);
  });

  test("a moment of an atom that is not there is an error, not a warning", async () => {
    const text = readFileSync(join(root, "test/fixtures/magnetic-cif/doubled-spherical.cif"), "utf8");
    const broken = text.replace(/^(Fe1)c( [\d.]+ \d+ )/m, "$1lost$2");
    expect(broken).not.toBe(text);
    const problems = await problemsOf(async () => readMagneticCif(await parseCif(broken, "m.cif")));
    expect(problems).toMatchObject([{ code: "cif-missing", where: { file: "m.cif" } }]);
    expect(problems.map(({ code }) => exitStatusOf(code))).toEqual([2]);
  });

  test("a moment beyond all numbers is refused with its place", async () => {
    const text = readFileSync(join(root, "test/fixtures/magnetic-cif/doubled-spherical.cif"), "utf8");
    const broken = text.replace(/^(Fe1c [\d.]+) \d+ /m, "$1 -1e308 ");
    expect(broken).not.toBe(text);
    const problems = await problemsOf(async () => readMagneticCif(await parseCif(broken, "m.cif")));
    expect(problems).toMatchObject([{ code: "cif-value", where: { file: "m.cif" } }]);
  });

  test("a list of moments without rows is refused with a place and a remedy", async () => {
    const problems = await problemsOf(() => parseMomentList("label x y z\n", "m.txt"));
    expect(places(problems)).toEqual(["file-empty 1:1"]);
    expect(problems[0]?.remedy).not.toBeNull();
  });

  test("a fraction beyond all numbers is no moment", async () => {
    const problems = await problemsOf(() => parseMomentList(`A 0 0 0 0 0 ${"7".repeat(400)}/3\n`, "m.txt"));
    expect(problems[0]?.code).toBe("invalid-component");
  });
});

/** Seconds of processor time. */
async function secondsOf(action: () => unknown): Promise<number> {
  const before = process.cpuUsage();
  await problemsOf(action);
  const { user, system } = process.cpuUsage(before);
  return (user + system) / 1e6;
}

describe("found by fuzzing: time", () => {
  const digits = `${"7".repeat(200_000)}x`;

  test("a word of many digits that is no number is soon seen to be none", async () => {
    const file = "long";
    expect(await secondsOf(() => parsePeakList(`${digits}\n`, { file, kind: "d" }))).toBeLessThan(5);
    expect(await secondsOf(() => parseScanTable(`1 ${digits}\n`, file))).toBeLessThan(5);
    expect(await secondsOf(() => parseMomentList(`A 0 0 0 0 0 ${digits}\n`, file))).toBeLessThan(5);
    expect(await secondsOf(() => parseFourierComponents(`1 0 0 ${digits}\n`, { file, atoms: 1 }))).toBeLessThan(5);
    const cif = await parseCif(`data_a\n_cell_length_a ${digits}\n`, file);
    expect(await secondsOf(() => readCifStructure(cif))).toBeLessThan(5);
  });

  test("a scan of ten thousand columns is refused", async () => {
    const problems = await problemsOf(() => parseScanTable(`T ${"save ".repeat(10_000)}\n1 2\n`, "s.txt"));
    expect(places(problems)).toEqual(["invalid-scan 1:1"]);
  });

  test("a list of more peaks than anybody has is refused", async () => {
    const problems = await problemsOf(() => parsePeakList("2 0.01\n".repeat(100_001), { file: "p.txt", kind: "d" }));
    expect(places(problems)).toEqual(["file-too-large 100001:1"]);
  });
});

describe("found by fuzzing: groups", () => {
  const codeOf = (run: () => unknown): string | undefined => {
    try {
      run();
    } catch (error) {
      return (error as { problems?: readonly { code: string }[] }).problems?.[0]?.code;
    }
    return undefined;
  };

  test("a denominator beyond all numbers is refused", () => {
    expect(codeOf(() => parseGroup(`x+1/${"9".repeat(400)},y,z`))).toBe("number-overflow");
  });

  test("a cell of a million lattice points is not listed", () => {
    const group = parseGroup("x,y,z;x+1/1000000,y,z");
    expect(codeOf(() => operatorsModuloIntegers(group))).toBe("invalid-argument");
  });

  test("a cell of 1000 lattice points is", () => {
    expect(operatorsModuloIntegers(parseGroup("x,y,z;x+1/10,y,z;x,y+1/10,z;x,y,z+1/10"))).toHaveLength(1000);
  });
});

describe("found by fuzzing: drafts and schemas", () => {
  test("a charge that no ion has is left out of a draft, which stays a study", async () => {
    const text = readFileSync(join(root, "test/fixtures/cif/structures/ions.cif"), "utf8");
    const broken = text.replace(/Fe3\+/g, "Fe222222+");
    expect(broken).not.toBe(text);
    const folder = scratchFolder({ "ions.cif": broken });
    const { status, stdout } = await kvane(["study", "ions.cif"], { cwd: folder });
    expect(status).toBe(0);
    await parseStudy(stdout, "draft.yaml");
  });

  test.each(["constructor", "a\nb", "\u001b", ""])(
    "the schema of %j, which is no command, allows no result",
    (command) => {
      expect(schemaErrors(command, { ...refused, command, result: {} })).not.toEqual([]);
      expect(schemaErrors(command, { ...refused, command })).toEqual([]);
    },
  );
  const refused = {
    kvane: version,
    format: 1,
    input: {},
    result: null,
    errors: [problem("unknown-command", "there is no such command")],
    warnings: [],
    assumed: [],
  };
});

describe("found by fuzzing: commands", () => {
  test("values of a wrong type are refused, not passed over, all at once", async () => {
    const request = { command: "modes", group: 62, k: [0, 0, 0], sites: "Fe 0 0 0", polar: "yes", cell: null };
    const whole = await answer(request as unknown as Request, { readText: async () => "" });
    expect(whole.errors.map(({ code, where }) => `${code} ${where.argument}`)).toEqual([
      "invalid-argument GROUP",
      "invalid-argument --k",
      "invalid-argument --site",
      "invalid-argument --polar",
    ]);
    expect(schemaErrors("modes", whole)).toEqual([]);
  });

  test("atoms on top of each other are refused where the later of them is written", async () => {
    const cell = "{a: 9, b: 7, c: 8, alpha: 90, beta: 90, gamma: 90}";
    const sites = "[{label: Fe1, at: [0, 0, 0]}, {label: Co1, at: [0.01, 0, 0]}]";
    const study = `group: P 1\ncell: ${cell}\nsites: ${sites}\nexchange:\n  - {bond: 1, j: 1}\n`;
    const host = { readText: async () => study };
    for (const command of ["exchange", "check"])
      expect((await answer({ command, study: "s.yaml" }, host)).errors, command).toMatchObject([
        { code: "invalid-site", where: { file: "s.yaml", path: "sites[1]" }, found: "atoms of Co1 and Fe1" },
      ]);
    const own = { command: "exchange", group: "P 1", cell: "9 7 8 90 90 90", sites: ["Fe1 0 0 0", "Co1 0.01 0 0"] };
    expect((await answer(own, host)).errors).toMatchObject([{ where: { argument: "--site", path: "sites[1]" } }]);
  });

  test("too many bonds are refused where the farthest of them is asked for", async () => {
    const asked = { command: "exchange", group: "P m -3 m", cell: "4 4 4 90 90 90", sites: ["Fe 0 0 0"] };
    const whereOf = async (more: object) =>
      (await answer({ ...asked, ...more }, { readText: async () => "" })).errors.map(({ code, where }) => [
        code,
        where.argument,
      ]);
    const far = "9007199254740991";
    expect(await whereOf({ vary: ["2 0 1 2", `${far} 0 1 2`] })).toEqual([["invalid-argument", "--vary"]]);
    expect(await whereOf({ constants: ["1 1", `${far} 1`] })).toEqual([["invalid-argument", "--j"]]);
  });

  test("a scale that would make squares of intensities infinite is refused, as an option and in a study", async () => {
    const example = (name: string) => readFileSync(join(root, "packages/cli/example", name), "utf8");
    const study = example("study.yaml");
    const huge = study.replace("scale: 40", "scale: 1e300");
    expect(huge).not.toBe(study);
    const host = (text: string) => ({ readText: async (path: string) => (path === "s.yaml" ? text : example(path)) });
    const option = await answer({ command: "weigh", study: "s.yaml", k: "0,1/2,0", scale: "1e308" }, host(study));
    expect(option.errors).toMatchObject([{ code: "invalid-number", where: { argument: "--scale" } }]);
    const written = await answer({ command: "weigh", study: "s.yaml", k: "0,1/2,0" }, host(huge));
    expect(written.errors).toMatchObject([{ code: "invalid-number", where: { path: "intensities.scale" } }]);
  });

  test("intensities beyond any measurement are refused in lists and scans", async () => {
    const list = (row: string) => () => parseIntensityList(`d intensity intensity-su\n4 10 1\n${row}\n`, { file: "i" });
    for (const row of ["3 1e200 1", "3 10 1e-200", "3 10 1e31"])
      expect(places(await problemsOf(list(row))), row).toEqual(["invalid-peak 3:1"]);
    const scan = (row: string) => () => parseScanTable(`T I su\n1 10 1\n${row}\n`, "s");
    for (const row of ["2 1e200 1", "2 -1e200 1"])
      expect(places(await problemsOf(scan(row))), row).toEqual(["invalid-scan 3:3"]);
    expect(places(await problemsOf(scan("2 10 1e-200")))).toEqual(["invalid-scan 3:6"]);
    expect(() => [list("3 0 1e-30")(), scan("2 -1e30 1")()]).not.toThrow();
  });

  test("a cell that nobody measures is refused in a CIF", async () => {
    const text = "data_a\n_cell_length_a 4.40(3)\n_cell_length_b 4.45(3)\n_cell_length_c 5e-324(3)\n";
    const { problems } = await readCifStructure(await parseCif(text, "a.cif"));
    expect(places(problems.cell)).toEqual(["cif-value 4:16"]);
  });

  test("that no peak is left is said of the list", async () => {
    const asked = { group: "62", cell: "10.21 6.05 4.71 90 90 90", peaks: "p", as: "q", qMax: "0.001" };
    const host = { readText: async () => "0.5\n1.1\n" };
    for (const own of [{ command: "index", k: "0,0.469,0" }, { command: "locate" }])
      expect((await answer({ ...asked, ...own }, host)).errors).toMatchObject([
        { code: "too-few-peaks", where: { file: "p" } },
      ]);
  });

  test("a command that is no text is no command", async () => {
    const whole = await answer({ command: 5 } as unknown as Request, { readText: async () => "" });
    expect(whole).toMatchObject({ command: "5", errors: [{ code: "unknown-command" }] });
  });

  test.each(["--k\n--k", "--a'b"])("an unknown option is named whole: %j", async (word) => {
    const { status, stdout } = await run("run", "--example", word, "--json");
    expect(status).toBe(2);
    const [first] = JSON.parse(stdout).errors;
    expect(first).toMatchObject({ code: "unknown-option", where: { argument: word.replace("\n", " ") } });
  });

  const folder = scratchFolder();
  const run = (...words: string[]) => kvane([...words], { cwd: folder });
  const fe = ["62", "--k", "0,0,0", "--site", "Fe 0 0 0"];

  test("open letters in k leave the magnetic CIFs out of the result folder", async () => {
    const { status } = await run("run", "--example", "--k", "0,u,0", "--out", "letters");
    expect(status).toBe(0);
    const answer = JSON.parse(readFileSync(join(folder, "letters/result.json"), "utf8"));
    expect(answer.result.files.filter((name: string) => name.endsWith(".mcif"))).toEqual([]);
  });

  test("open letters in k are refused by export", async () => {
    const { status, stderr } = await run("export", "--example", "--k", "0,u,0", "--configuration", "1.1");
    expect(status).toBe(2);
    expect(stderr).toContain("error[k-needs-values]");
    expect(stderr).toContain("at --k");
  });

  test.each([
    ["--together", "9", "Γ9"],
    ["--on-site", "Fe: 9", "Γ9"],
    ["--on-site", "Mn: 1", "Mn"],
    ["--arms", "2", "arm 2"],
  ])("a name that is no choice stands at its option: %s %s", async (option, value, named) => {
    const { status, stderr } = await run("configurations", ...fe, option, value);
    expect(status).toBe(2);
    expect(stderr).toContain(`at ${option}`);
    expect(stderr).toContain(named);
  });
});

describe("corrections of the search", () => {
  test.each([
    ["zero-shift", "1e-200"],
    ["zero-shift", "1.5"],
    ["cell-scale", "1e-320"],
    ["cell-scale", "0.1"],
  ])("too small for their squares, or too wide, are refused where they were given: %s %s", async (name, value) => {
    const folder = scratchFolder();
    const option = await kvane(["locate", "--example", `--${name}`, value], { cwd: folder });
    expect(option.status).toBe(2);
    expect(option.stderr).toContain(`error[invalid-argument]: --${name} is ${value}\n  at --${name}\n`);
    const example = join(import.meta.dirname, "../../packages/cli/example");
    const study = readFileSync(join(example, "study.yaml"), "utf8");
    writeFileSync(join(folder, "satellites.csv"), readFileSync(join(example, "satellites.csv")));
    writeFileSync(join(folder, "study.yaml"), study.replace(/^search: .*$/m, `search: {${name}: ${value}}`));
    for (const command of ["locate", "check"]) {
      const { status, stderr } = await kvane([command, "study.yaml"], { cwd: folder });
      expect(status).toBe(2);
      expect(stderr).toContain(`(search.${name})`);
    }
  });
});

test("words behind `--` stand there when they are too many", async () => {
  const { status, stderr } = await kvane(["modes", "--", "62", "--site", "Fe1 0 0 1/2"]);
  expect(status).toBe(2);
  expect(stderr).toContain("  at --\n");
  expect(stderr).toContain("leave `--` out");
});
