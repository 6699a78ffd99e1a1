import {
  changeMagneticBasis,
  familyGroup,
  identifyMagneticGroup,
  magneticGroupByNumber,
  magneticGroupTable,
} from "@kvane/core/magneticgroups";
import {
  changeBasis,
  formatTriplet,
  groupFromSetting,
  parseGroup,
  standardSetting,
  tabulatedSettings,
} from "@kvane/core/spacegroups";
import { describe, expect, it } from "vitest";
import { bnsOperators } from "../support/magnetic-bns-setting.js";
import { flatTexts, groupOfFlat } from "../support/magnetic-operators.js";
import { magneticRowProblems } from "../support/magnetic-sweep.js";
import { expandRow, magneticRows } from "../support/magnetic-table.js";
import { seeded } from "../support/random.js";
import { randomBasis } from "../support/random-bases.js";

const rows = magneticRows();

describe("the 1651 types from the generators of the table", () => {
  // The generators are multiplied out by a plain routine, and what the change of basis gives is compared with that.
  // All rows in five bases each are a sweep of `npm run certify`.
  it("are told by number and OG number, a twelfth of them as they stand and in a random basis each", () => {
    const random = seeded(601);
    const sample = rows.filter(() => random.below(12) === 0);
    expect(sample.flatMap((row) => magneticRowProblems(row, random, 1))).toEqual([]);
  });

  it("come back by their numbers, operator by operator", () => {
    const random = seeded(602);
    const sample = rows.filter(() => random.below(12) === 0);
    const wrong = sample.filter(
      (row) => flatTexts(magneticGroupByNumber(row.bns)).join("|") !== bnsOperators(row).map(String).sort().join("|"),
    );
    expect(wrong).toEqual([]);
  });

  it("stand in the settings of their numbers, with the inversion centre at the origin where there are two", () => {
    const wrong = rows
      .filter(({ type }) => type === 1)
      .filter(({ bns }) => {
        const [number = ""] = bns.split(".");
        const plain = (magneticGroupByNumber(bns).operators ?? []).map(({ operator }) => formatTriplet(operator));
        return plain.sort().join() !== parseGroup(number).operators.map(formatTriplet).sort().join();
      });
    expect(wrong).toEqual([]);
    // Magnetite's family: International Tables A, Fd-3m, origin 2 has -x,-y,-z.
    expect(
      magneticGroupByNumber("227.131").operators.some(({ operator }) => formatTriplet(operator) === "-x,-y,-z"),
    ).toBe(true);
  });

  it("have a symbol each, all different", () => {
    const table = magneticGroupTable();
    expect(table).toHaveLength(1651);
    expect(new Set(table.map((row) => row.name.bns.symbol)).size).toBe(1651);
    expect(table.map((row) => row.name.bns.number)).toEqual(rows.map((row) => row.bns));
  });

  it("have the point groups that there are: 122", () => {
    expect(
      new Set(rows.filter((row) => row.type < 4).map((row) => magneticGroupByNumber(row.bns).pointGroup)).size,
    ).toBe(122);
  });

  // The OG number begins with the number of the family, which for type IV is another one than that of the BNS number.
  it("have the family that their OG number names", () => {
    const random = seeded(603);
    const sample = rows.filter((row) => row.type === 4 && random.below(6) === 0);
    const wrong = sample.filter((row) => {
      const { setting } = standardSetting(familyGroup(groupOfFlat(expandRow(row))));
      return setting.number !== Number(row.og.split(".")[0]);
    });
    expect(wrong).toEqual([]);
  });

  it("have numbers that are texts", () => {
    const group = magneticGroupByNumber("62.441");
    expect(identifyMagneticGroup(group).name.bns.number).toBe("62.441");
    const five = changeMagneticBasis(magneticGroupByNumber("5.13"), randomBasis(seeded(604)));
    expect(identifyMagneticGroup(five).name).toMatchObject({ bns: { number: "5.13" }, og: { number: "5.1.19" } });
  });
});

describe("space groups in any basis", () => {
  it("are brought to their standard setting, half of the 530 as they stand, half in a random basis", () => {
    const random = seeded(605);
    const settings = tabulatedSettings();
    const standard = new Map(
      settings.filter((one) => one.standard).map((one) => [one.number, operatorsOf(groupFromSetting(one))]),
    );
    const problems = settings.flatMap((setting) => {
      const own = groupFromSetting(setting);
      const group = random.below(2) === 0 ? own : changeBasis(own, randomBasis(random));
      const found = standardSetting(group);
      if (found.setting.number !== setting.number)
        return [`${setting.hall} was taken for number ${found.setting.number}`];
      const carried = operatorsOf(changeBasis(group, found.change));
      return carried === standard.get(setting.number) ? [] : [`${setting.hall}: other operators after the change`];
    });
    expect(problems).toEqual([]);
  });
});

function operatorsOf({ lattice, operators }: ReturnType<typeof groupFromSetting>): string {
  return JSON.stringify([lattice, operators]);
}
