import {
  changeMagneticBasis,
  familyGroup,
  type MagneticGroup,
  magneticGroupByNumber,
  magneticGroupTable,
  tensorForms,
} from "@kvane/core/magneticgroups";
import type { Cell } from "@kvane/core/spacegroups";
import { describe, expect, it } from "vitest";
import { evaluateText } from "../support/evaluate-text.js";
import { type Random, seeded } from "../support/random.js";
import { randomBasis } from "../support/random-bases.js";
import { randomCell } from "../support/random-cells.js";

/** One group for each of the 122 point groups. */
const groups = new Map<string, MagneticGroup>();
for (const { name, type } of magneticGroupTable()) {
  // Types I to III have all point groups already; few symmorphic ones would do, the table is walked until all are there.
  if (type === 4 || groups.size === 122) continue;
  const group = magneticGroupByNumber(name.bns.number);
  if (!groups.has(group.pointGroup)) groups.set(group.pointGroup, group);
}

type Matrix = readonly (readonly number[])[];

const at = (list: readonly number[], index: number): number => list[index] as number;

/** a, b, c as columns: x along a, z along c*; the usual formulas with the angles of the cell. */
function axesOf({ a, b, c, alpha, beta, gamma }: Cell): Matrix {
  const [ca, cb, cg] = [alpha, beta, gamma].map((angle) => Math.cos((angle * Math.PI) / 180)) as [
    number,
    number,
    number,
  ];
  const sg = Math.sin((gamma * Math.PI) / 180);
  const y = (ca - cb * cg) / sg;
  return [
    [a, b * cg, c * cb],
    [0, b * sg, c * y],
    [0, 0, c * Math.sqrt(1 - cb * cb - y * y)],
  ];
}

function product(p: Matrix, q: Matrix): Matrix {
  return p.map((row) =>
    [0, 1, 2].map((column) => row.reduce((sum, entry, k) => sum + entry * (q[k]?.[column] ?? 0), 0)),
  );
}

/** Inverse of an upper triangular matrix. */
function inverseOf(m: Matrix): Matrix {
  const [a, b, c] = m[0] as [number, number, number];
  const [, d, e] = m[1] as [number, number, number];
  const f = m[2]?.[2] as number;
  return [
    [1 / a, -b / (a * d), (b * e - c * d) / (a * d * f)],
    [0, 1 / d, -e / (d * f)],
    [0, 0, 1 / f],
  ];
}

interface Turned {
  readonly rotation: Matrix;
  readonly sign: { readonly axialOdd: number; readonly polarEven: 1 };
}

function turnedOperators(group: MagneticGroup, cell: Cell): readonly Turned[] {
  const axes = axesOf(cell);
  return group.operators.map(({ operator, timeReversal }) => {
    const r = operator.rotation.map((entry) => entry / operator.rotationDenominator);
    const rows = [0, 3, 6].map((start) => r.slice(start, start + 3));
    const handed = Math.round(
      at(r, 0) * (at(r, 4) * at(r, 8) - at(r, 5) * at(r, 7)) -
        at(r, 1) * (at(r, 3) * at(r, 8) - at(r, 5) * at(r, 6)) +
        at(r, 2) * (at(r, 3) * at(r, 7) - at(r, 4) * at(r, 6)),
    );
    return {
      rotation: product(product(axes, rows), inverseOf(axes)),
      sign: { axialOdd: handed * timeReversal, polarEven: 1 },
    };
  });
}

/** Values of a form with a random number for each symbol, and how many symbols there are. */
function valuesOf(form: readonly string[], random: Random): { values: readonly number[]; symbols: number } {
  const symbol = /[MPαΛ][xyz0-9]+/g;
  const names = [...new Set(form.flatMap((text) => text.match(symbol) ?? []))];
  const letters = Object.fromEntries(names.map((_, index) => [`s${index}`, [random.next() + 0.5, 0] as const]));
  // The evaluator knows names in small letters.
  const plain = form.map((text) => text.replace(symbol, (name) => `s${names.indexOf(name)}`));
  return { values: plain.map((text) => evaluateText(text, letters)[0]), symbols: names.length };
}

const indices = [0, 1, 2];
const voigtOf = [
  [0, 5, 4],
  [5, 1, 3],
  [4, 3, 2],
];

/** The largest change of any component when all operators are applied, over all four tensors. */
function largestChange(forms: Record<string, readonly number[]>, operators: readonly Turned[]): number {
  const piezo = (i: number, j: number, k: number): number => {
    const place = voigtOf[j]?.[k] as number;
    return at(forms.piezomagnetic ?? [], 6 * i + place) / (j === k ? 1 : 2);
  };
  let largest = 0;
  const note = (wanted: number, found: number): void => {
    largest = Math.max(largest, Math.abs(wanted - found));
  };
  for (const { rotation, sign } of operators) {
    const r = (i: number, j: number): number => rotation[i]?.[j] as number;
    const sum = (of: (index: number) => number): number => indices.reduce((total, index) => total + of(index), 0);
    for (const i of indices) {
      for (const [name, factor] of [
        ["netMoment", sign.axialOdd],
        ["polarization", sign.polarEven],
      ] as const)
        note(at(forms[name] ?? [], i), factor * sum((p) => r(i, p) * at(forms[name] ?? [], p)));
      for (const j of indices) {
        const alpha = (p: number, q: number): number => at(forms.magnetoelectric ?? [], 3 * p + q);
        note(alpha(i, j), sign.axialOdd * sum((p) => sum((q) => r(i, p) * r(j, q) * alpha(p, q))));
        for (const k of indices)
          note(
            piezo(i, j, k),
            sign.axialOdd * sum((p) => sum((q) => sum((s) => r(i, p) * r(j, q) * r(k, s) * piezo(p, q, s)))),
          );
      }
    }
  }
  return largest;
}

/** How many independent tensors there are, by characters (International Tables D, section 1.2.5). */
function dimensions(operators: readonly Turned[]): readonly number[] {
  const mean = (of: (trace: number, squared: number, one: Turned) => number): number =>
    operators.reduce((sum, one) => {
      const trace = (m: Matrix): number => indices.reduce((total, index) => total + (m[index]?.[index] as number), 0);
      return sum + of(trace(one.rotation), trace(product(one.rotation, one.rotation)), one);
    }, 0) / operators.length;
  return [
    mean((trace, _, { sign }) => sign.axialOdd * trace),
    mean((trace) => trace),
    mean((trace, _, { sign }) => sign.axialOdd * trace * trace),
    mean((trace, squared, { sign }) => (sign.axialOdd * trace * (trace * trace + squared)) / 2),
  ].map((value) => Math.round(value * 1e6) / 1e6);
}

describe("tensors that the 122 point groups allow", () => {
  it("are unchanged by every operator and as many as characters say, half in the BNS setting, half in a random one", () => {
    const random = seeded(611);
    const problems: string[] = [];
    expect(groups.size).toBe(122);
    for (const [pointGroup, own] of groups) {
      const group = random.below(2) === 0 ? own : changeMagneticBasis(own, randomBasis(random));
      const cell = randomCell(familyGroup(group), random, 300);
      const forms = tensorForms(group, cell);
      const operators = turnedOperators(group, cell);
      const valued = Object.entries(forms).map(([name, form]) => [name, valuesOf(form, random)] as const);
      const change = largestChange(Object.fromEntries(valued.map(([name, { values }]) => [name, values])), operators);
      if (!(change < 1e-7)) problems.push(`${pointGroup}: an operator changes a tensor by ${change}`);
      const counts = valued.map(([, { symbols }]) => symbols);
      if (counts.join() !== dimensions(operators).join())
        problems.push(`${pointGroup}: ${counts.join()} symbols, ${dimensions(operators).join()} by characters`);
    }
    expect(problems).toEqual([]);
  });

  // R. R. Birss, Symmetry and Magnetism (1964); International Tables D, chapter 1.5: 31 groups allow ferromagnetism, 58
  // the linear magnetoelectric effect, 66 piezomagnetism (memory, 97 %); 31 allow a spontaneous polarization.
  it("are allowed in 31, 31, 58 and 66 groups", () => {
    const cell = { a: 5, b: 6, c: 7, alpha: 90, beta: 90, gamma: 90 };
    const allowed = { netMoment: 0, polarization: 0, magnetoelectric: 0, piezomagnetic: 0 };
    for (const group of groups.values())
      for (const [name, form] of Object.entries(tensorForms(group, cell)))
        if (form.some((text: string) => text !== "0")) allowed[name as keyof typeof allowed] += 1;
    expect(allowed).toEqual({ netMoment: 31, polarization: 31, magnetoelectric: 58, piezomagnetic: 66 });
  });
});
