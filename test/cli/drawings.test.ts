import { existsSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { wellFormed } from "../support/well-formed.js";
import { kvane, scratchFolder } from "./command.js";

const square = ["exchange", "P 4/m m m", "--cell", "4 4 10 90 90 90", "--site", "M 0 0 0", "--j", "1 1"];

describe("--svg", () => {
  const folder = scratchFolder();

  test("prints the drawing, or writes it to a file", async () => {
    const printed = await kvane(["onset", "--example", "--svg"]);
    expect(printed).toMatchObject({ status: 0, stderr: "" });
    expect(wellFormed(printed.stdout)).toBe(true);
    const written = await kvane(["onset", "--example", "--svg", "--out", "scan.svg"], { cwd: folder });
    expect(written).toEqual({ status: 0, stdout: "", stderr: "written: scan.svg\n" });
    expect(readFileSync(join(folder, "scan.svg"), "utf8")).toBe(printed.stdout);
  });

  test("draws a phase diagram, and asks for a constant that runs", async () => {
    const drawn = await kvane([...square, "--vary", "2 0 1 3", "--svg"]);
    expect(drawn.status).toBe(0);
    expect(drawn.stdout).toContain("Phase diagram");
    const { status, stdout, stderr } = await kvane([...square, "--svg", "--out", "none.svg"], { cwd: folder });
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toContain("at --vary");
    expect(existsSync(join(folder, "none.svg"))).toBe(false);
  });

  test("is one form of output among others", async () => {
    const { status, stderr } = await kvane(["onset", "--example", "--svg", "--csv"]);
    expect(status).toBe(2);
    expect(stderr).toContain("--csv and --svg are both given");
  });
});

test("run draws the scan of the study", async () => {
  const folder = scratchFolder();
  const { status, stdout } = await kvane(["run", "--example", "--k", "1/2,0,0", "--out", "result"], { cwd: folder });
  expect(status).toBe(0);
  expect(stdout).toContain("Transitions (2)");
  expect(wellFormed(readFileSync(join(folder, "result/onset.svg"), "utf8"))).toBe(true);
  expect(readFileSync(join(folder, "result/report.html"), "utf8")).toContain("figure-onset");
});
