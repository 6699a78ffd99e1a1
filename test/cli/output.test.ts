import { existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { kvane, scratchFolder } from "./command.js";

describe("--out FILE", () => {
  const folder = scratchFolder();

  test("writes what would be printed, and nothing beside it", async () => {
    const printed = await kvane(["ops", "62"], { cwd: folder });
    const { status, stdout, stderr } = await kvane(["ops", "62", "--out", "ops.txt"], { cwd: folder });
    expect({ status, stdout, stderr }).toEqual({ status: 0, stdout: "", stderr: "written: ops.txt\n" });
    expect(readFileSync(join(folder, "ops.txt"), "utf8")).toBe(printed.stdout);
    expect(readdirSync(folder)).toEqual(["ops.txt"]);
  });

  test("refuses an existing file, exit status 1, and replaces it with --force", async () => {
    writeFileSync(join(folder, "taken"), "precious");
    const refused = await kvane(["ops", "62", "--out", "taken"], { cwd: folder });
    expect(refused.status).toBe(1);
    expect(refused.stderr).toContain("error[output-exists]");
    expect(readFileSync(join(folder, "taken"), "utf8")).toBe("precious");
    const forced = await kvane(["ops", "62", "--out", "taken", "--force", "--quiet"], { cwd: folder });
    expect(forced).toEqual({ status: 0, stdout: "", stderr: "" });
    expect(readFileSync(join(folder, "taken"), "utf8")).toContain("P n m a");
  });

  test("leaves nothing where it cannot write, exit status 1", async () => {
    const before = readdirSync(folder);
    const missing = await kvane(["ops", "62", "--out", "no/such/folder.txt"], { cwd: folder });
    expect(missing.status).toBe(1);
    expect(missing.stderr).toContain("error[output-failed]");
    mkdirSync(join(folder, "a-folder"));
    const onFolder = await kvane(["ops", "62", "--out", "a-folder", "--force"], { cwd: folder });
    expect(onFolder.status).toBe(1);
    expect(readdirSync(folder)).toEqual([...before, "a-folder"].sort());
  });
});

describe("run --out DIR", () => {
  const folder = scratchFolder();
  const run = (...words: string[]) => kvane(["run", "--example", ...words], { cwd: folder });

  test("writes a folder whose files are those that the result names", async () => {
    const { status, stdout } = await run("--out", "results");
    expect(status).toBe(0);
    const answer = JSON.parse(readFileSync(join(folder, "results/result.json"), "utf8"));
    expect(readdirSync(join(folder, "results")).sort()).toEqual([...answer.result.files].sort());
    expect(readdirSync(folder)).toEqual(["results"]);
    const report = readFileSync(join(folder, "results/report.txt"), "utf8");
    // The report begins with the page that was printed, up to its last sections, and goes on with everything else.
    expect(report.slice(0, 200)).toBe(stdout.slice(0, 200));
    expect(report.length).toBeGreaterThan(stdout.length);
    for (const line of [...report.split("\n"), ...stdout.split("\n")])
      expect([...line].length, line).toBeLessThanOrEqual(100);
  });

  test("its tables agree with the JSON", () => {
    const { result } = JSON.parse(readFileSync(join(folder, "results/result.json"), "utf8"));
    const rows = readFileSync(join(folder, "results/branch-1-satellites.csv"), "utf8").trimEnd().split("\n");
    expect(rows.length - 1).toBe(result.branches[0].satellites.reflections.length);
    const [h, k, l, , , q] = (rows[1] as string).split(",").map(Number);
    const [first] = result.branches[0].satellites.reflections;
    expect([h, k, l]).toEqual(first.h);
    expect(q).toBe(first.q);
  });

  test("refuses an existing folder; --force replaces its own files and leaves others", async () => {
    writeFileSync(join(folder, "results/notes.txt"), "mine");
    const earlier = ["branch-9-modes.csv", "branch-9-configurations.svg", "branch-9-configuration-Gamma1.1.svg"];
    for (const name of earlier) writeFileSync(join(folder, "results", name), "of an earlier run");
    const refused = await run("--out", "results");
    expect(refused.status).toBe(1);
    expect(refused.stderr).toContain("error[output-exists]");
    const forced = await run("--out", "results", "--force", "--quiet");
    expect(forced).toMatchObject({ status: 0, stdout: "", stderr: "" });
    expect(readFileSync(join(folder, "results/notes.txt"), "utf8")).toBe("mine");
    for (const name of earlier) expect(existsSync(join(folder, "results", name)), name).toBe(false);
    expect(readdirSync(folder)).toEqual(["results"]);
  });

  test("writes nothing when the job fails", async () => {
    const { status } = await run("--k", "0,x,0", "--out", "other");
    expect(status).toBe(2);
    expect(readdirSync(folder)).toEqual(["results"]);
  });
});
