import { describe, expect, test } from "vitest";
import { decomposition, decompositionsBySuborbit, list, modesOf } from "../support/decomposition.js";

/**
 * Published magnetic structures: the site's decomposition at the published k as dimension × multiplicity.
 *
 * `mark` says how the structure (group, site, k) is known: `read` in a public text, or `memory NN` with the confidence
 * in per cent; below 80 nothing is listed. `counts` says the same of the decomposition: `computed` apart from kvane with
 * general-purpose tools, `by hand`, or that it agrees with a remembered publication.
 */
interface Published {
  readonly name: string;
  readonly group: string;
  readonly site: string;
  readonly k: string;
  readonly expected: string;
  readonly source: string;
  readonly mark: string;
  readonly counts: string;
}

const whole: readonly Published[] = [
  {
    name: "MnO",
    group: "F m -3 m",
    site: "0 0 0",
    k: "1/2 1/2 1/2",
    expected: "1x1 2x1",
    source: "Goodwin, Tucker, Dove & Keen, Phys. Rev. Lett. 96, 047209 (2006); arXiv 2509.11715",
    mark: "read",
    counts: "computed",
  },
  {
    name: "UO2, an arm of the star of (0,0,1)",
    group: "F m -3 m",
    site: "0 0 0",
    k: "0 0 1",
    expected: "1x1 2x1",
    source: "arXiv 2409.20228",
    mark: "read",
    counts: "computed",
  },
  {
    name: "MnF2",
    group: "P 42/m n m",
    site: "0 0 0",
    k: "0 0 0",
    expected: "1x1*2 2x2",
    source: "Erickson, Phys. Rev. 90, 779 (1953)",
    mark: "memory 93",
    counts: "computed",
  },
  {
    name: "α-Fe2O3",
    group: "R -3 c:H",
    site: "0 0 0.3553",
    k: "0 0 0",
    expected: "1x1*4 2x2*2",
    source: "Chem. Mater. 20, 4891 (2008); decomposition as in the text-book treatment of hematite",
    mark: "read",
    counts: "computed, agrees with the published form (memory 92)",
  },
  {
    name: "Cr2O3",
    group: "R -3 c:H",
    site: "0 0 0.3475",
    k: "0 0 0",
    expected: "1x1*4 2x2*2",
    source: "Brockhouse, J. Chem. Phys. 21, 961 (1953)",
    mark: "memory 95",
    counts: "computed",
  },
  {
    name: "perovskite, B site",
    group: "P b n m",
    site: "1/2 0 0",
    k: "0 0 0",
    expected: "1x3*4",
    source: "Bertaut, Acta Cryst. A24, 217 (1968)",
    mark: "memory 95",
    counts: "re-derived by hand",
  },
  {
    name: "perovskite, rare-earth site",
    group: "P b n m",
    site: "-0.017 0.07 1/4",
    k: "0 0 0",
    expected: "1x1*4 1x2*4",
    source: "Bertaut, Acta Cryst. A24, 217 (1968)",
    mark: "memory 88",
    counts: "computed, agrees",
  },
  {
    name: "TbMnO3, Mn",
    group: "P b n m",
    site: "1/2 0 0",
    k: "0 0.27 0",
    expected: "1x3*4",
    source: "Kajimoto et al., Phys. Rev. B 70, 012401 (2004); Kenzelmann et al., Phys. Rev. Lett. 95, 087206 (2005)",
    mark: "read",
    counts: "computed",
  },
  {
    name: "hexagonal YMnO3, Mn",
    group: "P 63 c m",
    site: "0.333 0 0",
    k: "0 0 0",
    expected: "1x1*2 1x2*2 2x3*2",
    source: "Munoz et al., Phys. Rev. B 62, 9498 (2000)",
    mark: "read",
    counts: "computed, agrees with the published counts (memory 95)",
  },
  {
    name: "hexagonal RMnO3, rare earth on 2a",
    group: "P 63 c m",
    site: "0 0 0.27",
    k: "0 0 0",
    expected: "1x1*2 2x1*2",
    source: "Munoz et al., Phys. Rev. B 62, 9498 (2000)",
    mark: "read",
    counts: "computed",
  },
  {
    name: "hexagonal RMnO3, rare earth on 4b",
    group: "P 63 c m",
    site: "1/3 2/3 0.23",
    k: "0 0 0",
    expected: "1x1*4 2x2*2",
    source: "Munoz et al., Phys. Rev. B 62, 9498 (2000)",
    mark: "read",
    counts: "computed",
  },
  {
    name: "MnWO4, collinear commensurate phase",
    group: "P 1 2/c 1",
    site: "1/2 0.685 1/4",
    k: "-1/4 1/2 1/2",
    expected: "1x3*2",
    source: "Lautenschlaeger et al., Phys. Rev. B 48, 6087 (1993)",
    mark: "memory 95",
    counts: "computed",
  },
  {
    name: "MnWO4, incommensurate phases",
    group: "P 1 2/c 1",
    site: "1/2 0.685 1/4",
    k: "-0.214 1/2 0.457",
    expected: "1x3*2",
    source: "Lautenschlaeger et al., Phys. Rev. B 48, 6087 (1993)",
    mark: "memory 95",
    counts: "computed",
  },
  {
    name: "CuO",
    group: "C 1 2/c 1",
    site: "1/4 1/4 0",
    k: "1/2 0 -1/2",
    expected: "1x3*2",
    source: "Forsyth, Brown & Wanklyn, J. Phys. C 21, 2917 (1988)",
    mark: "memory 93",
    counts: "computed",
  },
  {
    name: "CuO, incommensurate phase",
    group: "C 1 2/c 1",
    site: "1/4 1/4 0",
    k: "0.506 0 -0.483",
    expected: "1x3*2",
    source: "Forsyth, Brown & Wanklyn, J. Phys. C 21, 2917 (1988)",
    mark: "memory 93",
    counts: "computed",
  },
  {
    name: "BiFeO3 as if it were k = 0",
    group: "R 3 c:H",
    site: "0 0 0.22",
    k: "0 0 0",
    expected: "1x1*2 2x2",
    source: "Sosnowska, Peterlin-Neumaier & Steichele, J. Phys. C 15, 4835 (1982)",
    mark: "memory 95",
    counts: "computed",
  },
  {
    name: "jarosite KFe3(OH)6(SO4)2, k = 0",
    group: "R -3 m:H",
    site: "0 1/2 1/2",
    k: "0 0 0",
    expected: "1x1 1x2 2x3",
    source: "Wills, Phys. Rev. B 63, 064430 (2001)",
    mark: "memory 88",
    counts: "computed, agrees",
  },
  {
    name: "jarosite KFe3(OH)6(SO4)2, doubled along c",
    group: "R -3 m:H",
    site: "0 1/2 1/2",
    k: "0 0 3/2",
    expected: "1x1 1x2 2x3",
    source: "Inami et al., Phys. Rev. B 61, 12181 (2000); Wills, Phys. Rev. B 63, 064430 (2001)",
    mark: "memory 85",
    counts: "computed, agrees (memory 88)",
  },
  {
    name: "Er2Ti2O7",
    group: "F d -3 m:2",
    site: "1/2 1/2 1/2",
    k: "0 0 0",
    expected: "1x1 2x1 3x1 3x2",
    source: "Champion et al., Phys. Rev. B 68, 020401 (2003)",
    mark: "read",
    counts: "computed, agrees (memory 97)",
  },
  {
    name: "CuCrO2",
    group: "R -3 m:H",
    site: "0 0 0",
    k: "0.329 0.329 0",
    expected: "1x1 1x2",
    source: "Frontzek et al., arXiv 1109.1747; k: memory 95",
    mark: "memory 95",
    counts: "computed",
  },
  {
    name: "CsNiCl3",
    group: "P 63/m m c",
    site: "0 0 0",
    k: "1/3 1/3 1",
    expected: "1x1*2 2x1*2",
    source: "Cox & Minkiewicz, Phys. Rev. B 4, 2209 (1971)",
    mark: "memory 85",
    counts: "computed",
  },
  {
    name: "La2CuO4 in Cmce axes",
    group: "C m c e",
    site: "0 0 0",
    k: "1 0 0",
    expected: "1x1*2 1x2*2",
    source: "Vaknin et al., Phys. Rev. Lett. 58, 2802 (1987)",
    mark: "memory 88",
    counts: "computed",
  },
  {
    name: "La2CuO4 in Bmab axes",
    group: "B m a b",
    site: "0 0 0",
    k: "1 0 0",
    expected: "1x1*2 1x2*2",
    source: "Reehuis et al.; Vaknin et al., Phys. Rev. Lett. 58, 2802 (1987)",
    mark: "read for the setting, memory 88 for k",
    counts: "computed",
  },
  {
    name: "Li2CuO2",
    group: "I m m m",
    site: "0 0 0",
    k: "0 0 1",
    expected: "1x1*3",
    source: "Sapina et al., Solid State Commun. 74, 779 (1990)",
    mark: "memory 88",
    counts: "computed",
  },
  {
    name: "Sr2CuO2Cl2",
    group: "I 4/m m m",
    site: "0 0 0",
    k: "1/2 1/2 0",
    expected: "1x1*3",
    source: "Vaknin et al., Phys. Rev. B 41, 1926 (1990)",
    mark: "read",
    counts: "by hand: the little co-group is mmm, where the three components of a moment belong to three irreps",
  },
  {
    name: "Cr, an arm on the axis",
    group: "I m -3 m",
    site: "0 0 0",
    k: "0.952 0 0",
    expected: "1x1 2x1",
    source: "d and polarizations of the two phases as commonly published",
    mark: "memory 90",
    counts: "by hand: along the axis of 4mm, and across it",
  },
  {
    name: "β-MnS, zinc blende",
    group: "F -4 3 m",
    site: "0 0 0",
    k: "1 1/2 0",
    expected: "1x1*3",
    source: "Corliss, Elliott & Hastings, Phys. Rev. 104, 924 (1956)",
    mark: "memory 88",
    counts:
      "by hand: the little co-group -4 has one-dimensional irreps only, and -4 turns the three components by 1, i, -i",
  },
  {
    name: "BaCrF5",
    group: "P 21 21 21",
    site: "0.13 0.27 0.41",
    k: "0 0 0",
    expected: "1x3*4",
    source: "BaCrF5, Z. Naturforsch. (abstract)",
    mark: "read",
    counts: "by hand: a general position carries each irrep 3 × dimension times",
  },
];

describe("decompositions of published structures", () => {
  for (const entry of whole)
    test(`${entry.name} [${entry.mark}]`, () => {
      expect(decomposition(modesOf(entry.group, entry.k, entry.site))).toEqual(list(entry.expected));
    });
});

/** Sites that the little group splits: number of atoms and decomposition of each part. */
describe("sites that split under the little group", () => {
  test("TbMnO3, Tb: two pairs, each 1x1 twice and 1x2 twice [k read in Phys. Rev. B 70, 012401; counts computed]", () => {
    expect(decompositionsBySuborbit(modesOf("P b n m", "0 0.27 0", "-0.017 0.07 1/4"))).toEqual([
      "2 atoms: 1x1 1x1 1x2 1x2",
      "2 atoms: 1x1 1x1 1x2 1x2",
    ]);
  });

  test("MnSi along [111]: one atom on the axis and three around it [arXiv 1605.00936 read; counts computed]", () => {
    // Period 180 Å with a = 4.558 Å (memory 90): k = 0.0146 (1,1,1).
    expect(decompositionsBySuborbit(modesOf("P 21 3", "0.0146 0.0146 0.0146", "0.138 0.138 0.138"))).toEqual([
      "1 atoms: 1x1 1x1 1x1",
      "3 atoms: 1x3 1x3 1x3",
    ]);
  });

  test("BiFeO3, the cycloid: two atoms without relation [memory 95: J. Phys. C 15, 4835 (1982); counts computed]", () => {
    expect(decompositionsBySuborbit(modesOf("R 3 c:H", "0.0045 0.0045 0", "0 0 0.22"))).toEqual([
      "1 atoms: 1x3",
      "1 atoms: 1x3",
    ]);
  });
});
