/**
 * The evidence of a k for a powder list, term by term from its definition in docs/methods.md, with every line in the
 * sum: `Σ_i ln[ε + (1 − ε) Σ_l N(Q_i − q_l; s_i)/n(Q_i)]`, ε = 0.1, n(Q) the lines per Å⁻¹ within ±0.6 Å⁻¹ (the window
 * clipped at 0, n at least 0.5).
 */
export function twinLogOdds(
  peaks: readonly { readonly q: number; readonly s: number }[],
  lines: readonly { readonly q: number }[],
): number {
  let total = 0;
  for (const { q, s } of peaks) {
    let sum = 0;
    for (const line of lines) sum += Math.exp(-((q - line.q) ** 2) / (2 * s * s)) / (s * Math.sqrt(2 * Math.PI));
    const from = q > 0.6 ? q - 0.6 : 0;
    const inside = lines.filter((line) => line.q >= from && line.q <= q + 0.6).length;
    const density = Math.max(0.5, inside / (q + 0.6 - from));
    total += Math.log(0.1 + (0.9 * sum) / density);
  }
  return total;
}
