import type { WaveVector } from "../kvectors/index.js";
import {
  addCyclotomic,
  type Cyclotomic,
  cyclotomicNumbers,
  cyclotomicToComplex,
  cyclotomicZero,
  dot,
  fractionalPart,
  isCyclotomicZero,
  multiplyCyclotomic,
  negateCyclotomic,
  type Rational,
  type RationalVector,
  reducedEchelon,
  reduceOrder,
  rootOfUnity,
  roundNumber,
  subtract,
  subtractCyclotomic,
  toNumber,
  unitComplex,
  zero,
} from "../numbers/index.js";
import { imaginaryPart, realPart } from "./fixed-vectors.js";
import { amplitudeLetter, sumText } from "./form-text.js";
import type { ModulatedSite } from "./modulated-types.js";
import type { SiteFrame } from "./site-frames.js";
import { type SparseRow, sparseEchelon } from "./sparse-echelon.js";
import { exampleAmplitude } from "./split-sites.js";
import { constantPart, type ModulatedOrbit } from "./superspace-fields.js";

/** One site of the parent: its orbits under the operators and the amplitudes A' of the listed irreps. */
export interface ModulatedShare {
  readonly frame: SiteFrame;
  readonly orbits: readonly ModulatedOrbit[];
  readonly rows: readonly SparseRow[];
}

/** A number of a form: exact where it can be, else the float alone. */
interface Entry {
  readonly exact: Cyclotomic | null;
  readonly value: number;
}

/** Denominators of turns up to which cosines and sines are written exactly. */
const finestExactTurn = 24;
/** Digits of coefficients that depend on a coordinate, which is known to four or five. */
const decimalDigits = 6;

const amplitudeNames = ["mxcos", "mycos", "mzcos", "mxsin", "mysin", "mzsin"];

/**
 * The asymmetric unit with its cosine and sine amplitudes, `A_j = A'_j e^{2πi k_c·r_j}`. Where the constant part k_c of k
 * is not zero the angle depends on coordinates: then coefficients may be decimals.
 */
export function modulatedSites(k: WaveVector, shares: readonly ModulatedShare[]): ModulatedSite[] {
  const constants = constantPart(k);
  let used = 0;
  return shares.flatMap(({ frame, orbits, rows }) => {
    const first = used;
    used += rows.length;
    const angles = orbits.map(({ atom }) =>
      fractionalPart(dot(constants, frame.orbit.positions[atom] as RationalVector)),
    );
    const moments = turnedRows(rows, angles);
    return orbits.map(({ atom, members, allowed }, number): ModulatedSite => {
      const own = moments.flatMap((row, index) => {
        const entries = row[number] as readonly Entry[];
        return entries.some(({ value }) => value !== 0) ? [{ amplitude: first + index, entries }] : [];
      });
      const texts = columnTexts(own.map(({ amplitude, entries }) => ({ entries, letter: amplitudeLetter(amplitude) })));
      const forms = columnTexts(allowedForms(allowed, angles[number] as Rational));
      const amplitudes = own.map(({ amplitude, entries }) => ({
        amplitude,
        cosine: tripleOf(entries.slice(0, 3)),
        sine: tripleOf(entries.slice(3)),
      }));
      const example = (part: "cosine" | "sine"): [number, number, number] =>
        [0, 1, 2].map((axis) =>
          roundNumber(
            amplitudes.reduce(
              (sum, share) => sum + (share[part][axis] as number) * exampleAmplitude(share.amplitude),
              0,
            ),
          ),
        ) as [number, number, number];
      return {
        label: orbits.length === 1 ? frame.orbit.label : `${frame.orbit.label}_${number + 1}`,
        parentSite: frame.orbit.label,
        position: frame.orbit.positions[atom] as RationalVector,
        multiplicity: members,
        meanMoment: "(0, 0, 0)",
        cosine: texts.cosine,
        sine: texts.sine,
        symmformCosine: forms.cosine,
        symmformSine: forms.sine,
        exampleCosine: example("cosine"),
        exampleSine: example("sine"),
        amplitudes,
      };
    });
  });
}

function tripleOf(entries: readonly Entry[]): [number, number, number] {
  return entries.map(({ value }) => value) as [number, number, number];
}

/** Six entries per orbit of every row, turned by the angles; where i times a field is one too, by their differences. */
function turnedRows(rows: readonly SparseRow[], angles: readonly Rational[]): Entry[][][] {
  const free = isComplex(rows);
  const start = free ? (angles[0] ?? zero) : zero;
  const turns = angles.map((angle) => fractionalPart(subtract(angle, start)));
  const six = (row: SparseRow, number: number): Cyclotomic[] =>
    [0, 1, 2, 3, 4, 5].map((column) => row.get(6 * number + column) ?? cyclotomicZero);
  if (turns.some(([, denominator]) => denominator > finestExactTurn))
    return rows.map((row) => turns.map((angle, number) => turned(six(row, number), angle)));
  const exact = sparseEchelon(
    rows.map(
      (row) =>
        new Map(
          turns.flatMap((angle, number) =>
            exactlyTurned(six(row, number), angle).flatMap((entry, column): [number, Cyclotomic][] =>
              isCyclotomicZero(entry) ? [] : [[6 * number + column, entry]],
            ),
          ),
        ),
    ),
  );
  return exact.map((row) => turns.map((_, number) => six(row, number).map(exactEntry)));
}

/** Whether the space of rows (Re, Im per orbit) holds i times each of its vectors. */
function isComplex(rows: readonly SparseRow[]): boolean {
  const times = rows.map(
    (row) =>
      new Map(
        [...row].map(([column, value]): [number, Cyclotomic] => {
          const part = column % 6;
          return part < 3 ? [column + 3, value] : [column - 3, negateCyclotomic(value)];
        }),
      ),
  );
  return sparseEchelon([...rows, ...times]).length === rows.length;
}

function exactEntry(value: Cyclotomic): Entry {
  return { exact: value, value: roundNumber(cyclotomicToComplex(value)[0]) };
}

function exactlyTurned(six: readonly Cyclotomic[], angle: Rational): Cyclotomic[] {
  const root = rootOfUnity(angle);
  const [cosine, sine] = [realPart(root), imaginaryPart(root)];
  const combined = (axis: number): [Cyclotomic, Cyclotomic] => {
    const [re, im] = [six[axis] as Cyclotomic, six[axis + 3] as Cyclotomic];
    return [
      reduceOrder(subtractCyclotomic(multiplyCyclotomic(cosine, re), multiplyCyclotomic(sine, im))),
      reduceOrder(addCyclotomic(multiplyCyclotomic(sine, re), multiplyCyclotomic(cosine, im))),
    ];
  };
  const pairs = [0, 1, 2].map(combined);
  return [...pairs.map(([re]) => re), ...pairs.map(([, im]) => im)];
}

function turned(six: readonly Cyclotomic[], angle: Rational): Entry[] {
  if (angle[1] <= finestExactTurn) return exactlyTurned(six, angle).map(exactEntry);
  const [cosine, sine] = unitComplex(toNumber(angle));
  const values = six.map((entry) => cyclotomicToComplex(entry)[0]);
  const float = (value: number): Entry => ({ exact: null, value: roundNumber(value) });
  return [
    ...[0, 1, 2].map((axis) => float(cosine * (values[axis] as number) - sine * (values[axis + 3] as number))),
    ...[0, 1, 2].map((axis) => float(sine * (values[axis] as number) + cosine * (values[axis + 3] as number))),
  ];
}

/** The forms of the operators: names of the leading amplitudes of each row. */
function allowedForms(
  allowed: readonly (readonly Cyclotomic[])[],
  angle: Rational,
): { entries: readonly Entry[]; letter: string }[] {
  const sparse = allowed.map(
    (row) =>
      new Map(
        row.flatMap((entry, column): [number, Cyclotomic][] => (isCyclotomicZero(entry) ? [] : [[column, entry]])),
      ),
  );
  const turns = isComplex(sparse) ? zero : angle;
  if (turns[1] <= finestExactTurn) {
    const { rows, pivots } = reducedEchelon(
      allowed.map((row) => exactlyTurned(row, turns)),
      cyclotomicNumbers,
    );
    return rows.map((row, index) => ({
      entries: row.map((entry) => exactEntry(reduceOrder(entry))),
      letter: amplitudeNames[pivots[index] as number] as string,
    }));
  }
  const { rows, pivots } = floatEchelon(allowed.map((row) => turned(row, turns).map(({ value }) => value)));
  return rows.map((row, index) => ({
    entries: row.map((value) => ({ exact: null, value: roundNumber(value) })),
    letter: amplitudeNames[pivots[index] as number] as string,
  }));
}

/** Leading entries 1; the largest entry of a column leads, and what is below 1e-9 is rounding. */
function floatEchelon(rows: readonly (readonly number[])[]): { rows: number[][]; pivots: number[] } {
  const work = rows.map((row) => [...row]);
  const pivots: number[] = [];
  for (let column = 0, top = 0; column < 6 && top < work.length; column++) {
    let best = top;
    for (let row = top; row < work.length; row++)
      if (Math.abs(work[row]?.[column] as number) > Math.abs(work[best]?.[column] as number)) best = row;
    const lead = work[best]?.[column] as number;
    if (Math.abs(lead) < 1e-9) continue;
    const pivot = (work[best] as number[]).map((entry) => entry / lead);
    work[best] = work[top] as number[];
    work[top] = pivot;
    for (let row = 0; row < work.length; row++) {
      const factor = work[row]?.[column] as number;
      if (row !== top) work[row] = (work[row] as number[]).map((entry, at) => entry - factor * (pivot[at] as number));
    }
    pivots.push(column);
    top += 1;
  }
  return { rows: work, pivots };
}

function columnTexts(rows: readonly { entries: readonly Entry[]; letter: string }[]): { cosine: string; sine: string } {
  const texts = [0, 1, 2, 3, 4, 5].map((column) => {
    const terms = rows.map(({ entries, letter }) => ({ entry: entries[column] as Entry, letter }));
    return terms.every(({ entry }) => entry.exact !== null || entry.value === 0)
      ? sumText(terms.map(({ entry, letter }) => ({ factor: entry.exact ?? cyclotomicZero, letter })))
      : decimalText(terms.map(({ entry, letter }) => ({ value: entry.value, letter })));
  });
  return { cosine: `(${texts.slice(0, 3).join(", ")})`, sine: `(${texts.slice(3).join(", ")})` };
}

function decimalText(terms: readonly { value: number; letter: string }[]): string {
  let text = "";
  for (const { value, letter } of terms) {
    const rounded = roundNumber(value, 1, decimalDigits);
    if (rounded === 0) continue;
    const size = Math.abs(rounded) === 1 ? "" : String(Math.abs(rounded));
    text += `${rounded < 0 ? "-" : text === "" ? "" : "+"}${size}${letter}`;
  }
  return text === "" ? "0" : text;
}
