import type { ConventionRecord } from "../records/modes.js";

/** `exp(−2πi k·T)`, `½ exp(+2πi k·(T+r))`: what a Fourier component is multiplied with, in the head of every table. */
export function waveText({ exponent, phase, factor }: ConventionRecord): string {
  const sign = exponent === "minus" ? "−" : "+";
  return `${factor === "half" ? "½ " : ""}exp(${sign}2πi k·${phase === "lattice" ? "T" : "(T+r)"})`;
}

/** The axes of numbers: `along a, b, c`. */
export function axesText(components: ConventionRecord["components"]): string {
  if (components === "lattice") return "along a, b, c";
  if (components === "crystal") return "along the unit vectors of a, b, c";
  return "along x ∥ a, y, z ∥ c*";
}

/** What a Fourier component means, in a sentence; once a report. */
export function conventionSentence(convention: ConventionRecord): string {
  const { exponent, phase, factor, components } = convention;
  const sign = exponent === "minus" ? "−" : "+";
  const wave = `S_j exp(${sign}2πi k·${phase === "lattice" ? "T" : "(T + r_j)"})`;
  const sum = factor === "one" ? `M_j(T) = ${wave} + c.c., without a factor 1/2` : `M_j(T) = ½ [${wave} + c.c.]`;
  const half = phase === "lattice" ? "S_j real and without c.c." : "without c.c.";
  const alone = `(${half}${factor === "half" ? " and ½" : ""} where 2k is a reciprocal lattice vector)`;
  const runs =
    phase === "lattice"
      ? "phases run with lattice translations T only"
      : "phases run with the position T + r_j of the atom";
  return `${sum} ${alone}; ${runs}; components ${axesText(components)}.`;
}
