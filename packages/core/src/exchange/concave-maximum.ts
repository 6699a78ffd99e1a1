/** Value and slope of a concave function at a place; at a kink the slope of one of its sides. */
export interface ConcaveValue {
  readonly value: number;
  readonly slope: number;
}

interface Side extends ConcaveValue {
  readonly x: number;
}

const mostWidenings = 40;
const mostRounds = 80;
/** Of the first step: places nearer than this are one. */
const rounding = 1e-15;

/**
 * Where a concave function with kinks is largest. Two places with slopes of opposite sign hold the maximum between them;
 * the next place is in turn where their tangents meet, which ends at once at a kink (J. E. Kelley, J. Soc. Ind. Appl.
 * Math. 8 (1960) 703), and where the slope would vanish if it were straight, which ends soon at a smooth maximum.
 *
 * @param enough a slope below this is none
 */
export function concaveMaximum(at: (x: number) => ConcaveValue, start: number, step: number, enough: number): number {
  const side = (x: number): Side => ({ x, ...at(x) });
  const first = side(start);
  if (Math.abs(first.slope) <= enough) return start;
  let [low, high] = bracket(side, first, step);
  for (let round = 0; round < mostRounds; round++) {
    const gap = high.x - low.x;
    if (!(gap > rounding * step)) break;
    const meeting = low.x + (high.value - low.value - high.slope * gap) / (low.slope - high.slope);
    const straight = low.x + (low.slope * gap) / (low.slope - high.slope);
    // Every third place is the middle: neither of the others can stall for long.
    const wished = [meeting, straight, (low.x + high.x) / 2][round % 3] as number;
    const next = wished > low.x && wished < high.x ? wished : (low.x + high.x) / 2;
    if (next <= low.x || next >= high.x) break;
    const here = side(next);
    if (Math.abs(here.slope) <= enough) return next;
    if (here.slope > 0) low = here;
    else high = here;
  }
  return low.value >= high.value ? low.x : high.x;
}

/** Goes on in the direction in which the function rises until it falls. */
function bracket(side: (x: number) => Side, first: Side, step: number): readonly [Side, Side] {
  let last = first;
  for (let widening = 0, reach = step; widening < mostWidenings; widening++, reach *= 2) {
    const next = side(last.x + Math.sign(first.slope) * reach);
    if (next.slope * first.slope <= 0) return first.slope > 0 ? [last, next] : [next, last];
    last = next;
  }
  return [last, last];
}
