/**
 * Where do nuclear lines and satellites lie, and which fall together? Q = 2π/d in Å⁻¹; H is a vector of L* in a*, b*, c*
 * of the setting; satellites are H ± k (docs/conventions.md, Wave vectors). A line stands for all vectors that
 * symmetry makes equivalent, in the point group extended by −1 as usual for a powder. Sources: International Tables A,
 * section 1.6.3 (reflection conditions); Fincke & Pohst, Math. Comp. 44 (1985) 463 (enumeration).
 */
export { averagedReciprocalMetric } from "./averaged-metric.js";
export { nuclearLines } from "./nuclear-lines.js";
export { type Overlaps, overlapsOf } from "./overlaps.js";
export { distinctPositions, dToQ, qToTwoThetaDeg, twoThetaDegToQ } from "./positions.js";
export { type ReciprocalFrame, reciprocalFrame } from "./reciprocal-frame.js";
export { type SatelliteLister, satelliteLines, satelliteLister } from "./satellite-lines.js";
export {
  type ReflectionList,
  type ReflectionOptions,
  reflectionList,
  satelliteReflections,
} from "./satellite-reflections.js";
export type { NuclearLine, Overlap, PositionLimits, SatelliteLine, SatelliteReflection } from "./types.js";
export { type BallVisitor, visitBall } from "./vectors-in-ball.js";
