import { spawn } from "node:child_process";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll } from "vitest";
import { runCommand } from "../../packages/cli/src/run-command.ts";

/** The built command: that of the workspace or the packed one (test/tools/targets.mjs). */
export const commandFile = process.env["KVANE_TEST_COMMAND"] as string;

export interface Run {
  readonly status: number | null;
  readonly stdout: string;
  readonly stderr: string;
}

export interface RunOptions {
  /** Folder that relative names count from. */
  readonly cwd?: string;
  /** Text on standard input. */
  readonly input?: string;
}

/** Does what `kvane WORDS` does, in this process: the same code with other surroundings. */
export async function kvane(words: readonly string[], options: RunOptions = {}): Promise<Run> {
  let stdout = "";
  let stderr = "";
  const status = await runCommand(words, {
    write: (text) => {
      stdout += text;
    },
    writeError: (text) => {
      stderr += text;
    },
    showsProgress: false,
    standardInput: async () => new TextEncoder().encode(options.input ?? ""),
    folder: options.cwd ?? tmpdir(),
    signal: { aborted: false },
  });
  return { status, stdout, stderr };
}

/** Runs the built command in a process of its own. Colour settings of the caller do not count. */
export function kvaneProcess(
  words: readonly string[],
  options: RunOptions & { readonly env?: NodeJS.ProcessEnv } = {},
): Promise<Run> {
  return new Promise((resolve, reject) => {
    const { FORCE_COLOR: _force, NO_COLOR: _no, ...env } = process.env;
    const child = spawn(process.execPath, [commandFile, ...words], {
      cwd: options.cwd ?? tmpdir(),
      env: { ...env, ...options.env },
    });
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
    child.stdin.on("error", () => {});
    child.stdin.end(options.input ?? "");
  });
}

/** A folder for one file of tests, removed after it; `files` by name. */
export function scratchFolder(files: { readonly [name: string]: string | Uint8Array } = {}): string {
  const folder = mkdtempSync(join(tmpdir(), "kvane-cli-"));
  for (const [name, text] of Object.entries(files)) writeFileSync(join(folder, name), text);
  afterAll(() => rmSync(folder, { recursive: true, force: true }));
  return folder;
}

/** The words of a line as a shell would make them; knows double quotation marks, which is all that examples use. */
export function shellWords(line: string): string[] {
  return [...line.matchAll(/"([^"]*)"|(\S+)/g)].map(([, quoted, bare]) => quoted ?? bare ?? "");
}
