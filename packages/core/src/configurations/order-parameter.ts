import {
  littleGroupElement,
  type MinusKRelation,
  minusKRelation,
  type SmallIrrep,
  type SmallIrreps,
  smallIrrepMatrix,
} from "../irreps/index.js";
import {
  type Cyclotomic,
  type CyclotomicMatrix,
  conjugateCyclotomic,
  cyclotomicNumbers,
  cyclotomicOne,
  cyclotomicZero,
  identityCyclotomicMatrix,
  isCyclotomicZero,
  multiplyCyclotomic,
  multiplyCyclotomicMatrices,
  type Phase,
  reducedEchelon,
  reduceOrder,
  rootOfUnity,
} from "../numbers/index.js";
import { composeOperators, invertOperator, type SpaceGroup, type SymmetryOperator } from "../spacegroups/index.js";
import type { ArmSelection } from "./arm-selection.js";
import { constantTurns } from "./modular-field.js";
import { structureVectors } from "./real-structure.js";

/**
 * The order-parameter space V of one physically irreducible representation on the chosen arms. Its complex coordinates
 * are (arm, partner) of the induced representation Ind D; a real irrep has real vectors `x = U x*` among them, spanned
 * by the columns of `basis`; for the other types (D together with its conjugate) V is the whole complex space seen as a
 * real one, coordinates Re x, Im x.
 */
export interface OrderParameter {
  /** The irrep, and the conjugate one that comes with it, if that is another. */
  readonly labels: readonly string[];
  readonly irrep: SmallIrrep;
  readonly real: boolean;
  /** Dimension of Ind D on the chosen arms. */
  readonly complexSize: number;
  /** Dimension of V over the reals. */
  readonly size: number;
  /** Real coordinates of each ±k pair. */
  readonly perPair: number;
  /** Matrices of Ind D for every operator of the selection, without further translations. */
  readonly matrices: readonly CyclotomicMatrix[];
  /** Columns: complex coordinates of the real basis vectors, real type only. */
  readonly basis: CyclotomicMatrix | null;
  readonly inverseBasis: CyclotomicMatrix | null;
}

/** One order parameter per physically irreducible representation, in the order of the irreps. */
export function orderParameters(
  group: SpaceGroup,
  irreps: SmallIrreps,
  selection: ArmSelection,
  wanted: (label: string) => boolean = () => true,
): OrderParameter[] {
  const relation = irreps.minusK === "not in star" ? null : minusKRelation(group, irreps);
  const labels = irreps.irreps.map(({ label }) => label);
  const blocks = armBlocks(group, irreps, selection);
  return irreps.irreps.flatMap((irrep, index): OrderParameter[] => {
    const partner = irrep.conjugateOf === null ? index : labels.indexOf(irrep.conjugateOf);
    if (partner >= 0 && partner < index) return [];
    if (!wanted(irrep.label) && !(irrep.conjugateOf !== null && wanted(irrep.conjugateOf))) return [];
    return [orderParameter(group, irreps, irrep, selection, relation, blocks)];
  });
}

function orderParameter(
  group: SpaceGroup,
  irreps: SmallIrreps,
  irrep: SmallIrrep,
  selection: ArmSelection,
  relation: MinusKRelation | null,
  blocks: readonly (readonly ArmBlock[])[],
): OrderParameter {
  const matrices = blocks.map((own) => inducedMatrix(irrep, own, selection.members.length));
  const complexSize = selection.members.length * irrep.dimension;
  const real = irrep.reality === "real";
  const basis = real ? realBasis(group, irreps, irrep, selection, relation as MinusKRelation, complexSize) : null;
  const size = real ? complexSize : 2 * complexSize;
  return {
    labels:
      irrep.conjugateOf !== null && irrep.conjugateOf !== irrep.label
        ? [irrep.label, irrep.conjugateOf]
        : [irrep.label],
    irrep,
    real,
    complexSize,
    size,
    perPair: size / selection.pairs.length,
    matrices,
    basis,
    inverseBasis: basis === null ? null : inverted(basis),
  };
}

/** One non-zero block of an induced matrix: arms (places), the element of the little group and its phase. */
interface ArmBlock {
  readonly row: number;
  readonly column: number;
  readonly element: number;
  readonly root: Cyclotomic;
}

/** Where `s_row⁻¹ g s_column` is in the little group, for every operator g of the selection: the same for all irreps. */
function armBlocks(group: SpaceGroup, irreps: SmallIrreps, selection: ArmSelection): ArmBlock[][] {
  const carriers = selection.members.map(
    (member) => group.operators[selection.star.representatives[member] as number] as SymmetryOperator,
  );
  const backs = carriers.map(invertOperator);
  return selection.operators.map((operator, place) =>
    carriers.map((carrier, column): ArmBlock => {
      const moved = composeOperators(group.operators[operator] as SymmetryOperator, carrier);
      const row = selection.images[place]?.[column] as number;
      const inner = composeOperators(backs[row] as SymmetryOperator, moved);
      const { element, phase } = littleGroupElement(group, irreps, inner);
      return { row, column, element, root: plain(phase, cyclotomicOne) };
    }),
  );
}

/** Induction over the arms (Bradley & Cracknell, 1972, chapter 4). */
function inducedMatrix(irrep: SmallIrrep, blocks: readonly ArmBlock[], arms: number): CyclotomicMatrix {
  const { dimension } = irrep;
  const size = arms * dimension;
  const matrix = Array.from({ length: size }, () => new Array<Cyclotomic>(size).fill(cyclotomicZero));
  for (const { row, column, element, root } of blocks)
    irrep.matrices[element]?.forEach((entries, p) => {
      entries.forEach((factor, q) => {
        if (!isCyclotomicZero(factor))
          (matrix[row * dimension + p] as Cyclotomic[])[column * dimension + q] = reduceOrder(
            multiplyCyclotomic(root, factor),
          );
      });
    });
  return matrix;
}

/** `e^{2πi·phase}·factor` as one exact number. */
export function plain(phase: Phase, factor: Cyclotomic): Cyclotomic {
  if (isCyclotomicZero(factor)) return cyclotomicZero;
  const [numerator, denominator] = constantTurns(phase);
  return reduceOrder(multiplyCyclotomic(rootOfUnity([numerator, denominator]), factor));
}

/**
 * Real vectors, pair by pair. Complex conjugation of a moment field acts as `K e^(i)_p = Σ U_{(j,r)(i,p)} e^(j)_r`, arm j
 * the negative of arm i, with `U_{ji} = D(s_j⁻¹ s_i g₀) Nᵀ` from the relation between k and −k: `(g₀ e)* = e N`.
 */
function realBasis(
  group: SpaceGroup,
  irreps: SmallIrreps,
  irrep: SmallIrrep,
  selection: ArmSelection,
  relation: MinusKRelation,
  complexSize: number,
): CyclotomicMatrix {
  const { dimension } = irrep;
  const at = (index: number): SymmetryOperator => group.operators[index] as SymmetryOperator;
  const matrixOf = (operator: SymmetryOperator): CyclotomicMatrix => {
    const { phase, matrix } = smallIrrepMatrix(group, irreps, irrep, operator);
    return matrix.map((row) => row.map((entry) => plain(phase, entry)));
  };
  const link = relation.links.find(({ label }) => label === irrep.label)?.matrix as CyclotomicMatrix;
  const reversing = at(relation.operator);
  const carrier = (member: number): SymmetryOperator =>
    at(selection.star.representatives[selection.members[member] as number] as number);
  const conjugation = (from: number, to: number): CyclotomicMatrix =>
    multiplyCyclotomicMatrices(
      matrixOf(composeOperators(invertOperator(carrier(to)), composeOperators(carrier(from), reversing))),
      transposedMatrix(link),
    );
  const columns: Cyclotomic[][] = [];
  for (const [first, second] of selection.pairs as readonly (readonly [number, number?])[]) {
    const block = (place: number, vector: readonly Cyclotomic[]): Cyclotomic[] =>
      Array.from({ length: complexSize }, (_, index) =>
        Math.floor(index / dimension) === place ? (vector[index % dimension] as Cyclotomic) : cyclotomicZero,
      );
    if (second === undefined) {
      for (const vector of structureVectors(conjugation(first, first))) columns.push(block(first, vector));
      continue;
    }
    const across = conjugation(first, second);
    for (const vector of plainVectors(selection, at, matrixOf, conjugation, carrier, first, second, dimension))
      for (const factor of [cyclotomicOne, rootOfUnity([1, 4])]) {
        const own = vector.map((entry) => multiplyCyclotomic(factor, entry));
        const other = timesVector(across, own.map(conjugateCyclotomic));
        columns.push(block(first, own).map((entry, index) => addEither(entry, block(second, other)[index])));
      }
  }
  return transposedMatrix(columns);
}

/**
 * A basis of the components on one arm such that an operator that takes k to −k leaves the real multiples fixed, where
 * one has a square of 1 there: directions then come out as (a, 0) and not with odd phases.
 */
function plainVectors(
  selection: ArmSelection,
  at: (index: number) => SymmetryOperator,
  matrixOf: (operator: SymmetryOperator) => CyclotomicMatrix,
  conjugation: (from: number, to: number) => CyclotomicMatrix,
  carrier: (member: number) => SymmetryOperator,
  first: number,
  second: number,
  dimension: number,
): readonly (readonly Cyclotomic[])[] {
  const back = conjugation(second, first);
  for (const operator of selection.star.reversing) {
    // Seen from the first arm of this pair: s_i r s_i⁻¹ takes it to its negative.
    const moved = composeOperators(carrier(first), composeOperators(at(operator), invertOperator(carrier(first))));
    const there = composeOperators(invertOperator(carrier(second)), composeOperators(moved, carrier(first)));
    const antilinear = multiplyCyclotomicMatrices(
      back,
      matrixOf(there).map((row) => row.map(conjugateCyclotomic)),
    );
    const square = multiplyCyclotomicMatrices(
      antilinear,
      antilinear.map((row) => row.map(conjugateCyclotomic)),
    );
    if (isIdentity(square)) return structureVectors(antilinear);
  }
  return identityCyclotomicMatrix(dimension);
}

function isIdentity(matrix: CyclotomicMatrix): boolean {
  return matrix.every((row, index) =>
    row.every((entry, column) => {
      const reduced = reduceOrder(entry);
      return index === column
        ? reduced.order === 1 && reduced.denominator === 1 && reduced.coefficients[0] === 1
        : isCyclotomicZero(reduced);
    }),
  );
}

function addEither(a: Cyclotomic, b: Cyclotomic | undefined): Cyclotomic {
  return b === undefined || isCyclotomicZero(b) ? a : b;
}

export function timesVector(matrix: CyclotomicMatrix, vector: readonly Cyclotomic[]): Cyclotomic[] {
  return multiplyCyclotomicMatrices(
    matrix,
    vector.map((entry) => [entry]),
  ).map((row) => reduceOrder(row[0] as Cyclotomic));
}

export function transposedMatrix(matrix: CyclotomicMatrix): CyclotomicMatrix {
  return (matrix[0] ?? []).map((_, column) => matrix.map((row) => row[column] as Cyclotomic));
}

function inverted(matrix: CyclotomicMatrix): CyclotomicMatrix {
  const size = matrix.length;
  const unit = identityCyclotomicMatrix(size);
  const { rows } = reducedEchelon(
    matrix.map((row, index) => [...row, ...(unit[index] as readonly Cyclotomic[])]),
    cyclotomicNumbers,
  );
  return rows.map((row) => row.slice(size).map(reduceOrder));
}
