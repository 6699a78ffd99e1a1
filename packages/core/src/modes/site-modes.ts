import {
  type MinusKLink,
  type MinusKRelation,
  minusKRelation,
  type SmallIrrep,
  type SmallIrreps,
} from "../irreps/index.js";
import { isHalfLattice } from "../kvectors/index.js";
import {
  adjointCyclotomicMatrix,
  type Cyclotomic,
  type CyclotomicMatrix,
  cyclotomicNumbers,
  cyclotomicZero,
  integerDeterminant,
  isCyclotomicZero,
  matrixFrom,
  multiplyCyclotomicMatrices,
  type Phase,
  reducedEchelon,
  reduceOrder,
  reducePhase,
  subtractForms,
  zeroForm,
} from "../numbers/index.js";
import type { SiteOrbit, SpaceGroup, SymmetryOperator } from "../spacegroups/index.js";
import { constraintTable } from "./constraint-table.js";
import { type MomentOperator, momentMatrix, siteIntertwiners } from "./intertwiners.js";
import { minusKOnModes, type ReversingAction } from "./minus-k-modes.js";
import { modesOf } from "./modes-of.js";
import { type OperatorAction, siteAction, suborbits } from "./site-action.js";
import type { IrrepModes, MinusKOnModes, Mode, ModeMoment, SiteModes } from "./types.js";

/**
 * The magnetic modes of one site: the split of its orbit under the little group, and for each irrep the copies and
 * partners of its basis vectors, `Γ(g) e_{c,p} = Σ_q D(g)_{qp} e_{c,q}` with the matrices of `irreps`.
 *
 * The first partners of all copies together are in reduced echelon form (leading entry 1), so the same space always
 * prints the same vectors; further partners follow from the irrep's matrices. With `axial: false` the same for polar
 * vectors (displacements).
 */
export function siteModes(
  group: SpaceGroup,
  irreps: SmallIrreps,
  orbit: SiteOrbit,
  options: { readonly axial?: boolean } = {},
): SiteModes {
  const axial = options.axial ?? true;
  const { operators } = irreps.littleGroup;
  const actions = siteAction(group, irreps.k, orbit, operators);
  const parts = suborbits(actions, orbit.positions.length);
  const matrices = operators.map((operator) => matrixOf(group, operator, axial));
  const momentOperators = (atom: number): (MomentOperator & { readonly image: number })[] =>
    actions.map((action, element) => ({
      matrix: matrices[element] as CyclotomicMatrix,
      phase: action.phase[atom] as Phase,
      image: action.image[atom] as number,
      element,
    }));
  const real = isHalfLattice(group, irreps.k);
  const plain = irreps.irreps.map((irrep) => {
    const copies = parts.flatMap((atoms, suborbit) =>
      copiesOnSuborbit(
        irrep,
        irreps.phases,
        momentOperators(atoms[0] as number),
        atoms[0] as number,
        orbit.positions.length,
      ).map((copy) => ({ ...copy, suborbit })),
    );
    copies.sort((a, b) => a.pivot - b.pivot);
    return { irrep, modes: copies.flatMap((copy, number) => modesOfCopy(copy, number + 1)) };
  });
  const relation = irreps.minusK === "in star" ? minusKRelation(group, irreps) : null;
  const reversing = relation && reversingAction(group, irreps, orbit, relation, axial);
  const onModes = (irrep: SmallIrrep, modes: readonly Mode[], number: number): MinusKOnModes | null => {
    if (!relation || modes.length === 0) return null;
    const link = relation.links[number] as MinusKLink;
    const partnerModes = modesOf(plain, link.partner);
    return minusKOnModes(irreps.k, irrep, link, relation, reversing as ReversingAction, parts, modes, partnerModes);
  };
  return {
    orbit,
    suborbits: parts,
    axial,
    representations: irreps,
    irreps: plain.map(({ irrep, modes }, number) => ({
      ...describe(irrep, modes, real, modesOf(plain, irrep.conjugateOf), irreps),
      minusK: onModes(irrep, modes, number),
    })),
  };
}

function reversingAction(
  group: SpaceGroup,
  irreps: SmallIrreps,
  orbit: SiteOrbit,
  relation: MinusKRelation,
  axial: boolean,
): ReversingAction {
  const [action] = siteAction(group, irreps.k, orbit, [relation.operator]);
  return { ...(action as OperatorAction), matrix: matrixOf(group, relation.operator, axial) };
}

function matrixOf(group: SpaceGroup, operator: number, axial: boolean): CyclotomicMatrix {
  const { rotation, rotationDenominator } = group.operators[operator] as SymmetryOperator;
  const determinant = integerDeterminant(group.primitive.rotations[operator] as readonly number[]);
  return momentMatrix(matrixFrom(rotation, rotationDenominator), axial ? determinant : 1);
}

/** One copy of an irrep on a suborbit: a 3 × d block per atom and its phase; `pivot` orders the copies. */
interface Copy {
  readonly blocks: readonly { readonly phase: Phase; readonly block: CyclotomicMatrix | null }[];
  readonly dimension: number;
  readonly pivot: number;
}

/**
 * `E_j = Γ(g)_{j1} A D(g)⁻¹` carries the block A of the first atom to atom j by the first operator g that reaches it.
 * Its phase is common to all copies, so the echelon form is made on the cyclotomic parts alone.
 */
function copiesOnSuborbit(
  irrep: SmallIrrep,
  phases: readonly Phase[],
  operators: readonly (MomentOperator & { readonly image: number })[],
  first: number,
  atoms: number,
): Copy[] {
  const stabilizer = operators.filter((operator) => operator.image === first);
  const basis = siteIntertwiners(irrep, phases, stabilizer);
  if (basis.length === 0) return [];
  const carriers = Array.from(
    { length: atoms },
    (_, atom) => operators.find((operator) => operator.image === atom) ?? null,
  );
  const rows = basis.map((start) =>
    carriers.map((carrier) => (carrier === null ? null : carried(irrep, carrier, start))),
  );
  const { dimension } = irrep;
  const flat = rows.map((blocks) =>
    Array.from({ length: dimension }, (_, partner) =>
      blocks.flatMap((block) =>
        [0, 1, 2].map((axis) => (block === null ? cyclotomicZero : entryOf(block, axis, partner))),
      ),
    ).flat(),
  );
  const { rows: reduced, pivots } = reducedEchelon(flat, cyclotomicNumbers);
  const width = 3 * atoms;
  return reduced.map((row, index) => {
    const pivot = pivots[index] as number;
    const reference = carriers[Math.floor(pivot / 3)] as MomentOperator;
    const zeroOf = subtractForms(reference.phase, phases[reference.element] as Phase);
    return {
      dimension,
      pivot,
      blocks: carriers.map((carrier, atom) =>
        carrier === null
          ? { phase: zeroForm, block: null }
          : {
              phase: reducePhase(subtractForms(subtractForms(carrier.phase, phases[carrier.element] as Phase), zeroOf)),
              block: [0, 1, 2].map((axis) =>
                Array.from({ length: dimension }, (_, partner) =>
                  reduceOrder(row[partner * width + 3 * atom + axis] as Cyclotomic),
                ),
              ),
            },
      ),
    };
  });
}

function carried(irrep: SmallIrrep, { matrix, element }: MomentOperator, start: CyclotomicMatrix): CyclotomicMatrix {
  return multiplyCyclotomicMatrices(
    multiplyCyclotomicMatrices(matrix, start),
    adjointCyclotomicMatrix(irrep.matrices[element] as CyclotomicMatrix),
  );
}

function entryOf(block: CyclotomicMatrix, axis: number, partner: number): Cyclotomic {
  return (block[axis] as readonly Cyclotomic[])[partner] as Cyclotomic;
}

const zeroMoment: ModeMoment = { phase: zeroForm, vector: [cyclotomicZero, cyclotomicZero, cyclotomicZero] };

function modesOfCopy(copy: Copy & { readonly suborbit: number }, number: number): Mode[] {
  return Array.from({ length: copy.dimension }, (_, partner) => ({
    copy: number,
    partner: partner + 1,
    suborbit: copy.suborbit,
    moments: copy.blocks.map(({ phase, block }): ModeMoment => {
      if (block === null) return zeroMoment;
      const vector = [0, 1, 2].map((axis) => entryOf(block, axis, partner)) as [Cyclotomic, Cyclotomic, Cyclotomic];
      return vector.every(isCyclotomicZero) ? zeroMoment : { phase, vector };
    }),
  }));
}

function describe(
  irrep: SmallIrrep,
  modes: readonly Mode[],
  real: boolean,
  conjugate: readonly Mode[],
  irreps: SmallIrreps,
): Omit<IrrepModes, "minusK"> {
  const multiplicity = modes.length / irrep.dimension;
  const freeParameters = modes.length * (real && irrep.reality !== "complex" ? 1 : 2);
  return {
    irrep,
    multiplicity,
    modes,
    constraint: modes.length === 0 ? [] : constraintTable(irreps.k, modes, real ? { conjugate } : null),
    freeParameters,
    freeParametersWithMinusK: irreps.minusK === "in star" ? lockedParameters(irrep, multiplicity) : freeParameters,
    vanishingAtoms: (modes[0]?.moments ?? []).flatMap((_, atom) =>
      modes.every((mode) => (mode.moments[atom] as ModeMoment).vector.every(isCyclotomicZero)) ? [atom] : [],
    ),
  };
}

/**
 * Real parameters of one order parameter ξ (d complex components at k) that drives m copies. The copies' weights form a
 * space over the commuting field of the physically irreducible representation (reals, complex numbers, quaternions for
 * the three types; two copies make one physical copy of a pseudoreal irrep), and one scale in that field is common to
 * ξ and the weights.
 */
function lockedParameters({ dimension, reality }: SmallIrrep, multiplicity: number): number {
  if (multiplicity === 0) return 0;
  if (reality === "real") return 2 * dimension + multiplicity - 1;
  if (reality === "complex") return 2 * dimension + 2 * multiplicity - 2;
  return 4 * dimension + 2 * multiplicity - 4;
}
