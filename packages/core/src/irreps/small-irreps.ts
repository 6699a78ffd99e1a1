import { canonicalPlacement, littleGroup, star, type WaveVector } from "../kvectors/index.js";
import {
  addForms,
  type Cyclotomic,
  type CyclotomicMatrix,
  constantForm,
  cyclotomicToComplex,
  dotIntegers,
  type IntegerMatrix,
  type Phase,
  rational,
  reduceOrder,
  reducePhase,
  traceCyclotomicMatrix,
  unitComplex,
} from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import { littleCoGroup } from "./little-co-group.js";
import {
  composePrimitive,
  invertPrimitive,
  type PrimitiveOperator,
  primitiveComponents,
  primitiveOperator,
  turnsOf,
} from "./primitive-operators.js";
import { projectiveIrreps } from "./projective-irreps.js";
import { conjugateCharacter, herringReality, indexOfCharacter, realityContext } from "./reality.js";
import type { Reality, SmallIrreps } from "./types.js";

/**
 * All small irreps of the little group of k, exact, for any k of any group in any setting and without tables.
 *
 * They are made at the canonical representative of the kind of k and carried to k by the operator g that takes one to
 * the other, `D_k(h) = D_canonical(g⁻¹ h g)`, so that numbers and matrices belong together all along a line or plane
 * and on every arm. `D({R|t}) = e^{2πi(k·t + H·p)} Δ(R)` with Δ about the mean origin p of the little co-group.
 *
 * Method: the projective irreps of the little co-group (Bradley & Cracknell, 1972, chapter 3) along a
 * composition series (Zak, J. Math. Phys. 1 (1960) 165; chapter 4 of the book).
 *
 * Order and labels: by dimension, then by the characters of Δ at the canonical representative in operator order, larger
 * real part first, then larger imaginary part. Works with open letters in k.
 */
export function smallIrreps(group: SpaceGroup, k: WaveVector): SmallIrreps {
  const placement = canonicalPlacement(group, k);
  const canonical = canonicalIrreps(group, placement.canonical);
  const carrier = primitiveOperator(group, placement.operator);
  const little = littleGroup(group, k);
  const back = invertPrimitive(carrier);
  const images = little.operators.map((index) =>
    composePrimitive(composePrimitive(back, primitiveOperator(group, index)), carrier),
  );
  const elements = images.map(({ rotation }) => canonical.elementOf(rotation));
  const phases = images.map((image, index) => canonical.phaseOf(elements[index] as number, image));
  const { arms, minusK } = star(group, k);
  return {
    k,
    littleGroup: little,
    minusK,
    arms: arms.length,
    phases,
    irreps: canonical.irreps.map((irrep, position) => ({
      label: label(position),
      dimension: irrep.dimension,
      reality: irrep.reality,
      conjugateOf: irrep.conjugate === null ? null : label(irrep.conjugate),
      physicalDimension: arms.length * irrep.dimension * (irrep.reality === "real" ? 1 : 2),
      matrices: elements.map((element) => irrep.matrices[element] as CyclotomicMatrix),
      characters: elements.map((element, index) => ({
        phase: phases[index] as Phase,
        factor: irrep.character[element] as Cyclotomic,
      })),
    })),
  };
}

function label(position: number): string {
  return `Γ${position + 1}`;
}

interface CanonicalIrrep {
  readonly dimension: number;
  readonly reality: Reality;
  readonly conjugate: number | null;
  readonly matrices: readonly CyclotomicMatrix[];
  readonly character: readonly Cyclotomic[];
}

interface CanonicalIrreps {
  readonly irreps: readonly CanonicalIrrep[];
  /** Element number in the canonical little co-group of a rotation of the canonical little group. */
  readonly elementOf: (rotation: IntegerMatrix) => number;
  /** k·t + H·p of an operator of that group. */
  readonly phaseOf: (element: number, operator: PrimitiveOperator) => Phase;
}

function canonicalIrreps(group: SpaceGroup, k: WaveVector): CanonicalIrreps {
  const coGroup = littleCoGroup(group, k);
  const { operators, shifts } = coGroup.littleGroup;
  const elementByRotation = new Map(
    operators.map((operator, element) => [primitiveOperator(group, operator).rotation.join(), element]),
  );
  const elementOf = (rotation: IntegerMatrix): number => elementByRotation.get(rotation.join()) as number;
  const gauges = shifts.map((shift) =>
    constantForm(rational(dotIntegers(shift, coGroup.origin), coGroup.originDenominator)),
  );
  const kappa = primitiveComponents(group, k);
  const phaseOf = (element: number, { translation }: PrimitiveOperator): Phase =>
    reducePhase(addForms(turnsOf(kappa, translation, group.primitive.denominator), gauges[element] as Phase));
  const context = realityContext(kappa, coGroup, star(group, k).reversing, elementOf);
  const made = projectiveIrreps(coGroup).map((matrices) => ({
    matrices: matrices.map((matrix) => matrix.map((row) => row.map(reduceOrder))),
    character: matrices.map((matrix) => reduceOrder(traceCyclotomicMatrix(matrix))),
  }));
  const sorted = sortIrreps(made, gauges);
  const characters = sorted.map(({ character }) => character);
  const irreps = sorted.map(({ matrices, character }) => {
    const reality = herringReality(context, character);
    return {
      dimension: (matrices[0] as CyclotomicMatrix).length,
      reality,
      conjugate:
        reality === "complex" && context.images
          ? indexOfCharacter(characters, conjugateCharacter(context.images, character))
          : null,
      matrices,
      character,
    };
  });
  return { irreps, elementOf, phaseOf };
}

interface MadeIrrep {
  readonly matrices: readonly CyclotomicMatrix[];
  readonly character: readonly Cyclotomic[];
}

/** Decimals to which characters are rounded for sorting only; distinct ones differ by far more. */
const sortingDecimals = 9;

function sortIrreps(irreps: readonly MadeIrrep[], gauges: readonly Phase[]): MadeIrrep[] {
  const keyed = irreps.map((irrep) => ({
    irrep,
    key: [
      -(irrep.matrices[0] as CyclotomicMatrix).length,
      ...irrep.character.flatMap((value, element) => {
        const [real, imaginary] = cyclotomicToComplex(value);
        const [numerator, denominator] = (gauges[element] as Phase).constant;
        const [cosine, sine] = unitComplex(numerator / denominator);
        return [rounded(real * cosine - imaginary * sine), rounded(real * sine + imaginary * cosine)];
      }),
    ],
  }));
  keyed.sort((a, b) => {
    // Different irreps have different characters.
    const index = a.key.findIndex((entry, position) => entry !== b.key[position]);
    return (b.key[index] as number) - (a.key[index] as number);
  });
  return keyed.map(({ irrep }) => irrep);
}

function rounded(value: number): number {
  return Number(value.toFixed(sortingDecimals));
}
