import {
  type Cyclotomic,
  type CyclotomicMatrix,
  cyclotomicOne,
  cyclotomicZero,
  equalCyclotomic,
  multiplyCyclotomicMatrices,
  rational,
  rootOfUnity,
  rootTurns,
  scaleCyclotomicMatrix,
  traceCyclotomicMatrix,
} from "../numbers/index.js";
import { compositionSeries, type SeriesStep } from "./composition-series.js";
import { rowProduct, unitaryIntertwiner } from "./intertwiner.js";
import type { LittleCoGroup } from "./little-co-group.js";
import { indexOfCharacter } from "./reality.js";

/** A projective irrep Δ: unitary matrices by element number, `undefined` for elements not reached yet. */
type Matrices = readonly (CyclotomicMatrix | undefined)[];

/**
 * All projective irreps of a little co-group for its factor system, as exact unitary matrices by element number.
 *
 * Along a composition series each irrep of the normal subgroup H either is inequivalent to its conjugate by the
 * generator s, and the orbit of p irreps gives one induced irrep; or it is equivalent, and it extends to p irreps that
 * differ by the p-th roots of unity (Zak, J. Math. Phys. 1 (1960) 165; Bradley & Cracknell, 1972, chapter 4).
 */
export function projectiveIrreps(group: LittleCoGroup): CyclotomicMatrix[][] {
  const start: (CyclotomicMatrix | undefined)[] = new Array(group.size);
  start[0] = [[cyclotomicOne]];
  let irreps: Matrices[] = [start];
  for (const step of compositionSeries(group)) irreps = ascend(group, step, irreps);
  return irreps.map((matrices) => matrices.map((matrix) => matrix as CyclotomicMatrix));
}

function ascend(group: LittleCoGroup, step: SeriesStep, irreps: readonly Matrices[]): Matrices[] {
  const done = new Set<number>();
  const characters = irreps.map((matrices) => charactersOn(matrices, step.subgroup));
  return irreps.flatMap((matrices, index) => {
    if (done.has(index)) return [];
    const orbit = [matrices];
    for (;;) {
      const next = conjugated(group, step, orbit[orbit.length - 1] as Matrices);
      const partner = indexOfCharacter(characters, charactersOn(next, step.subgroup));
      done.add(partner);
      // Where `next` is equivalent to the first of the orbit, the orbit is complete: 1 or p irreps.
      if (partner === index)
        return orbit.length === 1 ? extended(group, step, matrices, next) : [induced(group, step, orbit)];
      orbit.push(next);
    }
  });
}

function charactersOn(matrices: Matrices, elements: readonly number[]): Cyclotomic[] {
  return elements.map((element) => traceCyclotomicMatrix(matrices[element] as CyclotomicMatrix));
}

/** The factor e^{2πi·n/denominator}. */
function root(group: LittleCoGroup, exponent: number): Cyclotomic {
  return rootOfUnity(rational(exponent, group.originDenominator));
}

/** Δˢ(h) = matrix of e_s⁻¹ e_h e_s = e^{2πi[ω(h,s) − ω(s,h')]} Δ(h'), h' = s⁻¹hs. */
function conjugated(group: LittleCoGroup, { generator: s, subgroup }: SeriesStep, matrices: Matrices): Matrices {
  const { product, inverse, factor, size } = group;
  const result: (CyclotomicMatrix | undefined)[] = new Array(size);
  for (const h of subgroup) {
    const image = product[(product[(inverse[s] as number) * size + h] as number) * size + s] as number;
    const exponent = (factor[h * size + s] as number) - (factor[s * size + image] as number);
    result[h] = scaledMatrix(root(group, exponent), matrices[image] as CyclotomicMatrix);
  }
  return result;
}

function scaledMatrix(scale: Cyclotomic, matrix: CyclotomicMatrix): CyclotomicMatrix {
  return equalCyclotomic(scale, cyclotomicOne) ? matrix : scaleCyclotomicMatrix(scale, matrix);
}

/** e_s^p = e^{2πi·exponent} e_{s^p}: the element s^p of H and the accumulated factor. */
function generatorPower(
  group: LittleCoGroup,
  { generator: s, index }: SeriesStep,
): { element: number; exponent: number } {
  let element = s;
  let exponent = 0;
  for (let power = 1; power < index; power++) {
    exponent += group.factor[element * group.size + s] as number;
    element = group.product[element * group.size + s] as number;
  }
  return { element, exponent };
}

/** The induced irrep on blocks e_s^j ⊗ v: block-diagonal Δ^{s^j} on H, a block shift for s. */
function induced(group: LittleCoGroup, step: SeriesStep, orbit: readonly Matrices[]): Matrices {
  const [first] = orbit as readonly [Matrices];
  const unit = first[0] as CyclotomicMatrix;
  const dimension = unit.length;
  const size = dimension * orbit.length;
  const blocks = (place: (row: number, column: number) => CyclotomicMatrix | null): CyclotomicMatrix =>
    Array.from({ length: size }, (_, row) =>
      Array.from({ length: size }, (_unused, column) => {
        const block = place(Math.floor(row / dimension), Math.floor(column / dimension));
        return block === null
          ? cyclotomicZero
          : ((block[row % dimension] as readonly Cyclotomic[])[column % dimension] as Cyclotomic);
      }),
    );
  const base: (CyclotomicMatrix | undefined)[] = new Array(group.size);
  for (const h of step.subgroup)
    base[h] = blocks((row, column) => (row === column ? ((orbit[row] as Matrices)[h] as CyclotomicMatrix) : null));
  const { element, exponent } = generatorPower(group, step);
  const wrap = scaledMatrix(root(group, exponent), first[element] as CyclotomicMatrix);
  const last = orbit.length - 1;
  const shift = blocks((row, column) => (row === column + 1 ? unit : row === 0 && column === last ? wrap : null));
  return completed(group, step, base, shift);
}

/** Fills in the cosets: e_s^j e_h = e^{2πi·c} e_{s^j h}, so Δ(s^j h) = e^{−2πi·c} Δ(s)^j Δ(h). */
function completed(group: LittleCoGroup, step: SeriesStep, base: Matrices, shift: CyclotomicMatrix): Matrices {
  const { product, factor, size } = group;
  const result = [...base];
  const next = (element: number): number => product[step.generator * size + element] as number;
  let coset: readonly number[] = step.subgroup;
  while (result[next(coset[0] as number)] === undefined)
    coset = coset.map((element) => {
      const image = next(element);
      const exponent = -(factor[step.generator * size + element] as number);
      result[image] = scaledMatrix(
        root(group, exponent),
        multiplyCyclotomicMatrices(shift, result[element] as CyclotomicMatrix),
      );
      return image;
    });
  return result;
}

/** The p extensions of an irrep that is equivalent to its conjugate. */
function extended(group: LittleCoGroup, step: SeriesStep, matrices: Matrices, conjugate: Matrices): Matrices[] {
  const intertwiner = unitaryIntertwiner(
    step.subgroup.map((h) => [matrices[h] as CyclotomicMatrix, conjugate[h] as CyclotomicMatrix]),
  );
  // X^p = λ e^{2πi·exponent} Δ(s^p) with a root of unity λ; each p-th root of 1/λ gives one extension.
  const { element, exponent } = generatorPower(group, step);
  const power = Array.from({ length: step.index - 1 }).reduce<CyclotomicMatrix>(
    (product) => multiplyCyclotomicMatrices(product, intertwiner),
    intertwiner,
  );
  const target = scaledMatrix(root(group, exponent), matrices[element] as CyclotomicMatrix);
  // Both are unitary, so λ is the product of any row with its counterpart.
  const [row, counterpart] = [power[0], target[0]] as [readonly Cyclotomic[], readonly Cyclotomic[]];
  const turns = rootTurns(rowProduct(row, counterpart));
  if (turns === null) throw new Error("an intertwiner's power is no root of unity times the matrix of the power");
  return Array.from({ length: step.index }, (_, branch) => {
    const scale = rootOfUnity(rational(branch * turns[1] - turns[0], turns[1] * step.index));
    return completed(group, step, matrices, scaledMatrix(scale, intertwiner));
  });
}
