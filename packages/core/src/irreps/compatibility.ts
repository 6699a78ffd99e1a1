import { fail } from "../errors/index.js";
import { type Manifold, manifold, pointOnManifold, star, type WaveVector } from "../kvectors/index.js";
import {
  addCyclotomic,
  type Cyclotomic,
  conjugateCyclotomic,
  cyclotomicToRational,
  cyclotomicZero,
  evaluateForm,
  multiplyCyclotomic,
  type PhasedNumber,
  type Rational,
  type RationalVector,
  rational,
  reduceOrder,
  rootOfUnity,
  subtract,
  zero,
} from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import { smallIrreps } from "./small-irreps.js";
import type { SmallIrreps } from "./types.js";

/** How the small irreps of a k restrict to the little group of a line or plane through it. */
export interface Compatibility {
  readonly from: SmallIrreps;
  readonly to: SmallIrreps;
  /** The arm of `from` that lies on the line or plane, and the operator (by index) that takes the given k to it. */
  readonly arm: WaveVector;
  readonly operator: number;
  /** Values of u, v, w of the line or plane at that arm. */
  readonly parameters: readonly Rational[];
  /** `rows[i].multiplicities[j]`: how often irrep j of the line or plane is in irrep i of the k. */
  readonly rows: readonly { readonly label: string; readonly multiplicities: readonly number[] }[];
}

/**
 * Compatibility relations by subduction (Bouckaert, Smoluchowski & Wigner, Phys. Rev. 50 (1936) 58; Bradley &
 * Cracknell, 1972, chapter 3): the little group of the line or plane is a subgroup of that of a k on it, and the
 * irreps of the line, continued to that k, are counted in the restriction. Exact.
 *
 * Throws `k-not-on-manifold` when no arm of `from` lies on the line or plane of `to`.
 *
 * @param from an exact k
 * @param to any k; its whole line or plane is taken
 */
export function compatibility(group: SpaceGroup, from: WaveVector, to: WaveVector): Compatibility {
  const through = manifold(group, to, { withInversion: false });
  const { arm, operator, parameters } = findArm(group, from, through);
  const point = smallIrreps(group, arm);
  const line = smallIrreps(group, {
    ...through.form,
    values: through.dimension === 0 ? [] : null,
    uncertainties: null,
  });
  // The little group of a line leaves its points alone.
  const places = line.littleGroup.operators.map((index) => point.littleGroup.operators.indexOf(index));
  // Letters that do not occur take any value.
  const values = [...parameters, zero, zero, zero] as unknown as RationalVector;
  return {
    from: point,
    to: line,
    arm,
    operator,
    parameters,
    rows: point.irreps.map((irrep) => ({
      label: irrep.label,
      multiplicities: line.irreps.map((other) =>
        multiplicity(
          places.map((place) => irrep.characters[place] as PhasedNumber),
          other.characters,
          values,
        ),
      ),
    })),
  };
}

function findArm(
  group: SpaceGroup,
  from: WaveVector,
  through: Manifold,
): { arm: WaveVector; operator: number; parameters: readonly Rational[] } {
  const { arms, representatives } = star(group, from);
  for (const [index, arm] of arms.entries()) {
    const parameters = pointOnManifold(group, through, arm);
    if (parameters !== null) return { arm, operator: representatives[index] as number, parameters };
  }
  return fail("k-not-on-manifold", "no arm of the first wave vector lies on the line or plane of the second", {
    expected: "a point and a line or plane through it, such as --from 0,1/2,0 --to 0,u,0",
    remedy: "list the kinds of k with `kvane atlas`",
  });
}

/** `(1/n) Σ χ(g)* χ'(g)` at the values; the phases of the two meet in short roots of unity. */
function multiplicity(point: readonly PhasedNumber[], line: readonly PhasedNumber[], values: RationalVector): number {
  const sum = line.reduce<Cyclotomic>((total, there, index) => {
    const here = point[index] as PhasedNumber;
    const turns = subtract(evaluateForm(there.phase, values), evaluateForm(here.phase, values));
    const product = multiplyCyclotomic(there.factor, conjugateCyclotomic(here.factor));
    return addCyclotomic(total, multiplyCyclotomic(rootOfUnity(turns), product));
  }, cyclotomicZero);
  const [total, denominator] = cyclotomicToRational(reduceOrder(sum)) as Rational;
  const [count, rest] = rational(total, denominator * line.length);
  if (rest !== 1) throw new Error("a multiplicity came out fractional");
  return count;
}
