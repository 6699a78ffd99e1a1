import { readFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { commandSpecs } from "../../packages/cli/src/commands/index.ts";
import { parseLine } from "../../packages/cli/src/parse-line.ts";
import type { ParsedLine } from "../../packages/cli/src/parsed-line.ts";
import { requestFrom } from "../../packages/cli/src/request.ts";
import { batchLines, batchRequest } from "../support/batch-requests.js";
import { root } from "../tools/paths.mjs";
import { kvane, type RunOptions, scratchFolder, shellWords } from "./command.js";
import { schemaErrors } from "./schemas.js";

/** What `--json` prints, on one line. */
const oneLine = (json: string) => JSON.stringify(JSON.parse(json));

/** The request that a line of the command line makes, as other programs would write it. */
function requestOf(words: readonly string[]): object {
  const line = parseLine(words, { write: () => {}, writeError: () => {} }) as ParsedLine;
  const given = Object.entries(requestFrom(line)).filter(([, value]) => value !== null && value !== false);
  return Object.fromEntries(given);
}

async function batch(input: string, options: RunOptions = {}) {
  const { status, stdout, stderr } = await kvane(["batch"], { ...options, input });
  expect(stdout === "" || stdout.endsWith("\n")).toBe(true);
  return { status, stderr, lines: stdout.split("\n").slice(0, -1) };
}

describe("an answer is byte for byte that of the single command", () => {
  const commands: Record<string, string> = JSON.parse(readFileSync(join(root, "docs/examples/commands.json"), "utf8"));
  const inJson = Object.entries(commands).filter(([file]) => file.endsWith(".json"));

  test("all examples of the documentation in one batch, wrong input among them", async () => {
    const words = inJson.map(([, line]) => shellWords(line).slice(1));
    const { status, lines } = await batch(words.map((each) => `${JSON.stringify(requestOf(each))}\n`).join(""));
    expect(status).toBe(0);
    expect(lines).toHaveLength(inJson.length);
    for (const [index, [file]] of inJson.entries()) {
      // Committed, and held against the single command by pages.test.ts.
      const single = oneLine(readFileSync(join(root, "docs/examples", file), "utf8"));
      expect(lines[index] === single, `${file}: ${lines[index]?.slice(0, 300)}`).toBe(true);
    }
  }, 120_000);

  test("files on the disk count from the folder of the process, as for the single command", async () => {
    const cwd = scratchFolder({
      "study.yaml":
        "group: P n m a\ncell: {a: 9, b: 7, c: 8, alpha: 90, beta: 90, gamma: 90}\nk: [[0, 1/2, 0]]\npeaks: {file: p.txt, as: d}\n",
      "p.txt": "7.2 0.02\n5.1 0.02\n",
    });
    for (const [words, request] of [
      [["index", "study.yaml"], { command: "index", study: "study.yaml" }],
      [["index", "none.yaml"], { command: "index", study: "none.yaml" }],
    ] as const) {
      const single = await kvane([...words, "--json"], { cwd });
      const { lines } = await batch(JSON.stringify(request), { cwd });
      expect(lines).toEqual([oneLine(single.stdout)]);
    }
  });

  test("an id goes in front and changes nothing else", async () => {
    const request = { command: "ops", group: "62" };
    const { lines } = await batch(
      [request, { ...request, id: "é\n" }, { ...request, id: 7.5 }].map((one) => `${JSON.stringify(one)}\n`).join(""),
    );
    const plain = oneLine((await kvane(["ops", "62", "--json"])).stdout);
    expect(lines).toEqual([plain, `{"id":"é\\n",${plain.slice(1)}`, `{"id":7.5,${plain.slice(1)}`]);
  });
});

describe("one answer a line", () => {
  test("in the order of the lines, errors in place, and each obeys its schema", async () => {
    const requests = Array.from({ length: 40 }, (_, index) => batchRequest(index));
    const input = requests.map((one) => JSON.stringify(one));
    input.splice(3, 0, "no JSON", "", "[1]", '{"command":"fly"}');
    const { status, stderr, lines } = await batch(`${input.join("\n")}\n`);
    expect(status).toBe(0);
    expect(lines).toHaveLength(44);
    const answers = lines.map((text) => JSON.parse(text));
    expect(answers.slice(3, 7).map(({ errors }) => [errors[0].code, errors[0].where.line])).toEqual([
      ["invalid-request", 4],
      ["invalid-request", 5],
      ["invalid-request", 6],
      ["unknown-command", null],
    ]);
    answers.splice(3, 4);
    expect(answers.map(({ id }) => id)).toEqual(requests.map(({ id }) => id));
    for (const { id: _id, ...answer } of answers) expect(schemaErrors(answer.command, answer)).toEqual([]);
    const wrong = answers.filter(({ errors }) => errors.length > 0);
    expect(wrong).toHaveLength(5);
    expect(stderr).toBe("9 of 44 answers hold errors, the first is that of line 4\n");
  });

  test("line ends of any kind, a byte order mark, no last line feed, nothing at all", async () => {
    const request = '{"command": "ops", "group": "1"}';
    const plain = (await batch(request)).lines[0];
    expect((await batch(`\uFEFF${request}\r\n${request}\n${request}`)).lines).toEqual([plain, plain, plain]);
    expect(await batch("")).toEqual({ status: 0, stderr: "", lines: [] });
    expect((await batch("\n\n")).lines).toHaveLength(2);
  });

  test("a byte that is no UTF-8 is told, and the run goes on", async () => {
    const cwd = scratchFolder({
      "requests.jsonl": Buffer.concat([
        Buffer.from('{"command": "'),
        Buffer.from([0xff]),
        Buffer.from('"}\n{"command":"ops","group":"1"}\n'),
      ]),
    });
    const { status, stdout } = await kvane(["batch", "requests.jsonl", "--quiet"], { cwd });
    const [first, second] = stdout
      .split("\n")
      .slice(0, -1)
      .map((text) => JSON.parse(text));
    expect(status).toBe(0);
    expect(first.errors[0]).toMatchObject({ code: "invalid-request", where: { file: "requests.jsonl", line: 1 } });
    expect(second.errors).toEqual([]);
  });

  test("a request cannot read the standard input that the requests come from, unless it brings it along", async () => {
    const { lines } = await batch(
      '{"command":"star","study":"-"}\n{"command":"star","study":"-","texts":{"-":"group: P n m a\\nk: [[0, 0, 0]]\\n"}}\n',
    );
    expect(lines.map((text) => JSON.parse(text).errors.map(({ code }: { code: string }) => code))).toEqual([
      ["file-unreadable"],
      [],
    ]);
  });
});

describe("kvane batch", () => {
  test("has help with examples that work, and a topic", async () => {
    expect(commandSpecs.some(({ name }) => name === "batch")).toBe(true);
    const help = await kvane(["batch", "--help"]);
    expect(help.stdout).toContain("kvane batch --example");
    const { status, stdout } = await kvane(["batch", "--example"]);
    expect(status).toBe(0);
    expect(stdout).toBe(readFileSync(join(root, "docs/examples/batch.jsonl"), "utf8"));
    expect((await kvane(["help", "requests"])).stdout).toContain('"texts"');
  });

  test("the requests that its topic shows are requests", async () => {
    const { stdout } = await kvane(["help", "requests"]);
    const shown = [...stdout.matchAll(/^ {2}(\{"?.*\})$/gm)].map(([, text]) => text as string);
    expect(shown).toHaveLength(3);
    for (const text of (await batch(shown.join("\n"))).lines) expect(JSON.parse(text).errors).toEqual([]);
  });

  test.each([
    [["batch", "none.jsonl"], "file-not-found"],
    [["batch", "."], "file-unreadable"],
    [["batch", "a.jsonl", "b.jsonl"], "invalid-argument"],
    [["batch", "a.jsonl", "--example"], "conflicting-arguments"],
    [["batch", "--json"], "unknown-option"],
  ])("%j is answered with %s, exit status 2", async (words, code) => {
    const { status, stdout, stderr } = await kvane(words, { cwd: scratchFolder() });
    expect({ status, stdout }).toEqual({ status: 2, stdout: words.includes("--json") ? stdout : "" });
    expect(stderr).toContain(`error[${code}]`);
    expect(stderr).toMatch(/remedy: +\S/);
  });

  test("a cancelled batch writes nothing more, exit status 130", async () => {
    const { runBatch } = await import("../../packages/cli/src/batch/run-batch.ts");
    const signal = { aborted: false };
    const written: string[] = [];
    const status = await runBatch(
      "-",
      {
        write: (text) => {
          written.push(text);
          signal.aborted = written.length === 3;
        },
        writeError: (text) => written.push(text),
        showsProgress: false,
        standardInput: async () => new TextEncoder().encode(batchLines(8)),
        folder: root,
        signal,
      },
      false,
    );
    expect(status).toBe(130);
    expect(written).toHaveLength(3);
  });
});
