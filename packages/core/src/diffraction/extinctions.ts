import { fail } from "../errors/index.js";
import { isHalfLattice, star, type WaveVector } from "../kvectors/index.js";
import type { IrrepModes, Mode, SiteModes } from "../modes/index.js";
import {
  addVectors,
  mapVector,
  type Rational,
  type RationalMatrix,
  type RationalVector,
  rowTimes,
  vectorFrom,
} from "../numbers/index.js";
import { fromPrimitiveRow, rotationOf, type SpaceGroup, type SymmetryOperator } from "../spacegroups/index.js";
import {
  type FormalPosition,
  type FormalVector,
  factorVanishes,
  formalPositions,
  formalWave,
  invariantMetrics,
} from "./formal-factors.js";

/** The modes of one irrep on all sites, ready for exact tests. */
export interface FormalModes {
  readonly label: string;
  readonly sites: readonly {
    readonly modes: readonly Mode[];
    /** As given, and with the free coordinates as letters. */
    readonly positions: readonly FormalPosition[];
    readonly freePositions: readonly FormalPosition[];
  }[];
}

/** What exact tests of one group at one k need. */
export interface ExtinctionFrame {
  readonly group: SpaceGroup;
  readonly k: WaveVector;
  readonly wave: FormalVector;
  readonly metrics: readonly RationalMatrix[];
  /** For each irrep by label. */
  readonly irreps: readonly FormalModes[];
}

/** Throws `invalid-argument` without sites. */
export function extinctionFrame(group: SpaceGroup, sites: readonly SiteModes[]): ExtinctionFrame {
  const [first] = sites;
  if (!first)
    fail("invalid-argument", "extinctions need at least one magnetic site", { expected: "a site", found: "none" });
  const { k, irreps } = first.representations;
  const positions = sites.map((site) => formalPositions(group, site, false));
  const freePositions = sites.map((site) => formalPositions(group, site, true));
  return {
    group,
    k,
    wave: formalWave(k),
    metrics: invariantMetrics(group),
    irreps: irreps.map(({ label }, index) => ({
      label,
      sites: sites.flatMap((site, at) => {
        const { modes } = site.irreps[index] as IrrepModes;
        return modes.length === 0
          ? []
          : [
              {
                modes,
                positions: positions[at] as FormalPosition[],
                freePositions: freePositions[at] as FormalPosition[],
              },
            ];
      }),
    })),
  };
}

/** Whether every mode of the irrep has F⊥ = 0 at Q, at the coordinates given or for all free coordinates. */
export function allVanish(frame: ExtinctionFrame, irrep: FormalModes, q: FormalVector, free: boolean): boolean {
  return irrep.sites.every(({ modes, positions, freePositions }) =>
    modes.every((mode) => factorVanishes(mode.moments, free ? freePositions : positions, q, frame.metrics)),
  );
}

/** H + k as a formal vector, H in a*, b*, c*. */
function satelliteVector({ wave }: Pick<ExtinctionFrame, "wave">, h: RationalVector): FormalVector {
  return { ...wave, constant: addVectors(wave.constant, h) };
}

/** Which satellites vanish for every arrangement of an irrep. */
export interface ExtinctionTest {
  /** Labels of the irreps that occur on the sites, in order. */
  readonly labels: readonly string[];
  /**
   * Labels of the irreps for which H + k vanishes whatever the amplitudes are; exact. With both signs: for which all of
   * the vectors vanish that symmetry and the opposite sign make one line of it.
   *
   * @param h H in a*, b*, c*, integers in a conventional setting
   */
  readonly vector: (h: readonly number[]) => readonly string[];
  /** The same for all vectors of a powder line. */
  readonly line: (h: readonly number[], sign: 1 | -1 | 0) => readonly string[];
}

/**
 * Extinctions of the irreps on some sites at one k, decided exactly from the mode vectors at the coordinates given: sums of
 * roots of unity with the letters of k kept. Irreps that occur on no site are left out.
 */
export function extinctionTest(group: SpaceGroup, sites: readonly SiteModes[]): ExtinctionTest {
  const frame = extinctionFrame(group, sites);
  const present = frame.irreps.filter((irrep) => irrep.sites.length > 0);
  const known = new Map<string, boolean>();
  const vanishes = (irrep: FormalModes, h: RationalVector): boolean => {
    const key = `${irrep.label}|${h.join()}`;
    const found = known.get(key) ?? allVanish(frame, irrep, satelliteVector(frame, h), false);
    known.set(key, found);
    return found;
  };
  const others = oppositeMaps(group, frame.k);
  return {
    labels: present.map(({ label }) => label),
    vector: (h) => {
      const exact = exactVector(group, h);
      return present.filter((irrep) => vanishes(irrep, exact)).map(({ label }) => label);
    },
    line: (h, sign) => {
      const exact = exactVector(group, h);
      // −(H − k) = −H + k is the vector at +k of the same line.
      const plus = sign === -1 ? mapVector(exact, ([top, bottom]): Rational => [0 - top, bottom]) : exact;
      const members = [plus, ...others.map((map) => map(plus))];
      return present.filter((irrep) => members.every((one) => vanishes(irrep, one))).map(({ label }) => label);
    },
  };
}

/** H → H' where H' + k = −(H + k) R for an R with k R ≡ −k (the first): the one other class of vectors of a line. */
function oppositeMaps(group: SpaceGroup, k: WaveVector): ((h: RationalVector) => RationalVector)[] {
  const base = formalWave(k).constant;
  const { reversing } = star(group, k);
  const [first] = isHalfLattice(group, k) ? [0] : reversing;
  if (first === undefined) return [];
  const rotation = rotationOf(group.operators[first] as SymmetryOperator);
  return [
    (h) => {
      const image = rowTimes(addVectors(h, base), rotation);
      return mapVector(addVectors(image, base), ([top, bottom]): Rational => [0 - top, bottom]);
    },
  ];
}

/** A vector of L* from numbers, exact. Throws `invalid-argument` when it is none. */
function exactVector(group: SpaceGroup, h: readonly number[]): RationalVector {
  const { vectors, denominator } = group.lattice;
  const eta = vectors.map((vector) => {
    const value = vector.reduce((sum, entry, axis) => sum + entry * (h[axis] as number), 0) / denominator;
    const whole = Math.round(value);
    if (Math.abs(value - whole) > 1e-6)
      fail("invalid-argument", `(${h.join(" ")}) is no vector of the reciprocal lattice`, {
        expected: "H with H·T integer for every lattice translation T",
        found: h.join(" "),
      });
    return whole;
  });
  return fromPrimitiveRow(group.lattice, vectorFrom(eta));
}
