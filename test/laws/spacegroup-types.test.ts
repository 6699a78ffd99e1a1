import { groupFromSetting, type SpaceGroup, tabulatedSettings } from "@kvane/core/spacegroups";
import { describe, expect, it } from "vitest";
import { typeFinder } from "../support/affine-types.js";

/**
 * The counts of International Tables A, chapters 1.3 and 2.1: 230 space-group types, 219 when mirror images are one,
 * 73 arithmetic crystal classes, 32 geometric ones. Nothing but operators goes into them here.
 */
const settings = tabulatedSettings();
const groups = settings.map(groupFromSetting);
const finder = typeFinder();

/** Classes of indices under a relation, each as the list of its members. */
function classesOf(same: (a: SpaceGroup, b: SpaceGroup) => boolean, among = groups): number[][] {
  const classes: number[][] = [];
  among.forEach((group, index) => {
    const own = classes.find(([first]) => same(among[first as number] as SpaceGroup, group));
    if (own) own.push(index);
    else classes.push([index]);
  });
  return classes;
}

describe("types counted from the operators of the 530 settings", () => {
  it("are 230, and settings are of one type exactly when they have one number", () => {
    const classes = classesOf((a, b) => finder.sameType(a, b, true));
    expect(classes).toHaveLength(230);
    const numbers = classes.map((members) => [...new Set(members.map((index) => settings[index]?.number))]);
    expect(numbers).toEqual(Array.from({ length: 230 }, (_, index) => [index + 1]));
  });

  it("are 219 when mirror images count as one", () => {
    const standard = groups.filter((_, index) => settings[index]?.standard);
    expect(classesOf((a, b) => finder.sameType(a, b, false), standard)).toHaveLength(219);
  });

  it("fall into 73 arithmetic classes", () => {
    expect(classesOf((a, b) => finder.sameArithmeticClass(a, b))).toHaveLength(73);
  });

  it("fall into 32 crystal classes", () => {
    expect(new Set(groups.map((group) => group.pointGroup)).size).toBe(32);
  });
});
