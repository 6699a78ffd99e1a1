import { existsSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { kvane, kvaneProcess, scratchFolder } from "./command.js";

const cellLine = "cell: {a: 10.21, b: 6.05, c: 4.71, alpha: 90, beta: 90, gamma: 90}";
const folder = scratchFolder({
  "colon.yaml": "group: P n m a\nsites\n  - {label: A, at: [0, 0, 0]}\npeaks: {file: a, as: d}\n",
  "title.yaml": "title: only a title\n",
  "no-wavelength.yaml": `group: P n m a\n${cellLine}\nsites: [{label: A, at: [0, 0, 0]}]\npeaks:\n  file: tt.txt\n`,
  "tt.txt": "2theta su\n11.43 0.05\n17.77 0.05\n29.69 0.05\n",
  "d.txt": "d su\n12.10 0.02\n7.803 0.01\n4.703 0.01\n",
  "zero.yaml": `group: P n m a\n${cellLine}\npeaks: {file: d.txt}\nsearch:\n  unmatched: 3\n  zero-shift: 0.1\n`,
  "no-k.yaml": `group: P n m a\n${cellLine}\nsites: [{label: A, at: [0, 0, 0]}]\npeaks: {file: d.txt}\n`,
  "no-peaks.yaml": `group: P n m a\n${cellLine}\nsites: [{label: A, at: [0, 0, 0]}]\n`,
  "scale.yaml": `group: P n m a\nsearch: {cell-scale: 1.5}\n`,
  "ions.yaml": [
    "group: P n m a",
    "sites:",
    "  - {label: A, ion: Mn7, at: [0, 0, 0]}",
    "  - {label: B, ion: Xx3+, at: [0, 0, 1/2]}",
    "  - {label: C, ion: fe3+, at: [0, 1/4, 0]}",
    "  - {label: D, ion: Fe+3, at: [0, 1/4, 1/2]}",
    "  - {label: E, ion: Fe3+, at: [1/4, 1/4, 1/2]}",
    "",
  ].join("\n"),
  "moved.yaml": `group: P 3\nsites: [{label: A, at: [0.3333, 0.6667, 0]}]\nk: [[0, 0, 0]]\n`,
});
const peaks = ["--cell", "10.21 6.05 4.71 90 90 90", "--peaks", "d.txt"];

/** What was typed, and what the error must say of where and how to mend it. */
const cases: readonly (readonly [string, readonly string[], readonly string[]])[] = [
  [
    "a site without quotation marks",
    ["modes", "62", "--k", "0,0,0", "--site", "Mn", "0", "0", "0"],
    ["at --site", '--site "Mn 0 0 0"'],
  ],
  ["a k with blanks", ["star", "62", "--k", "1/3,", "1/3,", "0"], ["at --k", '--k "1/3, 1/3, 0"']],
  ["a group without quotation marks", ["ops", "P", "n", "m", "a"], ["at GROUP", 'kvane ops "P n m a"']],
  ["two studies", ["run", "a.yaml", "b.yaml"], ["at STUDY", "takes one study", "b.yaml"]],
  ["two topics", ["help", "modes", "x"], ["at TOPIC", "one topic"]],
  ["an unknown option", ["ops", "62", "--nonsense"], ["kvane ops --help"]],
  [
    "decimal commas",
    ["satellites", "62", "--cell", "10,21 6,05 4,71 90 90 90", "--k", "0,0,0"],
    ['"10.21 6.05 4.71 90 90 90"'],
  ],
  [
    "decimal commas between commas",
    ["satellites", "62", "--cell", "10,21, 6,05, 4,71, 90, 90, 90", "--k", "0,0,0"],
    ['"10.21 6.05 4.71 90 90 90"'],
  ],
  ["a decimal comma in k", ["star", "62", "--k", "0,47,0,0"], ["decimal points"]],
  ["no k in a study with peaks", ["export", "no-k.yaml"], ["at no-k.yaml (k)", "`kvane locate` with this study"]],
  ["no k in a study without peaks", ["export", "no-peaks.yaml"], ["remedy:   give --k\n"]],
  ["a group for a study", ["run", "62"], ["needs a study file", "found:    62"]],
  ["no wavelength in a study", ["run", "no-wavelength.yaml"], ["at no-wavelength.yaml:5:3 (peaks)", "wavelength: …"]],
  ["one missing colon", ["check", "colon.yaml"], ["at colon.yaml:2:1", "no colon"]],
  ["a cell scale of more than the cell", ["check", "scale.yaml"], ["at scale.yaml:2:22 (search.cell-scale)"]],
  ["a zero shift without wavelength", ["check", "zero.yaml"], ["at zero.yaml:6:15 (search.zero-shift)", "wavelength"]],
  ["as many unmatched as there are", ["check", "zero.yaml"], ["at zero.yaml:5:14 (search.unmatched)", "below 3"]],
  ["the same for the whole job", ["locate", "zero.yaml"], ["at zero.yaml:6:15 (search.zero-shift)"]],
  ["the same as an option", ["locate", "62", ...peaks, "--unmatched", "3"], ["at --unmatched", "below 3"]],
  ["no name for --out", ["ops", "62", "--out", ""], ["at --out", "without a name"]],
  [
    "a list of reflections without end",
    ["satellites", "62", "--cell", "1021 605 471 90 90 90", "--k", "0,0,0"],
    ["at --q-max"],
  ],
];

describe("wrong input is answered with what to do about it", () => {
  test.each(cases)("%s", async (_what, words, holds) => {
    const { status, stderr } = await kvane(words, { cwd: folder });
    expect(status).toBeGreaterThan(0);
    for (const text of holds) expect(stderr).toContain(text);
    for (const line of stderr.split("\n")) expect([...line].length, line).toBeLessThanOrEqual(100);
  });

  test("one missing colon is one error, in no words of the YAML reader", async () => {
    const { stderr } = await kvane(["check", "colon.yaml"], { cwd: folder });
    expect(stderr.match(/error\[/g)).toHaveLength(1);
    expect(stderr).not.toMatch(/token|implicit|stream/i);
  });

  test("names of ions are checked, each with the right one", async () => {
    const { stderr } = await kvane(["check", "ions.yaml"], { cwd: folder });
    expect([...stderr.matchAll(/ions\.yaml:(\d)/g)].map(([, line]) => line)).toEqual(["3", "4", "5", "6"]);
    for (const text of ["write Mn7+", "`Xx` is no element", "write Fe3+"]) expect(stderr).toContain(text);
  });

  test("run names all that is missing at once, and no option that it has not", async () => {
    const { stderr } = await kvane(["run", "title.yaml"], { cwd: folder });
    for (const part of ["group", "cell", "sites", "peaks"]) expect(stderr).toContain(`at title.yaml (${part})`);
    expect(stderr).not.toContain("--site");
    expect(stderr).not.toContain("--cell");
  });

  test("check says plainly that a study is incomplete", async () => {
    const { status, stdout } = await kvane(["check", "title.yaml"], { cwd: folder });
    expect(status).toBe(0);
    expect(stdout).toContain("Incomplete");
  });

  test("long lists in an error are wrapped", async () => {
    const { stderr } = await kvane(
      ["index", "62", "--cell", "10 6 4 90 90 90", "--k", "0,0,0", "--peaks", "nonsense-header.txt"],
      {
        cwd: scratchFolder({ "nonsense-header.txt": "d nonsense\n1 2\n" }),
      },
    );
    expect(stderr).toContain("expected:");
    for (const line of stderr.split("\n")) expect([...line].length, line).toBeLessThanOrEqual(100);
  });
});

describe("what is understood", () => {
  test("--as 2theta", async () => {
    const words = ["index", "62", "--cell", "10.21 6.05 4.71 90 90 90", "--k", "0,1/2,0", "--peaks", "tt.txt"];
    const { status } = await kvane([...words, "--wavelength", "2.41", "--as", "2theta"], { cwd: folder });
    expect(status).toBe(0);
  });

  test("the bar of print: an overline that is combined with its digit", async () => {
    const { stdout } = await kvane(["ops", "Im3\u0305m"]);
    expect(stdout).toBe((await kvane(["ops", "I m -3 m"])).stdout);
  });

  test("what moved is echoed as it was typed", async () => {
    const { stdout } = await kvane(["run", "moved.yaml"], { cwd: folder });
    expect(stdout).toContain("(0.3333, 0.6667, 0)");
    expect(stdout).not.toContain("3333/10000");
  });

  test("left-handed axes are said, right-handed ones are not worth a word", async () => {
    expect((await kvane(["ops", "62 (a,c,b)"])).stdout).toContain("left-handed");
    expect((await kvane(["ops", "62 (b,c,a)"])).stdout).not.toContain("handed");
  });

  test("a wavelength ends the list at 2θ = 180°, and that is said", async () => {
    const words = ["satellites", "62", "--cell", "10.21 6.05 4.71 90 90 90", "--k", "0,1/2,0", "--json"];
    const answer = JSON.parse((await kvane([...words, "--q-max", "9", "--wavelength", "2.41"])).stdout);
    expect(answer.result.qMax).toBeCloseTo((4 * Math.PI) / 2.41, 9);
    expect(answer.assumed[0].because).toContain("180°");
    expect(answer.result.reflections.every((line: { twoThetaDeg: number | null }) => line.twoThetaDeg !== null)).toBe(
      true,
    );
  });
});

describe.skipIf(process.platform === "win32")("the process", () => {
  const long = ["satellites", "194", "--cell", "7.61 7.61 6.52 90 90 120", "--k", "0.1,0.2,0.3", "--q-max", "20"];

  test("a list longer than the memory is refused", async () => {
    const { status, stderr } = await kvaneProcess([...long.slice(0, -1), "45"]);
    expect(status).toBe(2);
    expect(stderr).toContain("at --q-max");
  });

  test.skipIf(!existsSync("/dev/full"))("a full disk is an error of one block, exit status 1", async () => {
    const { spawnSync } = await import("node:child_process");
    const { commandFile } = await import("./command.js");
    const { status, stderr } = spawnSync("sh", ["-c", '"$0" "$1" ops 62 > /dev/full', process.execPath, commandFile], {
      encoding: "utf8",
    });
    expect(stderr).toMatch(
      /^error\[output-failed\]: [^\n]*\n {2}expected: [^\n]*\n {2}found: {4}no room[^\n]*\n {2}remedy: [^\n]*\n$/,
    );
    expect(status).toBe(1);
  });

  test("a place that takes no file says so", async () => {
    const { status, stderr } = await kvaneProcess(["ops", "62", "--out", `${process.execPath}/x`]);
    expect(status).toBe(1);
    expect(stderr).toContain("error[output-failed]");
    expect(stderr).toContain("a file where a folder was named");
  });
});
