import {
  formatWaveVector,
  parseWaveVector,
  placeWaveVector,
  type WrittenWaveVector,
  waveVectorToJson,
} from "@kvane/core/kvectors";
import {
  formatMagneticTriplet,
  formatSuperspace,
  parseMagneticTriplet,
  parseSuperspace,
} from "@kvane/core/magneticgroups";
import {
  formatBasisChange,
  formatTriplet,
  parseBasisChange,
  parseCell,
  parseGroup,
  parseGroupWithNotes,
  parseSite,
  parseTriplet,
  tabulatedSettings,
} from "@kvane/core/spacegroups";
import {
  axisNames,
  type Cyclotomic,
  coordinateNames,
  formatCyclotomic,
  formatForm,
  formatRational,
  parameterNames,
  parseForm,
  parseRational,
  parseThreeForms,
  type Rational,
} from "#core/numbers/index.js";
import type { Random } from "../../support/random.js";
import { demand, demandPlain, demandWithin, readOrRefused } from "../properties.js";
import { target } from "../target.js";
import { damaged } from "../texts/damage.js";
import { randomText, wordsOf } from "../texts/random-text.js";
import { extremeNumbers } from "../texts/tokens.js";
import { goodWords, type WordKind } from "../texts/words.js";

const settings = tabulatedSettings();
const dictionaries = new Map<WordKind, readonly string[]>();

/** A spoilt good text mostly; sometimes nothing but words of the kind, or a good one with an extreme number in it. */
export function word(kind: WordKind, random: Random): string {
  const good = goodWords(kind, settings);
  const choice = random.below(8);
  if (choice === 0) {
    const words = dictionaries.get(kind) ?? wordsOf(good);
    dictionaries.set(kind, words);
    return randomText(random, words);
  }
  if (choice === 1) return random.pick(good).replace(/\d+(?:[./]\d+)?/, random.pick(extremeNumbers));
  if (choice === 2) return random.pick(good);
  return damaged(random.pick(good), random, good);
}

/** What a reader refuses is refused with a column in the text; what it takes is plain data. */
function wordTarget(kind: WordKind, share: number, few: number, read: (text: string) => unknown) {
  return target<string>({
    name: kind,
    share,
    few,
    patience: 5,
    make: (random) => word(kind, random),
    run: (text) =>
      readOrRefused(
        () => demandPlain(read(text) ?? null),
        (problems) => demandWithin(problems, text, null),
      ),
  });
}

/** What is written of a value that was read must be read as the same again. */
function roundTrip<T>(text: string, read: (text: string) => T, write: (value: T) => string): T {
  const value = read(text);
  const written = write(value);
  demand(write(read(written)) === written, () => `${JSON.stringify(text)} is written ${written} and read as another`);
  return value;
}

function divisor(a: number, b: number): number {
  return b === 0 ? Math.abs(a) : divisor(b, a % b);
}

const someGroup = parseGroup("P 63/m m c");

function readWaveVector(text: string): unknown {
  const written = parseWaveVector(text);
  const { k } = placeWaveVector(someGroup, written);
  waveVectorToJson(k);
  roundTrip(text, parseWaveVector, ({ components }: WrittenWaveVector) =>
    formatWaveVector({ components, values: null, uncertainties: null }),
  );
  return k;
}

function readForms(text: string): unknown {
  roundTrip(
    text,
    (one) => parseForm(one, coordinateNames),
    (form) => formatForm(form, coordinateNames),
  );
  parseThreeForms(`${text},${text},0`, coordinateNames);
  return [axisNames, parameterNames].map((names) => parseForm(text.replaceAll(/[xyz]/g, names[0]), names));
}

/** Numbers of the cyclotomic fields have no text that is read, but they are written. */
const cyclotomicTarget = target<Cyclotomic>({
  name: "cyclotomic texts",
  share: 1_000,
  few: 100,
  patience: 5,
  make: (random) => {
    const [order, degree] = random.pick([
      [1, 1],
      [3, 2],
      [4, 2],
      [5, 4],
      [7, 6],
      [8, 4],
      [12, 4],
      [15, 8],
      [24, 8],
      [60, 16],
    ] as const);
    const sizes = [2, 2, 7];
    const entry = () => (random.below(2) - 0.5 < 0 ? -1 : 1) * random.below(random.pick(sizes)) + 0;
    const coefficients = Array.from({ length: degree }, entry);
    const denominator = 1 + random.below(random.pick(sizes));
    const common = coefficients.reduce(divisor, denominator);
    return { order, denominator: denominator / common, coefficients: coefficients.map((one) => one / common + 0) };
  },
  run: (value) =>
    readOrRefused(
      () => {
        const text = formatCyclotomic(value);
        demand(/^[-+−·*/().{}^,\w√ζπ\s]+$/u.test(text) && !/NaN|Infinity|undefined/.test(text), () => text);
      },
      () => {},
    ),
});

export const wordTargets = [
  wordTarget("group", 8_000, 300, (text) => {
    const { group } = parseGroupWithNotes(text);
    demand(group.operators.length > 0, () => "a group without operators");
  }),
  wordTarget("hall", 4_000, 150, (text) => parseGroup(text).operators),
  wordTarget("triplet", 4_000, 150, (text) => roundTrip(text, parseTriplet, formatTriplet)),
  wordTarget("magnetic triplet", 2_000, 100, (text) => roundTrip(text, parseMagneticTriplet, formatMagneticTriplet)),
  wordTarget("superspace", 2_500, 100, (text) => roundTrip(text, parseSuperspace, formatSuperspace)),
  wordTarget("basis change", 3_500, 150, (text) => roundTrip(text, parseBasisChange, formatBasisChange)),
  wordTarget("k", 3_500, 200, readWaveVector),
  wordTarget("site", 3_000, 150, parseSite),
  wordTarget("cell", 3_000, 150, parseCell),
  wordTarget("form", 2_500, 150, readForms),
  wordTarget("rational", 2_000, 150, (text) => {
    const value = parseRational(text);
    if (value === null) return null;
    return roundTrip<Rational>(formatRational(value), (one) => parseRational(one) ?? [0, 1], formatRational);
  }),
  cyclotomicTarget,
];
