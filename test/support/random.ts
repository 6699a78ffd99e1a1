/** Seeded random numbers, so that every sample of the sweeps can be made again. */
export interface Random {
  /** In [0, 1). */
  readonly next: () => number;
  /** An integer in [0, bound). */
  readonly below: (bound: number) => number;
  readonly pick: <T>(items: readonly T[]) => T;
}

/** The generator `mulberry32`: 32 bits of state, plenty for choosing test cases. */
export function seeded(seed: number): Random {
  let state = seed >>> 0;
  const next = (): number => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296;
  };
  const below = (bound: number): number => Math.floor(next() * bound);
  return { next, below, pick: (items) => items[below(items.length)] as (typeof items)[number] };
}
