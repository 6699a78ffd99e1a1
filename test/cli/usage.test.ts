import { describedCommands } from "@kvane/core/reports";
import { describe, expect, test } from "vitest";
import { kvane, shellWords } from "./command.js";

describe("usage", () => {
  test.each([
    [["strr", "62"], "unknown-command", "star"],
    [["ops", "62", "--kk"], "unknown-option", "--help"],
    [["modes", "62", "--sites", "A 0 0 0"], "unknown-option", "--site"],
    [["ops", "62", "--csv"], "unknown-option", "--help"],
    [["star", "62", "--k"], "missing-argument", "behind the option"],
    [["star", "62", "--k", "--json"], "missing-argument", "behind the option"],
    [["star", "62", "--k", "0,0,0", "--k", "0,0,1/2"], "conflicting-arguments", "leave one"],
    [["ops", "P", "n", "m", "a"], "invalid-argument", "quotation marks"],
    [["modes", "62", "--site", "A 0 0 0", "B 0 0 1/2"], "invalid-argument", '--site "A 0 0 0" --site "B 0 0 1/2"'],
    [["modes", "62", "--site", "A", "0", "0", "0"], "invalid-argument", '--site "A 0 0 0"'],
    [["batch", "a.jsonl", "b.jsonl"], "invalid-argument", "one file after the other"],
    [["ops", "study.yaml", "--example"], "conflicting-arguments", "leave one"],
    [["modes", "62", "--csv", "--json"], "conflicting-arguments", "leave one"],
    [[], "missing-argument", "kvane run --example"],
  ])("%j is answered with %s and a remedy", async (words, code, remedy) => {
    const { status, stdout, stderr } = await kvane(words);
    expect(status).toBe(2);
    expect(stderr).toContain(`error[${code}]`);
    expect(stderr.slice(stderr.indexOf("remedy:"))).toContain(remedy);
    // With --json among the words the problem is there as JSON too.
    if (words.includes("--json")) expect(JSON.parse(stdout).errors[0].code).toBe(code);
    else expect(stdout).toBe("");
  });

  test("a Hall symbol or triplet that begins with a minus is a GROUP, wherever it stands", async () => {
    const asNumber = await kvane(["ops", "62"]);
    for (const words of [["-P 2ac 2n"], ["--quiet", "-P 2ac 2n"], ["-x+1/2,y+1/2,z+1/2; -x,-y,-z; -x,y+1/2,-z"]]) {
      const { status, stdout } = await kvane(["ops", ...words]);
      expect(status).toBe(0);
      expect(stdout).toBe(asNumber.stdout);
    }
  });

  test("a negative first component of k is a value, not an option", async () => {
    const { status } = await kvane(["star", "62", "--k", "-1/2,0,0"]);
    expect(status).toBe(0);
  });

  test("sites are counted one by one: the option is not greedy", async () => {
    const { stdout } = await kvane([
      "modes",
      "--k",
      "0,0,0",
      "--site",
      "A 0 0 0",
      "62",
      "--site",
      "B 0 0 1/2",
      "--json",
    ]);
    const labels = JSON.parse(stdout).result.sites.map(({ label }: { label: string }) => label);
    expect(labels).toEqual(["A", "B"]);
  });

  test("a study comes from standard input, and options win over it", async () => {
    const input = "group: P n m a\nk: [[0, 1/2, 0]]\nsites: [{label: Fe, at: [0, 0, 0]}]\n";
    const fromStudy = JSON.parse((await kvane(["star", "-", "--json"], { input })).stdout);
    expect(fromStudy.result.k.components).toEqual(["0", "1/2", "0"]);
    const overruled = JSON.parse((await kvane(["star", "-", "--k", "0,0,1/2", "--json"], { input })).stdout);
    expect(overruled.result.k.components).toEqual(["0", "0", "1/2"]);
    const broken = await kvane(["star", "-"], { input: "group: P n q a\n" });
    expect(broken.stderr).toContain("standard input:1:8");
  });

  test("of several k in a study a command for one takes the first, and says so", async () => {
    const input = "group: P n m a\nk: [[0, 1/2, 0], [0, 0, 1/2]]\n";
    const { result, assumed } = JSON.parse((await kvane(["irreps", "-", "--json"], { input })).stdout);
    expect(result.k.components).toEqual(["0", "1/2", "0"]);
    expect(assumed.map(({ because }: { because: string }) => because).join()).toContain("first of 2");
  });
});

describe("help", () => {
  test("names every command, within 100 columns", async () => {
    const { status, stdout } = await kvane(["--help"]);
    expect(status).toBe(0);
    for (const command of [...describedCommands, "batch"]) expect(stdout).toContain(command);
    expect(widest(stdout)).toBeLessThanOrEqual(100);
  });

  test.each(describedCommands)("%s --help has an example that works when pasted", async (command) => {
    const { status, stdout } = await kvane([command, "--help"]);
    expect(status).toBe(0);
    expect(widest(stdout)).toBeLessThanOrEqual(100);
    const examples = stdout.split("\n").filter((line) => line.startsWith(`  kvane ${command}`));
    expect(examples.length).toBeGreaterThan(0);
    for (const line of examples) {
      const run = await kvane(shellWords(line).slice(1));
      expect(run, line).toMatchObject({ status: 0, stderr: "" });
      expect(run.stdout.length).toBeGreaterThan(20);
    }
  });

  test("`kvane help COMMAND` is the help of the command", async () => {
    expect((await kvane(["help", "modes"])).stdout).toBe((await kvane(["modes", "--help"])).stdout);
  });

  test("every topic has a page within 100 columns", async () => {
    const { topics } = JSON.parse((await kvane(["help", "--json"])).stdout).result;
    for (const topic of topics) {
      const { status, stdout } = await kvane(["help", topic]);
      expect(status).toBe(0);
      expect(widest(stdout), topic).toBeLessThanOrEqual(100);
    }
  });

  test("a mistyped code gets the likely one", async () => {
    const { status, stderr } = await kvane(["explain", "invalid-sit"]);
    expect(status).toBe(2);
    expect(stderr).toContain("did you mean `invalid-site`?");
  });
});

function widest(text: string): number {
  return Math.max(...text.split("\n").map((line) => [...line].length));
}
