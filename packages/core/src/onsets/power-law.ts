import { goldenSection } from "../algorithms/index.js";

/** Points of one fit. */
export interface ScanPoints {
  /** K. */
  readonly temperatures: readonly number[];
  readonly values: readonly number[];
  readonly su: readonly number[];
}

/** The law with the amplitude and background that fit best for its T_N and β. */
export interface LawAt {
  readonly transition: number;
  readonly beta: number;
  readonly amplitude: number;
  readonly background: number;
  readonly chiSquared: number;
}

/** Exponents that are tried: 0.125 (planar Ising) to 0.5 (mean field) are usual, some smearing either way is allowed. */
export const leastBeta = 0.03;
export const mostBeta = 1.2;

/**
 * For given T_N and β the law is linear in amplitude and background: these are eliminated (variable projection; G. H.
 * Golub & V. Pereyra, SIAM J. Numer. Anal. 10 (1973) 413), so that no start values are needed and the kink at T_N, where
 * derivatives diverge for 2β < 1, does no harm.
 */
export function lawAt(points: ScanPoints, transition: number, beta: number): LawAt {
  return lawsAt(points, transition)(beta);
}

/** The same for many β: logarithms and the sums that do not depend on β are worked out once. */
function lawsAt({ temperatures, values, su }: ScanPoints, transition: number): (beta: number) => LawAt {
  const logs: number[] = [];
  const weights: number[] = [];
  const below: number[] = [];
  let [s, sy, syy] = [0, 0, 0];
  for (let n = 0; n < temperatures.length; n++) {
    const weight = 1 / (su[n] as number) ** 2;
    const y = values[n] as number;
    s += weight;
    sy += weight * y;
    syy += weight * y * y;
    const reduced = 1 - (temperatures[n] as number) / transition;
    if (reduced <= 0) continue;
    logs.push(2 * Math.log(reduced));
    weights.push(weight);
    below.push(y);
  }
  return (beta) => {
    let [sx, sxx, sxy] = [0, 0, 0];
    for (let n = 0; n < logs.length; n++) {
      const x = Math.exp(beta * (logs[n] as number));
      const weighted = (weights[n] as number) * x;
      sx += weighted;
      sxx += weighted * x;
      sxy += weighted * (below[n] as number);
    }
    const spread = sxx - (sx * sx) / s;
    const amplitude = spread > 1e-12 * sxx ? (sxy - (sx * sy) / s) / spread : 0;
    const background = (sy - amplitude * sx) / s;
    const chiSquared = Math.max(0, syy - amplitude * sxy - background * sy);
    return { transition, beta, amplitude, background, chiSquared };
  };
}

const logBetas = Array.from({ length: 7 }, (_, n) => Math.log(leastBeta) + (n / 6) * Math.log(mostBeta / leastBeta));

/** The best β for a T_N. */
export function lawAtTransition(points: ScanPoints, transition: number, steps = 18): LawAt {
  const laws = lawsAt(points, transition);
  const tried = logBetas.map((one) => laws(Math.exp(one)));
  const best = tried.reduce((least, one) => (one.chiSquared < least.chiSquared ? one : least));
  if (steps === 0) return best;
  const width = (logBetas[1] as number) - (logBetas[0] as number);
  const middle = Math.log(best.beta);
  const logBeta = goldenSection(
    (one) => laws(Math.exp(one)).chiSquared,
    Math.max(logBetas[0] as number, middle - width),
    Math.min(logBetas.at(-1) as number, middle + width),
    steps,
  );
  return laws(Math.exp(logBeta));
}

/** The best T_N for a β, near a given one. */
export function lawAtBeta(points: ScanPoints, beta: number, near: number, reach: number): LawAt {
  const value = (transition: number) => lawAt(points, transition, beta).chiSquared;
  return lawAt(points, lowestOnGrid(value, near - reach, near + reach, 32), beta);
}

/** With more points than this, gaps are joined first and the best of them are then gone through point by point. */
const mostEdges = 80;

/** The best law of all; χ² has a kink wherever T_N passes a point, so that every gap between points is looked at. */
export function bestLaw(points: ScanPoints, from: number, to: number): LawAt {
  const inside = points.temperatures.filter((one) => one > from && one < to);
  const every = Math.ceil(inside.length / mostEdges);
  const edges = [from, ...inside.filter((_, n) => every < 2 || n % every === 0), to];
  const grid = edges.slice(1).flatMap((high, n) => {
    const low = edges[n] as number;
    return [low + 0.2 * (high - low), low + 0.6 * (high - low)];
  });
  // Many points fix β so sharply that a rough β would upset the order of T_N.
  const steps = points.temperatures.length > 200 ? 14 : 6;
  const ranked = grid
    .map((one) => ({ one, chiSquared: lawAtTransition(points, one, steps).chiSquared }))
    .sort((a, b) => a.chiSquared - b.chiSquared);
  const gaps = [
    ...new Map(
      ranked
        .slice(0, 5)
        .map(({ one }) => gapAround(edges, one))
        .map((gap) => [gap[0], gap]),
    ).values(),
  ];
  const ends = gaps.slice(0, 3).map(([low, high]) =>
    every > 1
      ? bestLaw(points, low, high)
      : lawAtTransition(
          points,
          goldenSection((one) => lawAtTransition(points, one).chiSquared, low, high, 20),
          30,
        ),
  );
  return ends.reduce((least, end) => (end.chiSquared < least.chiSquared ? end : least));
}

function gapAround(edges: readonly number[], place: number): readonly [number, number] {
  const at = edges.findIndex((edge) => edge > place);
  return [edges[at - 1] as number, edges[at] as number];
}

function lowestOnGrid(value: (x: number) => number, from: number, to: number, count: number): number {
  const step = (to - from) / count;
  let best = from;
  let least = Number.POSITIVE_INFINITY;
  for (let n = 0; n <= count; n++) {
    const one = value(from + n * step);
    if (one < least) [best, least] = [from + n * step, one];
  }
  return goldenSection(value, best - step, best + step, 18);
}

/** Rises of χ² that belong to one, two, two and a half and three standard uncertainties. */
const rises = [1, 4, 6.25, 9];

/**
 * Standard uncertainty from the profile of χ²: the half-width of the region in which χ² rises by n² above its least,
 * divided by n, the largest for n = 1, 2, 2.5 and 3 (W. A. Rolke et al., Nucl. Instrum. Methods A 551 (2005) 493). χ² about
 * a kinked law is no parabola and may have a second hollow behind a small hill, so the whole grid is looked at.
 *
 * @param grid places where the profile is worked out, in rising order
 * @returns null where χ² stays low up to an end of the grid
 */
export function profileUncertainty(
  profile: (x: number) => number,
  best: number,
  least: number,
  grid: readonly number[],
): number | null {
  const values = grid.map(profile);
  const widths = rises.map((rise) => {
    const inside = grid.filter((_, n) => (values[n] as number) <= least + rise);
    if (inside.includes(grid[0] as number) || inside.includes(grid.at(-1) as number)) return null;
    const sides = [-1, 1].map((sign) => {
      const beyond = inside.filter((one) => sign * (one - best) > 0);
      const far = sign < 0 ? (beyond[0] ?? best) : (beyond.at(-1) ?? best);
      const next = sign < 0 ? grid.filter((one) => one < far).at(-1) : grid.find((one) => one > far);
      return Math.abs(crossing(profile, far, next as number, least + rise) - best);
    });
    return Math.max(...sides) / Math.sqrt(rise);
  });
  const known = widths.filter((width) => width !== null);
  return widths[0] === null ? null : Math.max(...known);
}

/** Between a place inside and one outside the region. */
function crossing(profile: (x: number) => number, inside: number, outside: number, level: number): number {
  let [low, high] = [inside, outside];
  for (let step = 0; step < 12; step++) {
    const middle = (low + high) / 2;
    if (profile(middle) <= level) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/** T_N tried about the best one: eight places in each of the gaps between points nearby, fewer further off. */
export function transitionGrid(temperatures: readonly number[], best: number): number[] {
  const last = temperatures.length - 1;
  const at = temperatures.filter((one) => one <= best).length;
  const places: number[] = [];
  for (let n = Math.max(1, at - 12); n <= Math.min(last, at + 12); n++) {
    const [low, high] = [temperatures[n - 1] as number, temperatures[n] as number];
    const count = Math.abs(n - at) < 3 ? 8 : 2;
    for (let step = 0; step < count; step++) places.push(low + ((step + 0.5) / count) * (high - low));
    // χ² may have a cusp just above a point, which is narrow.
    if (Math.abs(n - at) < 6) places.push(low + 0.01 * (high - low));
  }
  places.push(...outwards(best, temperatures[Math.max(0, at - 13)] as number, temperatures[0] as number));
  places.push(...outwards(best, temperatures[Math.min(last, at + 12)] as number, temperatures[last] as number));
  return [...new Set(places)].sort((a, b) => a - b);
}

/** Where points lie close together: ever wider steps from the gaps nearby to an end of the range. */
function outwards(best: number, nearby: number, end: number): number[] {
  const places: number[] = [];
  for (let step = 1.3 * (nearby - best); step !== 0 && Math.abs(step) < Math.abs(end - best); step *= 1.3)
    if (Math.sign(step) === Math.sign(end - best)) places.push(best + step);
  return places;
}

/** β tried about the best one, closer together near it. */
export function betaGrid(best: number): number[] {
  const steps = Array.from({ length: 14 }, (_, n) => 0.002 * 1.6 ** n);
  return [...steps.map((step) => best - step), ...steps.map((step) => best + step)]
    .filter((one) => one > leastBeta && one < mostBeta)
    .concat(leastBeta, mostBeta)
    .sort((a, b) => a - b);
}
