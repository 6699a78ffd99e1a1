import { closeSync, openSync, readFileSync, truncateSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { cifPath, cifText } from "../support/cif-fixtures.js";
import { kvane, scratchFolder } from "./command.js";
import { schemaErrors } from "./schemas.js";

const structure = (name: string) => cifPath("structures", name);
const folder = scratchFolder({
  "nuclear.cif": cifText("structures", "old-names.cif"),
  "small.cif": cifText("structures", "number-only.cif"),
  "two.cif": cifText("structures", "two-blocks.cif"),
  "study.yaml": "title: by a CIF\nstructure: nuclear.cif\nk: [[1/2, 1/2, 1/2]]\n",
  "block.yaml": "structure: {file: two.cif, block: at_2K}\nk: [[0, 0, 1/2]]\n",
  "wrong.yaml": "title: x\nstructure: none.cif\n",
  "latin1.cif": new Uint8Array([...Buffer.from("data_a\n_x 'M"), 0xfc, ...Buffer.from("ller'\n")]),
  "latin1-letter.cif": new Uint8Array([...Buffer.from("data_a\n_x Ren"), 0xe9, 0x0a]),
  "bad.cif": "data_a\n_x 'open\n_y\n",
});
const json = async (words: readonly string[]) =>
  JSON.parse((await kvane([...words, "--json"], { cwd: folder })).stdout);

describe("kvane check FILE.cif", () => {
  test("gives cell, group and sites by the contract", async () => {
    const answer = await json(["check", "nuclear.cif"]);
    expect(schemaErrors("check", answer)).toEqual([]);
    expect(answer.result).toMatchObject({
      kind: "cif",
      blocks: ["old"],
      cell: { a: 4.445, b: 4.445, c: 4.445, alpha: 90, beta: 90, gamma: 90 },
      group: { number: 225, hermannMauguin: "F m -3 m" },
      sites: [
        { label: "Mn1", ion: "Mn2+", position: ["0", "0", "0"], multiplicity: 4 },
        { label: "O1", ion: "O2-", position: ["1/2", "1/2", "1/2"], multiplicity: 4 },
      ],
      cif: { version: "1.1", block: "old", symmetryFrom: "Hermann–Mauguin symbol", siteCount: 2 },
    });
  });

  test("lists several blocks, and takes the one that is named", async () => {
    const all = await json(["check", "two.cif"]);
    expect(schemaErrors("check", all)).toEqual([]);
    expect(all.result).toMatchObject({ blocks: ["global", "at_300K", "at_2K"], group: null, cell: null });
    expect(all.result.cif.structures.map(({ block }: { block: string }) => block)).toEqual(["at_300K", "at_2K"]);
    expect((await json(["check", "two.cif", "--block", "at_2k"])).result.group).toMatchObject({ number: 139 });
    const { status, stdout } = await kvane(["check", "two.cif"], { cwd: folder });
    expect(status).toBe(0);
    expect(stdout).toContain("--block at_300K");
  });

  test("--syntax looks at the grammar alone, to the letter", async () => {
    expect((await kvane(["check", cifPath("refused", "no-symmetry.cif"), "--syntax"])).status).toBe(0);
    expect((await kvane(["check", cifPath("refused", "no-symmetry.cif")])).status).toBe(2);
    const lax = await kvane(["check", cifPath("bad", "non-ascii.cif"), "--syntax"]);
    expect(lax.status).toBe(2);
    expect(lax.stderr).toContain("error[cif-characters]");
    const study = await kvane(["check", "study.yaml", "--syntax"], { cwd: folder });
    expect(study).toMatchObject({ status: 2 });
    expect(study.stderr).toContain("error[conflicting-arguments]");
  });

  test("says every problem with its line and a caret", async () => {
    const { status, stderr } = await kvane(["check", "bad.cif"], { cwd: folder });
    expect(status).toBe(2);
    expect(stderr).toContain(
      "error[cif-syntax]: a quotation mark is not closed\n  at bad.cif:2:4\n    | _x 'open\n    |    ^",
    );
    expect(stderr).toContain("error[cif-incomplete]: _y has no value\n  at bad.cif:3:1");
  });

  test("bytes that are no UTF-8 are refused with their offset", async () => {
    const { errors } = await json(["check", "latin1.cif"]);
    expect(errors).toMatchObject([
      { code: "file-unreadable", where: { line: 2, column: 6 }, found: "the byte 0xFC at offset 12" },
    ]);
    expect((await json(["check", "latin1-letter.cif"])).errors).toMatchObject([
      { code: "file-unreadable", where: { line: 2, column: 7 }, found: "the byte 0xE9 at offset 13" },
    ]);
  });

  test("a file beyond 256 MB is refused without being read", async () => {
    closeSync(openSync(join(folder, "huge.cif"), "w"));
    truncateSync(join(folder, "huge.cif"), 257 * 1024 * 1024);
    const { errors } = await json(["check", "huge.cif"]);
    expect(errors).toMatchObject([{ code: "file-too-large", found: "257 MB" }]);
  });

  test("reads standard input", async () => {
    const { stdout } = await kvane(["check", "-", "--json"], { input: cifText("structures", "old-names.cif") });
    expect(JSON.parse(stdout).result).toMatchObject({ kind: "cif", group: { number: 225 } });
  });
});

describe("kvane study FILE.cif", () => {
  test("writes a study that check finds right, and says what is missing", async () => {
    const written = await kvane(["study", "nuclear.cif", "--out", "drafted.yaml"], { cwd: folder });
    expect(written).toMatchObject({ status: 0, stdout: "" });
    const printed = await kvane(["study", "nuclear.cif"], { cwd: folder });
    expect(printed).toMatchObject({ status: 0, stderr: "" });
    expect(readFileSync(join(folder, "drafted.yaml"), "utf8")).toBe(printed.stdout);
    const { result } = await json(["check", "drafted.yaml"]);
    expect(result).toMatchObject({
      kind: "study",
      group: { number: 225 },
      missing: [expect.stringContaining("peak list")],
    });
    expect(result.sites.map(({ label }: { label: string }) => label)).toEqual(["Mn1"]);
  });

  test("its JSON follows the schema; warnings go to the error output", async () => {
    const path = structure("occupancy-and-disorder.cif");
    const answer = await json(["study", path]);
    expect(schemaErrors("study", answer)).toEqual([]);
    expect(answer.warnings).toHaveLength(5);
    const { stdout, stderr } = await kvane(["study", path]);
    expect(stdout).toBe(answer.result.study);
    expect(stderr.match(/warning\[cif-doubtful\]/g)).toHaveLength(5);
  });
});

describe("a CIF in place of group, cell and sites", () => {
  const k = ["--k", "1/2,1/2,1/2"];

  test("goes into every command as argument and as --structure", async () => {
    for (const words of [
      ["ops"],
      ["atlas"],
      ["star", ...k],
      ["irreps", ...k],
      ["compatibility", "--from", "0,0,0", "--to", "0,u,0"],
      ["modes", ...k],
      ["satellites", ...k],
      ["run", ...k],
      ["report", ...k],
    ]) {
      const [command = "", ...rest] = words;
      const argument = await json([command, "small.cif", ...rest]);
      const option = await json([command, "--structure", "small.cif", ...rest]);
      expect(argument.errors, command).toEqual([]);
      expect(option.result, command).toEqual(argument.result);
      expect(argument.result.group ?? argument.result.branches[0].star.group).toMatchObject({ number: 62 });
      expect(schemaErrors(command, argument)).toEqual([]);
    }
  });

  test("gives what the same things on the command line give", async () => {
    const cell = ["--cell", "4.445 4.445 4.445 90 90 90"];
    const typed = await json(["modes", "225", ...k, ...cell, "--site", "Mn1 0 0 0"]);
    expect((await json(["modes", "nuclear.cif", ...k])).result).toEqual(typed.result);
    expect((await json(["satellites", "nuclear.cif", ...k])).result).toEqual(
      (await json(["satellites", "225", ...k, ...cell, "--site", "Mn1 0 0 0"])).result,
    );
  });

  test("--site LABEL takes a site of the CIF", async () => {
    const { result } = await json(["modes", "nuclear.cif", ...k, "--site", "O1"]);
    expect(result.sites).toMatchObject([{ label: "O1", position: ["1/2", "1/2", "1/2"] }]);
    const { errors } = await json(["modes", "nuclear.cif", ...k, "--site", "Fe9"]);
    expect(errors).toMatchObject([{ code: "invalid-site", where: { argument: "--site" }, expected: "one of Mn1, O1" }]);
  });

  test("an option beside it wins, and another group than its own is said", async () => {
    const other = await json(["ops", "221", "--structure", "nuclear.cif"]);
    expect(other.result.group.number).toBe(221);
    expect(other.warnings).toMatchObject([{ code: "cif-contradiction", expected: "F m -3 m", found: "221" }]);
    const same = await json(["ops", "F m -3 m", "--structure", "nuclear.cif"]);
    expect(same.warnings).toEqual([]);
    const cell = await json(["satellites", "nuclear.cif", ...k, "--cell", "5 5 5 90 90 90"]);
    expect(cell.result.cell.a).toBe(5);
    expect(cell.assumed).toContainEqual(expect.objectContaining({ what: "unit cell", value: "5 5 5 90 90 90" }));
  });

  test("serves a study through `structure:`, and --structure wins over the study", async () => {
    const run = await json(["run", "study.yaml"]);
    expect(run.errors).toEqual([]);
    expect(run.result).toMatchObject({ title: "by a CIF", group: { number: 225 } });
    expect((await json(["check", "study.yaml"])).result).toMatchObject({
      kind: "study",
      missing: [],
      group: { number: 225 },
    });
    expect((await json(["star", "block.yaml"])).result.group.number).toBe(139);
    const option = await json(["star", "study.yaml", "--structure", "two.cif", "--block", "at_2K", ...k]);
    expect(option.result.group.number).toBe(139);
  });

  test("is missed where the study names it", async () => {
    const { errors } = await json(["check", "wrong.yaml"]);
    expect(errors).toMatchObject([
      { code: "file-not-found", where: { file: "wrong.yaml", line: 2, path: "structure" } },
    ]);
  });

  test.each([
    [["ops", "nuclear.cif", "--structure", "two.cif"], "conflicting-arguments", "--structure"],
    [["ops", "62", "--block", "a"], "conflicting-arguments", "--block"],
    [["ops", "two.cif"], "cif-block", null],
    [["ops", "two.cif", "--block", "none"], "cif-block", "--block"],
    [["ops", "--structure", "none.cif"], "file-not-found", "--structure"],
    [["ops", cifPath("refused", "no-symmetry.cif")], "cif-missing", null],
  ])("%j is refused", async (words, code, argument) => {
    const { errors } = await json(words);
    expect(errors).toMatchObject([{ code, where: { argument } }]);
  });

  test("a part that a command does not need may be missing", async () => {
    expect((await kvane(["ops", cifPath("refused", "cartesian.cif")])).status).toBe(0);
    expect((await kvane(["satellites", cifPath("refused", "no-symmetry.cif"), "62", ...k])).status).toBe(2);
    expect((await kvane(["satellites", "62", "--structure", cifPath("refused", "no-symmetry.cif"), ...k])).status).toBe(
      0,
    );
  });
});
