/**
 * Which irreducible representations has the little group of k? Small irreps for any k of any group in any setting as
 * exact matrices, by induction and extension along a composition series, with their reality by Herring's test and the
 * relation to −k. `D({1|T}) = e^{+2πi k·T}` (docs/conventions.md, Moments and phases). Sources: Zak, J. Math. Phys. 1
 * (1960) 165; Bradley & Cracknell (1972), chapters 3 and 4; Herring, Phys. Rev. 52 (1937) 361.
 */
export {
  type Cyclotomic,
  type CyclotomicMatrix,
  cyclotomicToComplex,
  formatCyclotomic,
  type Rational,
} from "../numbers/index.js";
export { type Compatibility, compatibility } from "./compatibility.js";
export { constantRoot } from "./constant-root.js";
export { type LittleGroupElement, littleGroupElement, smallIrrepMatrix } from "./evaluate.js";
export { type FullIrrep, fullIrrepMatrix, fullIrreps } from "./full-irreps.js";
export { type MinusKLink, type MinusKRelation, minusKRelation } from "./minus-k.js";
export { translationColumn, waveTimesColumn } from "./setting.js";
export { smallIrreps } from "./small-irreps.js";
export type { Reality, SmallIrrep, SmallIrreps } from "./types.js";
