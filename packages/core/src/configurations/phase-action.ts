import {
  constantRoot,
  littleGroupElement,
  type MinusKRelation,
  minusKRelation,
  type SmallIrrep,
  type SmallIrreps,
  smallIrrepMatrix,
  translationColumn,
  waveTimesColumn,
} from "../irreps/index.js";
import type { WaveVector } from "../kvectors/index.js";
import {
  addForms,
  type Cyclotomic,
  type CyclotomicMatrix,
  cyclotomicZero,
  multiplyCyclotomic,
  multiplyCyclotomicMatrices,
  type Phase,
  reduceOrder,
  subtractForms,
} from "../numbers/index.js";
import { composeOperators, invertOperator, type SpaceGroup, type SymmetryOperator } from "../spacegroups/index.js";
import { transposedMatrix } from "./order-parameter.js";

/** An operator that takes k to ±k, modulo translations and phases, as it acts on the Fourier components at k. */
export interface PhaseElement {
  /** Index of the operator in the group. */
  readonly operator: number;
  /** −1 where it takes k to −k and acts with complex conjugation, ξ → U ξ*. */
  readonly epsilon: 1 | -1;
  readonly matrix: CyclotomicMatrix;
}

/**
 * The Fourier components at k of one physically irreducible representation: those of the irrep and, unless it is real or
 * −k is not in the star, of its partner. An operator acts as `e^{2πi k·t}` times a constant matrix, since phases that
 * run with k are phase shifts of the whole wave; those of the operators with ε = −1 are fixed up to one common phase.
 */
export interface PhaseAction {
  readonly labels: readonly string[];
  readonly irrep: SmallIrrep;
  /** Complex dimension. */
  readonly size: number;
  readonly elements: readonly PhaseElement[];
}

/** One per physically irreducible representation. Letters of k may be open. */
export function phaseActions(
  group: SpaceGroup,
  irreps: SmallIrreps,
  reversing: readonly number[],
  wanted: (label: string) => boolean,
): PhaseAction[] {
  const relation = irreps.minusK === "in star" ? minusKRelation(group, irreps) : null;
  const labels = irreps.irreps.map(({ label }) => label);
  return irreps.irreps.flatMap((irrep, index): PhaseAction[] => {
    const partner =
      irrep.reality === "complex" && irrep.conjugateOf !== null && relation !== null
        ? labels.indexOf(irrep.conjugateOf)
        : index;
    if (partner < index) return [];
    const own = [...new Set([irrep.label, labels[partner] as string])];
    if (!own.some(wanted)) return [];
    const other = irreps.irreps[partner] as SmallIrrep;
    return [
      {
        labels: own,
        irrep,
        size: irrep.dimension * (relation !== null && irrep.reality !== "real" ? 2 : 1),
        elements: [
          ...unitaryElements(group, irreps, irrep, relation !== null && irrep.reality !== "real" ? other : null),
          ...(relation === null ? [] : reversingElements(group, irreps, irrep, other, relation, reversing)),
        ],
      },
    ];
  });
}

function unitaryElements(
  group: SpaceGroup,
  irreps: SmallIrreps,
  irrep: SmallIrrep,
  partner: SmallIrrep | null,
): PhaseElement[] {
  return irreps.littleGroup.operators.map((operator, element) => {
    const own = group.operators[operator] as SymmetryOperator;
    const root = constantRoot(subtractForms(irreps.phases[element] as Phase, alongTranslation(irreps.k, own)));
    const block = scaled(root, irrep.matrices[element] as CyclotomicMatrix);
    return {
      operator,
      epsilon: 1 as const,
      matrix:
        partner === null
          ? block
          : blockMatrix(block, null, null, scaled(root, partner.matrices[element] as CyclotomicMatrix)),
    };
  });
}

/**
 * `g = h g₀` acts as `e^{2πi(k·t_h − k·t_g + k·t₀)} D(h) N` behind a conjugation, N of the relation between k and −k; from
 * the partner back to the irrep with `N' = D(g₀²) Nᵀ`, so that g₀ twice is g₀².
 */
function reversingElements(
  group: SpaceGroup,
  irreps: SmallIrreps,
  irrep: SmallIrrep,
  partner: SmallIrrep,
  relation: MinusKRelation,
  reversing: readonly number[],
): PhaseElement[] {
  const start = group.operators[relation.operator] as SymmetryOperator;
  const back = invertOperator(start);
  const link = relation.links.find(({ label }) => label === irrep.label)?.matrix as CyclotomicMatrix;
  const square = smallIrrepMatrix(group, irreps, irrep, composeOperators(start, start));
  const returning = multiplyCyclotomicMatrices(
    scaled(constantRoot(square.phase), square.matrix),
    transposedMatrix(link),
  );
  return reversing.map((operator) => {
    const own = group.operators[operator] as SymmetryOperator;
    const { element, phase } = littleGroupElement(group, irreps, composeOperators(own, back));
    const turns = addForms(subtractForms(phase, alongTranslation(irreps.k, own)), alongTranslation(irreps.k, start));
    const root = constantRoot(turns);
    const times = (small: SmallIrrep, right: CyclotomicMatrix): CyclotomicMatrix =>
      multiplyCyclotomicMatrices(scaled(root, small.matrices[element] as CyclotomicMatrix), right).map((row) =>
        row.map(reduceOrder),
      );
    return {
      operator,
      epsilon: -1 as const,
      matrix:
        irrep.reality === "real"
          ? times(irrep, link)
          : blockMatrix(null, times(irrep, returning), times(partner, link), null),
    };
  });
}

function alongTranslation(k: WaveVector, operator: SymmetryOperator): Phase {
  return waveTimesColumn(k, translationColumn(operator));
}

function scaled(factor: Cyclotomic, matrix: CyclotomicMatrix): CyclotomicMatrix {
  return matrix.map((row) => row.map((entry) => reduceOrder(multiplyCyclotomic(factor, entry))));
}

function blockMatrix(
  upperLeft: CyclotomicMatrix | null,
  upperRight: CyclotomicMatrix | null,
  lowerLeft: CyclotomicMatrix | null,
  lowerRight: CyclotomicMatrix | null,
): CyclotomicMatrix {
  const size = (upperLeft ?? upperRight)?.length ?? 0;
  const at = (matrix: CyclotomicMatrix | null, row: number, column: number): Cyclotomic =>
    matrix?.[row]?.[column] ?? cyclotomicZero;
  return Array.from({ length: 2 * size }, (_, row) =>
    Array.from({ length: 2 * size }, (_, column) =>
      row < size
        ? column < size
          ? at(upperLeft, row, column)
          : at(upperRight, row, column - size)
        : column < size
          ? at(lowerLeft, row - size, column)
          : at(lowerRight, row - size, column - size),
    ),
  );
}

/** The action on the direct sum of several order parameters, with one common phase. */
export function sumOfPhaseActions(actions: readonly PhaseAction[]): {
  readonly size: number;
  readonly elements: readonly PhaseElement[];
} {
  const size = actions.reduce((sum, action) => sum + action.size, 0);
  const [first] = actions;
  const elements = (first?.elements ?? []).map((element, index): PhaseElement => {
    const matrix: Cyclotomic[][] = Array.from({ length: size }, () => new Array<Cyclotomic>(size).fill(cyclotomicZero));
    let start = 0;
    for (const action of actions) {
      action.elements[index]?.matrix.forEach((row, r) => {
        row.forEach((entry, c) => {
          (matrix[start + r] as Cyclotomic[])[start + c] = entry;
        });
      });
      start += action.size;
    }
    return { ...element, matrix };
  });
  return { size, elements };
}
