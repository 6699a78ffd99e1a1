import { type ChildProcess, spawn, spawnSync } from "node:child_process";
import { closeSync, constants, openSync, readdirSync, readSync, writeSync } from "node:fs";
import { join } from "node:path";
import { version } from "@kvane/core/job";
import { describe, expect, test } from "vitest";
import { commandFile, kvane, kvaneProcess, scratchFolder } from "./command.js";

/** What only a whole process shows; everything else is tested without one. */
describe("the built command", () => {
  const folder = scratchFolder({ "word.txt": "d\nabc\n" });

  test("answers as the tested source does, with its exit statuses", async () => {
    for (const words of [
      ["--version"],
      ["ops", "-P 2ac 2n"],
      ["run", "--example"],
      ["modes", "62", "--k", "0,0,0", "--site", "Fe 0 0 1/2", "--json"],
      ["index", "62", "--cell", "1 2 3 90 90 90", "--k", "0,0,0", "--peaks", "word.txt"],
      ["atlas", "62"],
    ])
      expect(await kvaneProcess(words, { cwd: folder }), words.join(" ")).toEqual(await kvane(words, { cwd: folder }));
    expect((await kvaneProcess(["--version"])).stdout).toBe(`${version}\n`);
  });

  test("gives the same bytes in any surroundings", async () => {
    const words = ["run", "--example", "--json"];
    const plain = await kvaneProcess(words);
    const strange = await kvaneProcess(words, {
      cwd: folder,
      env: { LANG: "tr_TR.UTF-8", LC_ALL: "de_DE.UTF-8", TZ: "Asia/Kathmandu", COLUMNS: "40", FORCE_COLOR: "1" },
    });
    expect(strange.stdout).toBe(plain.stdout);
  });

  test("colours errors only where that is wanted", async () => {
    const colour = "\u001b[";
    expect((await kvaneProcess(["ops", "nonsense"])).stderr).not.toContain(colour);
    expect((await kvaneProcess(["ops", "nonsense"], { env: { FORCE_COLOR: "1" } })).stderr).toContain(colour);
    expect((await kvaneProcess(["ops", "nonsense"], { env: { NO_COLOR: "1" } })).stderr).not.toContain(colour);
  });

  test.skipIf(process.platform === "win32")("a closed pipe is no error", () => {
    const command = `"${process.execPath}" "${commandFile}" modes 227:2 --k u,v,w --site "A 0.1 0.2 0.3" --json`;
    const { stdout, stderr } = spawnSync("bash", ["-c", `${command} | head -c 20; echo "|\${PIPESTATUS[0]}"`], {
      encoding: "utf8",
    });
    expect(stderr).toBe("");
    expect(stdout.endsWith("|0\n"), stdout).toBe(true);
  });

  test.skipIf(process.platform === "win32")("Ctrl-C ends it with 130 and leaves nothing", async () => {
    const before = readdirSync(folder);
    const child = spawn(process.execPath, [commandFile, "run", "-", "--out", "results"], { cwd: folder });
    const ended = new Promise<number | null>((resolve) => child.on("exit", (status) => resolve(status)));
    // More than a pipe holds: once it is gone the command reads standard input, and its handler is in place.
    await new Promise((resolve) => child.stdin.write("# a study that does not end\n".repeat(100_000), resolve));
    child.kill("SIGINT");
    expect(await ended).toBe(130);
    expect(readdirSync(folder)).toEqual(before);
  });

  test.skipIf(process.platform === "win32")("Ctrl-C ends a long list of satellites", async () => {
    const words = ["satellites", "194", "--cell", "7.61 7.61 6.52 90 90 120", "--k", "0.1,0.2,0.3", "--q-max", "20"];
    const before = readdirSync(folder);
    const child = spawn(process.execPath, [commandFile, ...words, "--out", "list.txt"], { cwd: folder });
    const ended = new Promise<number | null>((resolve) => child.on("exit", (status) => resolve(status)));
    // It works for seconds; the handler is in place once it has begun.
    await new Promise((resolve) => setTimeout(resolve, 700));
    child.kill("SIGINT");
    expect(await ended).toBe(130);
    expect(readdirSync(folder)).toEqual(before);
  });

  describe.skipIf(process.platform === "win32")("while a full pipe takes no more", () => {
    /** Runs the command with a pipe for its output in which there is no room left, for as long as `meanwhile` takes. */
    async function withFullPipe(
      name: string,
      waits: boolean,
      meanwhile: (child: ChildProcess, pipe: { readonly end: number; readonly filled: number }) => Promise<void>,
    ): Promise<void> {
      const path = join(folder, name);
      spawnSync("mkfifo", [path]);
      const end = openSync(path, constants.O_RDWR | constants.O_NONBLOCK);
      const filled = fill(end);
      const waiting = openSync(path, constants.O_RDWR);
      const child = spawn(process.execPath, [commandFile, "ops", "62"], {
        stdio: ["ignore", waits ? waiting : end, "inherit"],
      });
      try {
        // It would have ended long before, were there any room.
        await new Promise((resolve) => setTimeout(resolve, 1500));
        expect([child.exitCode, child.signalCode], "it waits for a reader").toEqual([null, null]);
        await meanwhile(child, { end, filled });
      } finally {
        child.kill("SIGKILL");
        closeSync(end);
        closeSync(waiting);
      }
    }

    /** Writes until the pipe refuses more; how many bytes it took. */
    function fill(pipe: number): number {
      let filled = 0;
      try {
        for (;;) filled += writeSync(pipe, new Uint8Array(4096));
      } catch (error) {
        if ((error as NodeJS.ErrnoException).code !== "EAGAIN") throw error;
        return filled;
      }
    }

    const end = (child: ChildProcess) =>
      new Promise((resolve) => child.on("exit", (status, signal) => resolve(signal ?? status)));

    test("Ctrl-C ends it", () =>
      withFullPipe("waiting-pipe", true, async (child) => {
        const ended = end(child);
        child.kill("SIGINT");
        // A shell shows 130 for either.
        expect(["SIGINT", 130]).toContain(await ended);
      }));

    test("and refuses instead of waiting, it gets all as soon as there is room", () =>
      withFullPipe("refusing-pipe", false, async (child, pipe) => {
        const ended = end(child);
        for (let emptied = 0; emptied < pipe.filled; ) emptied += readSync(pipe.end, new Uint8Array(4096));
        expect(await ended).toBe(0);
        const text = new Uint8Array(65536);
        const length = readSync(pipe.end, text);
        expect(new TextDecoder().decode(text.subarray(0, length))).toBe((await kvane(["ops", "62"])).stdout);
      }));
  });

  test("an answer of a cancelled job is `interrupted`", async () => {
    const { answer, exitStatusOf } = await import("@kvane/core/job");
    const text = "group: P n m a\ncell: {a: 9, b: 7, c: 5, alpha: 90, beta: 90, gamma: 90}\npeaks: {file: p, as: d}\n";
    const { errors, result } = await answer(
      { command: "locate", study: "s.yaml" },
      { signal: { aborted: true }, readText: async (path) => (path === "p" ? "4.1\n3.2\n" : text) },
    );
    expect(result).toBeNull();
    expect(errors[0]?.code).toBe("interrupted");
    expect(exitStatusOf("interrupted")).toBe(130);
  });

  test("a fault of kvane itself is an internal fault, exit status 70", async () => {
    const { answer, exitStatusOf } = await import("@kvane/core/job");
    const request = {
      command: "ops",
      get group(): string {
        throw new TypeError("a fault that no input causes");
      },
    };
    const { errors, result } = await answer(request, { readText: async () => "" });
    expect(result).toBeNull();
    expect(errors).toMatchObject([{ code: "internal-fault", found: "TypeError: a fault that no input causes" }]);
    expect(errors[0]?.remedy).toContain("report");
    expect(exitStatusOf("internal-fault")).toBe(70);
  });
});
