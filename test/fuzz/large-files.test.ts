import { closeSync, ftruncateSync, openSync, statSync, writeSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { kvane, kvaneProcess, scratchFolder } from "../cli/command.js";

/** With KVANE_LARGE_FILES=1 the files have the size of the worst that is promised; else they are small enough for every run. */
const full = process.env["KVANE_LARGE_FILES"] === "1";
const megabytes = full ? 100 : 3;
const rows = full ? 1_000_000 : 10_000;
const patience = full ? 600_000 : 60_000;

const cell = ["--cell", "10.21 6.05 4.71 90 90 90"];

describe("large files", { timeout: patience }, () => {
  const folder = scratchFolder();

  /** Writes a file in pieces, so that it need not be held as a whole. */
  const written = (name: string, pieces: Iterable<string>): string => {
    const file = openSync(join(folder, name), "w");
    for (const piece of pieces) writeSync(file, piece);
    closeSync(file);
    return name;
  };
  function* repeated(head: string, count: number, row: (index: number) => string): Generator<string> {
    yield head;
    for (let from = 0; from < count; from += 10_000)
      yield Array.from({ length: Math.min(10_000, count - from) }, (_, index) => row(from + index)).join("");
  }
  const head =
    "data_big\n_cell_length_a 10.21\n_cell_length_b 6.05\n_cell_length_c 4.71\n_cell_angle_alpha 90\n_cell_angle_beta 90\n_cell_angle_gamma 90\n_space_group_IT_number 62\nloop_\n_atom_site_label\n_atom_site_fract_x\n_atom_site_fract_y\n_atom_site_fract_z\nFe1 0 0 0\n";

  test(`a CIF of ${megabytes} MB with raw data behind its structure is read`, async () => {
    const row = (index: number) => `${index} ${index % 977}.${index % 1000} ${index % 31}\n`;
    const count = Math.ceil((megabytes * 2 ** 20) / 19);
    const name = written(
      "raw.cif",
      repeated(`${head}loop_\n_pd_meas_point_id\n_pd_meas_counts_total\n_x\n`, count, row),
    );
    expect(statSync(join(folder, name)).size).toBeGreaterThan(megabytes * 0.7 * 2 ** 20);
    const { status, stderr } = await kvaneProcess(["ops", name], { cwd: folder });
    expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
  });

  test(`a CIF of ${megabytes} MB in one text field is read`, async () => {
    const line = `${"x".repeat(99)}\n`;
    const name = written(
      "text.cif",
      repeated(`${head}_x\n;\n`, megabytes * 10_486, () => line),
    );
    const { status, stderr } = await kvaneProcess(["check", name], { cwd: folder });
    // The text field has no end: that is what there is to say, and where.
    expect(status).toBe(2);
    expect(stderr).toMatch(/error\[cif-syntax\].*\n {2}at text\.cif:16/);
  });

  test.each([
    [
      "peaks",
      ["index", "62", ...cell, "--k", "0,1/2,0", "--as", "d", "--peaks"],
      (index: number) => `${2 + index / rows} 0.001\n`,
    ],
    ["words", ["index", "62", ...cell, "--k", "0,1/2,0", "--as", "d", "--peaks"], () => "no number here\n"],
    [
      "intensities",
      ["weigh", "--example", "--k", "0,1/2,0", "--as", "d", "--intensities"],
      (index: number) => `${2 + index / rows} 5 1\n`,
    ],
    ["temperatures", ["onset"], (index: number) => `${1 + index / rows} 5 1\n`],
    ["moments", ["decompose", "--parent", "study.yaml"], (index: number) => `Fe${index} 0 0 0 1 0 0\n`],
    [
      "components",
      ["modes", "62", "--k", "0,0.3,0", "--site", "A 0 0 0", "--read"],
      (index: number) => `${index + 1} 0 0 1\n`,
    ],
  ] as const)(`a list of ${rows} rows of %s gets an answer or a refusal`, async (what, words, row) => {
    written("study.yaml", [
      "group: P n m a\ncell: {a: 10.21, b: 6.05, c: 4.71, alpha: 90, beta: 90, gamma: 90}\nsites: [{label: Fe, at: [0, 0, 0]}]\n",
    ]);
    const name = written(`${what}.txt`, repeated("", rows, row));
    const first = what === "moments" ? [words[0] as string, name, ...words.slice(1)] : [...words, name];
    const { status, stderr } = await kvaneProcess([...first, "--quiet"], { cwd: folder });
    expect([0, 1, 2], stderr.slice(0, 500)).toContain(status);
    expect(stderr).not.toMatch(/internal-fault|heap/);
    if (status !== 0) expect(stderr).toMatch(/^error\[/);
    // What is wrong with a million rows is not said a million times.
    expect(stderr.length).toBeLessThan(100_000);
  });

  test("a file above 256 MB is refused unread", async () => {
    const file = openSync(join(folder, "sparse.cif"), "w");
    ftruncateSync(file, 256 * 2 ** 20 + 1);
    closeSync(file);
    for (const words of [
      ["check", "sparse.cif"],
      ["ops", "--structure", "sparse.cif"],
      ["onset", "sparse.cif"],
    ]) {
      const { status, stderr } = await kvane(words, { cwd: folder });
      expect(status).toBe(2);
      expect(stderr).toContain("error[file-too-large]");
      expect(stderr).toContain("257 MB");
    }
  });
});
