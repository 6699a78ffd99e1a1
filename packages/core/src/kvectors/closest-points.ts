/** A point of a family of parallel flats, seen from the origin. */
export interface ClosePoint {
  /** The whole numbers added to the offset; 0 for free coordinates. */
  readonly shift: readonly number[];
  /** All coordinates. */
  readonly coordinates: readonly number[];
  readonly distance: number;
}

/**
 * The points closest to zero among `x_i = offset_i + n_i` with whole n_i, the first `free` coordinates taking any
 * value: the closest if it is within `reach`, and all that are no more than `slack` farther. Nothing is missed: with
 * the metric as `Σ q_i (x_i + Σ_{j>i} μ_ij x_j)²` each coordinate is bounded once those after it are chosen (U. Fincke
 * & M. Pohst, Math. Comp. 44 (1985) 463). Nearest values are tried first, which soon narrows the bound (C. P. Schnorr &
 * M. Euchner, Math. Programming 66 (1994) 181), and a free coordinate makes its own square vanish.
 *
 * @param metric rows, positive definite
 * @param reach largest distance wanted, in the unit of the square root of the metric
 */
export function closestPoints(
  metric: readonly (readonly number[])[],
  offset: readonly number[],
  free: number,
  reach: number,
  slack: number,
): readonly ClosePoint[] {
  const squares = completedSquares(metric);
  const found: ClosePoint[] = [];
  const coordinates = offset.map(() => 0);
  const shift = offset.map(() => 0);
  let limit = reach + slack;
  const choose = (index: number, sum: number): void => {
    if (index < 0) {
      const distance = Math.sqrt(sum);
      found.push({ shift: [...shift], coordinates: [...coordinates], distance });
      limit = Math.min(limit, distance + slack);
      return;
    }
    const { weight, factors } = squares[index] as CompletedSquare;
    const rest = factors.reduce((total, factor, other) => total + factor * (coordinates[other] as number), 0);
    if (index < free) {
      coordinates[index] = -rest;
      choose(index - 1, sum);
      return;
    }
    const start = offset[index] as number;
    for (const whole of outwardsFrom(-start - rest)) {
      const added = sum + weight * (start + whole + rest) ** 2;
      // Values come in order of distance, so all later ones are beyond the limit too.
      if (added > limit ** 2) return;
      coordinates[index] = start + whole;
      shift[index] = whole;
      choose(index - 1, added);
    }
  };
  choose(offset.length - 1, 0);
  return found.filter(({ distance }) => distance <= limit);
}

interface CompletedSquare {
  /** q_i. */
  readonly weight: number;
  /** μ_ij for all j, 0 up to i. */
  readonly factors: readonly number[];
}

function completedSquares(metric: readonly (readonly number[])[]): CompletedSquare[] {
  const work = metric.map((row) => [...row]);
  return work.map((row, index) => {
    const weight = row[index] as number;
    const factors = row.map((entry, other) => (other > index ? entry / weight : 0));
    for (const lower of work.slice(index + 1)) {
      const factor = (lower[index] as number) / weight;
      row.forEach((entry, other) => {
        lower[other] = (lower[other] as number) - factor * entry;
      });
    }
    return { weight, factors };
  });
}

/** All whole numbers in order of their distance from a value, without end. */
function* outwardsFrom(value: number): Generator<number> {
  const nearest = Math.round(value) + 0;
  yield nearest;
  const side = value >= nearest ? 1 : -1;
  for (let step = 1; ; step++) {
    yield nearest + side * step;
    yield nearest - side * step;
  }
}
