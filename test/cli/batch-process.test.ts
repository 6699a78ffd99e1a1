import { type ChildProcess, spawn, spawnSync } from "node:child_process";
import { once } from "node:events";
import { createInterface } from "node:readline";
import { describe, expect, test } from "vitest";
import { linesOf } from "../../packages/cli/src/batch/lines-of.ts";
import { batchLines, batchRequest } from "../support/batch-requests.js";
import { measureBatch } from "../support/measure-batch.js";
import { commandFile, kvane, kvaneProcess } from "./command.js";

const windows = process.platform === "win32";

function start(settings: readonly string[] = []): ChildProcess {
  return spawn(process.execPath, [...settings, commandFile, "batch", "--quiet"], { stdio: ["pipe", "pipe", "pipe"] });
}

/** What only a whole process shows. */
describe("kvane batch as a process", () => {
  test("gives the bytes of the tested source", async () => {
    const input = batchLines(24);
    expect(await kvaneProcess(["batch"], { input })).toEqual(await kvane(["batch"], { input }));
  });

  test("an answer is there before the next request is sent", async () => {
    const child = start();
    const answers = createInterface({ input: child.stdout as NodeJS.ReadableStream })[Symbol.asyncIterator]();
    for (let number = 0; number < 8; number++) {
      child.stdin?.write(`${JSON.stringify(batchRequest(number))}\n`);
      expect(JSON.parse((await answers.next()).value as string).id).toBe(number);
    }
    child.stdin?.end();
    expect((await once(child, "exit"))[0]).toBe(0);
  });

  test.skipIf(windows)("a reader that has seen enough ends it without an error, however much input there is", () => {
    const command = `yes '{"command": "ops", "group": "62"}' | "${process.execPath}" "${commandFile}" batch | head -n 3 | wc -l`;
    const { stdout, stderr } = spawnSync("bash", ["-c", `${command}; echo "\${PIPESTATUS[1]}"`], { encoding: "utf8" });
    expect({ stdout: stdout.replaceAll(" ", ""), stderr }).toEqual({ stdout: "3\n0\n", stderr: "" });
  });

  test.skipIf(windows)(
    "Ctrl-C ends it with 130, at work as well as waiting; what stands are whole answers",
    async () => {
      for (const input of [batchLines(1), batchLines(2000)]) {
        const child = start();
        let output = "";
        child.stdout?.setEncoding("utf8").on("data", (text: string) => {
          output += text;
        });
        child.stdin?.on("error", () => {});
        child.stdin?.write(input);
        await once(child.stdout as NodeJS.ReadableStream, "data");
        const closed = once(child, "close");
        child.kill("SIGINT");
        expect((await closed)[0]).toBe(130);
        expect(output.endsWith("\n")).toBe(true);
        for (const text of output.trimEnd().split("\n")) expect(JSON.parse(text).kvane).toBeTypeOf("string");
      }
    },
  );
});

describe("memory", () => {
  test("the next part of the input is not asked for before the lines of the last one are taken", async () => {
    let asked = 0;
    async function* parts() {
      for (; asked < 100; asked++) yield new TextEncoder().encode(`${asked}a\n${asked}b\n${asked}`);
    }
    let seen = 0;
    for await (const line of linesOf(parts(), 1000)) {
      seen += 1;
      expect(line.number).toBe(seen);
      expect(asked).toBeLessThanOrEqual(seen / 2);
    }
    expect(seen).toBe(201);
  });

  test("a line that is too long is counted and not kept; the one behind it is whole", async () => {
    async function* parts() {
      yield new TextEncoder().encode("short\n");
      for (let part = 0; part < 1000; part++) yield new Uint8Array(1000).fill(97);
      yield new TextEncoder().encode("\nlast");
    }
    const lines = [];
    for await (const { number, bytes } of linesOf(parts(), 10_000))
      lines.push([number, bytes === null ? null : new TextDecoder().decode(bytes)]);
    expect(lines).toEqual([
      [1, "short"],
      [2, null],
      [3, "last"],
    ]);
  });

  // test/bench/batch-memory.ts measures 10 000; here a tenth of them.
  test.skipIf(process.platform !== "linux")(
    "a thousand requests take no more of it than a hundred",
    async () => {
      const [hundred, thousand] = await measureBatch(commandFile, [100, 1000]);
      expect(hundred).toBeGreaterThan(0);
      // Megabytes; what the collector leaves lying about between two measurements.
      expect((thousand ?? Number.NaN) - (hundred ?? Number.NaN)).toBeLessThan(48);
    },
    120_000,
  );

  test("150 MB of requests go through a heap of 64 MB", async () => {
    const child = start(["--max-old-space-size=64"]);
    const comment = `# ${"filling ".repeat(12_500)}\n`;
    let answers = 0;
    let stderr = "";
    child.stdout?.on("data", (part: Buffer) => {
      for (const byte of part) if (byte === 10) answers += 1;
    });
    child.stderr?.setEncoding("utf8").on("data", (text: string) => {
      stderr += text;
    });
    const count = 1500;
    for (let number = 0; number < count; number++) {
      // No two texts alike, so that nothing that kept them could share them.
      const texts = { "s.yaml": `${comment}group: P n m a\nk: [[0, 0, 0]] # ${number}\n` };
      const line = `${JSON.stringify({ command: "star", study: "s.yaml", texts })}\n`;
      if (child.stdin?.write(line) === false) await once(child.stdin, "drain");
    }
    child.stdin?.end();
    expect({ status: (await once(child, "close"))[0], answers, stderr }).toEqual({
      status: 0,
      answers: count,
      stderr: "",
    });
  }, 120_000);
});
