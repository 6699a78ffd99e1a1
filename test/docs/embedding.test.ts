import { spawnSync } from "node:child_process";
import { chmodSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { build } from "esbuild";
import { describe, expect, test } from "vitest";
import { commandFile, kvane, scratchFolder } from "../cli/command.js";
import { batchLines } from "../support/batch-requests.js";
import { root } from "../tools/paths.mjs";

const page = readFileSync(join(root, "docs/embedding.md"), "utf8");
const blocks = (language: string) =>
  [...page.matchAll(new RegExp(`^\`\`\`${language}\\n([\\s\\S]*?)^\`\`\`$`, "gm"))].map(([, text]) => text as string);

const has = (program: string) => !spawnSync(program, ["--version"]).error;

/** A title that says why a test is skipped. */
const needing = (program: string, title: string) =>
  `${title}${has(program) ? "" : ` (skipped: there is no ${program})`}`;

/** A folder with the name `kvane` as a program, as an installed package gives it. */
function folderWithKvane(files: { readonly [name: string]: string }): { cwd: string; env: NodeJS.ProcessEnv } {
  const cwd = scratchFolder(files);
  writeFileSync(join(cwd, "kvane"), `#!/bin/sh\nexec "${process.execPath}" "${commandFile}" "$@"\n`);
  chmodSync(join(cwd, "kvane"), 0o755);
  return { cwd, env: { ...process.env, HOME: cwd, PATH: `${cwd}:${process.env["PATH"]}` } };
}

describe.skipIf(process.platform === "win32")("docs/embedding.md", () => {
  const shell = blocks("sh");
  const piped = shell.filter((text) => text.startsWith("echo"));
  const spread = shell.filter((text) => text.startsWith("parallel"));

  test("has no block for a shell that is not run here", () => {
    expect([piped.length, spread.length, shell.length]).toEqual([1, 1, 2]);
  });

  test("its first line for a shell answers", async () => {
    const { stdout, stderr, status } = spawnSync("sh", ["-c", piped[0] as string], {
      ...folderWithKvane({}),
      encoding: "utf8",
    });
    expect({ stderr, status }).toEqual({ stderr: "", status: 0 });
    const single = JSON.parse((await kvane(["irreps", "P n m a", "--k", "0,1/2,0", "--json"])).stdout);
    expect(JSON.parse(stdout)).toEqual({ id: 1, ...single });
  });

  // The documented line takes 100 requests to a process; here there are three processes.
  test.skipIf(!has("parallel"))(
    needing("parallel", "its line for GNU parallel gives the answers of one process, in order"),
    async () => {
      const requests = batchLines(240);
      const { cwd, env } = folderWithKvane({ "requests.jsonl": requests });
      const { status, stderr } = spawnSync("sh", ["-c", spread[0] as string], { cwd, env, encoding: "utf8" });
      expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
      const alone = await kvane(["batch", "--quiet"], { input: requests });
      expect(readFileSync(join(cwd, "answers.jsonl"), "utf8") === alone.stdout).toBe(true);
    },
    120_000,
  );

  test("its requests in JSON are requests", async () => {
    const requests = blocks("json").map((text) => JSON.parse(text));
    expect(requests).toHaveLength(2);
    const input = requests.map((one) => `${JSON.stringify(one)}\n`).join("");
    const { stdout } = await kvane(["batch"], { input, cwd: scratchFolder() });
    // The files that they name are not here, and nothing else is wrong with them.
    const codes = stdout
      .trimEnd()
      .split("\n")
      .map((text) => JSON.parse(text).errors[0].code);
    expect(codes).toEqual(["file-not-found", "syntax"]);
  });

  test("its lines for the library run", async () => {
    const { outputFiles } = await build({
      stdin: { contents: blocks("ts")[0] as string, resolveDir: root, loader: "ts" },
      bundle: true,
      format: "esm",
      platform: "browser",
      conditions: ["kvane-source"],
      write: false,
    });
    const { stdout, stderr } = spawnSync(process.execPath, ["--input-type=module"], {
      input: outputFiles[0]?.text ?? "",
      encoding: "utf8",
    });
    expect({ stdout, stderr }).toEqual({ stdout: "0 1\n", stderr: "" });
  });
});

test("the example of worker threads says what it wants, and what is wrong, in a line", () => {
  const program = join(root, "docs/examples/embedding/worker-threads.mjs");
  const run = (...words: string[]) => {
    const { stderr, status } = spawnSync(process.execPath, [program, ...words], { encoding: "utf8" });
    return { stderr, status };
  };
  expect(run()).toEqual({ stderr: "usage: node worker-threads.mjs STUDY.yaml\n", status: 2 });
  const folder = scratchFolder({ "empty.yaml": "title: none\n" });
  const { stderr, status } = run(join(folder, "empty.yaml"));
  expect(status).toBe(1);
  expect(stderr).toMatch(/^the study has no .*\n$/);
});

// Dimensions by the sum rule Σd² = order of the little co-group: 8 of m m m at Γ, 8 with two irreps of 2 on the face
// (Bradley & Cracknell, 1972), 12 of -6 m 2 at K.
test.skipIf(!has("python3"))(
  needing("python3", "the example in Python prints what it should"),
  () => {
    const program = join(root, "docs/examples/embedding/batch.py");
    const words = [program, process.execPath, commandFile];
    const { stdout, stderr, status } = spawnSync("python3", words, { encoding: "utf8", cwd: scratchFolder() });
    expect({ stderr, status }).toEqual({ stderr: "", status: 0 });
    expect(stdout.split("\n")).toEqual([
      "P n m a at (0,0,0): dimensions 1 1 1 1 1 1 1 1",
      "P n m a at (0,1/2,0): dimensions 2 2",
      "P 63/m m c at (1/3,1/3,0): dimensions 1 1 1 1 2 2",
      "(0,1/2,0) explains 3 of 3 peaks",
      "unknown-group: `P n q a` is in no table of space groups",
      "",
    ]);
  },
  60_000,
);
