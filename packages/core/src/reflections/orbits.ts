import { fail } from "../errors/index.js";
import { roundNumber, sameLineInverseAngstrom } from "../numbers/index.js";
import { type ReciprocalFrame, toSettingIndices } from "./reciprocal-frame.js";
import { mapIndices, type SatelliteMap, type SymmetryOfK } from "./symmetry-of-k.js";
import type { PositionLimits } from "./types.js";
import { visitBall } from "./vectors-in-ball.js";

/** A list with more lines than this helps nobody and would fill the memory; it is refused, not cut. */
const mostOrbits = 250_000;

/** One orbit of vectors ±(η + κ) under the group of ±k. */
export interface VectorOrbit {
  /** H of the representative in a*, b*, c*. */
  readonly h: readonly [number, number, number];
  /** The same in the dual of the primitive basis, for the member H + k of the orbit. */
  readonly eta: readonly [number, number, number];
  readonly sign: 1 | -1 | 0;
  readonly q: number;
  readonly multiplicity: number;
}

/**
 * All orbits of vectors ±(η + κ) with `qMin ≤ |Q| ≤ qMax`, Q = 0 left out, in order of Q, then of the representative.
 *
 * Every orbit holds a vector η + κ. Among those, only the one with the largest integers is kept: an orbit is met once,
 * without a table of what was seen, and most vectors are given up after a few images.
 *
 * Throws `invalid-argument` for more than 250 000 orbits.
 */
export function vectorOrbits(
  frame: ReciprocalFrame,
  symmetry: SymmetryOfK,
  kappa: readonly [number, number, number],
  limits: PositionLimits,
): VectorOrbit[] {
  const squareMax = (limits.qMax / (2 * Math.PI)) ** 2;
  // A line at the limit itself belongs to the list, whatever rounding says.
  const lowest = Math.max(sameLineInverseAngstrom, (limits.qMin ?? 0) - sameLineInverseAngstrom) / (2 * Math.PI);
  const orbits: VectorOrbit[] = [];
  const k = toSettingIndices(frame, kappa);
  const members = symmetry.maps.length * (symmetry.halfLattice ? 1 : 2);
  visitBall(frame.metric, kappa, squareMax, (n1, n2, n3, square) => {
    const stabilizer = square < lowest * lowest ? 0 : stabilizerOrder(symmetry.maps, n1, n2, n3);
    if (stabilizer === 0) return;
    if (orbits.length === mostOrbits) refuseTooMany();
    orbits.push({
      eta: [n1, n2, n3],
      ...representative(frame, symmetry, k, [n1, n2, n3]),
      q: roundNumber(2 * Math.PI * Math.sqrt(square)),
      multiplicity: members / stabilizer,
    });
  });
  return orbits.sort(compareOrbits);
}

function refuseTooMany(): never {
  fail("invalid-argument", `the list would hold more than ${mostOrbits} lines`, {
    expected: `at most ${mostOrbits} lines within the limit of Q`,
    found: "more",
    remedy: "lower the limit of Q, or check the units of the cell (Å) and of Q (Å⁻¹)",
  });
}

/** How many maps leave (n1, n2, n3) where it is, or 0 when some map leads to larger integers. */
function stabilizerOrder(maps: readonly SatelliteMap[], n1: number, n2: number, n3: number): number {
  let count = 0;
  for (const { rotation: r, shift: s } of maps) {
    const first = n1 * (r[0] as number) + n2 * (r[3] as number) + n3 * (r[6] as number) + (s[0] as number) - n1;
    if (first > 0) return 0;
    if (first < 0) continue;
    const second = n1 * (r[1] as number) + n2 * (r[4] as number) + n3 * (r[7] as number) + (s[1] as number) - n2;
    if (second > 0) return 0;
    if (second < 0) continue;
    const third = n1 * (r[2] as number) + n2 * (r[5] as number) + n3 * (r[8] as number) + (s[2] as number) - n3;
    if (third > 0) return 0;
    if (third === 0) count += 1;
  }
  return count;
}

/** The member that a person would write: k itself where the line holds it, else see `isPlainer`. */
function representative(
  frame: ReciprocalFrame,
  symmetry: SymmetryOfK,
  k: readonly [number, number, number],
  eta: readonly [number, number, number],
): Pick<VectorOrbit, "h" | "sign"> {
  let best: { readonly h: Triple; readonly side: 1 | -1 } | null = null;
  let bestVector: Triple = [0, 0, 0];
  for (const map of symmetry.maps) {
    const h = toSettingIndices(frame, mapIndices(map, ...eta));
    if (h.every((entry) => entry === 0)) return { h: [0, 0, 0], sign: symmetry.halfLattice ? 0 : 1 };
    for (const side of symmetry.halfLattice ? oneSide : bothSides) {
      // Whole billionths, so that rounding does not tell equal components apart.
      const vector: Triple = [
        Math.round(1e9 * side * (h[0] + k[0])),
        Math.round(1e9 * side * (h[1] + k[1])),
        Math.round(1e9 * side * (h[2] + k[2])),
      ];
      if (best !== null && !isPlainer(vector, bestVector)) continue;
      best = { h, side };
      bestVector = vector;
    }
  }
  const { h, side } = best as { readonly h: Triple; readonly side: 1 | -1 };
  return { h: [side * h[0] + 0, side * h[1] + 0, side * h[2] + 0], sign: symmetry.halfLattice ? 0 : side };
}

type Triple = readonly [number, number, number];

const oneSide = [1] as const;
const bothSides = [1, -1] as const;

/**
 * Whether `a` is the plainer way to write a line: fewer negative components, then l and k not negative before h, as in
 * lists of monoclinic lines, then larger components from the first on.
 */
function isPlainer(a: Triple, b: Triple): boolean {
  const fewer = negatives(a) - negatives(b);
  if (fewer !== 0) return fewer < 0;
  if (a[2] < 0 !== b[2] < 0) return b[2] < 0;
  if (a[1] < 0 !== b[1] < 0) return b[1] < 0;
  return (a[0] - b[0] || a[1] - b[1] || a[2] - b[2]) > 0;
}

function negatives(vector: Triple): number {
  return (vector[0] < 0 ? 1 : 0) + (vector[1] < 0 ? 1 : 0) + (vector[2] < 0 ? 1 : 0);
}

function compareOrbits(a: VectorOrbit, b: VectorOrbit): number {
  if (a.q !== b.q) return a.q - b.q;
  for (const axis of [0, 1, 2] as const) if (a.h[axis] !== b.h[axis]) return b.h[axis] - a.h[axis];
  return b.sign - a.sign;
}
