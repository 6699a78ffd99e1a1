/**
 * The dense-grid search that branch and bound is compared with: every point of a grid over an asymmetric part of the
 * general k, no point further than `radius` from a grid point. Flat arrays, no allocation in the loop: the vectors H that
 * can give a peak in the cube of the grid at hand are looked up in a table, cube by cube, and a point is given up as soon
 * as too few peaks can match. Powder positions, P1 or P-1, Cartesian reciprocal axes, independent of core.
 */
export interface GridInput {
  /** Cartesian a*, b*, c* with 2π. */
  readonly axes: readonly (readonly [number, number, number])[];
  readonly peaks: readonly { readonly q: number; readonly halfWidth: number }[];
  readonly unmatched: number;
  readonly radius: number;
}

export interface GridAnswer {
  readonly points: number;
  /** Fractional k of the grid points where enough peaks match within half-width + slack. */
  readonly found: readonly (readonly [number, number, number])[];
}

/** Points along the edge of a cube whose table of H is made at once; infinite for one table of the whole zone. */
const usualCubeEdge = 16;

/**
 * Searches u, v, w in [0, 1) × [0, 1) × [0, 1/2], one of every pair ±k.
 *
 * @param slack Å⁻¹ added to each half-width: `radius` to miss nothing between the points, 0 to list matches only
 */
export function gridSearch(input: GridInput, slack: number, edge = usualCubeEdge): GridAnswer {
  const { axes, radius } = input;
  const peaks = [...input.peaks].sort((a, b) => a.q - b.q);
  const count = peaks.length;
  const lengths = axes.map((axis) => Math.hypot(...axis));
  // The half-diagonal of a cell is at most half the sum of its edges; half the length of (1, 1, 1) steps in a skew cell.
  const steps = lengths.map((length) => Math.ceil((length * Math.sqrt(3)) / (2 * radius)));
  const [n0, n1, n2] = steps as [number, number, number];
  const last2 = Math.floor(n2 / 2);
  const cubeEdge = Math.min(edge, Math.max(n0, n1, n2));
  const highest = Math.max(...peaks.map((peak) => peak.q + peak.halfWidth)) + slack;
  const vectors = vectorsUpTo(axes, highest + lengths.reduce((sum, length) => sum + length, 0));
  const lowSquare = Float64Array.from(peaks, ({ q, halfWidth }) => Math.max(0, q - halfWidth - slack) ** 2);
  const highSquare = Float64Array.from(peaks, ({ q, halfWidth }) => (q + halfWidth + slack) ** 2);
  const starts = new Int32Array(count + 1);
  let table = new Float64Array(3 * 4096);
  const found: [number, number, number][] = [];
  const at = (axis: number, i: number, j: number, l: number): number =>
    (i / n0) * (axes[0]?.[axis] as number) +
    (j / n1) * (axes[1]?.[axis] as number) +
    (l / n2) * (axes[2]?.[axis] as number);
  let points = 0;
  for (let i0 = 0; i0 < n0; i0 += cubeEdge)
    for (let j0 = 0; j0 < n1; j0 += cubeEdge)
      for (let l0 = 0; l0 <= last2; l0 += cubeEdge) {
        const half = (cubeEdge - 1) / 2;
        const c = [0, 1, 2].map((axis) => at(axis, i0 + half, j0 + half, l0 + half)) as [number, number, number];
        const reach = half * ((lengths[0] as number) / n0 + (lengths[1] as number) / n1 + (lengths[2] as number) / n2);
        let write = 0;
        for (let peak = 0; peak < count; peak++) {
          const { q, halfWidth } = peaks[peak] as { q: number; halfWidth: number };
          const low = Math.max(0, q - halfWidth - slack - reach) ** 2;
          const high = (q + halfWidth + slack + reach) ** 2;
          for (let v = 0; v < vectors.length; v += 3) {
            const x = (vectors[v] as number) + c[0];
            const y = (vectors[v + 1] as number) + c[1];
            const z = (vectors[v + 2] as number) + c[2];
            const square = x * x + y * y + z * z;
            if (square < low || square > high) continue;
            if (write + 3 > table.length) {
              const larger = new Float64Array(2 * table.length);
              larger.set(table);
              table = larger;
            }
            table[write] = vectors[v] as number;
            table[write + 1] = vectors[v + 1] as number;
            table[write + 2] = vectors[v + 2] as number;
            write += 3;
          }
          starts[peak + 1] = write;
        }
        for (let i = i0; i < Math.min(n0, i0 + cubeEdge); i++)
          for (let j = j0; j < Math.min(n1, j0 + cubeEdge); j++)
            for (let l = l0; l <= Math.min(last2, l0 + cubeEdge - 1); l++) {
              points += 1;
              const kx = at(0, i, j, l);
              const ky = at(1, i, j, l);
              const kz = at(2, i, j, l);
              let missing = 0;
              for (let peak = 0; peak < count; peak++) {
                const low = lowSquare[peak] as number;
                const high = highSquare[peak] as number;
                let hit = false;
                for (let v = starts[peak] as number; v < (starts[peak + 1] as number); v += 3) {
                  const x = (table[v] as number) + kx;
                  const y = (table[v + 1] as number) + ky;
                  const z = (table[v + 2] as number) + kz;
                  const square = x * x + y * y + z * z;
                  if (square >= low && square <= high) {
                    hit = true;
                    break;
                  }
                }
                if (hit) continue;
                missing += 1;
                if (missing > input.unmatched) break;
              }
              if (missing <= input.unmatched) found.push([i / n0, j / n1, l / n2]);
            }
      }
  return { points, found };
}

function vectorsUpTo(axes: GridInput["axes"], highest: number): Float64Array {
  const [a, b, c] = axes as unknown as [Vector, Vector, Vector];
  const volume = dot(a, cross(b, c));
  // |h| = |H · (b × c)| / V and so on.
  const reach = [cross(b, c), cross(c, a), cross(a, b)].map((normal) =>
    Math.ceil((highest * Math.hypot(...normal)) / Math.abs(volume)),
  ) as [number, number, number];
  const list: number[] = [];
  for (let h = -reach[0]; h <= reach[0]; h++)
    for (let k = -reach[1]; k <= reach[1]; k++)
      for (let l = -reach[2]; l <= reach[2]; l++) {
        const x = h * a[0] + k * b[0] + l * c[0];
        const y = h * a[1] + k * b[1] + l * c[1];
        const z = h * a[2] + k * b[2] + l * c[2];
        if (x * x + y * y + z * z <= highest * highest) list.push(x, y, z);
      }
  return Float64Array.from(list);
}

type Vector = readonly [number, number, number];

function cross(a: Vector, b: Vector): Vector {
  return [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]];
}

function dot(a: Vector, b: Vector): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
}
