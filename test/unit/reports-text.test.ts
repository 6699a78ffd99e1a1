import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { csvText } from "#core/reports/csv/csv-text.js";
import { jsonText } from "#core/reports/json-text.js";
import {
  fields,
  flow,
  numbered,
  pageWidth,
  plainBlanks,
  section,
  table,
  unbroken,
  wideTable,
  widthOf,
  wrap,
} from "#core/reports/text/layout.js";
import { kText, positionText } from "#core/reports/text/names.js";

const seed = 20261201;
const word = fc.stringMatching(/^[a-zΓ−0-9]{1,12}$/u);
const sentence = fc.array(word, { minLength: 1, maxLength: 40 }).map((words) => words.join(" "));

describe("layout", () => {
  test("wrapping keeps every word in order and every line within the width", () => {
    fc.assert(
      fc.property(sentence, fc.integer({ min: 20, max: 100 }), (text, width) => {
        const lines = wrap(text, width, 4);
        expect(lines.map((line) => line.trim()).join(" ")).toBe(text);
        for (const line of lines) expect(widthOf(line)).toBeLessThanOrEqual(width);
      }),
      { seed },
    );
  });

  test("tables, fields and flows stay within the page and lose nothing", () => {
    fc.assert(
      fc.property(fc.array(fc.tuple(word, word, sentence), { minLength: 1, maxLength: 12 }), (rows) => {
        const lines = [
          ...table([{ title: "a" }, { title: "b", align: "right" }, { title: "c" }], rows),
          ...fields(rows.map(([name, , text]) => [name, text] as const)),
          ...flow(rows.map(([a, b]) => `${a} ${b}`)),
          ...numbered(rows.map(([a]) => a)),
        ];
        for (const line of lines) {
          expect(widthOf(line)).toBeLessThanOrEqual(pageWidth);
          expect(line).toBe(line.trimEnd());
        }
        const text = lines.join(" ").replace(/\s+/g, " ");
        for (const [a] of rows) expect(text).toContain(a);
      }),
      { seed },
    );
  });

  test("columns that do not fit go into further blocks, each with its own head and the fixed column", () => {
    const columns = Array.from({ length: 60 }, (_, index) => ({ title: String(index + 1) }));
    const lines = wideTable([{ title: "row" }], columns, [
      { fixed: ["x"], cells: columns.map(({ title }) => `v${title}`) },
    ]);
    for (const line of lines) expect(widthOf(line)).toBeLessThanOrEqual(pageWidth);
    expect(lines.join(" ").match(/v\d+/g)).toEqual(columns.map(({ title }) => `v${title}`));
    expect(lines.filter((line) => line.includes("row")).length).toBe(lines.filter((line) => /\bx\b/.test(line)).length);
  });

  test("what is wider than a line is broken all the same, and nothing is lost", () => {
    const long = "Γ".repeat(230);
    const rows = [[long, "b", `${long} c`]];
    const lines = [
      ...table([{ title: "a" }, { title: "b", align: "right" }, { title: "c" }], rows),
      ...fields([["name", long]]),
      ...fields([[long, "value"]]),
      ...flow([long, "short"]),
      ...section(long, ["  line"]),
    ];
    for (const line of lines) expect(widthOf(line)).toBeLessThanOrEqual(pageWidth);
    expect([...lines.join("")].filter((letter) => letter === "Γ")).toHaveLength(6 * 230);
  });

  test("joined words stay together unless they fill more than a line", () => {
    expect(wrap(`aaaa bbbb ${unbroken("(1 0 -1) + k")}`, 16)).toEqual(["aaaa bbbb", unbroken("(1 0 -1) + k")]);
    expect(plainBlanks(wrap(unbroken("(1 0 -1) + k"), 6).join("|"))).toBe("(1 0|-1) +|k");
  });

  test("titles are broken before cells are", () => {
    const titles = ["first of many words", "second of many words", "third of many words", "fourth of many words"];
    const cell = "x".repeat(20);
    const lines = table(
      titles.map((title) => ({ title: `${title} and more` })),
      [[cell, cell, cell, cell]],
    );
    expect(lines.at(-1)?.trim().split(/ +/)).toEqual([cell, cell, cell, cell]);
    for (const line of lines) expect(widthOf(line)).toBeLessThanOrEqual(pageWidth);
  });

  test("right-aligned numbers end in one column", () => {
    const lines = table(
      [{ title: "n", align: "right" }, { title: "t" }],
      [
        ["1", "a"],
        ["100", "b"],
      ],
    );
    expect(lines).toEqual(["    n  t", "    1  a", "  100  b"]);
  });
});

describe("names", () => {
  test("fractions that were decimals read as decimals, thirds and eighths stay", () => {
    expect(positionText(["137/1000", "1/4", "77/250"])).toBe("(0.137, 1/4, 0.308)");
    expect(positionText(["1/3", "1/24", "-49/50"])).toBe("(1/3, 1/24, -0.98)");
    expect(positionText(["1/8", "3/10", "2/7"])).toBe("(1/8, 0.3, 2/7)");
  });

  test("a measured k shows its value, with the uncertainty where there is one", () => {
    const k = { components: ["0", "u", "0"], values: { u: 0.472 }, numeric: [0, 0.472, 0] };
    expect(kText({ ...k, su: {} })).toBe("(0, u, 0), u = 0.472");
    // Rule of 19 of the notes for authors of Acta Crystallographica.
    expect(kText({ ...k, su: { u: 0.0004 } })).toBe("(0, u, 0), u = 0.4720(4)");
    expect(kText({ ...k, su: { u: 0.00012 } })).toBe("(0, u, 0), u = 0.47200(12)");
  });
});

describe("JSON and CSV text", () => {
  test("any JSON value is read back as it was", () => {
    fc.assert(
      fc.property(fc.jsonValue(), (value) => {
        // JSON has no −0: the number formatter lets none out.
        const plain = JSON.parse(JSON.stringify(value));
        const text = jsonText(plain);
        expect(JSON.parse(text)).toEqual(plain);
        expect(text.endsWith("\n")).toBe(true);
      }),
      { seed },
    );
  });

  test("triples stay on one line", () => {
    expect(jsonText({ a: [[1, 2, 3]], b: {} })).toBe('{\n  "a": [[1, 2, 3]],\n  "b": {}\n}\n');
  });

  test("RFC 4180: commas, quotation marks and line ends are quoted", () => {
    expect(
      csvText(
        ["a", "b"],
        [
          ["x,y", 'say "k"'],
          [null, 1.5],
          ["two\nlines", true],
        ],
      ),
    ).toBe('a,b\n"x,y","say ""k"""\n,1.5\n"two\nlines",true\n');
  });
});
