import type { MomentScene } from "./moment-data.js";
import { combine, size, type Vector } from "./space.js";

/** Moments of all atoms of a scene, Cartesian, the longest of length 1, with the common phase that was taken. */
export interface Moments {
  readonly vectors: readonly Vector[];
  /** Turns by which all Fourier components were advanced. */
  readonly phase: number;
}

/** Tried in this order: cosine, a mixture, sine. */
const phases = [0, 1 / 8, 1 / 4];
/** Share of the longest moment below which one counts as none. */
const nothing = 1e-6;

/**
 * `M_j(T) = S_j exp(−2πi k·T) + c.c.` without a factor 1/2; for 2k ∈ L* the real part of S_j alone, with the sign of
 * exp(−2πi k·T) (docs/conventions.md, Moments and phases). S_j may be advanced by one common phase: the first of 0, 1/8
 * and 1/4 turn is taken at which no atom with an S_j is left without a moment, or else the one that leaves fewest.
 */
export function momentsOf(scene: MomentScene, arrangement: number): Moments {
  const components = scene.arrangements[arrangement]?.components ?? [];
  const at = (phase: number): Vector[] => {
    const vectors = scene.atoms.map(({ site, atom, turns }): Vector => {
      const s = components[site]?.[atom];
      if (s === undefined) return [0, 0, 0];
      const angle = 2 * Math.PI * (phase - turns);
      const [cosine, sine] = [Math.cos(angle), Math.sin(angle)];
      return combine(
        scene.axes,
        // Where 2k is in L* the phase of a translation is a sign, and the other phases stand for the imaginary part.
        s.map(([re, im]) => re * cosine - im * sine),
      );
    });
    const longest = Math.max(...vectors.map(size));
    return longest < nothing ? vectors : vectors.map(([x, y, z]) => [x / longest, y / longest, z / longest]);
  };
  const tried = (scene.real ? [0, 1 / 4] : phases).map((phase) => {
    const vectors = at(phase);
    return { phase, vectors, empty: vectors.filter((vector) => size(vector) < nothing).length };
  });
  const fewest = Math.min(...tried.map(({ empty }) => empty));
  const { vectors, phase } = tried.find(({ empty }) => empty === fewest) as (typeof tried)[number];
  return { vectors, phase };
}
