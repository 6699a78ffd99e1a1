import { type CifStructure, parseCif, readCifStructure } from "@kvane/core/files";
import { formatTriplet, operatorsModuloIntegers, parseGroup, siteOrbit } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { groupText } from "#core/files/cif/group-text.js";
import { formatRational, parseRational } from "#core/numbers/index.js";
import { cifNames, cifText } from "../support/cif-fixtures.js";
import { places, problemsOf } from "../support/problems-of.js";

async function structureIn(text: string, block: string | null = null): Promise<CifStructure> {
  return readCifStructure(await parseCif(text, "test.cif"), block);
}

/** Every problem of every part, as a command that needs all of it throws them. */
async function problemsIn(text: string): Promise<string[]> {
  const found = await problemsOf(() => structureIn(text));
  if (found.length > 0) return places(found);
  const { cell, symmetry, fit, sites } = (await structureIn(text)).problems;
  return places([...cell, ...symmetry, ...fit, ...sites]);
}

/** Operators as a set of texts, to compare groups without names. */
function operatorsOf(structure: CifStructure): string[] {
  const group = structure.symmetry?.group;
  return group ? operatorsModuloIntegers(group).map(formatTriplet).sort() : [];
}

function operatorsOfText(group: string): string[] {
  return operatorsModuloIntegers(parseGroup(group)).map(formatTriplet).sort();
}

/** A fraction in lowest terms. */
function reduced(text: string): string {
  const value = parseRational(text);
  return value ? formatRational(value) : text;
}

interface Expected {
  readonly group: string;
  readonly source: string;
  readonly cell: readonly number[];
  readonly sites: readonly string[];
  readonly warnings?: readonly string[];
  readonly block?: string;
}

/**
 * What each fixture has to give: the group as a symbol of International Tables A whose operators have to be the same, the
 * cell, the sites as `label ion x y z`, and the codes and lines of the warnings. Worked out by hand.
 */
const structures: { readonly [file: string]: Expected } = {
  "hexagonal-operators.cif": {
    group: "P 31 2 1",
    source: "operators",
    cell: [4.9, 4.9, 5.4, 90, 90, 120],
    sites: ["Fe1 Fe 47/100 0 33333/100000", "O1 O 41/100 27/100 39/50"],
  },
  "translation-first.cif": {
    group: "R -3 c:H",
    source: "operators",
    cell: [5.038, 5.038, 13.772, 90, 90, 120],
    sites: ["Fe1 Fe3+ 0 0 3553/10000", "O1 O2- 3059/10000 0 1/4"],
    // Its list leaves two thirds of the operators to the centring vectors.
    warnings: ["cif-contradiction 11:1"],
  },
  "old-names.cif": {
    group: "F m -3 m",
    source: "Hermann–Mauguin symbol",
    cell: [4.445, 4.445, 4.445, 90, 90, 90],
    sites: ["Mn1 Mn2+ 0 0 0", "O1 O2- 1/2 1/2 1/2"],
  },
  "new-names.cif": {
    group: "F m -3 m",
    source: "Hermann–Mauguin symbol",
    cell: [4.445, 4.445, 4.445, 90, 90, 90],
    sites: ["Mn1 Mn2+ 0 0 0", "O1 O2- 1/2 1/2 1/2"],
  },
  "hall-only.cif": {
    group: "F d -3 m:1",
    source: "Hall symbol",
    cell: [8.39, 8.39, 8.39, 90, 90, 90],
    sites: ["Fe1 Fe 0 0 0"],
  },
  "symbol-only.cif": {
    group: "P 1 21/c 1",
    source: "Hermann–Mauguin symbol",
    cell: [5.1, 6.2, 7.3, 90, 101.5, 90],
    sites: ["Co1 Co 1/10 1/5 3/10"],
  },
  "number-only.cif": {
    group: "P n m a",
    source: "number",
    cell: [10.2, 6, 4.7, 90, 90, 90],
    sites: ["Fe1 Fe 0 0 0"],
  },
  "rhombohedral-axes.cif": {
    group: "R -3 c:R",
    source: "Hermann–Mauguin symbol",
    cell: [5.427, 5.427, 5.427, 55.28, 55.28, 55.28],
    sites: ["Fe1 Fe 71/200 71/200 71/200"],
  },
  "hexagonal-axes.cif": {
    group: "R -3 c:H",
    source: "Hermann–Mauguin symbol",
    cell: [5.038, 5.038, 13.772, 90, 90, 120],
    sites: ["Fe1 Fe 0 0 71/200"],
  },
  "single-operator.cif": {
    group: "P 1",
    source: "operators",
    cell: [5, 6, 7, 81, 92, 103],
    sites: ["Ni1 Ni 1/10 1/5 3/10"],
  },
  "one-atom-without-loop.cif": {
    group: "I m -3 m",
    source: "Hermann–Mauguin symbol",
    cell: [2.87, 2.87, 2.87, 90, 90, 90],
    sites: ["Fe1 Fe 0 0 0"],
  },
  "operators-only.cif": {
    group: "P 1 21/c 1 (2a,b,c;0,0,0)",
    source: "operators",
    cell: [10.2, 6.2, 7.3, 90, 101.5, 90],
    sites: ["Cr1 Cr 1/20 1/5 3/10"],
  },
  "contradiction.cif": {
    group: "P b n m",
    source: "operators",
    cell: [5.3, 5.6, 7.6, 90, 90, 90],
    sites: ["Fe1 Fe 0 1/2 0"],
    warnings: ["cif-contradiction 10:33", "cif-contradiction 9:32", "cif-contradiction 11:29"],
  },
  "thirds.cif": {
    group: "P 63/m m c",
    source: "Hermann–Mauguin symbol",
    cell: [4.1, 4.1, 5.2, 90, 90, 120],
    sites: ["Mn1 Mn2+ 3333/10000 6667/10000 1/4", "Co1 Co2+ 3133/10000 6667/10000 1/4"],
  },
  "occupancy-and-disorder.cif": {
    group: "P m -3 m",
    source: "Hermann–Mauguin symbol",
    cell: [4.2, 4.2, 4.2, 90, 90, 90],
    sites: [
      "Fe1 Fe3+ 0 0 0",
      "Mn1 Mn3+ 0 0 0",
      "La1 La3+ 1/2 1/2 1/2",
      "O1A O2- 1/2 1/50 0",
      "O1B O2- 1/2 1/25 1/25",
      "H1 H none",
      "X1 none 1/10 1/10 1/10",
    ],
    // No coordinates, a shared position, partial occupancies, disorder: at the first site of each; an unknown element.
    warnings: ["cif-doubtful 23:1", "cif-doubtful 19:1", "cif-doubtful 18:1", "cif-doubtful 21:1", "cif-doubtful 1:1"],
  },
  "ions.cif": {
    group: "P 1",
    source: "Hermann–Mauguin symbol",
    cell: [5, 6, 7, 90, 90, 90],
    sites: [
      "Al1 Al 1/100 0 0",
      "Fe1 Fe3+ 1/50 0 0",
      "Fe2 Fe2+ 3/100 0 0",
      "Cu1 Cu 1/25 0 0",
      "D1 D 1/20 0 0",
      "O1 O2- 3/50 0 0",
      "Cr1 Cr3+ 7/100 0 0",
      "W1 W6+ 2/25 0 0",
      "Wat none 9/100 0 0",
      "Fe_3 Fe 1/10 0 0",
      "Fe1_2 Fe3+ 11/100 0 0",
    ],
    // No element in Wat; labels written anew.
    warnings: ["cif-doubtful 1:1", "cif-doubtful 1:1"],
  },
  "labels-alone.cif": {
    group: "P 1",
    source: "Hermann–Mauguin symbol",
    cell: [5, 6, 7, 90, 90, 90],
    sites: ["CO1 Co 1/100 0 0", "Ni2a Ni 1/50 0 0", "O3 O 3/100 0 0"],
  },
  "two-blocks.cif": {
    block: "data_AT_2k",
    group: "I 4/m m m",
    source: "Hermann–Mauguin symbol",
    cell: [4.4, 4.4, 4.3, 90, 90, 90],
    sites: ["Mn1 Mn 0 0 0"],
  },
  "origin-code.cif": {
    group: "F d -3 m:1",
    source: "Hermann–Mauguin symbol",
    cell: [8.39, 8.39, 8.39, 90, 90, 90],
    sites: ["Fe1 Fe 0 0 0"],
  },
  "cell-within-uncertainties.cif": {
    group: "P 4/m m m",
    source: "Hermann–Mauguin symbol",
    // a = b = (4.40 + 4.45)/2, equal uncertainties.
    cell: [4.425, 4.425, 5.2, 90, 90, 90],
    sites: ["Mn1 Mn 0 0 0"],
  },
  "equivalents-listed.cif": {
    group: "P n m a",
    source: "Hermann–Mauguin symbol",
    cell: [10.2, 6, 4.7, 90, 90, 90],
    sites: ["Fe1 Fe2+ 0 0 0", "Fe2 Fe2+ 1/2 0 1/2", "Fe3 Fe2+ 0 1/2 0", "Fe4 Fe2+ 1/2 1/2 1/2"],
  },
  "two-names.cif": {
    group: "P b n m",
    source: "Hermann–Mauguin symbol",
    cell: [5.1, 6.2, 7.3, 90, 90, 90],
    sites: ["Fe1 Fe 11/100 23/100 37/100"],
    warnings: ["cif-contradiction 9:32"],
  },
  "two-operator-lists.cif": {
    group: "P -1",
    source: "operators",
    cell: [5.1, 6.2, 7.3, 90, 90, 90],
    sites: ["Fe1 Fe 11/100 23/100 37/100"],
    warnings: ["cif-contradiction 14:1"],
  },
  "other-hand.cif": {
    group: "P 31 2 1 (a,b,c;0,0,-1/8)",
    source: "operators",
    cell: [4.9, 4.9, 5.4, 90, 90, 120],
    sites: ["Fe1 Fe 11/100 23/100 37/100"],
    // The symbol is that of the other hand; the number is right.
    warnings: ["cif-contradiction 9:32"],
  },
  "cell-weighted.cif": {
    group: "P 4",
    source: "Hermann–Mauguin symbol",
    // (4 × 5.001 + 5.003)/5
    cell: [5.0014, 5.0014, 7, 90, 90, 90],
    sites: ["Fe1 Fe 11/100 23/100 37/100"],
  },
  "labels-in-capitals.cif": {
    group: "P 1",
    source: "Hermann–Mauguin symbol",
    cell: [5.1, 6.2, 7.3, 90, 90, 90],
    sites: [
      "FE2 Fe 1/10 0 0",
      "NI1 Ni 11/100 0 0",
      "CO1 Co 3/25 0 0",
      "YB Yb 13/100 0 0",
      "HO1 Ho 7/50 0 0",
      "OW1 O 3/20 0 0",
      "C1A C 4/25 0 0",
      "NH4 N 17/100 0 0",
      "fe3 Fe 9/50 0 0",
      "Wat1 none 19/100 0 0",
      "WAT none 1/5 0 0",
      "M1 none 21/100 0 0",
    ],
    warnings: ["cif-doubtful 2:1"],
  },
};

/** Files of right grammar that cannot be used, and where. */
const refused: { readonly [file: string]: readonly string[] } = {
  "no-symmetry.cif": ["cif-missing 1:1"],
  "unknown-symmetry.cif": ["cif-missing 1:1"],
  "not-a-symbol.cif": ["unknown-group 5:28"],
  "not-a-group.cif": ["not-a-group 8:1"],
  "operator-words.cif": ["syntax 8:7", "syntax 9:1"],
  "cell.cif": ["cif-value 2:16", "cif-value 3:16", "cif-missing 4:1", "cif-value 5:19"],
  "cell-against-group.cif": ["cell-contradicts-group 2:16"],
  "coordinates.cif": ["cif-value 11:7", "cif-value 12:5", "cif-value 12:12"],
  "cartesian.cif": ["cif-missing 1:1"],
  "hall-as-symbol.cif": ["ambiguous-group 8:33"],
  "tripled-cell.cif": ["ambiguous-group 8:33"],
  "cell-without-uncertainties.cif": ["cell-contradicts-group 2:16"],
  "alias-twice.cif": ["cif-duplicate 3:1"],
  "several-structures.cif": ["cif-block 3:1"],
  "no-structure.cif": ["cif-missing 1:1", "cif-missing 1:1", "cif-missing 1:1"],
};

describe("structures of CIFs", () => {
  test("every fixture has its expectation", () => {
    expect(cifNames("structures")).toEqual(Object.keys(structures).sort());
    expect(cifNames("refused")).toEqual(Object.keys(refused).sort());
  });

  test.each(Object.entries(structures))("%s", async (file, expected) => {
    const structure = await structureIn(cifText("structures", file), expected.block ?? null);
    expect(Object.values(structure.problems).flat()).toEqual([]);
    expect(operatorsOf(structure)).toEqual(operatorsOfText(expected.group));
    expect(structure.symmetry?.source).toBe(expected.source);
    expect(Object.values(structure.fitted?.cell ?? {}).map((value) => Number(value.toFixed(8)))).toEqual(expected.cell);
    const shown = structure.sites.map(({ label, ion, position }) =>
      [label, ion?.text ?? "none", ...(position ? position.map(formatRational) : ["none"])].join(" "),
    );
    expect(shown).toEqual(expected.sites);
    const warnings = Object.values(structure.notes).flatMap((one) => one.warnings);
    expect(places(warnings)).toEqual(expected.warnings ?? []);
  });

  test.each(Object.entries(refused))("%s is refused where it is wrong", async (file, expected) => {
    expect(await problemsIn(cifText("refused", file))).toEqual(expected);
  });

  test.each(Object.keys(structures))("the group of %s is written so that it is read back", async (file) => {
    const structure = await structureIn(cifText("structures", file), structures[file]?.block ?? null);
    const text = structure.symmetry ? groupText(structure.symmetry.group) : "";
    expect(operatorsOfText(text)).toEqual(operatorsOf(structure));
  });

  test("Windows line ends, comments and other orders of names change nothing", async () => {
    const text = cifText("structures", "old-names.cif");
    const plain = await structureIn(text);
    const other = await structureIn(`# first\r\n${text.replaceAll("\n", "\r\n")}`);
    expect(operatorsOf(other)).toEqual(operatorsOf(plain));
    expect(other.fitted).toEqual(plain.fitted);
    expect(other.sites.map(({ position }) => position)).toEqual(plain.sites.map(({ position }) => position));
  });

  test("coordinates with all digits of a float stay exact enough for every group", async () => {
    const text = cifText("structures", "thirds.cif").replace(
      "Co1 Co2+ 0.3133 0.6667 0.25",
      "Co1 Co2+ 0.1234567891234567 -0.2345678912345678 1.3456789123456789",
    );
    const structure = await structureIn(text);
    const group = structure.symmetry?.group;
    const [site] = structure.sites.slice(1);
    expect(site?.position?.map(formatRational)).toEqual(
      ["1234568/10000000", "-2345679/10000000", "13456789/10000000"].map(reduced),
    );
    if (group && site?.position)
      expect(
        siteOrbit(group, { label: "Co1", position: site.position }, structure.fitted?.cell ?? null).multiplicity,
      ).toBe(24);
  });

  test("of several blocks the only one with a structure is taken, and that is said", async () => {
    const { block, notes } = await structureIn(`data_global\n_x 1\n${cifText("structures", "old-names.cif")}`);
    expect(block).toBe("old");
    expect(notes.file.assumed).toMatchObject([{ what: "data block", value: "old" }]);
    expect(places(await problemsOf(() => structureIn("data_a\n_x 1\n", "b")))).toEqual(["cif-block -:- --block"]);
  });

  test("a symbol that fits its operators only in another origin or axes without a code is no contradiction", async () => {
    // Number 227 with origin choice 1 by its operators; the symbol alone leaves the origin open.
    const operators = operatorsOfText("F d -3 m:1").map((one) => `'${one}'`);
    const text = (symbol: string) =>
      `data_a\n_symmetry_space_group_name_H-M '${symbol}'\nloop_\n_symmetry_equiv_pos_as_xyz\n${operators.join("\n")}\n`;
    const open = await structureIn(text("F d -3 m"));
    expect(open.symmetry?.group.name).toMatchObject({ number: 227, choice: "1" });
    expect(open.symmetry?.warnings).toEqual([]);
    expect((await structureIn(text("F d -3 m :2"))).symmetry?.warnings).toMatchObject([{ code: "cif-contradiction" }]);
  });

  test("of two names of one item both are named with their places; equal ones are silent", async () => {
    const text = cifText("structures", "two-names.cif");
    const [warning] = (await structureIn(text)).symmetry?.warnings ?? [];
    expect(warning?.message).toContain("_symmetry_space_group_name_H-M (line 9, column 32)");
    expect(warning?.remedy).toContain("_space_group_name_H-M_alt (line 10, column 27)");
    expect((await structureIn(text.replace("'P n m a'", '"P b n m"'))).symmetry?.warnings).toEqual([]);
  });

  test("a symbol of no table is not read as a Hall symbol beside operators, and that is said", async () => {
    const text = cifText("structures", "two-operator-lists.cif").replace(
      "loop_",
      "_space_group_name_H-M_alt 'P 2 2'\nloop_",
    );
    expect((await structureIn(text)).symmetry?.warnings.map(({ message }) => message)).toContain(
      "the Hermann–Mauguin symbol `P 2 2` is not understood (`P 2 2` is no Hermann–Mauguin symbol)",
    );
  });

  test("groups of atoms in the type symbols are no elements, and all guesses up to twenty are listed", async () => {
    const text = cifText("structures", "two-names.cif").replace("Fe1 Fe 0.11", "N1 NH4 0.11");
    const { sites, notes } = await structureIn(text);
    expect(sites[0]?.ion).toBeNull();
    expect(notes.sites.warnings.map(({ message }) => message)).toEqual([
      "sites have no element that is known: N1 (NH4)",
    ]);
    const guessed = (await structureIn(cifText("structures", "labels-in-capitals.cif"))).notes.sites.assumed;
    expect(guessed[0]?.value.split(", ")).toHaveLength(9);
  });

  test("a cell that breaks its group by more than its uncertainties, and by little, is warned about", async () => {
    const text = cifText("structures", "cell-within-uncertainties.cif");
    const { fitted } = await structureIn(text.replace("4.40(3)", "4.4000(2)").replace("4.45(3)", "4.4040(2)"));
    expect(fitted?.cell).toMatchObject({ a: 4.4, b: 4.404 });
    expect(fitted?.warnings.map(({ found }) => found)).toEqual(["4.4000(2)", "4.4040(2)"]);
  });
});
