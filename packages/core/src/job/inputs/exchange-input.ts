import { fail, type Place } from "../../errors/index.js";
import {
  type BondTable,
  bondsNamed,
  classesNamed,
  constantName,
  type DiagramAxis,
  type GivenCoupling,
} from "../../exchange/index.js";
import { formatRational, toNumber } from "../../numbers/index.js";
import { argumentNames } from "../request.js";
import { remember, type Work } from "../work.js";
import { studyText } from "./given.js";
import type { GivenSite } from "./site-input.js";

const number = /^[+-]?(\d+(?:\.\d*)?|\.\d+)(e[+-]?\d+)?$/i;
const bondName = /^[1-9]\d*[a-z]*$/;

/** The constants of the options, or of the study; of those that only run, their ranges speak. */
export function constantsOf(work: Work): GivenCoupling[] {
  const options = work.request.constants ?? [];
  if (options.length > 0) return options.map(constantOf);
  return (work.study?.exchange ?? []).flatMap(({ bond, between, j }, index) =>
    j === null ? [] : [{ bond, between, j, where: placeInStudy(work, index) }],
  );
}

function placeInStudy({ study }: Work, index: number): Partial<Place> {
  return study === null ? {} : studyText(study, `exchange[${index}]`, "").where;
}

/** `2 0.4`, `2b -0.3`, `2 Fe1 Fe2 0.4`; = and commas may stand between the words. */
function constantOf(text: string): GivenCoupling {
  const words = text.split(/[\s,=]+/).filter((word) => word !== "");
  const [bond = "", ...rest] = words;
  const j = rest.at(-1) ?? "";
  const labels = rest.slice(0, -1);
  const where = { argument: argumentNames.constants };
  if (
    !bondName.test(bond) ||
    !number.test(j) ||
    !Number.isFinite(Number(j)) ||
    (labels.length !== 0 && labels.length !== 2)
  )
    fail("invalid-argument", `\`${text}\` is no exchange constant`, {
      where,
      expected: 'BOND J or BOND LABEL LABEL J, such as "1 1.0", "2b -0.3" or "2 Fe1 Fe2 0.4"',
      found: text,
      remedy: `write ${argumentNames.constants} "1 1.0", once for each constant`,
    });
  const [first, second] = labels;
  return { bond, between: first !== undefined && second !== undefined ? [first, second] : null, j: Number(j), where };
}

/** |S| by label: the spins of the study where every site has one, else 1; that is remembered. */
export function spinsOf(work: Work, sites: readonly GivenSite[]): Record<string, number> {
  const fromStudy = (work.request.sites ?? []).length === 0 ? (work.study?.sites ?? []) : [];
  const spins = sites.map(({ site }) => fromStudy.find(({ label }) => label === site.label)?.spin ?? null);
  const all = sites.length > 0 && spins.every((spin) => spin !== null);
  remember(
    work,
    [
      {
        what: "lengths of the spins",
        value: all
          ? sites.map(({ site }, n) => `${site.label} ${formatRational(spins[n] ?? [1, 1])}`).join(", ")
          : "1 for every atom",
        because: all ? "the study gives the spin of every site" : "not every site has a spin in the study",
      },
    ],
    [],
  );
  return all ? Object.fromEntries(sites.map(({ site }, n) => [site.label, toNumber(spins[n] ?? [1, 1])])) : {};
}

/** A range as it was written. */
export interface GivenRange {
  readonly bond: string;
  /** Only bonds between sites of these labels. */
  readonly between: readonly [string, string] | null;
  readonly from: number;
  readonly to: number;
  readonly count: number;
  readonly where: Partial<Place>;
}

const usualCount = 21;
const mostPoints = 2500;

/** The ranges of the options; else those of the study, unless the options replace its constants. */
export function rangesOf(work: Work): GivenRange[] {
  const { request, study } = work;
  const texts = request.vary ?? [];
  const fromStudy = (request.constants ?? []).length > 0 ? [] : (study?.exchange ?? []);
  const ranges =
    texts.length > 0
      ? texts.map(rangeOf)
      : fromStudy.flatMap(({ bond, between, vary }, index): GivenRange[] => {
          const where = placeInStudy(work, index);
          return vary === null ? [] : [{ ...vary, bond, between, count: vary.count ?? usualCount, where }];
        });
  const total = ranges.reduce((product, { count }) => product * count, 1);
  if (ranges.length > 2 || total > mostPoints)
    fail(
      "invalid-argument",
      ranges.length > 2 ? "more than two constants are to run" : `the diagram would have ${total} points`,
      {
        where: ranges[2]?.where ?? ranges.at(-1)?.where ?? {},
        expected: `at most two ranges and ${mostPoints} points`,
        found: `${ranges.length} ranges, ${total} points`,
        remedy: "take fewer",
      },
    );
  return ranges;
}

/** `2 0 1` or `2 0 1 41`. */
function rangeOf(text: string): GivenRange {
  const where = { argument: argumentNames.vary };
  const [bond = "", from = "", to = "", count = String(usualCount), ...more] = text
    .split(/[\s,]+/)
    .filter((word) => word !== "");
  const fine =
    more.length === 0 &&
    bondName.test(bond) &&
    number.test(from) &&
    number.test(to) &&
    /^\d+$/.test(count) &&
    Number(count) >= 2 &&
    Number(from) !== Number(to) &&
    Number.isFinite(Number(to) - Number(from));
  if (!fine)
    fail("invalid-argument", `\`${text}\` is no range of an exchange constant`, {
      where,
      expected: 'BOND FROM TO COUNT, such as "2 0 1 41"',
      found: text,
      remedy: `write ${argumentNames.vary} "2 0 1 41"; the count may be left out`,
    });
  return { bond, between: null, from: Number(from), to: Number(to), count: Number(count), where };
}

/** The ranges with the classes of bonds that they stand for; each class may run in one of them. */
export function axesOf(table: BondTable, ranges: readonly GivenRange[]): DiagramAxis[] {
  const taken = new Set<string>();
  return ranges.map((range) => {
    const { from, to, count, where } = range;
    const classes = bondsNamed(table, range);
    const twice = classes.find(({ name }) => taken.has(name));
    if (twice !== undefined)
      fail("conflicting-arguments", `the bonds ${twice.name} run in two ranges`, {
        where,
        expected: "one range for each bond",
        found: ranges.map(({ bond }) => bond).join(" and "),
        remedy: "name different bonds, or leave one of the ranges out",
      });
    for (const { name } of classes) taken.add(name);
    return { name: constantName(range, classes), classes: classes.map(({ name }) => name), from, to, count };
  });
}

/**
 * Classes of bonds that run though no constant is given for them: outside the diagram they start where their range does.
 * A class that has a constant keeps it there, also where the constant is one of its whole shell.
 */
export function runningAlone(
  ranges: readonly GivenRange[],
  table: BondTable,
  constants: readonly GivenCoupling[],
): GivenCoupling[] {
  const given = new Set(constants.flatMap((one) => classesNamed(table, one).map(({ name }) => name)));
  return ranges.flatMap(({ bond, between, from }) => {
    const classes = classesNamed(table, { bond, between }).map(({ name }) => name);
    const open = classes.filter((one) => !given.has(one));
    return open.length === classes.length
      ? [{ bond, between, j: from }]
      : open.map((one) => ({ bond: one, between: null, j: from }));
  });
}
