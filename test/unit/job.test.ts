import { readFileSync } from "node:fs";
import { readFile } from "node:fs/promises";
import { join, posix } from "node:path";
import { KvaneError, problem } from "@kvane/core/errors";
import { answer, type CommandResults, commandTable, type JobHost, type Request, version } from "@kvane/core/job";
import { describe, expect, test } from "vitest";
import { root } from "../tools/paths.mjs";
import { readImports } from "../tools/read-imports.mjs";

/** A host over files in memory. */
function hostOf(files: { readonly [path: string]: string }) {
  return {
    readText: async (path: string) => {
      const text = files[path];
      if (text !== undefined) return text;
      throw new KvaneError([problem("file-not-found", `there is no file \`${path}\``)]);
    },
  };
}

const study = `group: P n m a
cell: {a: 10.21, b: 6.05, c: 4.71, alpha: 90, beta: 90, gamma: 90}
sites: [{label: Fe1, at: [0, 0, 0]}]
peaks: {file: lists/peaks.csv, as: d}
`;
// d of (0 ½ 0), (1 ½ 0), (2 ½ 0), (0 ½ 1) of the orthorhombic cell above: 1/d² = h²/a² + k²/b² + l²/c².
const peaks = [
  [0, 0],
  [1, 0],
  [2, 0],
  [0, 1],
]
  .map(([h = 0, l = 0]) => 1 / Math.sqrt((h / 10.21) ** 2 + (0.5 / 6.05) ** 2 + (l / 4.71) ** 2))
  .map((d) => `${d.toFixed(4)} 0.002\n`)
  .join("");

describe("answer", () => {
  test("refuses a field that the command does not take, and what is no request", async () => {
    const typo = { command: "star", group: "62", k: "0,0,0", grup: "1" } as Request;
    expect((await answer(typo, hostOf({}))).errors).toMatchObject([
      { code: "invalid-request", where: { path: "grup" }, remedy: "did you mean `group`?" },
    ]);
    for (const none of [null, undefined, "star"])
      expect((await answer(none as unknown as Request, hostOf({}))).errors).toMatchObject([
        { code: "invalid-request" },
      ]);
    expect((await answer({} as Request, hostOf({}))).errors).toMatchObject([{ code: "unknown-command" }]);
  });

  test("knows fields by the names of their options, and the parent as the study of moments", async () => {
    const remedyOf = async (request: object) => (await answer(request as Request, hostOf({}))).errors[0]?.remedy;
    expect(await remedyOf({ command: "exchange", group: "1", j: ["1 1"] })).toBe("did you mean `constants`?");
    expect(await remedyOf({ command: "weigh", "form-factor": [] })).toBe("did you mean `formFactors`?");
    expect(await remedyOf({ command: "decompose", moments: "m", parent: "p" })).toBe("did you mean `study`?");
  });

  test("tells what is wrong with a host from what is wrong with a file", async () => {
    const asked = { command: "star", study: "s.yaml" };
    for (const none of [undefined, null, {}, { readText: 1 }])
      expect((await answer(asked, none as unknown as JobHost)).errors).toMatchObject([
        { code: "invalid-request", message: "the host cannot read files" },
      ]);
    const bytes = { readText: async () => new Uint8Array(4) } as unknown as JobHost;
    expect((await answer(asked, bytes)).errors).toMatchObject([
      { code: "file-unreadable", where: { file: "s.yaml" }, expected: "a string from `readText`" },
    ]);
    const { errors } = await answer(asked, { readText: (path) => readFile(join(root, "none", path), "utf8") });
    expect(errors).toMatchObject([{ code: "file-not-found", where: { file: "s.yaml" } }]);
  });

  test("has a type for the result of every command (job/results.ts)", () => {
    const results: { readonly [command in keyof CommandResults]: true } = {
      run: true,
      study: true,
      report: true,
      check: true,
      ops: true,
      atlas: true,
      star: true,
      irreps: true,
      compatibility: true,
      modes: true,
      configurations: true,
      decompose: true,
      export: true,
      satellites: true,
      index: true,
      locate: true,
      weigh: true,
      exchange: true,
      onset: true,
      explain: true,
      help: true,
    };
    expect(Object.keys(results).sort()).toEqual(Object.keys(commandTable).sort());
  });

  test("runs on plain records and files in memory, and gives plain data", async () => {
    const host = hostOf({ "work/study.yaml": study, "work/lists/peaks.csv": peaks });
    const answered = await answer({ command: "run", study: "work/study.yaml" }, host);
    expect(answered.errors).toEqual([]);
    expect(structuredClone(answered)).toEqual(answered);
    expect(JSON.parse(JSON.stringify(answered))).toEqual(answered);
    const result = answered.result as { branches: readonly { k: { components: readonly string[] } }[] };
    expect(result.branches[0]?.k.components).toEqual(["0", "1/2", "0"]);
  });

  test("a file that the study names is looked for beside the study, and missed at the line that names it", async () => {
    const { errors } = await answer(
      { command: "check", study: "work/study.yaml" },
      hostOf({ "work/study.yaml": study }),
    );
    expect(errors).toMatchObject([
      { code: "file-not-found", where: { file: "work/study.yaml", line: 4, path: "peaks.file" } },
    ]);
    expect(errors[0]?.message).toContain("work/lists/peaks.csv");
  });

  test("check names all that the whole job still needs", async () => {
    const { result } = await answer({ command: "check", study: "s" }, hostOf({ s: "title: only a title\n" }));
    expect((result as { missing: readonly string[] }).missing.map((text) => /\((\w+)\)/.exec(text)?.[1])).toEqual([
      "group",
      "cell",
      "sites",
      "peaks",
    ]);
  });

  test("a snapped coordinate and a moved k are listed under assumed, once", async () => {
    const request: Request = { command: "modes", group: "P 3", k: "0.33333,0.33333,0", sites: ["A 0.3333 0.6667 0"] };
    const { assumed } = await answer(request, hostOf({}));
    expect(assumed.filter(({ what }) => what.includes("position of A"))).toHaveLength(1);
    expect(assumed.find(({ what }) => what.includes("position of A"))?.value).toBe("(1/3, 2/3, 0)");
    expect(assumed.find(({ what }) => what.includes("wave vector"))?.value).toContain("1/3");
  });

  test("the echo is tidied and does not depend on blanks", async () => {
    const plain = await answer({ command: "star", group: "P n m a", k: "0,1/2,0" }, hostOf({}));
    const spread = await answer({ command: "star", group: "  P  n m  a ", k: " 0,1/2,0 " }, hostOf({}));
    expect(spread).toEqual(plain);
    expect(plain.input).toEqual({ study: null, group: "P n m a", structure: null, block: null, k: "0,1/2,0" });
  });

  test("tied candidates are followed up to the bound", async () => {
    // A tetragonal metric of an orthorhombic group: (1/2,0,0) and (0,1/2,0) have the same positions.
    const square =
      "group: P m m m\ncell: {a: 5, b: 5, c: 7, alpha: 90, beta: 90, gamma: 90}\nsites: [{label: A, at: [0, 0, 0]}]\npeaks: {file: p, as: d}\n";
    const lines = [
      [0.5, 0, 0],
      [0.5, 1, 0],
      [0.5, 0, 1],
      [0.5, 1, 1],
      [1.5, 0, 0],
    ]
      .map(([h = 0, k = 0, l = 0]) => 1 / Math.sqrt((h * h + k * k) / 25 + (l * l) / 49))
      .map((d) => `${d.toFixed(4)} 0.001\n`)
      .join("");
    const run = async (branches?: string) => {
      const host = hostOf({ s: square, p: lines });
      const { result } = await answer({ command: "run", study: "s", branches: branches ?? null }, host);
      return result as { branches: readonly unknown[]; notFollowed: readonly number[]; next: readonly string[] };
    };
    expect(await run()).toMatchObject({ branches: { length: 2 }, notFollowed: [] });
    const bound = await run("1");
    expect(bound.branches).toHaveLength(1);
    expect(bound.notFollowed).toHaveLength(1);
    expect((await run()).next[0]).toContain("No powder line tells candidates 1 and 2 apart");
  });
});

describe("the table of commands", () => {
  test("a command loads only what it needs: nothing heavy is imported before the command is known", () => {
    const reached = staticImports("packages/core/src/job/index.ts");
    const rooms = new Set(reached.map((file) => file.split("/")[3]));
    for (const room of ["irreps", "modes", "search", "reflections", "files", "reports", "spacegroups"])
      expect(rooms, room).not.toContain(room);
  });

  test("`ops` loads neither irreps nor search nor the reader of files", () => {
    const reached = staticImports("packages/core/src/job/commands/ops.ts");
    const rooms = new Set(reached.map((file) => file.split("/")[3]));
    for (const room of ["irreps", "modes", "search", "reflections", "files"]) expect(rooms, room).not.toContain(room);
  });

  test("the version is that of the package", () => {
    const { version: packaged } = JSON.parse(readFileSync(join(root, "packages/core/package.json"), "utf8"));
    expect(version).toBe(packaged);
  });
});

/** Every file of core that is loaded with `file`, itself included, without what is loaded by `import()`. */
function staticImports(file: string, seen = new Set<string>()): string[] {
  if (seen.has(file)) return [];
  seen.add(file);
  for (const one of readImports(file, readFileSync(join(root, file), "utf8"))) {
    if (one.typeOnly || one.lazy || !one.specifier.startsWith(".")) continue;
    staticImports(posix.join(posix.dirname(file), one.specifier).replace(/\.js$/, ".ts"), seen);
  }
  return [...seen];
}
