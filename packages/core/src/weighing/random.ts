/** Random numbers in [0, 1) that depend on the seed alone: 32 bits of state, mixed by multiplication and shifts. */
export function seededNumbers(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x9e3779b9) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 16), 0x85ebca6b);
    mixed = Math.imul(mixed ^ (mixed >>> 13), 0xc2b2ae35);
    return ((mixed ^ (mixed >>> 16)) >>> 0) / 4294967296;
  };
}

/** Normally distributed, mean 0 and variance 1 (G. E. P. Box & M. E. Muller, Ann. Math. Statist. 29 (1958) 610). */
export function normalNumbers(uniform: () => number): () => number {
  return () => Math.sqrt(-2 * Math.log(1 - uniform())) * Math.cos(2 * Math.PI * uniform());
}
