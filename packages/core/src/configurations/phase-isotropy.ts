import { breathe, type WorkHost } from "../algorithms/index.js";
import { conjugateCyclotomic, lcm } from "../numbers/index.js";
import { commonOrder, inverseModulo, type ModularField, modularField, residue } from "./modular-field.js";
import type { PhaseElement } from "./phase-action.js";
import {
  fixedPart,
  fixesSubspace,
  identityResidues,
  isInside,
  mapSubspace,
  multiplyResidues,
  type ResidueMatrix,
  type Subspace,
  subspaceKey,
  wholeSpace,
} from "./subspaces.js";

/** An operator with the phase shift that makes it leave the order parameter unchanged: `e^{2πi·step/steps} U ξ = ξ`. */
export interface ShiftedElement {
  /** Place among the elements of the action. */
  readonly element: number;
  readonly step: number;
}

/** A class of stabilizers up to a phase. */
export interface PhaseClass {
  /** Real coordinates (Re, Im) of the fixed space. */
  readonly space: Subspace;
  readonly orbit: readonly Subspace[];
  readonly members: readonly ShiftedElement[];
  /** True where a single order parameter in `space` has more symmetry and only two or more with free phases have this. */
  readonly needsSecond: boolean;
}

export interface PhaseClasses {
  readonly classes: readonly PhaseClass[];
  /** Phase shifts are multiples of 1/steps of a turn. */
  readonly steps: number;
  readonly field: ModularField;
  /** Real matrices of the elements without phase shift. */
  readonly matrices: readonly ResidueMatrix[];
  readonly bounded: string | null;
}

/**
 * All stabilizers when a phase shift of the wave is free. The image is not finite, but the shifts that occur are: those
 * with which operators with ε = +1 have eigenvectors, and for ε = −1 differences of such, after the wave as a whole is
 * shifted so that one of them has none. So the finite group with the shifts `1/steps` adjoined has all classes
 * (Perez-Mato, Ribeiro, Petricek & Aroyo, J. Phys.: Condens. Matter 24 (2012) 163201, section 3).
 */
export async function phaseClasses(
  size: number,
  elements: readonly PhaseElement[],
  limit: number,
  host: WorkHost,
): Promise<PhaseClasses> {
  const first = modularField(orderOf(elements));
  const steps = stepsOf(
    elements.map((element) => realMatrix(element, size, first)),
    elements,
    2 * size,
    first,
  );
  const field = modularField(commonOrder([first.order, 2 * steps]));
  const { prime } = field;
  const matrices = elements.map((element) => realMatrix(element, size, field));
  const turned = (turns: number): ResidueMatrix => rotation(size, turns, field);
  const phases = Array.from({ length: steps }, (_, step) => turned(step / steps));
  const shifted = matrices.map((matrix) => phases.map((phase) => multiplyResidues(phase, matrix, 2 * size, prime)));
  // Half a step turns a class into others of the same order parameter with the wave shifted.
  const generators = [...matrices, turned(1 / (2 * steps))];
  const seen = new Set<string>();
  const classes: { space: Subspace; orbit: Subspace[] }[] = [];
  let bounded: string | null = null;
  const take = (space: Subspace): void => {
    if (seen.has(subspaceKey(space))) return;
    const orbit = orbitOf(space, generators, prime);
    for (const member of orbit) seen.add(subspaceKey(member));
    classes.push({ space: plainest(orbit, prime), orbit });
  };
  take(wholeSpace(2 * size));
  for (let next = 0; next < classes.length && bounded === null; next++) {
    const { space } = classes[next] as { space: Subspace };
    for (const list of shifted)
      for (const matrix of list) {
        await breathe(host);
        const part = fixedPart(space, matrix, 1, prime);
        if (part.rows === 0 || part.rows === space.rows) continue;
        take(part);
        if (seen.size > limit)
          bounded ??= `more than ${limit} directions of the order parameter came up; the list is not complete`;
      }
  }
  return {
    steps,
    field,
    matrices,
    bounded,
    classes: classes.map(({ space, orbit }) => {
      const members = shifted.flatMap((list, element) =>
        list.flatMap((matrix, step) => (fixesSubspace(space, matrix, 1, prime) ? [{ element, step }] : [])),
      );
      return { space, orbit, members, needsSecond: isLockedAlone(space, members, elements, matrices, prime) };
    }),
  };
}

/** One complex direction that an operator with ε = −1 maps on itself: each single vector of it is fixed with some phase. */
function isLockedAlone(
  space: Subspace,
  members: readonly ShiftedElement[],
  elements: readonly PhaseElement[],
  matrices: readonly ResidueMatrix[],
  prime: number,
): boolean {
  if (space.rows !== 2 || members.some(({ element }) => elements[element]?.epsilon === -1)) return false;
  return elements.some(
    ({ epsilon }, index) =>
      epsilon === -1 && isInside(mapSubspace(space, matrices[index] as ResidueMatrix, prime), space, prime),
  );
}

function orderOf(elements: readonly PhaseElement[]): number {
  const orders = new Set<number>();
  for (const { matrix } of elements) for (const row of matrix) for (const entry of row) orders.add(entry.order);
  return commonOrder(orders);
}

/** Coordinates (Re, Im): `U` becomes blocks (Re, −Im; Im, Re), a conjugation before it changes the sign of every Im. */
function realMatrix({ matrix, epsilon }: PhaseElement, size: number, field: ModularField): ResidueMatrix {
  const { prime, roots, order } = field;
  const half = inverseModulo(2, prime);
  const halfOverI = (half * (roots[(3 * order) / 4] as number)) % prime;
  const result = new Float64Array(4 * size * size);
  matrix.forEach((row, r) => {
    row.forEach((entry, c) => {
      const value = residue(field, entry);
      const other = residue(field, conjugateCyclotomic(entry));
      const re = (((value + other) % prime) * half) % prime;
      const im = (((value + prime - other) % prime) * halfOverI) % prime;
      const minusIm = im === 0 ? 0 : prime - im;
      const minusRe = re === 0 ? 0 : prime - re;
      result[2 * r * 2 * size + 2 * c] = re;
      result[2 * r * 2 * size + 2 * c + 1] = epsilon === 1 ? minusIm : im;
      result[(2 * r + 1) * 2 * size + 2 * c] = im;
      result[(2 * r + 1) * 2 * size + 2 * c + 1] = epsilon === 1 ? re : minusRe;
    });
  });
  return result;
}

function rotation(size: number, turns: number, field: ModularField): ResidueMatrix {
  const { prime, roots, order } = field;
  const exponent = Math.round(turns * order);
  const [value, other] = [roots[exponent % order] as number, roots[(order - exponent) % order] as number];
  const half = inverseModulo(2, prime);
  const re = (((value + other) % prime) * half) % prime;
  const im = (((value + prime - other) % prime) * ((half * (roots[(3 * order) / 4] as number)) % prime)) % prime;
  const width = 2 * size;
  const result = new Float64Array(width * width);
  for (let index = 0; index < size; index++) {
    result[2 * index * width + 2 * index] = re;
    result[2 * index * width + 2 * index + 1] = im === 0 ? 0 : prime - im;
    result[(2 * index + 1) * width + 2 * index] = im;
    result[(2 * index + 1) * width + 2 * index + 1] = re;
  }
  return result;
}

/** The least common order of the operators with ε = +1 and of products of two with ε = −1, as matrices; even. */
function stepsOf(
  matrices: readonly ResidueMatrix[],
  elements: readonly PhaseElement[],
  width: number,
  { prime }: ModularField,
): number {
  const unit = identityResidues(width).join();
  const antiunitary = matrices.filter((_, index) => elements[index]?.epsilon === -1);
  const unitary = [
    ...matrices.filter((_, index) => elements[index]?.epsilon === 1),
    ...antiunitary.flatMap((a) => antiunitary.map((b) => multiplyResidues(a, b, width, prime))),
  ];
  return unitary.reduce((steps, matrix) => {
    let order = 1;
    for (let power = matrix; power.join() !== unit; order++) power = multiplyResidues(power, matrix, width, prime);
    return lcm(steps, order);
  }, 2);
}

function orbitOf(space: Subspace, generators: readonly ResidueMatrix[], prime: number): Subspace[] {
  const found = [space];
  const keys = new Set([subspaceKey(space)]);
  for (let next = 0; next < found.length; next++)
    for (const generator of generators) {
      const moved = mapSubspace(found[next] as Subspace, generator, prime);
      const key = subspaceKey(moved);
      if (keys.has(key)) continue;
      keys.add(key);
      found.push(moved);
    }
  return found;
}

function plainest(orbit: readonly Subspace[], prime: number): Subspace {
  const scored = orbit.map((space) => {
    const entries = [...space.basis];
    const used = entries.filter((entry) => entry !== 0).length;
    const odd = entries.filter((entry) => entry > 1 && entry !== prime - 1).length;
    const columns = entries.flatMap((entry, index) => (entry === 0 ? [] : [index % space.width]));
    return { space, score: [used, odd, entries.filter((entry) => entry === prime - 1).length, ...columns, ...entries] };
  });
  return scored.reduce((best, other) => {
    const at = other.score.findIndex((value, index) => value !== best.score[index]);
    return at >= 0 && (other.score[at] as number) < (best.score[at] ?? Number.POSITIVE_INFINITY) ? other : best;
  }).space;
}
