import { fail } from "../errors/index.js";

/** A list longer than this helps nobody and would fill the memory; it is refused, not cut. */
const mostVectors = 5_000_000;

/** Relative. The ball is this much larger than asked, so that rounding loses no vector on its surface. */
const surfaceSlack = 1e-9;

/** Gets the integers n of a vector n + shift and the vector's squared length. */
export type BallVisitor = (n1: number, n2: number, n3: number, square: number) => void;

/**
 * Visits all `n + shift`, n ∈ Z³, with `|n + shift|² ≤ squareMax` in the metric: exactly the vectors of the ball, found
 * by completing squares, so that the bounds of each loop follow from the metric and none is missed or tried in vain,
 * however skew the basis (U. Fincke & M. Pohst, Math. Comp. 44 (1985) 463).
 *
 * @param metric symmetric positive definite, nine numbers row by row
 * Throws `invalid-argument` when the ball holds more than five million.
 */
export function visitBall(
  metric: readonly number[],
  shift: readonly number[],
  squareMax: number,
  visit: BallVisitor,
): void {
  const [g11, g12, g13, , g22, g23, , , g33] = metric as [
    number,
    number,
    number,
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  const [shift1, shift2, shift3] = shift as [number, number, number];
  // |x|² = g11 (x₁ + …)² + s22 (x₂ + …)² + t33 x₃²
  const s22 = g22 - (g12 * g12) / g11;
  const s23 = g23 - (g12 * g13) / g11;
  const t33 = g33 - (g13 * g13) / g11 - (s23 * s23) / s22;
  const limit = squareMax * (1 + surfaceSlack);
  refuseTooMany(limit, g11 * s22 * t33);
  const reach3 = Math.sqrt(limit / t33);
  for (let n3 = Math.ceil(-reach3 - shift3); n3 <= reach3 - shift3; n3++) {
    const x3 = n3 + shift3;
    const square3 = t33 * x3 * x3;
    const centre2 = shift2 + (s23 / s22) * x3;
    const reach2 = Math.sqrt(Math.max(0, limit - square3) / s22);
    for (let n2 = Math.ceil(-reach2 - centre2); n2 <= reach2 - centre2; n2++) {
      const square23 = square3 + s22 * (n2 + centre2) * (n2 + centre2);
      const centre1 = shift1 + (g12 * (n2 + shift2) + g13 * x3) / g11;
      const reach1 = Math.sqrt(Math.max(0, limit - square23) / g11);
      for (let n1 = Math.ceil(-reach1 - centre1); n1 <= reach1 - centre1; n1++)
        visit(n1, n2, n3, square23 + g11 * (n1 + centre1) * (n1 + centre1));
    }
  }
}

/** The volume of the ball over that of a cell is the number of vectors to expect. */
function refuseTooMany(squareMax: number, metricDeterminant: number): void {
  const expected = ((4 * Math.PI) / 3) * Math.sqrt(squareMax ** 3 / metricDeterminant);
  if (!(expected <= mostVectors))
    fail("invalid-argument", `the list of reflections would hold about ${expected.toExponential(1)} vectors`, {
      expected: `at most ${mostVectors} vectors within the limit of Q`,
      found: `about ${expected.toExponential(1)}`,
      remedy: "lower the limit of Q, or check the units of the cell (Å) and of Q (Å⁻¹)",
    });
}
