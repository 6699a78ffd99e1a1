import { waveTimesColumn } from "../irreps/index.js";
import { isHalfLattice, type WaveVector } from "../kvectors/index.js";
import {
  addForms,
  type Cyclotomic,
  conjugateCyclotomic,
  cyclotomicFromRational,
  multiplyCyclotomic,
  negateForm,
  type Phase,
  type Rational,
  type RationalVector,
  reducePhase,
} from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import type { ModeMoment } from "./types.js";

/**
 * How a Fourier component is written. kvane's own is `M = S e^{−2πi k·T} + c.c.` (no c.c. where 2k ∈ L*): exponent
 * `minus`, phase `lattice`, factor `one`.
 */
export interface FourierConvention {
  /** Sign of the exponent of the wave. */
  readonly exponent: "minus" | "plus";
  /** The phase runs with the lattice translation T, or with the atom's position T + r_j. */
  readonly phase: "lattice" | "position";
  /** The sum of the wave and its conjugate is taken as it stands, or with the factor 1/2. */
  readonly factor: "one" | "half";
}

/** The convention of this library: M = S exp(−2πi k·T) + c.c., phases by lattice translations, no factor (docs/conventions.md). */
export const ownConvention: FourierConvention = { exponent: "minus", phase: "lattice", factor: "one" };

/** A component in kvane's convention, written in another one. Exact. */
export function toConvention(
  group: SpaceGroup,
  k: WaveVector,
  position: RationalVector,
  moment: ModeMoment,
  convention: FourierConvention,
): ModeMoment {
  const shifted = convention.phase === "position" ? withPhase(moment, waveTimesColumn(k, position)) : moment;
  const signed = convention.exponent === "plus" ? conjugateMoment(shifted) : shifted;
  return scaledMoment(signed, factorOf(group, k, convention));
}

/** The inverse of `toConvention`: a component written in the convention, in kvane's own. Exact. */
export function fromConvention(
  group: SpaceGroup,
  k: WaveVector,
  position: RationalVector,
  moment: ModeMoment,
  convention: FourierConvention,
): ModeMoment {
  const [numerator, denominator] = factorOf(group, k, convention);
  const plain = scaledMoment(moment, [denominator, numerator]);
  const signed = convention.exponent === "plus" ? conjugateMoment(plain) : plain;
  return convention.phase === "position" ? withPhase(signed, negateForm(waveTimesColumn(k, position))) : signed;
}

/** Without a conjugate term (2k ∈ L*) there is nothing to halve. */
function factorOf(group: SpaceGroup, k: WaveVector, convention: FourierConvention): Rational {
  return convention.factor === "half" && !isHalfLattice(group, k) ? [2, 1] : [1, 1];
}

function withPhase(moment: ModeMoment, turns: Phase): ModeMoment {
  return { ...moment, phase: reducePhase(addForms(moment.phase, turns)) };
}

function conjugateMoment({ phase, vector }: ModeMoment): ModeMoment {
  return { phase: reducePhase(negateForm(phase)), vector: mapMoment(vector, conjugateCyclotomic) };
}

function scaledMoment({ phase, vector }: ModeMoment, factor: Rational): ModeMoment {
  return { phase, vector: mapMoment(vector, (entry) => multiplyCyclotomic(cyclotomicFromRational(factor), entry)) };
}

function mapMoment(vector: ModeMoment["vector"], change: (entry: Cyclotomic) => Cyclotomic): ModeMoment["vector"] {
  return [change(vector[0]), change(vector[1]), change(vector[2])];
}

/** Which axes the components of a moment refer to. */
export type MomentComponents = "lattice" | "crystal" | "cartesian";
