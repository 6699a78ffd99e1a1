import { spawnSync } from "node:child_process";
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { configurationsOf, decomposeField, momentField } from "@kvane/core/configurations";
import { parseCif, readMagneticCif } from "@kvane/core/files";
import { smallIrreps } from "@kvane/core/irreps";
import { parseWaveVector, placeWaveVector } from "@kvane/core/kvectors";
import { siteModes } from "@kvane/core/modes";
import { commensurateOnes, configurationCif, configurationsRecord, modulatedOnes } from "@kvane/core/reports";
import { type Cell, parseSite, type SpaceGroup, siteOrbit } from "@kvane/core/spacegroups";
import { afterAll, describe, expect, test } from "vitest";
import { randomHalfThirdQuarter } from "../support/configurations-cases.ts";
import { groupOf } from "../support/parsed-groups.ts";
import { type Random, seeded } from "../support/random.ts";
import { generalSite, specialSite } from "../support/random-cases.ts";
import { randomCell } from "../support/random-cells.ts";

/**
 * Written magnetic CIFs: read back they are the same arrangement; they use names of the IUCr dictionaries alone
 * (test/fixtures/mag_names.json, see ORIGIN.md); independent readers of Debian take them.
 */
const numbers = [2, 5, 12, 14, 15, 19, 33, 36, 43, 62, 63, 70, 88, 136, 141, 148, 161, 167, 176, 185, 194, 205, 225];

/** Few enough atoms and operators for a law that goes through the whole list. */
const mostConfigurations = 4;

interface Written {
  readonly name: string;
  readonly group: SpaceGroup;
  readonly cell: Cell;
  readonly id: string;
  readonly bns: string;
  readonly orbit: ReturnType<typeof siteOrbit>;
  readonly cif: string;
  readonly cif11: string;
}

async function writtenFor(number: number, random: Random): Promise<Written[]> {
  const group = groupOf(number);
  const cell = randomCell(group, random, 120);
  const k = randomHalfThirdQuarter(group, random);
  const site = number > 60 || random.below(2) === 0 ? specialSite(group, random) : generalSite(random);
  const orbit = siteOrbit(group, { ...site, label: "Fe1" }, cell);
  const irreps = smallIrreps(group, k);
  const set = await configurationsOf(group, irreps, [siteModes(group, irreps, orbit)], cell, { limit: 2000 });
  const named = { orbit, ion: "Fe3+", occupancy: 1, spin: null };
  const record = await configurationsRecord(set, cell, { magnetic: [named], others: [] });
  return Promise.all(
    commensurateOnes(record)
      .slice(0, mostConfigurations)
      .map(async (one) => ({
        name: `group ${number}, k ${record.k.components.join(" ")}, ${one.id}`,
        group,
        cell,
        id: one.id,
        bns: one.magneticGroup.bns.number,
        orbit,
        cif: (await configurationCif(record, one, "2.0")) as string,
        cif11: (await configurationCif(record, one, "1.1")) as string,
      })),
  );
}

const all: Written[] = [];
for (const number of numbers) all.push(...(await writtenFor(number, seeded(40_000 + number))));

describe("written magnetic CIFs", () => {
  test(`read back they are the same configuration, all ${all.length}`, { timeout: 120_000 }, async () => {
    const failures: string[] = [];
    for (const one of all)
      for (const text of [one.cif, one.cif11]) {
        const structure = await readMagneticCif(await parseCif(text, one.name));
        const field = momentField(one.group, one.cell, [one.orbit], {
          childFromParent: structure.childFromParent as NonNullable<typeof structure.childFromParent>,
          cell: structure.cell,
          operators: structure.operators,
          centrings: structure.centrings,
          atoms: structure.atoms,
        });
        const found = await decomposeField(one.group, one.cell, field);
        if (found.recognised?.configuration.id !== one.id)
          failures.push(`${one.name}: came back as ${found.recognised?.configuration.id ?? "none"}`);
        if (structure.named.bns !== one.bns) failures.push(`${one.name}: BNS ${structure.named.bns}`);
      }
    expect(failures).toEqual([]);
  });

  test("only names of the dictionaries, each with a value of its type", () => {
    const { items } = JSON.parse(readFileSync(new URL("../fixtures/mag_names.json", import.meta.url), "utf8")) as {
      items: readonly { name: string; contents?: string; enumeration?: readonly string[] }[];
    };
    const known = new Map(items.map((item) => [item.name.toLowerCase(), item]));
    for (const { cif, name } of all) {
      const names = cif.match(/^_[\w.-]+/gm) ?? [];
      expect(names.length, name).toBeGreaterThan(20);
      for (const one of names) expect(known.has(one.toLowerCase()), `${name}: ${one}`).toBe(true);
      for (const [, item = "", value = ""] of cif.matchAll(/^(_[\w.-]+) +(\S.*)$/gm))
        if (known.get(item.toLowerCase())?.contents === "Real") expect(value, item).toMatch(/^-?\d+(\.\d+)?$/);
    }
  });

  const folder = mkdtempSync(join(tmpdir(), "kvane-mcif-"));
  afterAll(() => rmSync(folder, { recursive: true, force: true }));
  const installed = ["cif_linguist", "cif_parse"].every((one) => spawnSync(one, ["--help"]).error === undefined);
  if (!installed)
    console.warn("skipped: cif_linguist and cod-tools are not installed (Debian: cif-linguist, cod-tools)");
  test.skipIf(!installed)("independent readers take them, in both versions", () => {
    for (const [index, { cif, cif11, name }] of all.filter((_, place) => place % 4 === 0).entries())
      for (const [version, text] of [["2.0", cif] as const, ["1.1", cif11] as const]) {
        const file = join(folder, `${index}-${version}.cif`);
        writeFileSync(file, text);
        expect(spawnSync("cif_linguist", ["-q", "-s", file, "/dev/null"]).status, name).toBe(0);
      }
    const { stderr } = spawnSync("sh", ["-c", "cif_parse *.cif > /dev/null"], { cwd: folder, encoding: "utf8" });
    expect(stderr).not.toMatch(/ERROR/);
  });
});

describe("modulated structures", () => {
  const cases: readonly (readonly [number, string, string])[] = [
    [62, "0,0.283,0", "0 0 1/2"],
    [14, "0,0.31,0", "0.137 0.223 0.317"],
    [166, "0,0,0.217", "0 0 0"],
    [148, "0,0,0.313", "0 0 0.193"],
    [225, "0,0,0.231", "0 0 0"],
  ];
  test.each(cases)(
    "group %i, k = %s: written and read back, waves and operators are the same",
    async (number, text, at) => {
      const group = groupOf(number);
      const cell = randomCell(group, seeded(50_000 + number), 120);
      const { k } = placeWaveVector(group, parseWaveVector(text));
      const orbit = siteOrbit(group, parseSite(`Fe1 ${at}`), cell);
      const irreps = smallIrreps(group, k);
      const set = await configurationsOf(group, irreps, [siteModes(group, irreps, orbit)], cell);
      const named = { orbit, ion: "Fe3+", occupancy: 1, spin: null };
      const record = await configurationsRecord(set, cell, { magnetic: [named], others: [] });
      const all = modulatedOnes(record);
      expect(all.length).toBeGreaterThan(0);
      for (const one of all) {
        const cif = (await configurationCif(record, one, "2.0")) as string;
        const read = await readMagneticCif(await parseCif(cif, one.id));
        expect(read.modulation?.operators).toEqual(one.magneticGroup.superspace.operators);
        expect(read.modulation?.waveVector.map((entry) => entry.toFixed(6))).toEqual(
          one.magneticGroup.superspace.k.numeric?.map((entry) => entry.toFixed(6)),
        );
        for (const [index, site] of one.sites.entries()) {
          const [wave] = read.atoms[index]?.waves ?? [];
          for (const axis of [0, 1, 2]) {
            expect(wave?.cosine[axis]).toBeCloseTo(site.exampleCosineCrystal?.[axis] as number, 5);
            expect(wave?.sine[axis]).toBeCloseTo(site.exampleSineCrystal?.[axis] as number, 5);
          }
        }
      }
    },
  );
});
