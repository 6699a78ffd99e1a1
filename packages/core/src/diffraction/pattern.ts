import { fail } from "../errors/index.js";
import { roundNumber } from "../numbers/index.js";
import { qToTwoThetaDeg } from "../reflections/index.js";
import { type DiffractionGeometry, displacementFactor, lorentzFactor } from "./lorentz.js";

/** A line with Σ|F|² over its vectors. */
export interface PatternLine {
  readonly q: number;
  readonly square: number;
}

/** Lines of one observed peak: those that lie nearer to each other than the resolution. */
export interface LineCluster {
  /** Indices of the lines, in order of Q. */
  readonly lines: readonly number[];
  readonly qMin: number;
  readonly qMax: number;
}

/**
 * Lines (in order of Q) that the instrument does not separate: neighbours at most `resolution` Å⁻¹ apart are one peak, and
 * so on along the chain.
 */
export function clusterLines(q: readonly number[], resolution: number): readonly LineCluster[] {
  const clusters: { lines: number[]; qMin: number; qMax: number }[] = [];
  q.forEach((value, index) => {
    const last = clusters.at(-1);
    if (last && value - last.qMax <= resolution) {
      last.lines.push(index);
      last.qMax = value;
    } else clusters.push({ lines: [index], qMin: value, qMax: value });
  });
  return clusters;
}

/** Integrated intensity of a line, arbitrary scale: Σ|F|² × Lorentz factor × displacement factor. */
export function integratedIntensity(
  { q, square }: PatternLine,
  geometry: DiffractionGeometry,
  displacement = 0,
): number {
  return square * lorentzFactor(geometry, q) * displacementFactor(displacement, q);
}

/** Range, step and width of a simulated pattern, degrees 2θ, and the wavelength in Å. */
export interface PatternOptions {
  readonly wavelengthAngstrom: number;
  readonly fromDeg: number;
  readonly toDeg: number;
  readonly stepDeg: number;
  /** Full width at half maximum in degrees 2θ. */
  readonly widthDeg: number;
  /** Overall B in Å². */
  readonly displacement?: number;
}

/** A powder pattern: equal steps of 2θ from `fromDeg` on. */
export interface SimulatedPattern {
  readonly fromDeg: number;
  readonly stepDeg: number;
  readonly intensities: readonly number[];
}

const mostPoints = 100_000;

/**
 * A pattern at constant wavelength for looking at, not for refinement: every line is a Gaussian of one width whose area
 * (over degrees) is its integrated intensity. Throws `invalid-argument` for an impossible range or width.
 */
export function simulatedPattern(lines: readonly PatternLine[], options: PatternOptions): SimulatedPattern {
  const { wavelengthAngstrom, fromDeg, toDeg, stepDeg, widthDeg, displacement = 0 } = options;
  const points = Math.floor((toDeg - fromDeg) / stepDeg + 1e-9) + 1;
  if (!(stepDeg > 0 && widthDeg > 0 && toDeg > fromDeg && fromDeg >= 0 && toDeg < 180 && points <= mostPoints))
    fail("invalid-argument", "the range of the pattern is impossible", {
      expected: `0 ≤ from < to < 180 degrees, step and width above 0, at most ${mostPoints} points`,
      found: `from ${fromDeg} to ${toDeg} in steps of ${stepDeg}, width ${widthDeg}`,
    });
  const intensities = new Float64Array(points);
  const sigma = widthDeg / Math.sqrt(8 * Math.LN2);
  for (const line of lines) {
    const centre = qToTwoThetaDeg(line.q, wavelengthAngstrom);
    if (centre === null) continue;
    const area = integratedIntensity(line, { kind: "powder", wavelengthAngstrom }, displacement);
    const first = Math.max(0, Math.ceil((centre - 6 * sigma - fromDeg) / stepDeg));
    const last = Math.min(points - 1, Math.floor((centre + 6 * sigma - fromDeg) / stepDeg));
    for (let point = first; point <= last; point++) {
      const away = (fromDeg + point * stepDeg - centre) / sigma;
      const height = Math.exp((-away * away) / 2) / (sigma * Math.sqrt(2 * Math.PI));
      intensities[point] = (intensities[point] as number) + area * height;
    }
  }
  const scale = intensities.reduce((largest, value) => Math.max(largest, value), 0);
  return { fromDeg, stepDeg, intensities: Array.from(intensities, (value) => roundNumber(value, scale)) };
}
