import { spawn } from "node:child_process";
import {
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  rmSync,
  statSync,
  symlinkSync,
  writeFileSync,
} from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { runCommand } from "../../packages/cli/src/run-command.ts";
import { commandFile, kvane, kvaneProcess, scratchFolder } from "./command.js";

/** Places that take no output, on systems that have them. */
describe.skipIf(process.platform === "win32")("output that cannot be written", () => {
  const folder = scratchFolder();
  const onFullDisk = (words: readonly string[], to: string) =>
    new Promise<{ status: number | null; stderr: string }>((resolve, reject) => {
      const child = spawn("sh", ["-c", `exec "$0" "$@" ${to}`, process.execPath, commandFile, ...words]);
      let stderr = "";
      child.stderr.setEncoding("utf8").on("data", (text: string) => {
        stderr += text;
      });
      child.on("error", reject);
      child.on("close", (status) => resolve({ status, stderr }));
    });

  /** Runs a line in the folder; something happens there before anything is written. */
  const meanwhile = async (words: readonly string[], happens: () => void) => {
    let stderr = "";
    const status = await runCommand(words, {
      write: () => {},
      writeError: (text) => {
        stderr += text;
      },
      showsProgress: false,
      standardInput: async () => new Uint8Array(),
      folder,
      signal: {
        // It is asked between the work and the writing at the latest.
        get aborted() {
          happens();
          return false;
        },
      },
    });
    return { status, stderr };
  };

  test.skipIf(!existsSync("/dev/full"))("a full disk behind the output ends it with status 1", async () => {
    for (const words of [["ops", "62"], ["ops", "62", "--json"], ["help"]]) {
      const { status, stderr } = await onFullDisk(words, "> /dev/full");
      expect(status, words.join(" ")).toBe(1);
      expect(stderr).toContain("error[output-failed]");
      expect(stderr).toContain("no room left on the device");
    }
  });

  test.skipIf(!existsSync("/dev/full"))("a full disk behind both outputs ends it with status 1", async () => {
    expect((await onFullDisk(["ops", "62"], "> /dev/full 2> /dev/full")).status).toBe(1);
  });

  test.skipIf(!existsSync("/dev/full"))(
    "a full disk behind the error output alone does not hide the status",
    async () => {
      expect((await onFullDisk(["ops", "nonsense"], "2> /dev/full")).status).not.toBe(0);
    },
  );

  test.skipIf(!existsSync("/dev/full"))("a device is not replaced by a file", async () => {
    const before = statSync("/dev/full");
    const link = join(folder, "link");
    symlinkSync("/dev/full", link);
    const kept = await kvane(["ops", "62", "--out", "link"], { cwd: folder });
    expect(kept.status).toBe(1);
    expect(kept.stderr).toContain("error[output-exists]");
    const forced = await kvane(["ops", "62", "--out", "link", "--force"], { cwd: folder });
    // The name was replaced, not what it led to.
    expect(forced.status).toBe(0);
    expect(statSync("/dev/full").rdev).toBe(before.rdev);
    expect(readFileSync(link, "utf8")).toContain("P n m a");
    rmSync(link);
  });

  test.each([
    ["a file", ["ops", "62", "--out", "gone/ops.txt"]],
    ["a folder", ["run", "--example", "--k", "1/2,0,0", "--out", "gone/results"]],
  ])("the folder removed while the work is done leaves no part of %s", async (_what, words) => {
    mkdirSync(join(folder, "gone"), { recursive: true });
    const { status, stderr } = await meanwhile(words, () =>
      rmSync(join(folder, "gone"), { recursive: true, force: true }),
    );
    expect(status).toBe(1);
    expect(stderr).toContain("error[output-failed]");
    expect(stderr).toContain("a folder that does not exist");
    expect(readdirSync(folder)).toEqual([]);
  });

  test("a file that appears while the work is done is not replaced", async () => {
    const path = join(folder, "late.txt");
    const { status, stderr } = await meanwhile(["ops", "62", "--out", "late.txt"], () =>
      writeFileSync(path, "precious"),
    );
    expect(status).toBe(1);
    expect(stderr).toContain("error[output-exists]");
    expect(readFileSync(path, "utf8")).toBe("precious");
    expect(readdirSync(folder)).toEqual(["late.txt"]);
    rmSync(path);
  });

  test("a batch system that ends it leaves nothing", async () => {
    const words = ["satellites", "194", "--cell", "7.61 7.61 6.52 90 90 120", "--k", "0.1,0.2,0.3", "--q-max", "20"];
    let status: number | null = null;
    // It works for seconds; the handler is in place once it has begun, which takes longer on a busy machine.
    for (const wait of [700, 2800]) {
      const child = spawn(process.execPath, [commandFile, ...words, "--out", "list.txt"], { cwd: folder });
      const ended = new Promise<number | null>((resolve) => child.on("exit", resolve));
      await new Promise((resolve) => setTimeout(resolve, wait));
      child.kill("SIGTERM");
      status = await ended;
      if (status !== null) break;
    }
    expect(status).toBe(130);
    expect(readdirSync(folder)).toEqual([]);
  });
});

describe("input without end", () => {
  test.skipIf(!existsSync("/dev/zero"))("a device that never ends is refused", async () => {
    const { status, stderr } = await kvane(["check", "/dev/zero"]);
    expect(status).toBe(2);
    expect(stderr).toContain("error[file-too-large]");
  });

  test.skipIf(!existsSync("/dev/zero"))("standard input that never ends is refused", async () => {
    const { status, stderr } = await new Promise<{ status: number | null; stderr: string }>((resolve, reject) => {
      const child = spawn("sh", ["-c", `"$0" "$1" check - < /dev/zero`, process.execPath, commandFile]);
      let text = "";
      child.stderr.setEncoding("utf8").on("data", (part: string) => {
        text += part;
      });
      child.on("error", reject);
      child.on("close", (status) => resolve({ status, stderr: text }));
    });
    expect(status).toBe(2);
    expect(stderr).toContain("error[file-too-large]");
    expect((await kvaneProcess(["--version"])).status).toBe(0);
  });
});
