import { draftStudyOf, magneticSitesOf, parseCif, parseStudy, readCifStructure } from "@kvane/core/files";
import { formatTriplet, operatorsModuloIntegers, parseGroup, type SpaceGroup } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { ionOfLabel, ionOfSymbol } from "#core/files/cif/ions.js";
import { momentChance } from "#core/files/cif/moments.js";
import { formatRational } from "#core/numbers/index.js";
import { cifNames, cifText } from "../support/cif-fixtures.js";
import { problemsOf } from "../support/problems-of.js";

async function draftOf(text: string, block: string | null = null) {
  const structure = await readCifStructure(await parseCif(text, "folder/test.cif"), block);
  const group = structure.symmetry?.group as SpaceGroup;
  return draftStudyOf(structure, group, structure.fitted?.cell ?? null, ["one note\nof two lines"]);
}

const operatorTexts = (group: SpaceGroup) => operatorsModuloIntegers(group).map(formatTriplet).sort();

describe("studies drafted from CIFs", () => {
  test.each(cifNames("structures"))("the draft from %s reads back as what the CIF says", async (file) => {
    const block = file === "two-blocks.cif" ? "at_2K" : null;
    const structure = await readCifStructure(await parseCif(cifText("structures", file), file), block);
    const draft = await draftOf(cifText("structures", file), block);
    const study = await parseStudy(draft.text, "draft.yaml");
    expect(operatorTexts(parseGroup(study.group ?? ""))).toEqual(
      operatorTexts(structure.symmetry?.group as SpaceGroup),
    );
    expect(study.cell).toEqual(structure.fitted?.cell);
    expect(study.peaks).toBeNull();
    expect(study.sites.map(({ label }) => label)).toEqual(
      draft.sites.filter(({ active }) => active).map(({ site }) => site.label),
    );
  });

  test("candidates are sites, the others comments that need only lose their mark", async () => {
    const { text } = await draftOf(cifText("structures", "occupancy-and-disorder.cif"));
    const sites = async (draft: string) => (await parseStudy(draft, "draft.yaml")).sites.map(({ label }) => label);
    // Mn shares the position of Fe; La3+ and O2- have closed shells.
    expect(await sites(text)).toEqual(["Fe1"]);
    const { atoms } = await parseStudy(text, "draft.yaml");
    // All others are there for written files; Mn with its share of the iron site.
    expect(atoms.map(({ label }) => label)).toContain("Mn1");
    expect(atoms.find(({ label }) => label === "Mn1")?.occupancy).toBeLessThan(1);
    expect(await sites(text.replace("# peaks:", "peaks:"))).toEqual(["Fe1"]);
  });

  test("no atom of the CIF is missing from the files that are written, a doubtful one neither", async () => {
    const cell = "_cell_length_a 7.3\n_cell_length_b 7.3\n_cell_length_c 3.9\n";
    const angles = "_cell_angle_alpha 90\n_cell_angle_beta 90\n_cell_angle_gamma 90\n";
    const loop = "loop_\n_atom_site_label\n_atom_site_fract_x\n_atom_site_fract_y\n_atom_site_fract_z\n";
    const atomLines = "Tb1 0.171 0.671 0.5\nPd1 0 0 0\nGa1 0.38 0.88 0\n";
    const text = `data_a\n${cell}${angles}_space_group_name_H-M_alt 'P 4/m b m'\n${loop}${atomLines}`;
    const study = await parseStudy((await draftOf(text)).text, "draft.yaml");
    expect(study.sites.map(({ label }) => label)).toEqual(["Tb1"]);
    expect(study.atoms.map(({ label }) => label)).toEqual(["Pd1", "Ga1"]);
  });

  test("special positions are written as fractions, others as the CIF has them", async () => {
    const { text } = await draftOf(cifText("structures", "thirds.cif"));
    const study = await parseStudy(text, "draft.yaml");
    expect(study.sites.map(({ position }) => position.map(formatRational).join(" "))).toEqual([
      "1/3 2/3 1/4",
      "3133/10000 6667/10000 1/4",
    ]);
  });

  test("text of the CIF cannot become YAML", async () => {
    const evil =
      "data_x\n_chemical_formula_sum '}: &a [*b] # \"c'\n_space_group_name_H-M_alt 'P 1'\n_cell_length_a 5\n_cell_length_b 5\n_cell_length_c 5\nloop_\n_atom_site_label\n_atom_site_type_symbol\n_atom_site_fract_x\n_atom_site_fract_y\n_atom_site_fract_z\n'Fe: {1}' Fe3+ 0 0 0\n\"O'#\" O2- 0 0 0.5\n<img> Mn 0.5 0 0\n";
    const study = await parseStudy((await draftOf(evil)).text, "draft.yaml");
    expect(study.title).toBe('}: &a [*b] # "c');
    expect(study.sites.map(({ label }) => label)).toEqual(["Fe:_{1}", "<img>"]);
    const lines = "data_x\n_chemical_name_common\n;one\ngroup: P 2\n;\n";
    const draft = await draftOf(evil.replace("data_x\n", lines));
    expect((await parseStudy(draft.text, "draft.yaml")).title).toBe("one group: P 2");
  });

  test("the sites that a command takes are those likely to carry a moment, each orbit once", async () => {
    const read = async (file: string) => readCifStructure(await parseCif(cifText("structures", file), file));
    const chosen = async (file: string) => {
      const structure = await read(file);
      return magneticSitesOf(structure, structure.symmetry?.group ?? null, structure.fitted?.cell ?? null);
    };
    const equivalents = await chosen("equivalents-listed.cif");
    expect(equivalents.sites.map(({ label }) => label)).toEqual(["Fe1"]);
    expect(equivalents.warnings).toHaveLength(3);
    expect((await chosen("ions.cif")).sites.map(({ label }) => label)).toEqual([
      "Fe1",
      "Fe2",
      "Cu1",
      "Cr1",
      "Fe_3",
      "Fe1_2",
    ]);
    const none = cifText("structures", "single-operator.cif").replace("Ni1", "O1");
    const structure = await readCifStructure(await parseCif(none, "none.cif"));
    expect(await problemsOf(() => magneticSitesOf(structure, null, null))).toMatchObject([{ code: "cif-missing" }]);
  });
});

describe("ions", () => {
  test.each([
    ["Fe3+", "Fe3+", "likely"],
    ["O2-", "O2-", "none"],
    ["Al0+", "Al", "none"],
    ["D", "D", "none"],
    ["Fe+3", "Fe3+", "likely"],
    ["FE", "Fe", "likely"],
    ["Ti4+", "Ti4+", "none"],
    ["Ti3+", "Ti3+", "possible"],
    ["Cu1+", "Cu+", "none"],
    ["Gd", "Gd", "likely"],
    ["Zn2+", "Zn2+", "none"],
    ["Mn(3+)", "Mn3+", "likely"],
  ])("%s is %s, with a moment: %s", (symbol, text, chance) => {
    expect(ionOfSymbol(symbol)?.text).toBe(text);
    expect(momentChance(ionOfSymbol(symbol))).toBe(chance);
  });

  test.each(["Wat", "OH", "X", "", "Fe3+-", "Uani"])("`%s` is no element", (symbol) => {
    expect(ionOfSymbol(symbol)).toBeNull();
  });

  test.each([
    ["Co1", [], "Co"],
    ["CO1", ["Co", "O"], "Co"],
    ["CO1", ["C", "O"], "C"],
    ["CA1", ["Ca", "Mn"], "Ca"],
    ["O1A", [], "O"],
    ["Fe(1)", [], "Fe"],
    ["N1", [], "N"],
  ])("the label %s beside %j is of %s", (label, known, element) => {
    expect(ionOfLabel(label, new Set(known))?.element).toBe(element);
  });
});
