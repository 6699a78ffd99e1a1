import { parseStudy } from "@kvane/core/files";
import { describe, expect, it } from "vitest";
import { places, problemsOf } from "../support/problems-of.js";

function problems(text: string) {
  return problemsOf(() => parseStudy(text, "study.yaml"));
}

const cell = "cell: {a: 5, b: 6, c: 7, alpha: 90, beta: 90, gamma: 90}";

describe("what is wrong in a study", () => {
  it.each<[string, string, string[]]>([
    ["an empty file", "", ["file-empty 1:1"]],
    ["comments alone", "# title: x\n", ["file-empty 1:1"]],
    ["a zero byte", "title: a\ngroup: P\u0000", ["file-unreadable 2:9"]],
    ["a list", "- title\n", ["wrong-type 1:1"]],
    ["a word", "title\n", ["wrong-type 1:1"]],
    ["an unknown key", "titel: x\n", ["unknown-key 1:1 titel"]],
    ["an unknown key inside", "peaks: {file: x, wavelenght: 2}\n", ["unknown-key 1:18 peaks.wavelenght"]],
    ["a second colon", "title: Ferrite: the second\n", ["syntax 1:8"]],
    ["an open bracket", "k: [[0, 1/2, 0]\n", ["syntax 1:16"]],
    ["a tab", "peaks:\n\tfile: x\n", ["syntax 2:1"]],
    ["a key twice", "title: a\ngroup: P 1\ntitle: b\n", ["syntax 3:1 title"]],
    ["two documents", "title: a\n---\ntitle: b\n", ["syntax 2:1"]],
    ["an alias", "title: &t a\ngroup: *t\n", ["syntax 2:8 group"]],
    ["a tag", "title: !!int 3\n", ["syntax 1:8"]],
    ["a list as a key", "? [a]\n: b\n", ["syntax 1:3"]],
    ["keys without values", "group:\nk: ~\n", ["missing-key 1:1 group", "missing-key 2:1 k"]],
    ["a list for a text", "group: [P, n, m, a]\n", ["wrong-type 1:8 group"]],
    ["a text for a section", "peaks: satellites.csv\n", ["wrong-type 1:8 peaks"]],
    ["a missing file name", "peaks: {as: d}\n", ["missing-key 1:8 peaks.file"]],
    [
      "a half cell",
      "cell: {a: 5, b: 6, c: 7, alpha: 90}\n",
      ["missing-key 1:7 cell.beta", "missing-key 1:7 cell.gamma"],
    ],
    ["an impossible angle", cell.replace("beta: 90", "beta: 190"), ["invalid-cell 1:43 cell.beta"]],
    ["a negative length", cell.replace("b: 6", "b: -6"), ["invalid-cell 1:17 cell.b"]],
    ["angles without a volume", cell.replaceAll("90", "130"), ["invalid-cell 1:7 cell"]],
    ["NaN", cell.replace("b: 6", "b: .nan"), ["invalid-number 1:17 cell.b"]],
    ["infinity", cell.replace("b: 6", "b: 1e999"), ["invalid-number 1:17 cell.b"]],
    ["an uncertainty", cell.replace("b: 6", "b: 6.01(2)"), ["invalid-number 1:17 cell.b"]],
    ["a cell against the group", `group: P 4\n${cell}\n`, ["cell-contradicts-group 2:7 cell"]],
    ["an unknown group", "title: x\ngroup: P n n x a\n", ["unknown-group 2:8 group"]],
    ["triplets with a slip", "group: 'x,y,z; -x,q,z'\n", ["syntax 1:19 group"]],
    ["no sites", "sites: []\n", ["wrong-type 1:8 sites"]],
    ["a site without coordinates", "sites: [{label: Fe1}]\n", ["missing-key 1:9 sites[0].at"]],
    ["a site without a label", "sites: [{at: [0, 0, 0]}]\n", ["missing-key 1:9 sites[0].label"]],
    ["a blank in a label", "sites: [{label: Fe 1, at: [0, 0, 0]}]\n", ["invalid-site 1:17 sites[0].label"]],
    [
      "a label twice",
      "sites:\n- {label: A, at: [0, 0, 0]}\n- {label: A, at: [0, 0, 1/2]}\n",
      ["duplicate-site 3:11 sites[1].label"],
    ],
    ["two coordinates", "sites: [{label: A, at: [0, 0]}]\n", ["invalid-site 1:24 sites[0].at"]],
    ["a decimal comma in a coordinate", "sites: [{label: A, at: [0,5, 0, 0]}]\n", ["invalid-site 1:24 sites[0].at"]],
    ["a word for a coordinate", "sites: [{label: A, at: [0, x, 0]}]\n", ["invalid-number 1:28 sites[0].at[1]"]],
    ["a fraction by zero", "sites: [{label: A, at: [0, 0, 1/0]}]\n", ["invalid-number 1:31 sites[0].at[2]"]],
    [
      "endless digits",
      `sites: [{label: A, at: [0, 0, 0.${"3".repeat(30)}]}]\n`,
      ["number-overflow 1:31 sites[0].at[2]"],
    ],
    ["a third of a spin", "sites: [{label: A, at: [0, 0, 0], spin: 4/3}]\n", ["invalid-number 1:41 sites[0].spin"]],
    ["an empty k", "k: []\n", ["wrong-type 1:4 k"]],
    ["two components", "k: [[0, 1/2]]\n", ["wrong-type 1:5 k[0]"]],
    ["text in a k", "k: [[0, 1/2, 0], [0, a, 0]]\n", ["invalid-k 1:22 k[1]"]],
    ["text in a k of one text", "k: '0,1/2,b'\n", ["invalid-k 1:11 k[0]"]],
    ["text in a k of lines", "k:\n- 0\n- a\n- 0\n", ["invalid-k 2:1 k[0]"]],
    ["an unknown kind", "peaks: {file: x, as: angle}\n", ["peak-kind-unknown 1:22 peaks.as"]],
    ["a unit of another kind", "peaks: {file: x, as: d, unit: deg}\n", ["invalid-argument 1:31 peaks.unit"]],
    ["a wavelength of 0", "peaks: {file: x, wavelength: 0}\n", ["invalid-number 1:30 peaks.wavelength"]],
    ["a decimal comma", "peaks:\n  file: x\n  wavelength: 2,41\n", ["invalid-number 3:15 peaks.wavelength"]],
    ["half a peak", "search: {unmatched: 0.5}\n", ["invalid-number 1:21 search.unmatched"]],
    ["four dimensions", "search: {max-dimension: 4}\n", ["invalid-number 1:25 search.max-dimension"]],
    ["shell 0", "exchange: [{shell: 0, j: 1}]\n", ["invalid-number 1:20 exchange[0].shell"]],
    ["a bond that is none", "exchange: [{bond: b2, j: 1}]\n", ["wrong-type 1:19 exchange[0].bond"]],
    ["shell and bond", "exchange: [{shell: 1, bond: 2b, j: 1}]\n", ["conflicting-arguments 1:29 exchange[0].bond"]],
    ["neither shell nor bond", "exchange: [{j: 1}]\n", ["missing-key 1:12 exchange[0]"]],
    [
      "a bond between three",
      "exchange: [{shell: 1, between: [A, B, C], j: 1}]\n",
      ["wrong-type 1:32 exchange[0].between"],
    ],
    ["a constant without a value", "exchange: [{shell: 1}]\n", ["missing-key 1:12 exchange[0].j"]],
    ["a range of one number", "exchange: [{shell: 1, vary: [1]}]\n", ["wrong-type 1:29 exchange[0].vary"]],
    ["a range of four", "exchange: [{shell: 1, vary: [0, 1, 5, 2]}]\n", ["wrong-type 1:29 exchange[0].vary"]],
    ["a range that goes nowhere", "exchange: [{shell: 1, vary: [1, 1]}]\n", ["wrong-type 1:29 exchange[0].vary"]],
    ["half a value", "exchange: [{shell: 1, vary: [0, 1, 2.5]}]\n", ["invalid-number 1:36 exchange[0].vary[2]"]],
    ["an onset without a file", "onset: {}\n", ["missing-key 1:8 onset.file"]],
    ["a range upside down", "exclude: [[38.5, 38.1]]\n", ["wrong-type 1:11 exclude[0]"]],
    ["structure and cell", `structure: a.cif\n${cell}\n`, ["conflicting-arguments 2:7 cell"]],
  ])("%s", async (_what, text, expected) => {
    const found = await problems(text);
    expect(places(found)).toEqual(expected);
    for (const one of found) expect([one.message, one.expected].every((word) => word)).toBe(true);
  });

  it("is told all at once, in the order of the file", async () => {
    const text = [
      "group: P n x a",
      "cell: {a: 10,21, b: 6, c: 5, alpha: 90, beta: 90, gamma: 90}",
      "sites:",
      "  - {label: Fe1, ion: [Fe], at: [0, y, 0]}",
      "k: [[0, 1/2, k]]",
      "serach: {unmatched: 1}",
    ].join("\n");
    expect(places(await problems(text))).toEqual([
      "unknown-group 1:8 group",
      "unknown-key 2:14 cell.21",
      "wrong-type 4:23 sites[0].ion",
      "invalid-number 4:37 sites[0].at[1]",
      "invalid-k 5:14 k[0]",
      "unknown-key 6:1 serach",
    ]);
  });

  it.each([
    ["titel: x", "`title`"],
    ["Group: P 1", "`group`"],
    ["max_dimension: 1", "`search`"],
    ["search: {max_dimension: 1}", "`max-dimension`"],
    ["search: {maxdimension: 1}", "`max-dimension`"],
    ["cell: {alfa: 90}", "`alpha`"],
    ["wavelength: 2.4", "`peaks`"],
    ["tolerance: 2.4", "`peaks` or `search`"],
    ["peaks: {file: a, k: 0}", "top of the file"],
    ["cell: {a: 5,3}", "point instead of the comma"],
  ])("names the likely key for %s", async (text, likely) => {
    const found = (await problems(text)).find(({ code }) => code === "unknown-key");
    expect(found?.remedy).toContain(likely);
  });

  it("does not guess at keys that are nothing like it", async () => {
    for (const text of ["colour: red", "cell: {d: 4}", "constructor: 1", "__proto__: {a: 1}"]) {
      const found = (await problems(text)).find(({ code }) => code === "unknown-key");
      expect(found?.remedy).not.toContain("did you mean");
    }
  });

  it("is not brought to its knees by what YAML allows", async () => {
    const bomb = ["a: &a [x, x, x, x]", ...Array.from({ length: 20 }, (_, i) => `b${i}: &b${i} [*a, *a, *a]`)].join(
      "\n",
    );
    expect((await problems(bomb)).length).toBe(21);
    expect((await problems("[".repeat(2_000))).map(({ code }) => code)).toContain("syntax");
    expect(
      (await problems(Array.from({ length: 500 }, (_, i) => `${" ".repeat(i)}a:`).join("\n"))).length,
    ).toBeGreaterThan(0);
    expect(places(await problems("a: 1\n".repeat(60_000)))).toEqual(["syntax 1:1"]);
  });
});
