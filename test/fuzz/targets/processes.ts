import { spawn } from "node:child_process";
import { join } from "node:path";
import { root } from "../../tools/paths.mjs";
import { target } from "../target.js";
import { inFolder, type LineInput, type LineResult, spoiltLine } from "./lines.js";

/** The built command. */
const command = process.env["KVANE_TEST_COMMAND"] ?? join(root, "packages/cli/bin/kvane.js");

/** Milliseconds after which a process counts as hung. */
const hung = 60_000;

/** A whole process for each line: what only it shows, from the first byte of standard input to the exit status. */
export const processTarget = target<LineInput>({
  name: "process",
  share: 50,
  few: 4,
  // Of this process; that of the other one is watched by the clock.
  patience: 5,
  make: spoiltLine,
  run: (input) => inFolder(input, (folder) => processOf(input, folder)),
});

function processOf({ words, input }: LineInput, cwd: string): Promise<LineResult> {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, [command, ...words], { cwd, timeout: hung, killSignal: "SIGKILL" });
    let stdout = "";
    let stderr = "";
    child.stdout.setEncoding("utf8").on("data", (text: string) => {
      stdout += text;
    });
    child.stderr.setEncoding("utf8").on("data", (text: string) => {
      stderr += text;
    });
    child.on("error", reject);
    child.on("close", (status) => resolve({ status, stdout, stderr }));
    // One that does not read closes the pipe.
    child.stdin.on("error", () => {});
    child.stdin.end(Buffer.from(input, "latin1"));
  });
}
