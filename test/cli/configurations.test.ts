import { writeFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { reportText } from "@kvane/core/reports";
import { describe, expect, test } from "vitest";
import { kvane, scratchFolder } from "./command.js";
import { schemaErrors } from "./schemas.js";

/** Cells: MnO near 4.43 Å, MnF₂ as in Griffel & Stout (1950), both rounded from memory; the Pnma compound is invented. */
const folder = scratchFolder({
  "mno.yaml": `group: F m -3 m
cell: {a: 4.43, b: 4.43, c: 4.43, alpha: 90, beta: 90, gamma: 90}
sites: [{label: Mn, ion: Mn2+, at: [0, 0, 0]}]
k: [[1/2, 1/2, 1/2]]
`,
  "mnf2.yaml": `group: P 42/m n m
cell: {a: 4.874, b: 4.874, c: 3.310, alpha: 90, beta: 90, gamma: 90}
sites: [{label: Mn1, ion: Mn2+, at: [0, 0, 0]}]
`,
  "lamno3.yaml": `group: P n m a
cell: {a: 5.75, b: 7.70, c: 5.53, alpha: 90, beta: 90, gamma: 90}
sites: [{label: Mn, ion: Mn3+, at: [0, 0, 1/2]}]
`,
  "a-type.txt":
    "label x y z mx my mz\nMn 0 0 1/2 3.5 0 0\nMn 1/2 0 0 3.5 0 0\nMn 0 1/2 1/2 -3.5 0 0\nMn 1/2 1/2 0 -3.5 0 0\n",
  "doubled.txt": [
    "Mn 0 0 1/2 3.5 0 0",
    "Mn 1/2 0 0 -3.5 0 0",
    "Mn 0 1/2 1/2 -3.5 0 0",
    "Mn 1/2 1/2 0 3.5 0 0",
    "Mn 1 0 1/2 -3.5 0 0",
    "Mn 3/2 0 0 3.5 0 0",
    "Mn 1 1/2 1/2 3.5 0 0",
    "Mn 3/2 1/2 0 -3.5 0 0",
    "",
  ].join("\n"),
  "wrong.txt": "Mn 0 0 1/2 3.5 0 0\nMn 0 0 1/2 3,5 0\nMn 0 0 x 1 2 3\n",
  "pnma.yaml": `group: P n m a
cell: {a: 10.21, b: 6.05, c: 4.71, alpha: 90, beta: 90, gamma: 90}
sites: [{label: Fe1, ion: Fe3+, at: [0, 0, 0]}]
`,
});
const fixture = (name: string) => fileURLToPath(new URL(`../fixtures/magnetic-cif/${name}`, import.meta.url));
const json = async (...words: string[]) => {
  const { stdout } = await kvane([...words, "--json"], { cwd: folder });
  const answer = JSON.parse(stdout);
  expect(schemaErrors(words[0] as string, answer)).toEqual([]);
  return answer;
};

describe("kvane configurations", () => {
  test("MnO: the one-arm monoclinic group, its index and domains, and the component that the group lets in", async () => {
    // C_c2/c 15.90: feature article, Acta Cryst. B (2024), MnO and NiO (read); counts by Lagrange: 48·2·2/(4·2) = 24.
    const { result } = await json("configurations", "mno.yaml");
    const one = result.configurations.find(
      (entry: { magneticGroup: { bns: { number: string } } }) => entry.magneticGroup.bns.number === "15.90",
    );
    expect(one.magneticGroup.bns.symbol).toBe("C_c2/c");
    expect(one).toMatchObject({ index: 24, domains: { total: 24, k: 4, orientation: 12 } });
    expect(one.freeParameters).toEqual({ irreps: 1, group: 2 });
    expect(one.netMoment).toEqual({ form: ["0", "0", "0"], inParent: false, induced: false });
    expect(one.subgroupOf.length).toBeGreaterThan(0);
  });

  test("the text names each group, the CSV has a row for each site", async () => {
    const { stdout } = await kvane(["configurations", "mno.yaml"], { cwd: folder });
    expect(stdout).toContain("C_c2/c (15.90)");
    for (const line of stdout.split("\n")) expect([...line].length).toBeLessThanOrEqual(100);
    const { stdout: csv } = await kvane(["configurations", "mno.yaml", "--csv"], { cwd: folder });
    const { result } = await json("configurations", "mno.yaml");
    const sites = result.configurations.reduce((sum: number, { sites }: { sites: unknown[] }) => sum + sites.length, 0);
    expect(csv.trim().split(/\r?\n/).length).toBe(sites + 1);
  });

  test("irreps by number, together and by site; unknown ones are refused", async () => {
    const { result } = await json("configurations", "pnma.yaml", "--k", "0,0,0", "--together", "1+3");
    expect(result.configurations.every(({ severalIrreps }: { severalIrreps: boolean }) => severalIrreps)).toBe(true);
    const bad = await json("configurations", "pnma.yaml", "--k", "0,0,0", "--together", "77");
    expect(bad.errors[0].code).toBe("invalid-argument");
    const arms = await json("configurations", "mno.yaml", "--arms", "x");
    expect(arms.errors[0].where.argument).toBe("--arms");
  });

  test("a bound on the size is said", async () => {
    const { result } = await json("configurations", "mno.yaml", "--arms", "all", "--limit", "50");
    expect(result.bounded.length).toBeGreaterThan(0);
    const { stdout } = await kvane(["configurations", "mno.yaml", "--arms", "all", "--limit", "50"], { cwd: folder });
    expect(stdout).toContain("Left out because of the limit");
  });
});

describe("kvane export", () => {
  test("a configuration by its id in any spelling; another one is refused with the list", async () => {
    const texts = await Promise.all(
      ["Γ5.2", "Gamma5.2", "5.2"].map(
        async (id) => (await kvane(["export", "mno.yaml", "--configuration", id], { cwd: folder })).stdout,
      ),
    );
    expect(new Set(texts).size).toBe(1);
    expect(texts[0]).toMatch(/^#\\#CIF_2\.0\n/);
    expect(texts[0]?.match(/^# The numbers of irreps are kvane's own/gm)).toHaveLength(1);
    expect(texts[0]).toContain("_space_group_magn.number_BNS            '15.90'");
    const bad = await json("export", "mno.yaml", "--configuration", "9.1");
    expect(bad.errors[0]).toMatchObject({ code: "invalid-argument", where: { argument: "--configuration" } });
    expect(bad.errors[0].expected).toContain("Γ5.2");
  });

  test("an id that is not in the list leads to it, and to the arms that it leaves out", async () => {
    const remedyOf = async (...words: string[]) =>
      (await json("export", "mno.yaml", "--configuration", ...words)).errors[0]?.remedy;
    const more = "kvane configurations lists them; --arms all adds those of several arms of the star";
    for (const id of ["3.2", "3.99", "9.1"]) expect(await remedyOf(id), id).toBe(more);
    expect((await json("export", "mno.yaml", "--configuration", "3.2", "--arms", "all")).errors).toEqual([]);
    expect(await remedyOf("3.99", "--arms", "all")).toBe("kvane configurations lists them");
  });

  test("without a cell there is no CIF", async () => {
    const { errors } = await json(
      "export",
      "F m -3 m",
      "--k",
      "1/2,1/2,1/2",
      "--site",
      "Mn 0 0 0",
      "--configuration",
      "5.2",
    );
    expect(errors[0]).toMatchObject({ code: "missing-argument", where: { argument: "--cell" } });
  });
});

describe("kvane decompose", () => {
  test("MnF₂ in the older data names: one irrep, P4_2'/mnm' (136.499), a configuration of k = 0", async () => {
    // Erickson, Phys. Rev. 90 (1953) 779; number of the group: magnetic group tables, 136.499.
    const { result, assumed } = await json("decompose", fixture("rutile-old-names.cif"), "--parent", "mnf2.yaml");
    expect(result.parts.length).toBe(1);
    expect(result.parts[0].share).toBeCloseTo(1, 9);
    expect(result.magneticGroup.bns).toEqual({ number: "136.499", symbol: "P4_2'/mnm'" });
    expect(result.declared.operators).toBe("136.499");
    expect(result.recognised.id).toBe(`${result.primary.irreps[0]}.1`);
    expect(assumed.map(({ what }: { what: string }) => what)).toContain("axes and origin of the file");
  });

  test("a doubled cell with spherical moments and no operators: k, irrep and the group that the moments have", async () => {
    const { result } = await json("decompose", fixture("doubled-spherical.cif"), "--parent", "pnma.yaml");
    expect(result.primary.k.components).toEqual(["1/2", "0", "0"]);
    expect(result.parts.length).toBe(1);
    // All along b and of one size: fewer operators in the file than in the moments.
    expect(result.declared.operators).toBe("1.3");
    expect(result.magneticGroup.type).toBe(4);
    expect(result.recognised).not.toBeNull();
  });

  test("a list of moments in the parent's axes, in its cell and in a doubled one", async () => {
    // A-type order of LaMnO₃, moments along the long axis of the plane: Pn'ma' (Wollan & Koehler, Phys. Rev. 100 (1955) 545).
    const plain = await json("decompose", "a-type.txt", "--parent", "lamno3.yaml");
    expect(plain.result.magneticGroup.bns).toEqual({ number: "62.448", symbol: "Pn'ma'" });
    expect(plain.result.moments[0]).toMatchObject({ site: "Mn", largest: 3.5, limit: 4, verdict: "usual" });
    expect(plain.result.recognised).not.toBeNull();
    const doubled = await json("decompose", "doubled.txt", "--parent", "lamno3.yaml", "--child", "2a,b,c;0,0,0");
    expect(doubled.result.primary.k.components).toEqual(["1/2", "0", "0"]);
    expect(doubled.result.recognised).not.toBeNull();
    const wrong = await json("decompose", "wrong.txt", "--parent", "lamno3.yaml");
    expect(wrong.errors.map(({ where }: { where: { line: number } }) => where.line)).toEqual([2, 3]);
  });

  test("a domain that nothing moves is the listed one itself", async () => {
    const answer = await json("decompose", "a-type.txt", "--parent", "lamno3.yaml");
    expect(answer.result.recognised.operator).toBe("x,y,z,+1");
    const domainOf = async (operator: string) => {
      const result = { ...answer.result, recognised: { ...answer.result.recognised, operator } };
      return /Domain +(.*)/.exec(await reportText({ ...answer, result }, { width: null }))?.[1];
    };
    expect(await domainOf("x,y,z,+1")).toBe("the listed one itself");
    expect(await domainOf("x,y,z,-1")).toBe("the listed one moved by x,y,z,-1");
  });

  test("a modulated file of its own is refused, as its help says", async () => {
    const written = await kvane(["export", "--example", "--k", "0.47,0,0", "--configuration", "1.1"], { cwd: folder });
    writeFileSync(join(folder, "modulated.mcif"), written.stdout);
    const refused = await kvane(["decompose", "modulated.mcif", "--parent", "pnma.yaml"], { cwd: folder });
    expect(refused.stderr).toContain("error[not-built]");
    const help = (await kvane(["decompose", "--help"])).stdout.replace(/\s+/g, " ");
    expect(help).toContain("Structures have to be commensurate: a modulated one");
  });

  test("what does not fit the parent is refused with a remedy", async () => {
    const wrong = await json("decompose", fixture("doubled-spherical.cif"), "--parent", "mnf2.yaml");
    expect(wrong.errors[0].code).toMatch(/invalid-site|cell-contradicts-group/);
    const none = await json("decompose", "--parent", "mnf2.yaml");
    expect(none.errors[0]).toMatchObject({ code: "missing-argument", where: { argument: "FILE" } });
  });
});
