import { spawnSync } from "node:child_process";
import { problemCodes } from "@kvane/core/errors";
import { commandTable } from "@kvane/core/job";
import { describe, expect, test } from "vitest";
import { kvane, scratchFolder } from "./command.js";

const has = (program: string) => spawnSync(program, ["-c", "exit 0"]).status === 0;

describe("kvane completion", () => {
  test.each(["bash", "zsh", "fish"])("%s names every command and its options", async (shell) => {
    const { status, stdout, stderr } = await kvane(["completion", shell]);
    expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
    for (const command of Object.keys(commandTable)) expect(stdout).toContain(command);
    for (const option of ["max-dimension", "two-theta", "wavelength"]) expect(stdout).toContain(option);
  });

  test.each([["completion"], ["completion", "tcsh"]])("%j says which shells there are", async (...words) => {
    const { status, stdout, stderr } = await kvane(words);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toContain("bash, zsh, fish");
  });

  test.skipIf(!has("bash"))("bash completes commands, options, values, topics, codes and files", async () => {
    const script = (await kvane(["completion", "bash"])).stdout;
    const folder = scratchFolder({ "study.yaml": "", "peaks.csv": "" });
    const complete = (...words: string[]): string[] => {
      const probe = `COMP_WORDS=("$@"); COMP_CWORD=$(($# - 1)); _kvane; printf "%s\\n" "\${COMPREPLY[@]}"`;
      const run = spawnSync("bash", ["-c", `${script}\n${probe}`, "bash", ...words], { cwd: folder, encoding: "utf8" });
      expect(run.stderr).toBe("");
      return run.stdout.trim().split("\n").sort();
    };
    expect(complete("kvane", "loc")).toEqual(["locate"]);
    expect(complete("kvane", "locate", "--max")).toEqual(["--max-dimension"]);
    expect(complete("kvane", "locate", "--as", "")).toEqual(["d", "hkl", "q", "two-theta"]);
    expect(complete("kvane", "locate", "--peaks", "pe")).toEqual(["peaks.csv"]);
    expect(complete("kvane", "run", "st")).toEqual(["study.yaml"]);
    expect(complete("kvane", "ops", "--cs")).toEqual([""]);
    expect(complete("kvane", "help", "conv")).toEqual(["conventions"]);
    expect(complete("kvane", "explain", "").length).toBe(Object.keys(problemCodes).length);
  });

  test.each(["zsh", "fish"].filter(has))("%s reads its script", async (shell) => {
    const script = (await kvane(["completion", shell])).stdout;
    const { status, stderr } = spawnSync(shell, ["-n", "/dev/stdin"], { input: script, encoding: "utf8" });
    expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
  });
});
