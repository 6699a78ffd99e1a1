import { addForms, type CyclotomicMatrix, type Phase, subtractVectors } from "../numbers/index.js";
import type { SpaceGroup, SymmetryOperator } from "../spacegroups/index.js";
import { type PrimitiveOperator, primitiveComponents, primitiveOperator, turnsOf } from "./primitive-operators.js";
import { translationColumn, waveTimesColumn } from "./setting.js";
import type { SmallIrrep, SmallIrreps } from "./types.js";

/** The place of an operator in the little group, and the phase of its matrix: `D(g) = e^{2πi·phase} · matrices[element]`. */
export interface LittleGroupElement {
  readonly element: number;
  readonly phase: Phase;
}

/**
 * Any operator of the little group, with any lattice translation, in terms of the printed coset representatives:
 * `D({R|t + T}) = e^{+2πi k·T} D({R|t})`. Throws a plain error when the operator is not in the little group.
 */
export function littleGroupElement(
  group: SpaceGroup,
  irreps: SmallIrreps,
  operator: SymmetryOperator,
): LittleGroupElement {
  const element = irreps.littleGroup.operators.findIndex((index) =>
    sameRotation(group.operators[index] as SymmetryOperator, operator),
  );
  const representative = group.operators[irreps.littleGroup.operators[element] as number];
  if (!representative) throw new Error("an operator is not in the little group");
  const step = subtractVectors(translationColumn(operator), translationColumn(representative));
  return { element, phase: addForms(irreps.phases[element] as Phase, waveTimesColumn(irreps.k, step)) };
}

function sameRotation(a: SymmetryOperator, b: SymmetryOperator): boolean {
  return (
    a.rotationDenominator === b.rotationDenominator && a.rotation.every((entry, index) => entry === b.rotation[index])
  );
}

/** The same for operators in the primitive basis, translations over the group's `primitive.denominator`. */
export function littleGroupPlaces(
  group: SpaceGroup,
  irreps: SmallIrreps,
): (operator: PrimitiveOperator) => LittleGroupElement {
  const representatives = irreps.littleGroup.operators.map((index) => primitiveOperator(group, index));
  const elementByRotation = new Map(representatives.map(({ rotation }, element) => [rotation.join(), element]));
  const kappa = primitiveComponents(group, irreps.k);
  return ({ rotation, translation }) => {
    const element = elementByRotation.get(rotation.join());
    if (element === undefined) throw new Error("an operator is not in the little group");
    const representative = representatives[element] as PrimitiveOperator;
    const step = translation.map((entry, axis) => entry - (representative.translation[axis] as number));
    const turns = turnsOf(kappa, step, group.primitive.denominator);
    return { element, phase: addForms(irreps.phases[element] as Phase, turns) };
  };
}

/** `D(g)` of an irrep for any operator of the little group, as phase and matrix. */
export function smallIrrepMatrix(
  group: SpaceGroup,
  irreps: SmallIrreps,
  irrep: SmallIrrep,
  operator: SymmetryOperator,
): { readonly phase: Phase; readonly matrix: CyclotomicMatrix } {
  const { element, phase } = littleGroupElement(group, irreps, operator);
  return { phase, matrix: irrep.matrices[element] as CyclotomicMatrix };
}
