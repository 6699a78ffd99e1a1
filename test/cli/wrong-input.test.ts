import { readdirSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { kvane, scratchFolder } from "./command.js";

const study = (lines: readonly string[]) => `group: P n m a\n${lines.join("\n")}\n`;
const files = {
  "word.txt": "d su\n3.10 0.01\nabc 0.01\n",
  "good.txt": "d su\n3.10 0.01\n2.40 0.01\n",
  "empty.txt": "",
  "empty.yaml": "\n \n",
  "unknown-key.yaml": study(["cel: {a: 1}"]),
  "bad-number.yaml": study(["cell: {a: ten, b: 6, c: 4, alpha: 90, beta: 90, gamma: 90}"]),
  "bad-k.yaml": study(["k: [[0, x, 0]]"]),
  "no-at.yaml": study(["sites:", "  - {label: Fe}"]),
  "no-peaks-file.yaml": study([
    "cell: {a: 10, b: 6, c: 4, alpha: 90, beta: 90, gamma: 90}",
    "peaks: {file: none.csv, as: d}",
  ]),
  "bad-group.yaml": "title: x\ngroup: P n q a\n",
  "not-yaml.yaml": "group: [P n m a\ncell: }\n",
  "components.txt": "# S\n1 0 0.5+0.1i 0\n2 0 0.5+ 0\n",
  "no-atom.txt": "1 0 0 1\n5 0 0 1\n",
  "atom-twice.txt": "1 0 0 1\n1 0 0 1\n",
  "two-components.txt": "1 0 0\n",
  "quote.cif": "data_a\n_x 'open\n",
  "latin1.txt": new Uint8Array([0x64, 0x0a, 0xe9, 0x0a]),
};
const rows = ["modes", "62", "--k", "0,0.3,0", "--site", "A 0 0 0", "--read"];
const folder = scratchFolder(files);
const cell = ["--cell", "10 6 4 90 90 90"];

interface Case {
  readonly line: readonly string[];
  readonly code: string;
  /** What the line with the place must hold. */
  readonly place: string;
}

/** One row for each kind of wrong input, all of which the interface promises to answer with exit status 2. */
const cases: readonly Case[] = [
  { line: ["ops", "P n q a"], code: "unknown-group", place: "GROUP, column 1" },
  { line: ["ops", "300"], code: "unknown-group", place: "GROUP, column 1" },
  { line: ["ops", "x,y,z; -y,x,z+1/5"], code: "not-a-group", place: "GROUP, column 8" },
  { line: ["ops", "x,y,z; -y,x,q"], code: "syntax", place: "GROUP, column 13" },
  { line: ["ops", "62 (a,a,c)"], code: "singular-basis", place: "GROUP" },
  { line: ["ops", "62 (a,y,c)"], code: "syntax", place: "GROUP" },
  { line: ["ops"], code: "missing-argument", place: "GROUP" },
  { line: ["star", "62", "--k", "0,half,0"], code: "invalid-k", place: "--k, column 3" },
  { line: ["star", "62", "--k", "0,1/2"], code: "invalid-k", place: "--k" },
  { line: ["star", "62", "--k", "NaN,0,0"], code: "invalid-k", place: "--k, column 1" },
  { line: ["star", "62"], code: "missing-argument", place: "--k" },
  { line: ["atlas", "62", "--within", "-0.1"], code: "invalid-number", place: "--within" },
  { line: ["atlas", "62", "--within", "near"], code: "invalid-number", place: "--within" },
  { line: ["atlas", "62", "--k", "0,1/2"], code: "invalid-k", place: "--k" },
  { line: ["atlas", "62", "--cell", "10 6 4 90 100 90"], code: "cell-contradicts-group", place: "--cell" },
  { line: ["atlas"], code: "missing-argument", place: "GROUP" },
  { line: ["compatibility", "62"], code: "missing-argument", place: "--from" },
  { line: ["compatibility", "62", "--from", "0,0,0"], code: "missing-argument", place: "--to" },
  { line: ["compatibility", "62", "--from", "0,0,0", "--to", "0,half,0"], code: "invalid-k", place: "--to, column 3" },
  { line: ["compatibility", "62", "--from", "0,u,0", "--to", "u,v,0"], code: "invalid-k", place: "--from" },
  { line: ["compatibility", "62", "--from", "0,0.31,0", "--to", "0,u,0"], code: "invalid-k", place: "--from" },
  {
    line: ["compatibility", "62", "--from", "0,1/2,0", "--to", "0,0,u"],
    code: "k-not-on-manifold",
    place: "--to",
  },
  { line: ["modes", "62", "--k", "0,0,0", "--site", "Fe 0 0"], code: "invalid-site", place: "--site, column 7" },
  { line: ["modes", "62", "--k", "0,0,0", "--site", "Fe"], code: "invalid-site", place: "--site" },
  { line: ["modes", "62", "--k", "0,0,0", "--site", "Fe 0 0 NaN"], code: "invalid-site", place: "--site, column 8" },
  { line: ["modes", "62", "--k", "0,0,0"], code: "missing-argument", place: "--site" },
  ...["exponent", "phase", "factor", "components"].map((option) => ({
    line: ["modes", "62", "--k", "0,0,0", "--site", "A 0 0 0", `--${option}`, "nonsense"],
    code: "invalid-argument",
    place: `--${option}`,
  })),
  {
    line: ["modes", "62", "--k", "0,0,0", "--site", "A 0 0 0", "--components", "crystal"],
    code: "missing-argument",
    place: "--cell",
  },
  {
    line: ["modes", "62", ...cell, "--k", "0,u,0", "--site", "A 0 0 0", "--components", "cartesian"],
    code: "k-needs-values",
    place: "--k",
  },
  {
    line: ["modes", "62", "--k", "0,0,0", "--site", "A 0 0 0", "--cell", "10 6 4 90 100 90"],
    code: "cell-contradicts-group",
    place: "--cell",
  },
  {
    line: ["modes", "62", "--k", "0,0,0", "--site", "A 0 0 0", "--site", "B 1/2 0 1/2"],
    code: "duplicate-site",
    place: "--site",
  },
  { line: [...rows, "components.txt"], code: "invalid-component", place: "components.txt:3:5" },
  { line: [...rows, "no-atom.txt"], code: "invalid-component", place: "no-atom.txt:2:1" },
  { line: [...rows, "atom-twice.txt"], code: "invalid-component", place: "atom-twice.txt:2:1" },
  { line: [...rows, "two-components.txt"], code: "invalid-component", place: "two-components.txt:1" },
  { line: [...rows, "empty.txt"], code: "file-empty", place: "empty.txt" },
  { line: [...rows, "none.txt"], code: "file-not-found", place: "none.txt" },
  { line: [...rows, "no-atom.txt", "--site", "B 0.1 0.2 0.3"], code: "conflicting-arguments", place: "--read" },
  {
    line: ["modes", "62", "--k", "0,u,0", "--site", "A 0 0 0", "--read", "no-atom.txt"],
    code: "k-needs-values",
    place: "--k",
  },
  {
    line: ["satellites", "62", "--cell", "10 6 4 90 200 90", "--k", "0,0,0"],
    code: "invalid-cell",
    place: "--cell, column 11",
  },
  { line: ["satellites", "62", "--cell", "10 6 4 30 90 30", "--k", "0,0,0"], code: "invalid-cell", place: "--cell" },
  {
    line: ["satellites", "62", "--cell", "10 6 4 90 100 90", "--k", "0,0,0"],
    code: "cell-contradicts-group",
    place: "--cell",
  },
  {
    line: ["satellites", "62", "--cell", "10 NaN 4 90 90 90", "--k", "0,0,0"],
    code: "invalid-number",
    place: "--cell, column 4",
  },
  { line: ["satellites", "62", "--cell", "10 6 4", "--k", "0,0,0"], code: "invalid-cell", place: "--cell" },
  { line: ["satellites", "62", ...cell, "--k", "0,0,0", "--q-max", "NaN"], code: "invalid-number", place: "--q-max" },
  {
    line: ["satellites", "62", ...cell, "--k", "0,0,0", "--q-max", "Infinity"],
    code: "invalid-number",
    place: "--q-max",
  },
  {
    line: ["satellites", "62", ...cell, "--k", "0,0,0", "--wavelength", "-1"],
    code: "invalid-number",
    place: "--wavelength",
  },
  { line: ["satellites", "62", ...cell, "--k", "u,0,0"], code: "k-needs-values", place: "--k" },
  {
    line: ["index", "62", ...cell, "--k", "0,0,0", "--peaks", "word.txt"],
    code: "invalid-peak",
    place: "word.txt:3:1",
  },
  { line: ["index", "62", ...cell, "--k", "0,0,0", "--peaks", "none.txt"], code: "file-not-found", place: "none.txt" },
  { line: ["index", "62", ...cell, "--k", "0,0,0", "--peaks", "."], code: "file-unreadable", place: "." },
  {
    line: ["index", "62", ...cell, "--k", "0,0,0", "--peaks", "latin1.txt"],
    code: "file-unreadable",
    place: "latin1.txt",
  },
  { line: ["locate", "62", ...cell, "--peaks", "empty.txt", "--as", "d"], code: "file-empty", place: "empty.txt" },
  {
    line: ["locate", "62", ...cell, "--peaks", "good.txt", "--as", "nonsense"],
    code: "invalid-argument",
    place: "--as",
  },
  {
    line: ["locate", "62", ...cell, "--peaks", "good.txt", "--unmatched", "1.5"],
    code: "invalid-number",
    place: "--unmatched",
  },
  {
    line: ["locate", "62", ...cell, "--peaks", "good.txt", "--max-dimension", "4"],
    code: "invalid-number",
    place: "--max-dimension",
  },
  { line: ["locate", "62", ...cell], code: "missing-argument", place: "--peaks" },
  { line: ["check", "none.yaml"], code: "file-not-found", place: "none.yaml" },
  { line: ["check", "empty.yaml"], code: "file-empty", place: "empty.yaml" },
  { line: ["check", "unknown-key.yaml"], code: "unknown-key", place: "unknown-key.yaml:2:1" },
  { line: ["check", "bad-number.yaml"], code: "invalid-number", place: "bad-number.yaml:2:11" },
  { line: ["check", "bad-k.yaml"], code: "invalid-k", place: "bad-k.yaml:2" },
  { line: ["check", "no-at.yaml"], code: "missing-key", place: "no-at.yaml:3" },
  { line: ["check", "no-peaks-file.yaml"], code: "file-not-found", place: "no-peaks-file.yaml:3" },
  { line: ["check", "bad-group.yaml"], code: "unknown-group", place: "bad-group.yaml:2:8" },
  { line: ["check", "not-yaml.yaml"], code: "syntax", place: "not-yaml.yaml" },
  { line: ["run", "no-at.yaml"], code: "missing-key", place: "no-at.yaml:3" },
  { line: ["run"], code: "missing-argument", place: "STUDY" },
  { line: ["run", "--example", "--branches", "0"], code: "invalid-number", place: "--branches" },
  { line: ["check", "quote.cif"], code: "cif-syntax", place: "quote.cif:2:4" },
  { line: ["study", "quote.cif"], code: "cif-syntax", place: "quote.cif:2:4" },
  { line: ["study"], code: "missing-argument", place: "STUDY" },
  { line: ["check", "none.cif"], code: "file-not-found", place: "none.cif" },
  { line: ["ops", "quote.cif"], code: "cif-syntax", place: "quote.cif:2:4" },
  { line: ["star", "unknown-key.yaml", "--k", "0,0,0"], code: "unknown-key", place: "unknown-key.yaml:2:1" },
];

describe("wrong input", () => {
  const shown = cases.map((one) => [one.line.join(" "), one] as const);

  test.each(shown)("%s", async (_line, { line, code, place }) => {
    const { status, stdout, stderr } = await kvane(line, { cwd: folder });
    expect(status).toBe(2);
    expect(stdout).toBe("");
    expect(stderr.startsWith(`error[${code}]: `), stderr).toBe(true);
    const at = stderr.split("\n").find((line) => line.startsWith("  at "));
    expect(at?.startsWith(`  at ${place}`), stderr).toBe(true);
    for (const part of ["expected:", "remedy:"]) expect(stderr).toContain(`  ${part}`);
    // No stack trace: neither its lines nor files of ours.
    expect(stderr).not.toMatch(/^ {4}at |\.[jt]s:\d+/m);
  });

  test.each(shown)("leaves no output: %s", async (_line, { line }) => {
    const before = readdirSync(folder);
    const { status } = await kvane([...line, "--out", "result"], { cwd: folder });
    expect(status).toBe(2);
    expect(readdirSync(folder)).toEqual(before);
  });

  test("all problems of a line come at once", async () => {
    const { stderr } = await kvane(["satellites", "P n q a", "--cell", "1 2 3 90 90 NaN", "--k", "0,x,0"]);
    const codes = [...stderr.matchAll(/^error\[(.*?)\]/gm)].map(([, code]) => code);
    expect(codes.sort()).toEqual(["invalid-k", "invalid-number", "unknown-group"]);
  });

  test("the caret stands under the place", async () => {
    const { stderr } = await kvane(["star", "62", "--k", "0,half,0"]);
    const lines = stderr.split("\n");
    const source = lines.findIndex((line) => line.endsWith("0,half,0"));
    const caret = lines[source + 1] ?? "";
    expect(lines[source]?.[caret.indexOf("^")]).toBe("h");
  });

  test("the caret under a line of a file, tabs and long lines included", async () => {
    const row = `3.1\t${" ".repeat(200)}oops`;
    const at = scratchFolder({ "long.txt": `d su\n${row}\n` });
    const { stderr } = await kvane(["index", "62", ...cell, "--k", "0,0,0", "--peaks", "long.txt"], { cwd: at });
    const lines = stderr.split("\n");
    const caret = lines.findIndex((line) => /^ {4}\| *\^$/.test(line));
    expect(lines[caret - 1]?.[(lines[caret] ?? "").indexOf("^")]).toBe("o");
    expect(Math.max(...lines.map((line) => line.length))).toBeLessThanOrEqual(100);
  });
});
