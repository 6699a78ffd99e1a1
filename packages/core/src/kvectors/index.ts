/**
 * Which k is it, and what leaves it alone? Exact wave vectors as rows in the reciprocal basis of the setting, modulo
 * L* (docs/conventions.md, Wave vectors): equivalence, little group, star, the manifold a k lies on, the atlas of all
 * kinds of k and the special points.
 * Sources: Bradley & Cracknell, The Mathematical Theory of Symmetry in Solids (1972), chapter 3; Wintgen, Math. Ann.
 * 118 (1941) 195; International Tables for Crystallography B, chapter 1.5.
 */
export type { Assumption } from "../errors/index.js";
export { atlas } from "./atlas.js";
export { type CanonicalPlacement, canonicalPlacement } from "./canonical.js";
export { firstZoneRepresentative } from "./first-zone.js";
export { kindOf } from "./kind-of.js";
export { equivalentWaveVectors, isHalfLattice, littleGroup, star } from "./little-group.js";
export { manifold } from "./manifold.js";
export { nearbyKinds } from "./nearby-kinds.js";
export { type PlacedWaveVector, placeWaveVector } from "./placing.js";
export { plainestRepresentative } from "./plainest.js";
export { pointOnManifold } from "./point-on-manifold.js";
export { reducedRepresentative } from "./reduced.js";
export { specialPoints } from "./special-points.js";
export type { KindOfK, LittleGroup, Manifold, MinusK, NearbyKind, SpecialPoint, Star, WaveVector } from "./types.js";
export {
  exactComponents,
  exactWaveVector,
  formatWaveVector,
  isExactWaveVector,
  isReciprocalLatticeVector,
  numericWaveVector,
  parameterValues,
  usedParameters,
  type WaveVectorJson,
  waveVectorToJson,
} from "./wave-vector.js";
export { parseWaveVector, type WrittenWaveVector } from "./written.js";
