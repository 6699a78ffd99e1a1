/** Share of the longest vector squared within which a point counts as nearest. */
const rounding = 1e-12;

/**
 * The point nearest to the origin among all weighted means of a few vectors: the direction in which a concave function
 * with these slopes at a kink rises most (J. Frédéric Bonnans et al., Numerical Optimization, 2006, chapter 8). Every
 * face is tried, smallest first: there are at most 2ⁿ.
 */
export function nearestInHull(vectors: readonly (readonly number[])[]): number[] {
  const longest = Math.max(...vectors.map((one) => dot(one, one)));
  let best: number[] = [...(vectors[0] as readonly number[])];
  for (let face = 1; face < 1 << vectors.length; face++) {
    const own = vectors.filter((_, index) => face & (1 << index));
    const point = nearestInSpan(own);
    if (point === null || dot(point, point) > dot(best, best)) continue;
    if (vectors.every((one) => dot(point, one) >= dot(point, point) - rounding * longest)) best = point;
  }
  return best;
}

/** The nearest point of the flat through the vectors, or null where it is no mean of theirs with weights above zero. */
function nearestInSpan(own: readonly (readonly number[])[]): number[] | null {
  const size = own.length + 1;
  // Normal equations with a multiplier for Σ weights = 1.
  const rows = own.map((a) => [...own.map((b) => dot(a, b)), 1, 0]);
  rows.push([...own.map(() => 1), 0, 1]);
  const weights = solved(rows, size)?.slice(0, own.length);
  if (!weights || weights.some((one) => one < 0)) return null;
  return (own[0] as readonly number[]).map((_, axis) =>
    own.reduce((sum, one, index) => sum + (weights[index] as number) * (one[axis] as number), 0),
  );
}

/** Gaussian elimination with pivots; null for a singular system. */
function solved(rows: number[][], size: number): number[] | null {
  const scale = Math.max(...rows.flat().map(Math.abs));
  for (let column = 0; column < size; column++) {
    let pivot = column;
    for (let row = column; row < size; row++)
      if (Math.abs(rows[row]?.[column] as number) > Math.abs(rows[pivot]?.[column] as number)) pivot = row;
    [rows[column], rows[pivot]] = [rows[pivot] as number[], rows[column] as number[]];
    const head = rows[column] as number[];
    if (Math.abs(head[column] as number) <= 1e-13 * scale) return null;
    for (let row = 0; row < size; row++) {
      if (row === column) continue;
      const factor = (rows[row]?.[column] as number) / (head[column] as number);
      rows[row] = (rows[row] as number[]).map((entry, at) => entry - factor * (head[at] as number));
    }
  }
  return rows.map((row, index) => (row[size] as number) / (row[index] as number));
}

function dot(a: readonly number[], b: readonly number[]): number {
  return a.reduce((sum, entry, axis) => sum + entry * (b[axis] as number), 0);
}
