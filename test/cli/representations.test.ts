import { describe, expect, test } from "vitest";
import { evaluateText } from "../support/evaluate-text.js";
import { kvane } from "./command.js";

async function resultOf(...words: string[]) {
  const { status, stdout, stderr } = await kvane([...words, "--json"]);
  expect(stderr).toBe("");
  expect(status).toBe(0);
  return JSON.parse(stdout).result;
}

async function textOf(...words: string[]): Promise<string> {
  const { status, stdout, stderr } = await kvane(words);
  expect(stderr).toBe("");
  expect(status).toBe(0);
  return stdout;
}

/** Without the breaks of lines and tables. */
function flat(text: string): string {
  return text.replace(/\s+/g, " ");
}

describe("kvane atlas", () => {
  /** Wyckoff positions of the symmorphic group of the dual class: International Tables A (F and I change places). */
  test.each([
    ["P m -3 m", "P m -3 m", 14],
    ["F m -3 m", "I m -3 m", 12],
    ["I m -3 m", "F m -3 m", 12],
    ["P n m a", "P m m m", 27],
    ["P 21 3", "P 2 3", 10],
    ["R -3 m:H", "R -3 m", 9],
    ["P -1", "P -1", 9],
    ["P 3 m 1", "P 3 1 m", 4],
  ])("%s has as many kinds of k as %s has positions: %i", async (group, _dual, count) => {
    expect((await resultOf("atlas", group)).kinds).toHaveLength(count);
  });

  test("a group given by triplets in an odd basis has the same kinds, numbered by the same rules", async () => {
    const plain = await resultOf("atlas", "I 4/m m m");
    for (const group of [
      "I 4/m m m (a-b,a+b,c)",
      "I 4/m m m (-a/2+b/2+c/2,a/2-b/2+c/2,a/2+b/2-c/2)",
      "I 4/m m m (a,b,3a+c;1/7,0,1/3)",
      "x,y,z; -y,x,z; -x,-y,-z; x,-y,-z; x+1/2,y+1/2,z+1/2 (2a+b,a+b,c)",
    ]) {
      const other = await resultOf("atlas", group);
      const signature = (kinds: (typeof plain)["kinds"]) =>
        kinds
          .map(
            ({ dimension, dimensionPM, littleCoGroup, arms, minusK, halfLattice }: (typeof plain)["kinds"][number]) =>
              JSON.stringify([dimension, dimensionPM, littleCoGroup, arms, minusK, halfLattice.length]),
          )
          .sort();
      expect(signature(other.kinds), group).toEqual(signature(plain.kinds));
      expect(signature(other.kindsPM), group).toEqual(signature(plain.kindsPM));
    }
  });

  test("a given k: its kind, and special kinds nearby at their distance", async () => {
    const words = ["atlas", "P 63/m m c", "--k", "0.329,0.329,1", "--cell", "7.14 7.14 5.90 90 90 120"];
    const { given, kinds, kindsPM } = await resultOf(...words);
    expect(kinds[given.kind].k.components).toEqual(["u", "u", "0"]);
    expect(given.within).toBe(0.05);
    expect(given.nearby).toHaveLength(1);
    const [near] = given.nearby;
    expect(kindsPM[near.kindPM].k.components).toEqual(["1/3", "1/3", "0"]);
    expect(near.nearest.numeric).toEqual([expect.closeTo(1 / 3, 12), expect.closeTo(1 / 3, 12), 1]);
    // |δ(a* + b*)| = δ · 2π · 2/a in the hexagonal lattice.
    expect(near.distance).toBeCloseTo(((1 / 3 - 0.329) * 4 * Math.PI) / 7.14, 9);
    const text = await textOf(...words);
    expect(text).toContain("Belongs to  kind 12, line (u, u, 0)");
    expect(text).toMatch(/nearby {2}within 0\.05 Å⁻¹ {2}--within was not given/);
    const closer = await resultOf(...words, "--within", "0.005");
    expect(closer.given.nearby).toEqual([]);
  });

  test("without a cell and with an open letter it says why nothing is nearby", async () => {
    expect(await textOf("atlas", "62", "--k", "0,0.47,0")).toContain("distances need a cell (--cell)");
    const open = await textOf("atlas", "62", "--k", "0,u,0", "--cell", "10 6 5 90 90 90");
    expect(open).toContain("distances need a number for every letter of k");
  });

  test("two classifications where −1 is not in the group, one where it is", async () => {
    expect(await textOf("atlas", "P n m a")).toContain("With k and −k taken as one the kinds are the same.");
    const polar = await textOf("atlas", "P 63");
    expect(polar).toContain("Kinds of k with k and −k taken as one");
    const { kinds, kindsPM } = await resultOf("atlas", "P 63");
    expect(kinds.every(({ dimension }: { dimension: number }) => dimension > 0)).toBe(true);
    expect(kindsPM[0].k.components).toEqual(["0", "0", "0"]);
  });

  test("the table: a row a kind in both classifications", async () => {
    const { stdout } = await kvane(["atlas", "P 63", "--csv"]);
    const { kinds, kindsPM } = await resultOf("atlas", "P 63");
    expect(stdout.trimEnd().split("\n")).toHaveLength(1 + kinds.length + kindsPM.length);
  });
});

describe("kvane compatibility", () => {
  test("both directions say the same, and the dimensions agree", async () => {
    for (const words of [
      ["P m -3 m", "--from", "0,0,0", "--to", "u,u,u"],
      ["F d -3 m:2", "--from", "0,1,0", "--to", "0,u,0"],
      ["P n m a", "--from", "0,1/2,0", "--to", "u,1/2,v"],
      ["I 41/a m d:2", "--from", "1/2,1/2,0", "--to", "u,u,0"],
    ]) {
      const { splitting, joining, from, to } = await resultOf("compatibility", ...words);
      expect(splitting).toHaveLength(from.irreps.length);
      expect(joining).toHaveLength(to.irreps.length);
      const pairs = (list: { label: string; parts: { label: string; multiplicity: number }[] }[]) =>
        list.flatMap(({ label, parts }) => parts.map((part) => `${label} ${part.label} ${part.multiplicity}`)).sort();
      const turned = joining.flatMap(
        ({ label, ends }: { label: string; ends: { label: string; multiplicity: number }[] }) =>
          ends.map((end) => `${end.label} ${label} ${end.multiplicity}`),
      );
      expect(turned.sort()).toEqual(pairs(splitting));
      for (const row of splitting) expect(row.dimensionOfParts).toBe(row.dimension);
      // Frobenius: an irrep of the line stands in all irreps of the point together |G|/|H| times its dimension.
      for (const [index, { ends }] of joining.entries()) {
        const sum = ends.reduce(
          (total: number, end: { label: string; multiplicity: number }) =>
            total +
            end.multiplicity * from.irreps.find(({ label }: { label: string }) => label === end.label).dimension,
          0,
        );
        expect(sum).toBe((to.irreps[index].dimension * from.littleGroup.order) / to.littleGroup.order);
      }
    }
  });

  test("it says which arm lies on the line, by which operator, and the value of its letter", async () => {
    const { from, to } = await resultOf("compatibility", "P m -3 m", "--from", "1/2,0,0", "--to", "0,0,u");
    expect(from.k.components).toEqual(["1/2", "0", "0"]);
    expect(from.arm.components).toEqual(["0", "0", "1/2"]);
    expect(to.values).toEqual({ u: "1/2" });
    const text = await textOf("compatibility", "P m -3 m", "--from", "1/2,0,0", "--to", "0,0,u");
    expect(text).toContain("(0, 0, 1/2), by ");
    expect(text).toMatch(/Letters there +u = 1\/2/);
    expect(text).toContain("How irreps at (0, 0, 1/2) split");
    expect(text).toContain("Where irreps of the line (0, 0, u) end");
  });

  test("the table has every pair", async () => {
    const { stdout } = await kvane(["compatibility", "P m -3 m", "--from", "0,0,0", "--to", "0,u,0", "--csv"]);
    expect(stdout.trimEnd().split("\n")).toHaveLength(1 + 10 * 5);
  });
});

type Matrix = readonly (readonly [number, number][])[];

/** Largest entry of A A† − 1. */
function unitarity(matrix: Matrix): number {
  let largest = 0;
  matrix.forEach((a, i) => {
    matrix.forEach((b, j) => {
      let [re, im] = [i === j ? -1 : 0, 0];
      a.forEach(([x, y], at) => {
        const [u, v] = b[at] as [number, number];
        re += x * u + y * v;
        im += y * u - x * v;
      });
      largest = Math.max(largest, Math.hypot(re, im));
    });
  });
  return largest;
}

describe("kvane irreps", () => {
  test("the relation between k and −k is there exactly where −k is in the star", async () => {
    const inStar = await resultOf("irreps", "P n m a", "--k", "0,0.3,1/2");
    expect(inStar.minusK).toBe("in star");
    expect(inStar.minusKRelation.links.map(({ label }: { label: string }) => label)).toEqual(
      inStar.irreps.map(({ label }: { label: string }) => label),
    );
    for (const { matrix, exact, label, partner } of inStar.minusKRelation.links) {
      const { dimension, conjugateOf } = inStar.irreps.find((irrep: { label: string }) => irrep.label === label);
      expect(partner).toBe(conjugateOf ?? label);
      expect(matrix).toHaveLength(dimension);
      expect(unitarity(matrix)).toBeLessThan(1e-9);
      expect(numbersOf(exact)).toEqual(closeTo(matrix));
    }
    expect((await resultOf("irreps", "P 21 3", "--k", "u,u,u")).minusKRelation).toBeNull();
    expect(await textOf("irreps", "P 21 3", "--k", "u,u,u")).not.toContain("Relation between");
    const text = await textOf("irreps", "P n m a", "--k", "0,u,1/2");
    expect(text).toContain("Relation between k and −k");
    expect(text).toContain(`g₀ = ${inStar.minusKRelation.operator} takes k to −k`);
  });

  test("--full gives the induced matrices: unitary, arms × dimension, exact and numeric alike", async () => {
    for (const [group, k] of [
      ["P 21 3", "1/5,1/5,1/5"],
      ["P n m a", "0,0.3,1/2"],
      ["F m -3 m", "1/2,1/2,1/2"],
    ] as const) {
      const { full, irreps, arms } = await resultOf("irreps", group, "--k", k, "--full");
      expect(full.arms).toHaveLength(arms);
      expect(full.representatives).toHaveLength(arms);
      full.irreps.forEach(
        (irrep: { dimension: number; matrices: Matrix[]; exact: { matrices: string[][][] } }, index: number) => {
          expect(irrep.dimension).toBe(arms * irreps[index].dimension);
          expect(irrep.matrices).toHaveLength(full.operators.length);
          const inverse = irrep.matrices.at(-1) as Matrix;
          expect(unitarity(inverse)).toBeLessThan(1e-9);
          const u = group === "P n m a" ? 0.3 : 0;
          expect(numbersOf(irrep.exact.matrices.at(-1) as string[][], u)).toEqual(closeTo(inverse));
        },
      );
    }
    expect((await resultOf("irreps", "P 21 3", "--k", "u,u,u")).full).toBeNull();
    expect((await resultOf("irreps", "P 21 3", "--k", "u,u,u", "--full")).full.irreps[0].matrices).toBeNull();
  });
});

function numbersOf(exact: readonly (readonly string[])[], u = 0) {
  return exact.map((row) => row.map((entry) => [...evaluateText(entry, { u: [u, 0] })]));
}

function closeTo(matrix: Matrix) {
  return matrix.map((row) => row.map((entry) => entry.map((value) => expect.closeTo(value, 9))));
}

describe("kvane modes", () => {
  const tb = ["modes", "P b n m", "--k", "0,0.28,0", "--site", "Tb -0.017 0.07 1/4"];

  test("the table of one order parameter stands beside the plain one, with what a star means", async () => {
    const text = flat(await textOf(...tb));
    expect(text).toContain("of one order parameter");
    expect(text).toMatch(/\(0, 0, v\) +\(0, 0, u\*\)·e\^\{-2πi·ky\}/);
    expect(text).toContain("a star marks their complex conjugate");
    expect(text).not.toContain("ξ");
    expect(text).toMatch(/B on the copies +\(0, e\^\{-2πi·ky\} \| e\^\{-2πi·ky\}, 0\)/);
    expect(text).toContain("not computed: they need a cell (--cell)");
    const hexagonal = flat(await textOf("modes", "P 63/m m c", "--k", "1/3,1/3,1", "--site", "Ni 0 0 0"));
    expect(hexagonal).toContain("ξ1, ξ2, … are the complex components of the order parameter");
    expect(hexagonal).toContain("In u1, u2 the digit is the partner");
  });

  test("with a cell it says what sizes are possible", async () => {
    // CsNiCl3: 120° order has equal moments in all cells; along c only a wave of amplitudes fits k = (1/3,1/3,1).
    const words = [
      "modes",
      "P 63/m m c",
      "--k",
      "1/3,1/3,1",
      "--site",
      "Ni 0 0 0",
      "--cell",
      "7.14 7.14 5.9 90 90 120",
    ];
    const { sites } = await resultOf(...words);
    for (const irrep of sites[0].irreps.filter(({ multiplicity }: { multiplicity: number }) => multiplicity > 0)) {
      expect(irrep.equalAmplitude).toBe(true);
      expect(irrep.constantMoment).toBe(irrep.dimension === 2);
      expect(irrep.collinear).toBe(irrep.dimension === 1);
    }
    const without = await resultOf(...words.slice(0, -2));
    expect(without.sites[0].irreps[0].equalAmplitude).toBeNull();
  });

  test("every table says its convention, and so does the JSON", async () => {
    const words = [...tb, "--exponent", "plus", "--phase", "position", "--factor", "half"];
    const text = flat(await textOf(...words));
    const tables = text.match(/allowed S along a, b, c, with ½ exp\(\+2πi k·\(T\+r\)\)/g) ?? [];
    const vectors = text.match(/basis vectors along a, b, c, with ½ exp\(\+2πi k·\(T\+r\)\)/g) ?? [];
    expect(tables).toHaveLength(4);
    expect(vectors).toHaveLength(4);
    expect(text).toContain("M_j(T) = ½ [S_j exp(+2πi k·(T + r_j)) + c.c.]");
    expect(text).not.toContain("exp(−2πi k·T)");
    expect((await resultOf(...words)).convention).toEqual({
      exponent: "plus",
      phase: "position",
      factor: "half",
      components: "lattice",
    });
    expect((await resultOf(...tb)).convention).toEqual({
      exponent: "minus",
      phase: "lattice",
      factor: "one",
      components: "lattice",
    });
  });

  test("crystal and Cartesian components are numbers along unit vectors", async () => {
    const hexagonal = ["modes", "P 63/m m c", "--k", "0,0,0", "--site", "A 0 0 0", "--cell", "4 4 5 90 90 120"];
    const at = async (components: string) => {
      const { sites } = await resultOf(...hexagonal, "--components", components);
      return sites[0].irreps.flatMap(({ modes }: { modes: { moments: [number, number][][] }[] }) =>
        modes.map(({ moments }) => moments[0]?.map(([re]) => re)),
      );
    };
    const [crystal, cartesian] = [await at("crystal"), await at("cartesian")];
    // b lies at 120° to a; c is z.
    crystal.forEach(([a, b, c]: number[], index: number) => {
      const [x, y, z] = cartesian[index];
      expect(x).toBeCloseTo((a as number) - (b as number) / 2, 9);
      expect(y).toBeCloseTo(((b as number) * Math.sqrt(3)) / 2, 9);
      expect(z).toBeCloseTo(c as number, 9);
    });
    expect(crystal).toContainEqual([0, 0, 1]);
  });

  test("--star lists the vectors on every arm; those of the first are those of k", async () => {
    const { sites, arms } = await resultOf(
      "modes",
      "P 21 3",
      "--k",
      "1/5,1/5,1/5",
      "--site",
      "Mn 0.138 0.138 0.138",
      "--star",
    );
    const [{ starModes, irreps }] = sites;
    expect(starModes).toHaveLength(arms);
    for (const [index, { modes }] of starModes[0].irreps.entries()) expect(modes).toEqual(irreps[index].modes);
    // Rotations keep the size of a Fourier component, and every arm has all atoms.
    const total = (list: { moments: [number, number][][] }[]) =>
      list.reduce(
        (sum, { moments }) => sum + moments.flat().reduce((inner, [re, im]) => inner + re * re + im * im, 0),
        0,
      );
    for (const arm of starModes)
      for (const [index, { modes }] of arm.irreps.entries())
        expect(total(modes)).toBeCloseTo(total(irreps[index].modes), 7);
    expect(
      (await resultOf("modes", "P 21 3", "--k", "0,0,0", "--site", "Mn 0.138 0.138 0.138")).sites[0].starModes,
    ).toBeNull();
  });

  test("the table of vectors names the convention in every row, and the arm", async () => {
    const { stdout } = await kvane([...tb, "--star", "--csv", "--exponent", "plus"]);
    const [header = "", ...rows] = stdout.trimEnd().split("\n");
    expect(header.split(",").slice(0, 2)).toEqual(["site", "arm"]);
    // Two arms, twelve vectors, four atoms.
    expect(rows).toHaveLength(2 * 12 * 4);
    for (const row of rows) expect(row).toContain("exponent plus; phase lattice; factor one; components lattice");
  });
});
