import { minusKRelation, type SmallIrreps } from "@kvane/core/irreps";
import type { SiteModes } from "@kvane/core/modes";
import type { SpaceGroup } from "@kvane/core/spacegroups";
import { adjoint, type ComplexMatrix, conjugate, distance, product, scaled, turned, unitMatrix } from "./complex.js";
import { compose, type FloatOperator, inner, inverse, letterValues, operatorsTaking, reduce } from "./float-group.js";
import { type FloatIrreps, floatIrreps, floatMatrix, phasedValue } from "./float-irreps.js";
import {
  actOn,
  combined,
  type Field,
  type FloatModes,
  floatModes,
  landings,
  largestDifference,
  vectorMatrix,
} from "./validate-modes.js";

const tolerance = 1e-9;

/** N of one irrep and the number of the irrep that it leads to. */
export interface FloatLink {
  readonly partner: number;
  readonly matrix: ComplexMatrix;
}

/**
 * The antiunitary relation of every irrep: `D(g₀⁻¹ g g₀)* = N⁻¹ D'(g) N` with unitary N, and `N N* = ±D(g₀²)` where D'
 * is D (+ real, − pseudoreal). Empty is a pass.
 */
export function relationProblems(group: SpaceGroup, irreps: SmallIrreps): string[] {
  const read = floatIrreps(group, irreps);
  const relation = minusKRelation(group, irreps);
  const reversing = operatorsTaking(read.group, read.k, -1);
  if (relation === null) return reversing.length === 0 ? [] : ["no relation to −k is given, though −k is in the star"];
  if (!reversing.includes(relation.operator)) return [`operator ${relation.operator} does not take k to −k`];
  return floatLinks(read, relation.links).flatMap((link, irrep) =>
    linkProblems(read, irreps, relation.operator, link, irrep),
  );
}

export function floatLinks(
  read: FloatIrreps,
  links: readonly { readonly partner: string; readonly matrix: Parameters<typeof floatMatrix>[0] }[],
): FloatLink[] {
  return links.map(({ partner, matrix }) => ({
    partner: read.labels.indexOf(partner),
    matrix: floatMatrix(matrix, null),
  }));
}

function linkProblems(
  read: FloatIrreps,
  irreps: SmallIrreps,
  operator: number,
  link: FloatLink,
  irrep: number,
): string[] {
  const { matrix, partner } = link;
  const own = irreps.irreps[irrep];
  const label = own?.label;
  if (own === undefined || (own.conjugateOf ?? label) !== read.labels[partner])
    return [`${label}: the relation to −k leads to ${read.labels[partner]}`];
  if (distance(product(matrix, adjoint(matrix)), unitMatrix(matrix.rows)) > tolerance)
    return [`${label}: N is not unitary`];
  const reverse = read.group.operators[operator] as FloatOperator;
  const back = inverse(reverse);
  const problems: string[] = [];
  read.operators.forEach((index, at) => {
    const moved = compose(compose(back, read.group.operators[index] as FloatOperator), reverse);
    const left = product(matrix, conjugate(matrixOf(read, irrep, moved)));
    const right = product(read.matrices[partner]?.[at] as ComplexMatrix, matrix);
    if (distance(left, right) > tolerance) problems.push(`${label}: N D(g₀⁻¹ g g₀)* ≠ D'(g) N for operator ${index}`);
  });
  if (partner === irrep) {
    const square = scaled(matrixOf(read, irrep, compose(reverse, reverse)), own.reality === "pseudoreal" ? -1 : 1);
    if (distance(product(matrix, conjugate(matrix)), square) > tolerance)
      problems.push(`${label}: N N* is not ${own.reality === "pseudoreal" ? "−" : ""}D(g₀²)`);
  }
  return problems;
}

/** D of any operator of the little group. */
function matrixOf(read: FloatIrreps, irrep: number, operator: FloatOperator): ComplexMatrix {
  const { index, shift } = reduce(read.group, operator);
  return turned(read.matrices[irrep]?.[read.operators.indexOf(index)] as ComplexMatrix, inner(read.k, shift));
}

/** The relation as it acts on the modes of one irrep. */
export interface FloatReversal {
  readonly operator: FloatOperator;
  /** By irrep; null where the irrep does not occur on the site. */
  readonly actions: readonly ((FloatLink & { readonly copies: ComplexMatrix }) | null)[];
}

/** Null where k ≡ −k or −k is in no arm of the star. */
export function floatReversal(group: SpaceGroup, modes: SiteModes): FloatReversal | null {
  const read = floatIrreps(group, modes.representations);
  const relation = minusKRelation(group, modes.representations);
  if (relation === null || modes.representations.minusK !== "in star") return null;
  const links = floatLinks(read, relation.links);
  return {
    operator: read.group.operators[relation.operator] as FloatOperator,
    actions: modes.irreps.map((entry, irrep) => {
      if (entry.minusK === null || entry.multiplicity === 0) return null;
      const values = entry.minusK.matrix.map((row) =>
        row.map(({ phase, factor }) => phasedValue(phase, factor, letterValues)),
      );
      return { ...(links[irrep] as FloatLink), copies: matrixFrom(values) };
    }),
  };
}

function matrixFrom(values: readonly (readonly (readonly [number, number])[])[]): ComplexMatrix {
  const flat = values.flat();
  return {
    rows: values.length,
    columns: values[0]?.length ?? 0,
    real: Float64Array.from(flat, ([re]) => re),
    imaginary: Float64Array.from(flat, ([, im]) => im),
  };
}

/**
 * `Θ E_c = Σ_c' E'_c' N B_{c'c}` with `(ΘS)_{j'} = e^{+2πi k·a} det(R₀) R₀ S_j*` and `g₀ r_j = r_j' + a`, on every mode.
 */
export function reversalProblems(group: SpaceGroup, modes: SiteModes): string[] {
  const read = floatModes(group, modes);
  const expected = modes.representations.minusK === "in star";
  const wrong = modes.irreps.filter((entry) => entry.multiplicity > 0 && (entry.minusK !== null) !== expected);
  if (wrong.length > 0)
    return wrong.map((entry) => `${entry.irrep.label}: the relation to −k is given where there is none, or missing`);
  const reversal = floatReversal(group, modes);
  if (reversal === null) return [];
  return reversal.actions.flatMap((action, irrep) => {
    if (action === null) return [];
    const label = modes.irreps[irrep]?.irrep.label;
    if (modes.irreps[irrep]?.minusK?.partner !== read.irreps.labels[action.partner])
      return [`${label}: another partner`];
    return (read.modes[irrep] ?? []).flatMap((mode) => {
      const error = largestDifference(reversedField(read, reversal.operator, mode), reversedMode(read, action, mode));
      return error < tolerance * 10 ? [] : [`${label}: ΘE ≠ Σ E' N B for a mode of copy ${mode.copy}`];
    });
  });
}

/** ΘS. */
export function reversedField(read: FloatModes, operator: FloatOperator, field: Field): Field {
  const conjugated = { real: field.real, imaginary: field.imaginary.map((value) => -value) };
  const where = landings(read.irreps.group, operator, read.positions);
  return actOn(conjugated, where, vectorMatrix(operator, read.axial), read.irreps.k);
}

/** Column (copy, partner) of Σ_c' E'_c' N B_{c'c}. */
function reversedMode(
  read: FloatModes,
  action: FloatLink & { readonly copies: ComplexMatrix },
  mode: { readonly copy: number; readonly partner: number },
): Field {
  const size = action.matrix.rows;
  const list = read.modes[action.partner] ?? [];
  const factors = list.map((_, index): [number, number] => {
    const b = Math.floor(index / size) * action.copies.columns + mode.copy - 1;
    const n = (index % size) * size + mode.partner - 1;
    const [x, y] = [action.copies.real[b] as number, action.copies.imaginary[b] as number];
    const [u, v] = [action.matrix.real[n] as number, action.matrix.imaginary[n] as number];
    return [x * u - y * v, x * v + y * u];
  });
  return combined(list, factors);
}
