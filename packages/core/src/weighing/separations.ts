import {
  basisFactors,
  cartesianQ,
  chiralityAlong,
  type LineMembers,
  lineMembers,
  type MomentSpace,
  matchWave,
  type PreparedSpace,
  prepareSpace,
  rotationNumbers,
  rowTimesNumbers,
  scatteringGeometry,
  type Triple,
} from "../diffraction/index.js";
import { star } from "../kvectors/index.js";
import { clearDifferenceShare, integerDeterminant, roundNumber } from "../numbers/index.js";
import { type SatelliteLine, satelliteLines } from "../reflections/index.js";
import type { DataFrame } from "./fit-forms.js";
import type { WeighSeparation } from "./types.js";

/** An arrangement whose sizes are fitted. */
export interface FittedArrangement {
  readonly id: string;
  readonly space: MomentSpace;
  readonly amplitudes: ArrayLike<number>;
}

/** Lines and vectors that are looked at. */
const mostLines = 80;
const mostVectors = 400;

/** |F⊥|² and chiral term at every vector of the first lines. */
interface Pattern {
  /** By line: Σ|F⊥|². */
  readonly powder: readonly number[];
  readonly at: (q: Triple) => { readonly square: number; readonly chirality: number };
}

/** Compares arrangements; what is worked out for one serves for all its comparisons. */
export interface Separator {
  /** What would tell two apart. */
  readonly separate: (one: FittedArrangement, other: FittedArrangement) => WeighSeparation;
  /** Whether no powder line tells them apart; true for a crystal, of which all that can be compared was measured. */
  readonly samePowder: (one: FittedArrangement, other: FittedArrangement) => boolean;
}

/**
 * The measurement that would tell two arrangements apart whose fits are equally good: a powder line that was not measured,
 * a crystal of one domain, polarised neutrons; in this order. Domains of the second are turned as suits it best.
 */
export function separator(frame: DataFrame, qMax: number): Separator {
  const { group, cell, k } = frame;
  const lines = satelliteLines(group, cell, k, { qMax }).slice(0, mostLines);
  const members = lineMembers(group, k);
  const vectors = vectorsOf(frame, members, lines);
  const patterns = new Map<string, Pattern>();
  const patternFor = (arrangement: FittedArrangement): Pattern => {
    const known = patterns.get(arrangement.id) ?? patternOf(frame, arrangement, lines, members);
    patterns.set(arrangement.id, known);
    return known;
  };
  const powderDifference = (one: FittedArrangement, other: FittedArrangement) => {
    const [a, b] = [patternFor(one).powder, patternFor(other).powder];
    return frame.data.sample === "powder" ? largestDifference(a, b, strongestOf(a, b)) : null;
  };
  const separate = (one: FittedArrangement, other: FittedArrangement): WeighSeparation => {
    const [a, b] = [patternFor(one), patternFor(other)];
    const names = [one.id, other.id] as const;
    const found = powderDifference(one, other);
    const line = found && lines[found.index];
    if (found && line) {
      const q = vectorOf(line, members.of(line.h, line.sign));
      return told(names, "powder line", q, line.q, found.values, frame);
    }
    const crystal = bestOverDomains(frame, a, b, vectors, "square");
    if (crystal) return told(names, "single crystal", crystal.q, null, crystal.values, frame);
    const chiral = bestOverDomains(frame, a, b, vectors, "chirality");
    if (chiral) return told(names, "polarised neutrons", chiral.q, null, chiral.values, frame);
    return {
      from: other.id,
      by: "not by diffraction",
      hkl: null,
      q: null,
      values: null,
      text: `${one.id} and ${other.id} give the same intensities up to domains and handedness: a field, stress or another probe is needed`,
    };
  };
  return { separate, samePowder: (one, other) => powderDifference(one, other) === null };
}

/** The vectors of the first lines on every arm, a set that the group maps onto itself. */
function vectorsOf({ group, k }: DataFrame, members: LineMembers, lines: readonly SatelliteLine[]): readonly Triple[] {
  const { representatives } = star(group, k);
  const found = new Map<string, Triple>();
  for (const line of lines) {
    if (found.size >= mostVectors) break;
    const own = members.of(line.h, line.sign);
    for (const operator of representatives)
      for (const q of members.onArm(own, { k, halfLattice: members.halfLattice, operator })) found.set(keyOf(q), q);
  }
  return [...found.values()];
}

function keyOf(q: Triple): string {
  return `${Math.round(1e4 * q[0])},${Math.round(1e4 * q[1])},${Math.round(1e4 * q[2])}`;
}

function vectorOf(line: SatelliteLine, members: readonly Triple[]): Triple {
  const [first] = members;
  if (!first) return line.h;
  return line.sign === -1 ? [0 - first[0], 0 - first[1], 0 - first[2]] : first;
}

function told(
  names: readonly [string, string],
  by: WeighSeparation["by"],
  q: Triple,
  length: number | null,
  values: readonly [number, number],
  frame: DataFrame,
): WeighSeparation {
  const size = length ?? Math.hypot(...cartesianQ(scatteringGeometry(frame.group, frame.cell), q));
  const hkl = q.map((entry) => roundNumber(entry, 1, 6)) as unknown as Triple;
  const numbers = values.map((value) => roundNumber(value, 1, 3)) as [number, number];
  const what = {
    "powder line": "the powder line",
    "single crystal": "in a crystal of one domain the reflection",
    "polarised neutrons": "in a crystal of one domain the part that depends on the polarization of the beam at",
    "not by diffraction": "",
  }[by];
  const [own, from] = names;
  return {
    from,
    by,
    hkl,
    q: roundNumber(size),
    values: numbers,
    text: `${what} (${hkl.join(" ")}), Q = ${size.toFixed(3)} Å⁻¹, tells them apart: ${numbers[0]} (${own}) against ${numbers[1]} (${from}) of the strongest |F⊥|²`,
  };
}

function patternOf(
  frame: DataFrame,
  { space, amplitudes }: FittedArrangement,
  lines: readonly SatelliteLine[],
  members: LineMembers,
): Pattern {
  const prepared = prepareSpace(scatteringGeometry(frame.group, frame.cell), space);
  const known = new Map<string, ReturnType<Pattern["at"]>>();
  const at = (q: Triple): ReturnType<Pattern["at"]> => {
    const key = keyOf(q);
    const before = known.get(key);
    if (before) return before;
    const found = matchWave(frame.group, prepared, q);
    const value =
      found === null ? { square: 0, chirality: 0 } : squareAndChirality(prepared, found.wave, found.q, amplitudes);
    known.set(key, value);
    return value;
  };
  const powder = lines.map((line) => {
    const own = members.of(line.h, line.sign);
    let sum = 0;
    space.waves.forEach((wave, index) => {
      for (const q of members.onArm(own, wave)) sum += squareAndChirality(prepared, index, q, amplitudes).square;
    });
    return sum * (members.halfLattice ? 1 : 2);
  });
  return { powder, at };
}

function squareAndChirality(
  prepared: PreparedSpace,
  wave: number,
  q: Triple,
  amplitudes: ArrayLike<number>,
): { square: number; chirality: number } {
  const factors = basisFactors(prepared, wave, q);
  const sum = [0, 0, 0, 0, 0, 0];
  for (let index = 0; index < prepared.size; index++)
    for (let part = 0; part < 6; part++)
      sum[part] = (sum[part] as number) + (amplitudes[index] as number) * (factors[6 * index + part] as number);
  const [x, y, z, u, v, w] = sum as [number, number, number, number, number, number];
  const cartesian = cartesianQ(prepared.geometry, q);
  const length = Math.hypot(...cartesian) || 1;
  return {
    square: x * x + y * y + z * z + u * u + v * v + w * w,
    chirality: chiralityAlong([x, y, z], [u, v, w], cartesian) / length,
  };
}

function strongestOf(a: readonly number[], b: readonly number[]): number {
  return Math.max(...a.map(Math.abs), ...b.map(Math.abs));
}

/**
 * Share by which one difference must be larger than another. Equivalent vectors differ by rounding alone, and the last
 * digits are not the same in every engine: of them the first is taken.
 */
const larger = 1 + 1e-9;

/** Where two lists differ most, if by a clear share of the strongest intensity. */
function largestDifference(
  a: readonly number[],
  b: readonly number[],
  scale: number,
): { readonly index: number; readonly values: readonly [number, number] } | null {
  if (!(scale > 0)) return null;
  let best = -1;
  let most = clearDifferenceShare;
  a.forEach((value, index) => {
    const share = Math.abs(value - (b[index] as number)) / scale;
    if (share > larger * most) [best, most] = [index, share];
  });
  return best < 0 ? null : { index: best, values: [(a[best] as number) / scale, (b[best] as number) / scale] };
}

function bestOverDomains(
  { group }: DataFrame,
  a: Pattern,
  b: Pattern,
  vectors: readonly Triple[],
  part: "square" | "chirality",
): { readonly q: Triple; readonly values: readonly [number, number] } | null {
  const own = vectors.map((q) => a.at(q)[part]);
  // Of the intensities, for the chiral part too: rounding errors of one that is zero are no difference.
  const scale = strongestOf(
    vectors.map((q) => a.at(q).square),
    vectors.map((q) => b.at(q).square),
  );
  let result: { readonly q: Triple; readonly values: readonly [number, number] } | null = null;
  let least = Number.POSITIVE_INFINITY;
  for (const [index, operator] of group.operators.entries()) {
    const rotation = rotationNumbers(operator);
    // An improper operator turns the sign of the chiral term.
    const hand = part === "chirality" ? integerDeterminant(group.primitive.rotations[index] as readonly number[]) : 1;
    const found = largestDifference(
      own,
      vectors.map((q) => hand * b.at(rowTimesNumbers(q, rotation))[part]),
      scale,
    );
    if (!found) return null;
    const share = Math.abs(found.values[0] - found.values[1]);
    if (larger * share < least) {
      least = share;
      result = { q: vectors[found.index] as Triple, values: found.values };
    }
  }
  return result;
}
