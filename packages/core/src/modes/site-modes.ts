import type { SmallIrrep, SmallIrreps } from "../irreps/index.js";
import { isHalfLattice } from "../kvectors/index.js";
import {
  adjointCyclotomicMatrix,
  type Cyclotomic,
  type CyclotomicMatrix,
  cyclotomicNumbers,
  cyclotomicZero,
  isCyclotomicZero,
  integerDeterminant,
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
import { siteAction, suborbits } from "./site-action.js";
import type { IrrepModes, Mode, ModeMoment, SiteModes } from "./types.js";

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
      copiesOnSuborbit(irrep, irreps.phases, momentOperators(atoms[0] as number), atoms[0] as number, orbit.positions.length).map(
        (copy) => ({ ...copy, suborbit }),
      ),
    );
    copies.sort((a, b) => a.pivot - b.pivot);
    return { irrep, modes: copies.flatMap((copy, number) => modesOfCopy(copy, number + 1)) };
  });
  return {
    orbit,
    suborbits: parts,
    axial,
    representations: irreps,
    irreps: plain.map(({ irrep, modes }) => {
      const partner = plain.find((other) => other.irrep.label === irrep.conjugateOf);
      return describe(irrep, modes, real, real && partner ? partner.modes : [], irreps);
    }),
  };
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
  const carriers = Array.from({ length: atoms }, (_, atom) => operators.find((operator) => operator.image === atom) ?? null);
  const rows = basis.map((start) => carriers.map((carrier) => (carrier === null ? null : carried(irrep, carrier, start))));
  const { dimension } = irrep;
  const flat = rows.map((blocks) =>
    Array.from({ length: dimension }, (_, partner) =>
      blocks.flatMap((block) => [0, 1, 2].map((axis) => (block === null ? cyclotomicZero : (block[axis]?.[partner] as Cyclotomic)))),
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
                Array.from({ length: dimension }, (_, partner) => reduceOrder(row[partner * width + 3 * atom + axis] as Cyclotomic)),
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

const zeroMoment: ModeMoment = { phase: zeroForm, vector: [cyclotomicZero, cyclotomicZero, cyclotomicZero] };

function modesOfCopy(copy: Copy & { readonly suborbit: number }, number: number): Mode[] {
  return Array.from({ length: copy.dimension }, (_, partner) => ({
    copy: number,
    partner: partner + 1,
    suborbit: copy.suborbit,
    moments: copy.blocks.map(({ phase, block }): ModeMoment => {
      if (block === null) return zeroMoment;
      const vector = [0, 1, 2].map((axis) => block[axis]?.[partner] as Cyclotomic) as [Cyclotomic, Cyclotomic, Cyclotomic];
      return vector.every(isCyclotomicZero) ? zeroMoment : { phase, vector };
    }),
  }));
}

function describe(irrep: SmallIrrep, modes: readonly Mode[], real: boolean, conjugate: readonly Mode[], irreps: SmallIrreps): IrrepModes {
  const multiplicity = modes.length / irrep.dimension;
  const doubled = real ? irrep.reality === "complex" : true;
  const freeParameters = modes.length * (doubled ? 2 : 1);
  const atoms = modes[0]?.moments.length ?? 0;
  return {
    irrep,
    multiplicity,
    modes,
    constraint: modes.length === 0 ? [] : constraintTable(irreps.k, modes, real ? { conjugate } : null),
    freeParameters,
    // Where k ≡ −k, and where −k is in no arm, nothing further ties the amplitudes of one arm.
    freeParametersWithMinusK: irreps.minusK === "in star" ? null : freeParameters,
    vanishingAtoms: Array.from({ length: atoms }, (_, atom) => atom).filter((atom) =>
      modes.every((mode) => mode.moments[atom]?.vector.every(isCyclotomicZero) ?? true),
    ),
  };
}
