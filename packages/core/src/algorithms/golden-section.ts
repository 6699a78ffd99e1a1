/** Share of an interval that each step keeps. */
const share = (Math.sqrt(5) - 1) / 2;

/**
 * Where a function that falls and then rises is lowest between two numbers, by golden sections (W. H. Press et al.,
 * Numerical Recipes, section 10.2): each step keeps 0.618 of the interval.
 */
export function goldenSection(value: (x: number) => number, from: number, to: number, steps = 80): number {
  let [low, high] = [from, to];
  let [a, b] = [high - share * (high - low), low + share * (high - low)];
  let [fa, fb] = [value(a), value(b)];
  for (let step = 0; step < steps; step++) {
    if (fa <= fb) {
      [high, b, fb] = [b, a, fa];
      a = high - share * (high - low);
      fa = value(a);
    } else {
      [low, a, fa] = [a, b, fb];
      b = low + share * (high - low);
      fb = value(b);
    }
  }
  return fa <= fb ? a : b;
}
