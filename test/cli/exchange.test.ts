import { describe, expect, test } from "vitest";
import { kvane, scratchFolder } from "./command.js";

const lattice = ["exchange", "P 1", "--cell", "4 4 10 90 90 90"];

describe("exchange", () => {
  test("a constant that no number can hold is refused at its place", async () => {
    const { status, stderr } = await kvane([...lattice, "--site", "M 0 0 0", "--j", "1 1e400"]);
    expect(status).toBe(2);
    expect(stderr).toContain("error[invalid-argument]");
    expect(stderr).toContain("at --j");
  });

  test("so it is in a study", async () => {
    const study =
      "group: P 1\ncell: {a: 4, b: 4, c: 10, alpha: 90, beta: 90, gamma: 90}\nsites: [{label: M, at: [0, 0, 0]}]\nexchange: [{shell: 1, j: 1e400}]\n";
    const { status, stderr } = await kvane(["exchange", "wide.yaml"], { cwd: scratchFolder({ "wide.yaml": study }) });
    expect(status).toBe(2);
    expect(stderr).toContain("wide.yaml:4");
  });

  test("atoms that lie on each other are refused", async () => {
    const { status, stderr } = await kvane([...lattice, "--site", "A 0 0 0", "--site", "B 0.001 0 0", "--j", "1 1"]);
    expect(status).toBe(2);
    expect(stderr).toContain("0.0040 Å apart");
  });

  test("constants that are all zero prefer no k", async () => {
    const { status, stdout } = await kvane([...lattice, "--site", "M 0 0 0", "--j", "1 0"]);
    expect(status).toBe(0);
    expect(stdout.replace(/\s+/g, " ")).toContain("every constant is zero: no bond acts");
    expect(stdout).not.toContain("ground state");
  });

  test("draws the ranges of a study, and says what is missing where there are none", async () => {
    const head =
      "group: P 4/m m m\ncell: {a: 4, b: 4, c: 40, alpha: 90, beta: 90, gamma: 90}\nsites: [{label: M, at: [0, 0, 0]}]\n";
    const cwd = scratchFolder({
      "range.yaml": `${head}exchange: [{shell: 1, j: 1}, {shell: 2, vary: [0, 1, 3]}]\n`,
      "none.yaml": `${head}exchange: [{shell: 1, j: 1}]\n`,
    });
    const drawn = await kvane(["exchange", "range.yaml", "--svg"], { cwd });
    expect(drawn.status).toBe(0);
    expect(drawn.stdout).toContain("<title>Phase diagram of the exchange model</title>");
    const missing = await kvane(["exchange", "none.yaml", "--svg"], { cwd });
    expect(missing.status).toBe(2);
    expect(missing.stderr).toContain("there is no phase diagram to draw");
    expect(missing.stderr.replace(/\s+/g, " ")).toContain("exchange: [{shell: 2, vary: [0, 1, 21]}]");
  });

  test("help on study points to the page of the study file", async () => {
    for (const words of [
      ["help", "study"],
      ["study", "--help"],
    ]) {
      const { status, stdout } = await kvane(words);
      expect(status).toBe(0);
      expect(stdout).toContain("kvane help study-file");
    }
  });
});
