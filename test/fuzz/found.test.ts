import { readFileSync } from "node:fs";
import { join } from "node:path";
import { parseCif, parseMomentList, readCifStructure, readMagneticCif } from "@kvane/core/files";
import { describe, expect, test } from "vitest";
import { kvane, scratchFolder } from "../cli/command.js";
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

describe("found by fuzzing: commands", () => {
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
