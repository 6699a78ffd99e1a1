import { littleGroupElement, type SmallIrreps, smallIrreps } from "../irreps/index.js";
import { exactComponents, exactWaveVector, formatWaveVector, plainestRepresentative, star } from "../kvectors/index.js";
import {
  conjugatePhased,
  integerDeterminant,
  modulo,
  overCommonDenominator,
  type PhasedNumber,
  type RationalVector,
  rational,
} from "../numbers/index.js";
import {
  composeOperators,
  fromPrimitiveRow,
  invertOperator,
  type SpaceGroup,
  type SymmetryOperator,
  toPrimitiveRow,
} from "../spacegroups/index.js";
import {
  commonOrder,
  constantTurns,
  inverseModulo,
  type ModularField,
  modularField,
  phasedResidue,
  rootModulo,
} from "./modular-field.js";
import { operatorOf } from "./parent-quotient.js";
import type { SiteFrame } from "./site-frames.js";
import type { Stabilizer } from "./stabilizer.js";

/**
 * The irreps of one star of k' with what is needed to count, for any subgroup H of the grey parent, the fields of each
 * irrep that H leaves unchanged: characters of the induced representation arm by arm, and multiplicities on the sites.
 */
export interface Harmonic {
  readonly irreps: SmallIrreps;
  readonly field: ModularField;
  /** Arms as integer rows over `denominator`. */
  readonly rows: readonly (readonly number[])[];
  readonly denominator: number;
  /** Where −k' is not in the star the conjugate irreps double every count. */
  readonly weight: 1 | 2;
  /** Residue of the character of each irrep, per arm, per operator of the group; −1 where it moves the arm. */
  readonly characters: readonly (readonly (readonly number[])[])[];
  /** Copies of each irrep on all sites together. */
  readonly multiplicities: readonly number[];
}

/** Makes harmonics as they are asked for and keeps them: one set of irreps per star. */
export interface HarmonicShelf {
  readonly at: (row: readonly number[], denominator: number) => Harmonic;
}

export function harmonicShelf(group: SpaceGroup, base: SmallIrreps, frames: readonly SiteFrame[]): HarmonicShelf {
  const byRow = new Map<string, Harmonic>();
  const byStar = new Map<string, Harmonic>();
  const own = formatWaveVector(plainestRepresentative(group, base.k));
  return {
    at: (row, denominator) => {
      const key = row.map((entry) => rational(modulo(entry, denominator), denominator).join("/")).join();
      const known = byRow.get(key);
      if (known !== undefined) return known;
      const k = exactWaveVector(
        fromPrimitiveRow(group.lattice, row.map((entry) => rational(entry, denominator)) as unknown as RationalVector),
      );
      const plainest = plainestRepresentative(group, k);
      const name = formatWaveVector(plainest);
      const made = byStar.get(name) ?? harmonic(group, name === own ? base : smallIrreps(group, plainest), frames);
      byStar.set(name, made);
      byRow.set(key, made);
      return made;
    },
  };
}

function harmonic(group: SpaceGroup, irreps: SmallIrreps, frames: readonly SiteFrame[]): Harmonic {
  const arms = star(group, irreps.k);
  const exact = arms.arms.map((arm) => toPrimitiveRow(group.lattice, exactComponents(arm) as RationalVector));
  const { numerators, denominator } = overCommonDenominator(exact.flat());
  const rows = exact.map((_, index) => numerators.slice(3 * index, 3 * index + 3));
  const little = new Set(irreps.littleGroup.operators.map((index) => rotationKey(group, index)));
  const at = (index: number): SymmetryOperator => group.operators[index] as SymmetryOperator;
  // Per arm and operator the place in the little group and the phase of s⁻¹ g s.
  const places = arms.representatives.map((representative) => {
    const carrier = at(representative);
    const back = invertOperator(carrier);
    return group.operators.map((operator) => {
      const inner = composeOperators(back, composeOperators(operator, carrier));
      return little.has(`${inner.rotation.join(" ")}/${inner.rotationDenominator}`)
        ? littleGroupElement(group, irreps, inner)
        : null;
    });
  });
  const orders = new Set<number>([denominator]);
  for (const irrep of irreps.irreps)
    for (const { factor, phase } of irrep.characters) {
      orders.add(factor.order);
      orders.add(constantTurns(phase)[1]);
    }
  for (const list of places) for (const place of list) if (place !== null) orders.add(constantTurns(place.phase)[1]);
  for (const phase of irreps.phases) orders.add(constantTurns(phase)[1]);
  const field = modularField(commonOrder(orders));
  const characters = irreps.irreps.map((irrep) => {
    // The trace of the matrix alone: the character of D without the phase of the printed representative.
    const bare = irrep.characters.map(({ phase, factor }, element) =>
      phasedResidue(field, {
        factor,
        phase: {
          ...phase,
          constant: minus(constantTurns(phase), constantTurns(irreps.phases[element] as typeof phase)),
        },
      }),
    );
    return places.map((list) =>
      list.map((place) =>
        place === null
          ? -1
          : ((bare[place.element] as number) * rootModulo(field, constantTurns(place.phase))) % field.prime,
      ),
    );
  });
  return {
    irreps,
    field,
    rows,
    denominator,
    weight: irreps.minusK === "not in star" ? 2 : 1,
    characters,
    multiplicities: irreps.irreps.map((irrep) =>
      frames.reduce(
        (sum, frame) => sum + multiplicityOn(group, irreps, irrep.characters, frame, field, rows[0] ?? [], denominator),
        0,
      ),
    ),
  };
}

function minus(a: readonly [number, number], b: readonly [number, number]) {
  return rational(a[0] * b[1] - b[0] * a[1], a[1] * b[1]);
}

function rotationKey(group: SpaceGroup, index: number): string {
  const { rotation, rotationDenominator } = group.operators[index] as SymmetryOperator;
  return `${rotation.join(" ")}/${rotationDenominator}`;
}

/** Copies of an irrep in the magnetic representation of a site, by characters. */
function multiplicityOn(
  group: SpaceGroup,
  irreps: SmallIrreps,
  characters: readonly PhasedNumber[],
  frame: SiteFrame,
  field: ModularField,
  row: readonly number[],
  denominator: number,
): number {
  const { prime } = field;
  let sum = 0;
  irreps.littleGroup.operators.forEach((operator, element) => {
    const rotation = group.primitive.rotations[operator] as readonly number[];
    const spur = (rotation[0] as number) + (rotation[4] as number) + (rotation[8] as number);
    const trace = spur * (integerDeterminant(rotation) > 0 ? 1 : -1);
    if (trace === 0) return;
    let fixed = 0;
    frame.images[operator]?.forEach((target, atom) => {
      if (target !== atom) return;
      const turns = dotRow(row, frame.shifts[operator]?.[atom] as readonly number[]);
      fixed = (fixed + rootModulo(field, rational(modulo(turns, denominator), denominator))) % prime;
    });
    if (fixed === 0) return;
    const conjugate = phasedResidue(field, conjugatePhased(characters[element] as PhasedNumber));
    sum = (sum + ((modulo(trace, prime) * fixed) % prime) * conjugate) % prime;
  });
  return (sum * inverseModulo(irreps.littleGroup.operators.length, prime)) % prime;
}

function dotRow(row: readonly number[], column: readonly number[]): number {
  return row.reduce((sum, entry, axis) => sum + entry * (column[axis] as number), 0);
}

/**
 * How many complex dimensions of the induced representation of each irrep the stabilizer leaves fixed:
 * `(1/|H|) Σ θ(h) Σ_arms χ_arm(h)` over cosets of its translations, arms periodic with these only.
 */
export function fixedDimensions(harmonic: Harmonic, stabilizer: Stabilizer): number[] {
  const { field, rows, denominator, characters } = harmonic;
  const { prime } = field;
  const { quotient } = stabilizer;
  const arms = rows.flatMap((row, arm) =>
    stabilizer.lattice.every((vector) => modulo(dotRow(row, vector), denominator) === 0) ? [arm] : [],
  );
  const inverse = inverseModulo(stabilizer.cosets.length, prime);
  const sums = characters.map(() => 0);
  for (const element of stabilizer.cosets) {
    const operator = operatorOf(quotient, element);
    const translation = quotient.translations[element.translation] as readonly number[];
    for (const arm of arms) {
      if (characters[0]?.[arm]?.[operator] === -1) continue;
      const turns = modulo(dotRow(rows[arm] as readonly number[], translation), denominator);
      const root = rootModulo(field, rational(turns, denominator));
      const factor = element.timeReversal === 1 ? root : prime - root;
      characters.forEach((list, irrep) => {
        sums[irrep] = ((sums[irrep] as number) + factor * (list[arm]?.[operator] as number)) % prime;
      });
    }
  }
  return sums.map((sum) => (sum * inverse) % prime);
}

/** One row of every star that has an arm periodic with the lattice of the stabilizer, zero first. */
export function periodicRows(stabilizer: Stabilizer): { rows: readonly (readonly number[])[]; denominator: number } {
  const [p, q, r] = stabilizer.lattice as [readonly number[], readonly number[], readonly number[]];
  const [a, b, c] = [p[0] as number, q[1] as number, r[2] as number];
  const denominator = a * b * c;
  // Rows κ with κ·T integer: the columns of the inverse of the upper triangular basis, over its determinant.
  const steps = [
    [b * c, 0 - c * (p[1] as number), (p[1] as number) * (q[2] as number) - (p[2] as number) * b],
    [0, a * c, 0 - a * (q[2] as number)],
    [0, 0, a * b],
  ];
  const columns = [0, 1, 2].map((column) => steps.map((row) => row[column] as number));
  const found = new Map<string, number[]>([["0,0,0", [0, 0, 0]]]);
  const queue = [[0, 0, 0]];
  for (let next = queue.pop(); next !== undefined; next = queue.pop())
    for (const step of columns) {
      const sum = next.map((entry, axis) => modulo(entry + (step[axis] as number), denominator));
      if (found.has(sum.join())) continue;
      found.set(sum.join(), sum);
      queue.push(sum);
    }
  return { rows: [...found.values()], denominator };
}
