/**
 * Satellite and nuclear positions the slow way: every h k l of a box that is certainly large enough, Cartesian
 * reciprocal axes, no symmetry and no reduced bases. Written from docs/conventions.md, independent of core.
 */

export interface TwinCell {
  readonly a: number;
  readonly b: number;
  readonly c: number;
  readonly alpha: number;
  readonly beta: number;
  readonly gamma: number;
}

type Vector = readonly [number, number, number];

/** Cartesian a*, b*, c* with 2π, by cross products of Cartesian a, b, c. */
export function reciprocalAxes(cell: TwinCell): readonly [Vector, Vector, Vector] {
  const [alpha, beta, gamma] = [cell.alpha, cell.beta, cell.gamma].map((angle) => (angle * Math.PI) / 180) as [
    number,
    number,
    number,
  ];
  const a: Vector = [cell.a, 0, 0];
  const b: Vector = [cell.b * Math.cos(gamma), cell.b * Math.sin(gamma), 0];
  const cx = Math.cos(beta);
  const cy = (Math.cos(alpha) - Math.cos(beta) * Math.cos(gamma)) / Math.sin(gamma);
  const c: Vector = [cell.c * cx, cell.c * cy, cell.c * Math.sqrt(1 - cx * cx - cy * cy)];
  const volume = dot(a, cross(b, c));
  const scaled = (v: Vector): Vector =>
    [0, 1, 2].map((i) => (2 * Math.PI * (v[i] as number)) / volume) as unknown as Vector;
  return [scaled(cross(b, c)), scaled(cross(c, a)), scaled(cross(a, b))];
}

export function lengthOf(axes: readonly [Vector, Vector, Vector], hkl: readonly number[]): number {
  const [h, k, l] = hkl as [number, number, number];
  return Math.hypot(
    ...[0, 1, 2].map((i) => h * (axes[0][i] as number) + k * (axes[1][i] as number) + l * (axes[2][i] as number)),
  );
}

/** One distinct position with the number of vectors that lie there. */
export interface TwinLine {
  readonly q: number;
  count: number;
}

/**
 * All vectors H + s·k of a cell whose centring translations are `centring` (0 0 0 may be left out), for every k of
 * `arms`, with both signs; each vector once. Gathered by |Q| within 1e-7 Å⁻¹, Q = 0 left out.
 */
export function twinLines(
  cell: TwinCell,
  centring: readonly Vector[],
  arms: readonly Vector[],
  qMax: number,
): TwinLine[] {
  const axes = reciprocalAxes(cell);
  const lengths = [cell.a, cell.b, cell.c];
  const vectors = new Map<string, number>();
  for (const arm of arms) {
    for (const sign of [1, -1]) {
      const k = arm.map((entry) => sign * entry) as unknown as Vector;
      // |h_i + k_i| = |Q·a_i|/2π ≤ Q|a_i|/2π, rounded up generously.
      const reach = lengths.map(
        (length, i) => Math.ceil((qMax * length) / (2 * Math.PI) + Math.abs(k[i] as number)) + 1,
      );
      const [m, n, o] = reach as [number, number, number];
      for (let h = -m; h <= m; h++)
        for (let i = -n; i <= n; i++)
          for (let l = -o; l <= o; l++) {
            if (!centring.every((t) => isWhole(h * t[0] + i * t[1] + l * t[2]))) continue;
            const vector = [h + k[0], i + k[1], l + k[2]];
            const q = lengthOf(axes, vector);
            if (q > qMax + 1e-9 || q < 1e-7) continue;
            vectors.set(vector.map((entry) => Math.round(entry * 1e7)).join(), q);
          }
    }
  }
  const lines: TwinLine[] = [];
  for (const q of [...vectors.values()].sort((x, y) => x - y)) {
    const last = lines.at(-1);
    if (last && q - last.q < 1e-7) last.count += 1;
    else lines.push({ q, count: 1 });
  }
  return lines;
}

function isWhole(value: number): boolean {
  return Math.abs(value - Math.round(value)) < 1e-9;
}

function cross(a: Vector, b: Vector): Vector {
  return [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]];
}

function dot(a: Vector, b: Vector): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
}
