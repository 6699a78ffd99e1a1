import { answer, answerLine, commandTable, hostOfTexts, type Request, requestSchema } from "@kvane/core/job";
import { Ajv2020 } from "ajv/dist/2020.js";
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { jsonFault } from "#core/job/lines/json-fault.js";

const seed = 20_261_202;

/** What the engine makes of the same text. */
function isJson(text: string): boolean {
  try {
    JSON.parse(text);
    return true;
  } catch {
    return false;
  }
}

describe("the first fault of a JSON text", () => {
  test.each([
    ["", 1, "a value", "the end of the line"],
    ['{"a": 1,}', 9, "a name in double quotation marks", "}"],
    ['{"a" 1}', 6, "a colon", "1}"],
    ["{'a': 1}", 2, "a name in double quotation marks, or }", "'a': 1}"],
    ["[1, 2", 6, "a comma or the closing bracket", "the end of the line"],
    ["[1 2]", 4, "a comma or the closing bracket", "2]"],
    ["[1}", 3, "a comma or the closing bracket", "}"],
    ["[01]", 3, "a comma or the closing bracket", "1]"],
    ["[.5]", 2, "a value or ]", ".5]"],
    ["[NaN]", 2, "a value or ]", "NaN]"],
    ['"abc', 5, "a closing quotation mark", "the end of the line"],
    ['"a\tb"', 3, "no control characters within a text: \\n and \\t stand for them", '\\tb"'],
    ['"\\x"', 2, 'one of \\" \\\\ \\/ \\b \\f \\n \\r \\t \\uXXXX', '\\\\x"'],
    ["{} {}", 4, "nothing more", "{}"],
    ['{"k": 1, "\\u006b": 2}', 10, 'the name "k" once', "it stands twice"],
  ])("%s: column %d", (text, column, expected, found) => {
    expect(jsonFault(text)).toEqual({ column, expected, found });
  });

  test("none in what JSON.stringify writes, at any depth", () => {
    fc.assert(
      fc.property(fc.jsonValue({ maxDepth: 6 }), (value) => {
        expect(jsonFault(JSON.stringify(value))).toBeNull();
        expect(jsonFault(JSON.stringify(value, null, 2))).toBeNull();
      }),
      { seed },
    );
    expect(jsonFault(`${"[".repeat(1_000_000)}${"]".repeat(1_000_000)}`)).toBeNull();
    expect(jsonFault(`"${"\\n".repeat(3_000_000)}"`)).toBeNull();
  });

  test("one exactly where JSON.parse refuses, whatever is cut out, put in or doubled", () => {
    const pieces = fc.constantFrom(
      '"',
      "\\",
      "{",
      "}",
      "[",
      "]",
      ",",
      ":",
      "0",
      "-",
      ".",
      "e",
      "u",
      "\t",
      " ",
      "null",
      "é",
    );
    const mutated = fc
      .tuple(fc.jsonValue({ maxDepth: 3 }), fc.nat(200), fc.nat(3), pieces)
      .map(([value, at, cut, piece]) => {
        const text = JSON.stringify(value);
        const place = at % (text.length + 1);
        return text.slice(0, place) + piece + text.slice(place + cut);
      });
    fc.assert(
      fc.property(mutated, (text) => {
        const fault = jsonFault(text);
        if (fault?.found === "it stands twice") return;
        expect(fault === null, text).toBe(isJson(text));
      }),
      { seed, numRuns: 5000 },
    );
  });
});

const host = hostOfTexts({});
const line = async (request: unknown, place = {}) =>
  (await answerLine(typeof request === "string" ? request : JSON.stringify(request), host, place)).answer;

describe("a line that is no request", () => {
  test.each([
    ["no JSON", "{command}", { column: 2 }],
    ["no object", "[1, 2]", { column: null }],
    ["nothing", "  ", { column: null }],
    ["no command", { group: "62" }, { path: "command" }],
    ["a command that is no text", { command: 7 }, { path: "command" }],
    ["an unknown field", { command: "ops", grup: "62" }, { path: "grup" }],
    ["a field of another command", { command: "ops", group: "62", k: "0,0,0" }, { path: "k" }],
    ["a number in place of a text", { command: "locate", wavelength: 2.41 }, { path: "wavelength" }],
    ["a text in place of a list", { command: "modes", sites: "A 0 0 0" }, { path: "sites" }],
    ["a list that holds other things", { command: "modes", sites: ["A 0 0 0", 1] }, { path: "sites" }],
    ["a text in place of a flag", { command: "modes", polar: "yes" }, { path: "polar" }],
    ["an id that cannot be given back", { command: "ops", id: 2 ** 60 }, { path: "id" }],
    ["an id that is a list", { command: "ops", id: [1] }, { path: "id" }],
    ["texts that are none", { command: "ops", texts: { a: 1 } }, { path: "texts.a" }],
    ["texts that are a list", { command: "ops", texts: ["a"] }, { path: "texts" }],
    ["a field named like what every object has", '{"command": "ops", "__proto__": "62"}', { path: "__proto__" }],
  ])("%s: code, place, what was expected, remedy", async (_name, request, where) => {
    const answered = await line(request, { file: "-", line: 3 });
    expect(answered).toMatchObject({ format: 1, input: {}, result: null, warnings: [], assumed: [] });
    for (const each of answered.errors) {
      expect(each).toMatchObject({ code: "invalid-request", where: { file: "-", line: 3, ...where } });
      for (const text of [each.message, each.expected, each.found, each.remedy]) expect(text).toMatch(/\S/);
    }
    expect(answered.errors).toHaveLength(1);
  });

  test("says all that is wrong at once, names the likely field, and gives the id back", async () => {
    const request = { id: "a", command: "modes", grop: "62", kk: "0,0,0", sites: "A 0 0 0", polar: 1 };
    const { text, answer: answered } = await answerLine(JSON.stringify(request), host);
    expect(answered.errors.map(({ where }) => where.path)).toEqual(["grop", "kk", "sites", "polar"]);
    expect(answered.errors[0]?.remedy).toBe("did you mean `group`?");
    expect(answered.command).toBe("modes");
    expect(text.startsWith('{"id":"a","kvane":')).toBe(true);
  });

  test.each([
    ["a slip of the pen", { command: "ops", grup: "62" }],
    ["one that another command takes", { command: "ops", group: "62", k: "0,0,0" }],
    ["one of a wrong kind", { command: "ops", k: 1 }],
    ["false where no flag is due", { command: "ops", k: false, grup: false }],
    ["the command misspelt", { command: "ops", comand: "star" }],
  ])("an untaken field is refused as in a record: %s", async (_name, fields) => {
    const inRecord = (await answer(fields as Request, host)).errors;
    const inLine = (await line(fields)).errors;
    expect(inRecord.map(({ code, where }) => `${code} ${where.path}`)).toEqual(
      Object.keys(fields)
        .filter((field) => field !== "command" && field !== "group")
        .map((field) => `invalid-request ${field}`),
    );
    expect(inRecord[0]?.expected).toBe("one of study, group, structure, block");
    expect(inLine).toEqual(inRecord.map((one) => ({ ...one, expected: `${one.expected}, texts, id` })));
  });

  test("says where in the line a field stands, also when its place came with all its parts", async () => {
    const place = { file: "-", line: 3, column: null, path: null, argument: null };
    expect((await line({ command: "ops", grup: "62" }, place)).errors).toMatchObject([
      { where: { ...place, path: "grup" } },
    ]);
  });

  test("an unknown command is the answer's to refuse, whatever stands beside it", async () => {
    for (const command of ["stra", "batch", "completion", "toString", ""])
      expect((await line({ command, anything: 1 })).errors).toMatchObject([{ code: "unknown-command" }]);
  });
});

describe("a line that is a request", () => {
  test("has the answer of the same record, and null, and false of a flag, is as good as nothing", async () => {
    const request = { command: "star", group: "62", k: "0,1/2,0" };
    const answered = await answer(request, host);
    expect(await line(request)).toEqual(answered);
    expect(await line({ ...request, cell: null, polar: null, id: null, texts: null })).toEqual(answered);
    expect(await line({ ...request, polar: false })).toEqual(answered);
  });

  test("brings its files along: by the exact name, before those of the host", async () => {
    const study = "group: P n m a\ncell: {a: 9, b: 7, c: 8, alpha: 90, beta: 90, gamma: 90}\npeaks: {file: p, as: d}\n";
    const request = { command: "check", study: "a/s.yaml" };
    const beyond = hostOfTexts({ "a/s.yaml": "group: P n q a\n", "a/p": "4.1\n" });
    const text = JSON.stringify({ ...request, texts: { "a/s.yaml": study } });
    expect((await answerLine(text, beyond)).answer.errors).toEqual([]);
    expect((await answerLine(text, host)).answer.errors).toMatchObject([{ code: "file-not-found" }]);
    const inherited = JSON.stringify({ command: "check", study: "toString.yaml", texts: {} });
    expect((await answerLine(inherited, host)).answer.errors[0]?.code).toBe("file-not-found");
  });
});

test("a line that was spoilt anywhere has an envelope as its answer, on one line", async () => {
  const whole =
    '{"id": "a", "command": "ops", "group": "P n m a", "study": null, "texts": {"s.yaml": "group: P -1\\n"}}';
  const pieces = fc.constantFrom(
    '"',
    "\\",
    "{",
    "}",
    "[",
    ",",
    ":",
    "1",
    "null",
    "\n",
    "\u2028",
    "\ud800",
    "study",
    "texts",
    "é",
  );
  await fc.assert(
    fc.asyncProperty(fc.nat(whole.length), fc.nat(12), pieces, async (at, cut, piece) => {
      const { text, answer: answered } = await answerLine(whole.slice(0, at) + piece + whole.slice(at + cut), host);
      expect(text).not.toContain("\n");
      const { id: _id, ...parsed } = JSON.parse(text);
      expect(parsed).toEqual(JSON.parse(JSON.stringify(answered)));
      expect(answered.errors.map(({ code }) => code)).not.toContain("internal-fault");
      expect(answered.result === null).toBe(answered.errors.length > 0);
    }),
    { seed, numRuns: 2000 },
  );
});

describe("the schema of a request", () => {
  const validate = new Ajv2020({ strict: true, strictTypes: false, allowUnionTypes: true }).compile(requestSchema());

  test("has every command, and holds for what is answered alone", async () => {
    for (const command of Object.keys(commandTable)) expect(validate({ command }), command).toBe(true);
    expect(validate({ command: "modes", group: "62", k: "0,0,0", sites: ["A 0 0 0"], polar: true, id: 3 })).toBe(true);
    for (const wrong of [
      {},
      { command: "batch" },
      { command: "ops", k: "0,0,0" },
      { command: "modes", sites: "A 0 0 0" },
    ])
      expect(validate(wrong)).toBe(false);
  });

  test("of every field one kind, or null", () => {
    for (const [command, { takes }] of Object.entries(commandTable))
      for (const field of takes) {
        const fits = (value: unknown) => validate({ command, [field]: value });
        expect([fits("a"), fits(true), fits(["a"])].filter(Boolean), `${command} ${field}`).toHaveLength(1);
        expect(fits(null), field).toBe(true);
      }
  });
});
