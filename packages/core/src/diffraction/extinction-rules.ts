import { littleGroup } from "../kvectors/index.js";
import type { SiteModes } from "../modes/index.js";
import {
  isZero,
  type LinearForm,
  lcm,
  modulo,
  multiply,
  one,
  type Rational,
  type RationalVector,
  rational,
  rationalField,
  reducedEchelon,
  subtract,
  toNumber,
  vectorFrom,
  zero,
} from "../numbers/index.js";
import { fromPrimitiveRow, type SpaceGroup, toPrimitiveRow } from "../spacegroups/index.js";
import { allVanish, type ExtinctionFrame, extinctionFrame, type FormalModes } from "./extinctions.js";
import { denominatorOf, type FormalPosition, type FormalVector, subtractPositions } from "./formal-factors.js";
import { familyText, type MarkedReflection, plainCondition } from "./reflection-conditions.js";
import {
  type FlatCondition,
  flatsOf,
  placeOnFlat,
  type ReflectionFlat,
  shiftedValue,
  spansFlat,
  vectorOnFlat,
} from "./reflection-flats.js";

/**
 * Satellites H + k that vanish for every arrangement of an irrep, for all values of the free coordinates, the cell
 * lengths and the letters of k.
 */
export interface ExtinctionRule {
  /** The H meant: `(h 0 l)`, `(h k l)`, `(0 0 l)`. */
  readonly reflections: string;
  /** `h+l = 2n+1`, `h+k = 2n and l = 2n`; null when all of them vanish; `listed` when no such condition says it. */
  readonly condition: string | null;
  /** The same for machines: one H of each class that vanishes, and the steps that lead to the others of a class. */
  readonly classes: readonly (readonly number[])[];
  readonly steps: readonly (readonly number[])[];
  /** `h = 2n+1 for (h 0 l)+k`. */
  readonly text: string;
}

/** The rules of one irrep. */
export interface IrrepExtinctions {
  readonly label: string;
  readonly rules: readonly ExtinctionRule[];
  /** False where there were more families of reflections than could be looked at. */
  readonly complete: boolean;
}

/** Most families of reflections, and most classes of one family, that are looked at. */
const mostFlats = 400;
const mostClasses = 2_000;

/**
 * The rules of every irrep that occurs on the sites. Families of reflections are the flats on which operators of the
 * little group leave H + k fixed or on which atoms of an orbit get one phase whatever their free coordinates; on each,
 * F⊥ depends on H through a finite set of classes, which are tried one by one with exact arithmetic.
 */
export function extinctionRules(group: SpaceGroup, sites: readonly SiteModes[]): readonly IrrepExtinctions[] {
  const frame = extinctionFrame(group, sites);
  return frame.irreps
    .filter((irrep) => irrep.sites.length > 0)
    .map((irrep) => {
      const flats = flatsOf(flatConditions(frame, irrep), mostFlats);
      const found = rulesOn(frame, irrep, flats ?? flatsOf(groupConditions(frame), mostFlats) ?? []);
      return { label: irrep.label, rules: found.rules, complete: flats !== null && found.complete };
    });
}

/** On a flat: how many steps of each basis vector make a class, and the classes that vanish. */
interface FlatRule {
  readonly flat: ReflectionFlat;
  readonly periods: readonly number[];
  readonly extinct: ReadonlySet<string>;
}

function rulesOn(
  frame: ExtinctionFrame,
  irrep: FormalModes,
  flats: readonly ReflectionFlat[],
): { readonly rules: ExtinctionRule[]; readonly complete: boolean } {
  const kept: FlatRule[] = [];
  const rules: ExtinctionRule[] = [];
  let complete = true;
  for (const flat of flats) {
    const periods = flat.basis.map((vector) => periodOf(frame, irrep, vector));
    if (periods.reduce((product, period) => product * period, 1) > mostClasses) {
      complete = false;
      continue;
    }
    const rule: FlatRule = { flat, periods, extinct: extinctClasses(frame, irrep, flat, periods) };
    if (rule.extinct.size === 0 || !addsToOthers(rule, kept)) continue;
    kept.push(rule);
    rules.push(written(frame, rule));
  }
  return { rules, complete };
}

/** Steps along a vector after which all constant parts of the phases are back. */
function periodOf({ group }: ExtinctionFrame, irrep: FormalModes, vector: readonly number[]): number {
  const row = fromPrimitiveRow(group.lattice, vectorFrom(vector));
  return irrep.sites.reduce(
    (period, { freePositions }) =>
      freePositions.reduce((own, { constant }) => lcm(own, denominatorOf(row, constant)), period),
    1,
  );
}

function extinctClasses(
  frame: ExtinctionFrame,
  irrep: FormalModes,
  flat: ReflectionFlat,
  periods: readonly number[],
): Set<string> {
  const extinct = new Set<string>();
  const row = (eta: readonly number[]): RationalVector => fromPrimitiveRow(frame.group.lattice, vectorFrom(eta));
  const steps = flat.basis.map((vector, index) => row(vector.map((entry) => entry * (periods[index] as number))));
  for (const places of placesUpTo(periods)) {
    const h = row(vectorOnFlat(flat, places));
    const q: FormalVector = {
      constant: h.map((entry, axis) =>
        addTo(entry, frame.wave.constant[axis as 0 | 1 | 2]),
      ) as unknown as RationalVector,
      letters: [...frame.wave.letters, ...steps],
      ofK: frame.wave.letters.length,
    };
    // The origin itself is no satellite.
    if (q.constant.every(isZero) && q.letters.every((letter) => letter.every(isZero))) continue;
    if (allVanish(frame, irrep, q, true)) extinct.add(places.join());
  }
  return extinct;
}

function addTo(a: Rational, b: Rational): Rational {
  return subtract(a, multiply([-1, 1], b));
}

function placesUpTo(periods: readonly number[]): number[][] {
  return periods.reduce<number[][]>(
    (list, period) => list.flatMap((places) => Array.from({ length: period }, (_, step) => [...places, step])),
    [[]],
  );
}

/**
 * Whether some H that the rule takes is taken by none of the rules found before. Those that meet its flat in less than
 * the whole of it cannot take a class, however many they are.
 */
function addsToOthers(rule: FlatRule, found: readonly FlatRule[]): boolean {
  const others = found.filter(({ flat }) => spansFlat(flat, rule.flat));
  if (others.length === 0) return true;
  const fine = others.reduce((period, other) => other.periods.reduce(lcm, period), 1);
  const periods = rule.periods.map((period) => lcm(period, fine));
  if (periods.reduce((product, period) => product * period, 1) > 20 * mostClasses) return true;
  return placesUpTo(periods).some((places) => {
    if (!rule.extinct.has(places.map((place, index) => modulo(place, rule.periods[index] as number)).join()))
      return false;
    const eta = vectorOnFlat(rule.flat, places);
    return !others.some((other) => takes(other, eta));
  });
}

function takes({ flat, periods, extinct }: FlatRule, eta: readonly number[]): boolean {
  const places = placeOnFlat(flat, eta);
  return places !== null && extinct.has(places.map((place, index) => modulo(place, periods[index] as number)).join());
}

function written({ group }: ExtinctionFrame, { flat, periods, extinct }: FlatRule): ExtinctionRule {
  const inSetting = (eta: readonly number[]): number[] =>
    fromPrimitiveRow(group.lattice, vectorFrom(eta)).map(toNumber);
  const marked = placesUpTo(periods).map(
    (places): MarkedReflection => ({ h: inSetting(vectorOnFlat(flat, places)), extinct: extinct.has(places.join()) }),
  );
  const reflections = familyText(familyForms(group, flat));
  const of = `${reflections}+k`;
  const classes = marked.filter((one) => one.extinct).map(({ h }) => h);
  const steps = flat.basis.map((vector, index) => inSetting(vector.map((entry) => entry * (periods[index] as number))));
  const condition = plainCondition(marked, steps);
  if (condition === undefined) {
    const bracketed = (list: readonly (readonly number[])[]) => list.map((h) => `(${h.join(" ")})`).join(", ");
    const text = `${bracketed(classes)} and steps of ${bracketed(steps)} for ${of}`;
    return { reflections, condition: "listed", classes, steps, text };
  }
  const text = condition !== null ? `${condition} for ${of}` : flat.basis.length === 0 ? of : `all ${of}`;
  return { reflections, condition, classes, steps, text };
}

/** H of a flat as forms in those of h, k, l that run freely. */
function familyForms(group: SpaceGroup, flat: ReflectionFlat): readonly [LinearForm, LinearForm, LinearForm] {
  const origin = fromPrimitiveRow(group.lattice, vectorFrom(flat.origin));
  const rows = flat.basis.map((vector) => fromPrimitiveRow(group.lattice, vectorFrom(vector)));
  const { rows: reduced, pivots } = wholeEchelon(rows);
  return [0, 1, 2].map((axis): LinearForm => {
    const at = axis as 0 | 1 | 2;
    const coefficients: [Rational, Rational, Rational] = [zero, zero, zero];
    let constant = origin[at];
    reduced.forEach((row, index) => {
      const pivot = pivots[index] as 0 | 1 | 2;
      const factor = row[at] as Rational;
      coefficients[pivot] = factor;
      constant = subtract(constant, multiply(factor, origin[pivot]));
    });
    return { constant, coefficients };
  }) as unknown as readonly [LinearForm, LinearForm, LinearForm];
}

/** Echelon form on the first choice of free indices that leaves whole coefficients, `(h h l)` and not `(l/2 l/2 l)`. */
function wholeEchelon(rows: readonly RationalVector[]): { rows: Rational[][]; pivots: number[] } {
  const orders = [
    [0, 1, 2],
    [0, 2, 1],
    [1, 0, 2],
    [1, 2, 0],
    [2, 0, 1],
    [2, 1, 0],
  ];
  const tries = orders.map((order) => {
    const { rows: reduced, pivots } = reducedEchelon(
      rows.map((row) => order.map((axis) => row[axis as 0 | 1 | 2])),
      rationalField,
    );
    return {
      rows: reduced.map((row) => [0, 1, 2].map((axis) => row[order.indexOf(axis)] as Rational)),
      pivots: pivots.map((pivot) => order[pivot] as number),
    };
  });
  const whole = tries.find((one) => one.rows.every((row) => row.every(([, bottom]) => bottom === 1)));
  return whole ?? (tries[0] as { rows: Rational[][]; pivots: number[] });
}

/** `(η + κ) R = η + κ` for each operator of the little group. */
function groupConditions({ group, k }: ExtinctionFrame): FlatCondition[][] {
  const { operators, shifts } = littleGroup(group, k);
  return operators.flatMap((operator, index) => {
    const rotation = group.primitive.rotations[operator] as readonly number[];
    const shift = shifts[index] as readonly number[];
    const conditions = [0, 1, 2].map((column): FlatCondition => {
      const entries = [0, 1, 2].map((row) =>
        rational((rotation[3 * row + column] as number) - (row === column ? 1 : 0)),
      );
      return { column: entries as unknown as RationalVector, value: rational(0 - (shift[column] as number)) };
    });
    return conditions.every(({ column }) => column.every(isZero)) ? [] : [conditions];
  });
}

/** Besides: `(H + k)·(A_i − A_j) = 0` for atoms of one orbit, A their free coordinates. */
function flatConditions(frame: ExtinctionFrame, irrep: FormalModes): FlatCondition[][] {
  const { group, wave } = frame;
  const sets = new Map<string, FlatCondition[]>();
  for (const { freePositions } of irrep.sites)
    for (let i = 0; i < freePositions.length; i++)
      for (let j = i + 1; j < freePositions.length; j++) {
        const differences = subtractPositions(freePositions[i] as FormalPosition, freePositions[j] as FormalPosition);
        if (differences.every((one) => one.every(isZero))) continue;
        // Letters of k must not stand in it.
        if (differences.some((one) => wave.letters.some((letter) => !isZero(dotOf(letter, one))))) continue;
        const set = differences.map((difference): FlatCondition => {
          const column = dualColumn(group, difference);
          const base = toPrimitiveRow(group.lattice, wave.constant);
          return { column, value: shiftedValue(zero, base, column) };
        });
        sets.set(JSON.stringify(set), set);
      }
  return [...groupConditions(frame), ...sets.values()];
}

function dotOf(a: RationalVector, b: RationalVector): Rational {
  return a.reduce<Rational>((sum, entry, axis) => addTo(sum, multiply(entry, b[axis as 0 | 1 | 2])), zero);
}

/** A column of positions in the primitive basis: `H·x = η·ξ`. */
function dualColumn(group: SpaceGroup, x: RationalVector): RationalVector {
  const rows = [0, 1, 2].map((axis) =>
    dotOf(
      fromPrimitiveRow(group.lattice, [axis === 0 ? one : zero, axis === 1 ? one : zero, axis === 2 ? one : zero]),
      x,
    ),
  );
  return rows as unknown as RationalVector;
}
