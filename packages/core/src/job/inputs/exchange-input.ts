import { fail } from "../../errors/index.js";
import { type BondTable, classesNamed, type DiagramAxis, type GivenCoupling } from "../../exchange/index.js";
import { formatRational, toNumber } from "../../numbers/index.js";
import { argumentNames } from "../request.js";
import { remember, type Work } from "../work.js";
import { studyText } from "./given.js";
import type { GivenSite } from "./site-input.js";

const number = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i;
const bondName = /^[1-9]\d*[a-z]*$/;

/** The constants of the options, or of the study. */
export function constantsOf({ request, study }: Work): GivenCoupling[] {
  const options = request.constants ?? [];
  if (options.length > 0) return options.map(constantOf);
  return (study?.exchange ?? []).map((one, index) => ({
    ...one,
    where: study === null ? {} : studyText(study, `exchange[${index}]`, "").where,
  }));
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
  readonly text: string;
  readonly bond: string;
  readonly from: number;
  readonly to: number;
  readonly count: number;
}

const usualCount = 21;
const mostPoints = 2500;

/** `2 0 1` or `2 0 1 41`, at most two. */
export function rangesOf({ request }: Work): GivenRange[] {
  const texts = request.vary ?? [];
  const where = { argument: argumentNames.vary };
  const ranges = texts.map((text): GivenRange => {
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
      Number(from) !== Number(to);
    if (!fine)
      fail("invalid-argument", `\`${text}\` is no range of an exchange constant`, {
        where,
        expected: 'BOND FROM TO COUNT, such as "2 0 1 41"',
        found: text,
        remedy: `write ${argumentNames.vary} "2 0 1 41"; the count may be left out`,
      });
    return { text, bond, from: Number(from), to: Number(to), count: Number(count) };
  });
  const total = ranges.reduce((product, { count }) => product * count, 1);
  if (ranges.length > 2 || total > mostPoints)
    fail(
      "invalid-argument",
      ranges.length > 2 ? "more than two constants are to run" : `the diagram would have ${total} points`,
      {
        where,
        expected: `at most two ranges and ${mostPoints} points`,
        found: `${ranges.length} ranges, ${total} points`,
        remedy: "take fewer",
      },
    );
  return ranges;
}

/** The ranges with the classes of bonds that they stand for. */
export function axesOf(table: BondTable, ranges: readonly GivenRange[]): DiagramAxis[] {
  return ranges.map(({ bond, from, to, count }) => ({
    name: bond,
    classes: classesNamed(table, { bond, between: null }).map(({ name }) => name),
    from,
    to,
    count,
  }));
}
