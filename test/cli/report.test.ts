import { spawn, spawnSync } from "node:child_process";
import { chmodSync, mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { runCommand } from "../../packages/cli/src/run-command.ts";
import { commandFile, kvane, scratchFolder } from "./command.js";

/** A given k: nothing is searched for, so that it is quick. */
const quick = ["--example", "--k", "1/2,0,0"];

describe("kvane report", () => {
  const folder = scratchFolder();
  const report = (...words: string[]) => kvane(["report", ...quick, ...words], { cwd: folder });

  test.each([
    ["report.html", "<!DOCTYPE html>"],
    ["report.md", "# Oxide with two magnetic sites (invented), 1.8 K\n"],
    ["report.txt", "Oxide with two magnetic sites (invented), 1.8 K\n"],
    ["report.json", '{\n  "kvane": '],
  ])("writes %s by its ending, the same bytes each time", async (name, start) => {
    const first = await report("--out", name);
    expect(first).toEqual({ status: 0, stdout: "", stderr: `written: ${name}\n` });
    const text = readFileSync(join(folder, name), "utf8");
    expect(text.startsWith(start)).toBe(true);
    expect((await report("--out", name)).status).toBe(1);
    expect((await report("--out", name, "--force")).status).toBe(0);
    expect(readFileSync(join(folder, name), "utf8")).toBe(text);
  });

  test("refuses an ending that is no form of a report before it begins to work", async () => {
    const { status, stderr } = await kvane(["report", "no-such-study.yaml", "--out", "report.pdf"], { cwd: folder });
    expect(status).toBe(2);
    expect(stderr).toContain("at --out");
    expect(stderr).toContain(".html, .htm, .md, .txt, .json");
    expect(stderr).not.toContain("no-such-study");
  });

  test("prints the whole report without --out, and its JSON is that of run", async () => {
    const printed = await report();
    expect(printed.stdout).toContain("Basis");
    for (const line of printed.stdout.split("\n")) expect([...line].length, line).toBeLessThanOrEqual(100);
    const [own, whole] = await Promise.all([report("--json"), kvane(["run", ...quick, "--json"])]);
    expect(JSON.parse(own.stdout).result).toEqual(JSON.parse(whole.stdout).result);
  });

  test.each([
    ["again.md", "--out again.md"],
    ["once more.html", "--out &quot;once more.html&quot;"],
  ])("says how to repeat it, with the name of its file: %s", async (name, option) => {
    await report("--out", name);
    expect(readFileSync(join(folder, name), "utf8")).toContain(`kvane report --example --k 1/2,0,0 ${option}`);
  });
});

describe("the width of a terminal", () => {
  const printed = async (columns: number | null, ...words: string[]) => {
    let stdout = "";
    await runCommand(words, {
      write: (text) => {
        stdout += text;
      },
      writeError: () => {},
      showsProgress: false,
      columns,
      standardInput: async () => new Uint8Array(),
      folder: scratchFolder(),
      signal: { aborted: false },
    });
    return stdout;
  };

  test.each([60, 72, 80, 100])("of %d columns is kept", async (columns) => {
    for (const words of [
      ["run", ...quick],
      ["irreps", "P 21 3", "--k", "u,u,u", "--full"],
      ["atlas", "62"],
    ])
      for (const line of (await printed(columns, ...words)).split("\n"))
        expect([...line].length, line).toBeLessThanOrEqual(columns);
  });

  test("changes nothing where it is 100 or more, or where there is no terminal, nor in JSON and tables", async () => {
    const usual = await printed(null, "atlas", "62");
    expect(await printed(240, "atlas", "62")).toBe(usual);
    expect(await printed(70, "atlas", "62")).not.toBe(usual);
    expect(await printed(null, "atlas", "62")).toBe(usual);
    for (const form of ["--json", "--csv"])
      expect(await printed(70, "atlas", "62", form)).toBe(await printed(null, "atlas", "62", form));
  });
});

describe.skipIf(process.platform === "win32")("a folder of results is whole or not there", () => {
  const folder = scratchFolder();
  const command = (...words: string[]) => [commandFile, "run", ...quick, "--quiet", ...words];

  test("when there is no room for its largest file", () => {
    // A limit on the size of files, in KiB: the first ones fit, the page does not.
    const { status, stderr } = spawnSync(
      "bash",
      ["-c", 'ulimit -f 60; exec "$@"', "bash", process.execPath, ...command("--out", "results")],
      { cwd: folder, encoding: "utf8" },
    );
    expect(stderr).toContain("error[output-failed]");
    expect(stderr).toContain("a limit on the size of files");
    expect(status).toBe(1);
    expect(readdirSync(folder)).toEqual([]);
  });

  test("when the folder may not be written to", () => {
    mkdirSync(join(folder, "locked"));
    chmodSync(join(folder, "locked"), 0o500);
    // Modes of files bind root only without the capabilities to pass over them.
    const bound = ["setpriv", "--bounding-set", "-dac_override,-dac_read_search"];
    const words = [...(process.getuid?.() === 0 ? bound : []), process.execPath, ...command("--out", "locked/results")];
    const { status, stderr } = spawnSync(words[0] as string, words.slice(1), { cwd: folder, encoding: "utf8" });
    expect(stderr).toContain("no permission");
    expect(status).toBe(1);
    expect(readdirSync(join(folder, "locked"))).toEqual([]);
  });

  test("when a folder stands where a file would be replaced", async () => {
    const place = scratchFolder();
    expect((await kvane(["run", ...quick, "--out", "results"], { cwd: place })).status).toBe(0);
    const file = (name: string) => join(place, "results", name);
    writeFileSync(file("report.txt"), "before");
    rmSync(file("zone.svg"));
    mkdirSync(file("zone.svg"));
    const { status } = await kvane(["run", ...quick, "--out", "results", "--force"], { cwd: place });
    expect(status).toBe(1);
    expect(readFileSync(file("report.txt"), "utf8")).toBe("before");
    expect(readdirSync(place)).toEqual(["results"]);
  });

  test("when its place lies in a file", async () => {
    writeFileSync(join(folder, "a-file"), "");
    const { status } = await kvane(["run", ...quick, "--out", "a-file/results"], { cwd: folder });
    expect(status).toBe(1);
    expect(readdirSync(folder).filter((name) => name.startsWith("."))).toEqual([]);
  });

  test("when Ctrl-C comes at any time", async () => {
    const place = scratchFolder();
    for (const wait of [250, 700, 1100]) {
      const child = spawn(process.execPath, [commandFile, "run", "--example", "--quiet", "--out", "results"], {
        cwd: place,
      });
      const ended = new Promise<number | null>((resolve) => child.on("exit", (status) => resolve(status)));
      await new Promise((resolve) => setTimeout(resolve, wait));
      child.kill("SIGINT");
      const status = await ended;
      const left = readdirSync(place);
      if (status === 0) expect(readdirSync(join(place, "results"))).toContain("report.html");
      // Before its first line runs the process has no handler, and ends by the signal itself: null.
      else expect({ status: status ?? 130, left }).toEqual({ status: 130, left: [] });
      if (status === 0) break;
    }
  });
});
