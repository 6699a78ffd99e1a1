import { type CifDocument, type CifValue, parseCif } from "@kvane/core/files";
import { describe, expect, test } from "vitest";
import { valueAt } from "#core/files/cif/values.js";
import { cifNames, cifText } from "../support/cif-fixtures.js";
import { problemsOf } from "../support/problems-of.js";

/** Texts, and lists and tables of them, without places. */
type Plain = string | readonly Plain[] | { readonly [key: string]: Plain };

function plain(value: CifValue): Plain {
  if (value.shape === "text") return value.text;
  if (value.shape === "list") return value.items.map(plain);
  return Object.fromEntries(value.entries.map(({ key, value: inner }) => [key, plain(inner)]));
}

/** Every value of every name, block by block; loops by column. */
function contents(document: CifDocument): { [block: string]: { [name: string]: Plain } } {
  const of = ({ items, loops }: CifDocument["blocks"][number]) =>
    Object.fromEntries([
      ...items.map(({ name, value }) => [name, plain(valueAt(document, value))] as const),
      ...loops.flatMap(({ names, values }) =>
        names.map(({ name }, column) => {
          const own = values.filter((_, index) => index % names.length === column);
          return [name, own.map((offset) => plain(valueAt(document, offset)))] as const;
        }),
      ),
    ]);
  return Object.fromEntries(document.blocks.map((block) => [block.code, of(block)]));
}

const read = async (text: string, strict = true) => contents(await parseCif(text, "test.cif", { strict }));

/** `code line:column` of every problem. */
async function problemsIn(text: string, strict = true): Promise<string[]> {
  const problems = await problemsOf(() => parseCif(text, "test.cif", { strict }));
  return problems.map(({ code, where }) => `${code} ${where.line}:${where.column}`);
}

/** What the standards (International Tables G, 2.2; Bernstein et al., 2016) make of the good fixtures, worked out by hand. */
const meanings: { readonly [file: string]: Awaited<ReturnType<typeof read>> } = {
  "quotes.cif": {
    quotes: {
      _dog: "a dog's life",
      _inch: '5"tall',
      _empty: "",
      _question_text: "?",
      _dot_text: ".",
      _unknown: "?",
      _inapplicable: ".",
      _hash: "a#b",
      _semicolon: ";abc",
      _loop: "loop_x",
      _stop: "stop_it",
      _global: "global_x",
      _datum: "dat_a",
      _quote_inside: "o'clock",
      _number_text: "1.5",
    },
  },
  "brackets-in-1.1.cif": { brackets: { _brackets: "a[b]{c}", _braces: "{x}" } },
  "triple-in-1.1.cif": { triple: { _x: "''abc''", _y: '""' } },
  "text-fields.cif": {
    text: {
      _plain: "first line\n second line\n",
      _empty: "",
      _not_closed_here: " a ; in the line\n ;indented does not close",
      _folded: "one line and a half\nsecond",
      _prefixed: "one\n; two",
      _prefixed_and_folded: "one line",
      _no_prefix: ">\\\n>one\ntwo",
      _next: "1",
    },
  },
  "loops.cif": {
    Loops: { _a: ["1", "3"], _b: ["2", "4"], _single: "5", _c: ["x", "text"], _d: ["y z", "tab"], _e: ["1"] },
  },
  "save-frames.cif": { dictionary: { _title: "a save frame", _after: "3" } },
  "cif2.cif": {
    two: {
      _list: ["1", "2", ["a", "b c"]],
      _empty_list: [],
      _table: { k: "value", l: ["1", "2"], m: "with a blank" },
      _empty_table: {},
      _triple: "one ' and '' two\nlines",
      _triple_double: 'a"b',
      _unicode: "Müller Å 𝄞",
      _apostrophe: "o'clock",
      _spread: ["1", "2", "a text field"],
    },
  },
  "no-line-end.cif": { end: { _x: "1" } },
  "only-comments.cif": {},
  "blocks.cif": { first: { _x: "1" }, second: { _x: "2" } },
};

/** The first problem of every bad fixture, and the others where there are several. */
const faults: { readonly [file: string]: readonly string[] } = {
  "quote-open.cif": ["cif-syntax 2:4"],
  "quote-open-2.cif": ["cif-syntax 3:11", "cif-syntax 3:13"],
  "triple-open.cif": ["cif-syntax 3:4"],
  "triple-lines-in-1.1.cif": ["cif-syntax 2:4", "cif-syntax 3:1"],
  "text-open.cif": ["cif-syntax 4:1"],
  "text-glued.cif": ["cif-syntax 4:2"],
  "no-value.cif": ["cif-incomplete 2:1", "cif-incomplete 4:1"],
  "loop-count.cif": ["cif-incomplete 6:1"],
  "loop-no-names.cif": ["cif-incomplete 2:1"],
  "loop-no-values.cif": ["cif-incomplete 2:1"],
  "name-twice.cif": ["cif-duplicate 3:1"],
  "name-twice-loop.cif": ["cif-duplicate 3:10"],
  "block-twice.cif": ["cif-duplicate 3:1"],
  "block-no-code.cif": ["cif-syntax 1:1"],
  "global.cif": ["cif-syntax 3:1"],
  "stop.cif": ["cif-syntax 2:14"],
  "bracket-first.cif": ["cif-syntax 2:4"],
  "bracket-closing-first.cif": ["cif-syntax 2:4"],
  "dollar-first.cif": ["cif-syntax 2:4"],
  "no-letters.cif": ["cif-syntax 2:1"],
  "stray-values.cif": ["cif-syntax 2:12"],
  "before-block.cif": ["cif-syntax 1:1"],
  "no-block.cif": ["cif-syntax 1:1"],
  "save-nested.cif": ["cif-syntax 2:1"],
  "save-open.cif": ["cif-syntax 2:1"],
  "save-close.cif": ["cif-syntax 2:1"],
  "list-open.cif": ["cif-syntax 3:4"],
  "list-glued.cif": ["cif-syntax 3:8"],
  "list-end.cif": ["cif-syntax 3:9", "cif-incomplete 4:1", "cif-syntax 4:4"],
  "bare-bracket.cif": ["cif-syntax 3:5"],
  "table-key.cif": ["cif-syntax 3:5"],
  "table-key-twice.cif": ["cif-duplicate 3:11"],
  "table-no-value.cif": ["cif-incomplete 3:5"],
  "control.cif": ["cif-characters 2:5"],
  "control-2.cif": ["cif-characters 3:6", "cif-characters 3:8"],
  "non-ascii.cif": ["cif-characters 2:11"],
  "name-long.cif": ["cif-syntax 2:1"],
  "several.cif": ["cif-syntax 2:4", "cif-incomplete 3:17", "cif-duplicate 4:1", "cif-syntax 5:1", "cif-duplicate 6:1"],
};

describe("the grammar of CIF", () => {
  test("every fixture has its expectation", () => {
    expect(cifNames("good")).toEqual([...Object.keys(meanings), "numbers.cif"].sort());
    expect(cifNames("bad")).toEqual(Object.keys(faults).sort());
  });

  test.each(Object.entries(meanings))("%s means what the standard says", async (file, expected) => {
    expect(await read(cifText("good", file))).toEqual(expected);
  });

  test.each(Object.entries(faults))("%s is refused at the place of its fault", async (file, expected) => {
    expect(await problemsIn(cifText("bad", file))).toEqual(expected);
  });

  test("line ends of every system, mixed ones and none at the end mean the same", async () => {
    for (const file of Object.keys(meanings)) {
      const text = cifText("good", file);
      const expected = await read(text);
      let turn = 0;
      const ends = ["\r\n", "\r", "\n"];
      const mixed = text.replace(/\n/g, () => ends[turn++ % 3] as string);
      for (const other of [text.replaceAll("\n", "\r\n"), text.replaceAll("\n", "\r"), mixed, text.trimEnd()])
        expect(await read(other), file).toEqual(expected);
    }
  });

  test("lines and columns count the same with CRLF", async () => {
    for (const [file, expected] of Object.entries(faults))
      expect(await problemsIn(cifText("bad", file).replaceAll("\n", "\r\n"))).toEqual(expected);
  });

  test("values know their places, their form and what stands in the file", async () => {
    const document = await parseCif("data_a\n  _x 'a b' _y ?\nloop_\n_z\n;text\n;\n", "test.cif");
    const [block] = document.blocks;
    const values = [...(block?.items ?? []).map(({ value }) => value), ...(block?.loops[0]?.values ?? [])];
    expect(values.map((offset) => valueAt(document, offset))).toEqual([
      { shape: "text", form: "quoted", text: "a b", raw: "'a b'", line: 2, column: 6 },
      { shape: "text", form: "bare", text: "?", raw: "?", line: 2, column: 15 },
      { shape: "text", form: "text field", text: "text", raw: ";text\n;", line: 5, column: 1 },
    ]);
    expect(JSON.parse(JSON.stringify(document))).toEqual(document);
  });

  test("save frames keep what is theirs", async () => {
    const document = await parseCif(cifText("good", "save-frames.cif"), "test.cif");
    const frames = document.blocks[0]?.frames ?? [];
    expect(contents({ ...document, blocks: frames })).toEqual({
      one: { _name: "1" },
      two: { _name: "2", _l: ["1", "2"] },
    });
  });

  test("CIF 2.0 is what begins so, behind a byte-order mark if there is one", async () => {
    const version = async (text: string) => (await parseCif(text, "test.cif")).version;
    expect(await version("#\\#CIF_2.0\ndata_a\n_x 1\n")).toBe("2.0");
    expect(await version("\uFEFF#\\#CIF_2.0\ndata_a\n_x 1\n")).toBe("2.0");
    expect(await version(" #\\#CIF_2.0\ndata_a\n_x 1\n")).toBe("1.1");
    expect(await version("#\\#CIF_2.01\ndata_a\n_x 1\n")).toBe("1.1");
    expect(await version("#\\#CIF_1.1\ndata_a\n_x 1\n")).toBe("1.1");
    expect(await version("# a comment\n#\\#CIF_2.0\ndata_a\n_x 1\n")).toBe("1.1");
  });

  test("what has one meaning all the same is a warning unless the letter of the standard is asked for", async () => {
    const codes = async (text: string) =>
      (await parseCif(text, "test.cif")).warnings.map(({ code, where }) => `${code} ${where.line}:${where.column}`);
    expect(await codes(cifText("bad", "non-ascii.cif"))).toEqual(["cif-characters 2:11"]);
    expect(await codes(cifText("bad", "name-long.cif"))).toEqual(["cif-syntax 2:1"]);
    expect(await codes("\uFEFFdata_a\n_x 1\n")).toEqual(["cif-characters 1:1"]);
    expect(await codes("data_a\n_x 1\n\u001a")).toEqual(["cif-characters 3:1"]);
    expect(await codes(`data_a\n_x '${"a".repeat(2050)}'\n`)).toEqual(["cif-syntax 2:1"]);
    expect(await codes("#\\#CIF_3.0\ndata_a\n_x 1\n")).toEqual(["cif-syntax 1:1"]);
    expect(await codes(`data_a\n_x '${"a".repeat(2043)}'\n`)).toEqual([]);
  });

  test("a list that is nested without end is refused, not followed", async () => {
    expect((await problemsIn(`#\\#CIF_2.0\ndata_a\n_x ${"[".repeat(100_000)}`))[0]).toMatch(/^cif-syntax 3:/);
  });

  test("a file of another kind has one problem that says so", async () => {
    expect(await problemsIn("<html>\n<body>not found</body>\n</html>\n")).toEqual(["cif-syntax 1:1"]);
    expect(await problemsIn("")).toEqual(["file-empty 1:1"]);
    expect(await problemsIn("data_a\u0000")).toEqual(["file-unreadable 1:7"]);
  });
});
