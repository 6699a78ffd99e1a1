import { averagedMetric, type Cell, directMetric } from "../spacegroups/index.js";
import { invariantTensors, type TensorKind } from "./invariant-tensors.js";
import { symbolForms } from "./symbol-forms.js";
import type { MagneticGroup } from "./types.js";

/**
 * What a magnetic point group allows, in Cartesian axes x ∥ a, z ∥ c*: each entry a text in symbols, equal symbols for
 * equal entries, `0` where nothing is allowed.
 */
export interface TensorForms {
  /** Spontaneous moment Mx, My, Mz: axial, odd under time reversal. */
  readonly netMoment: readonly string[];
  /** Spontaneous polarization Px, Py, Pz: polar, even. */
  readonly polarization: readonly string[];
  /** Linear magnetoelectric tensor, nine entries row by row: `Pᵢ = αᵢⱼ Hⱼ`, first index electric; axial, odd. */
  readonly magnetoelectric: readonly string[];
  /**
   * Piezomagnetic tensor, three rows of six: `Mᵢ = Λᵢμ Tμ` with stress in Voigt's order xx, yy, zz, yz, xz, xy;
   * `Λᵢμ = Λᵢⱼₖ` for μ = 1 to 3 and `2Λᵢⱼₖ` for μ = 4 to 6. Axial, odd, symmetric in j and k.
   */
  readonly piezomagnetic: readonly string[];
}

const axialVector: TensorKind = { rank: 1, axial: true, timeOdd: true, symmetric: false };
const polarVector: TensorKind = { rank: 1, axial: false, timeOdd: false, symmetric: false };
const axialMatrix: TensorKind = { rank: 2, axial: true, timeOdd: true, symmetric: false };
const axialThird: TensorKind = { rank: 3, axial: true, timeOdd: true, symmetric: true };

const letters = ["x", "y", "z"] as const;
const pairs = letters.flatMap((first) => letters.map((second) => first + second));
const voigt = [
  [0, 0],
  [1, 1],
  [2, 2],
  [1, 2],
  [0, 2],
  [0, 1],
] as const;

/**
 * The forms of four properties that the point group of `group` allows (Neumann's principle: the property has every
 * symmetry of the crystal). Conventions of tensors as in International Tables D, sections 1.5.7 and 1.5.8.
 *
 * @param cell of the axes in which the operators of `group` are given; its metric is averaged over the group
 */
export function tensorForms(group: MagneticGroup, cell: Cell): TensorForms {
  const axes = cartesianAxes(
    averagedMetric(
      group.operators.map(({ operator }) => operator),
      directMetric(cell),
    ),
  );
  const inAxes = (kind: TensorKind): number[][] =>
    invariantTensors(group, kind).map((tensor) => toCartesian(tensor, axes, kind.rank));
  return {
    netMoment: symbolForms(
      inAxes(axialVector),
      letters.map((letter) => `M${letter}`),
    ),
    polarization: symbolForms(
      inAxes(polarVector),
      letters.map((letter) => `P${letter}`),
    ),
    magnetoelectric: symbolForms(
      inAxes(axialMatrix),
      pairs.map((pair) => `α${pair}`),
    ),
    piezomagnetic: symbolForms(
      inAxes(axialThird).map(inVoigt),
      [1, 2, 3].flatMap((row) => voigt.map((_, column) => `Λ${row}${column + 1}`)),
    ),
  };
}

/** A tensor symmetric in the last two indices as three rows of six. */
function inVoigt(tensor: readonly number[]): number[] {
  return [0, 1, 2].flatMap((i) => voigt.map(([j, k]) => (tensor[9 * i + 3 * j + k] as number) * (j === k ? 1 : 2)));
}

/** a, b, c in Cartesian axes as columns of a matrix (nine numbers row by row): x ∥ a, y in the plane of a and b. */
function cartesianAxes(metric: readonly number[]): readonly number[] {
  const [aa, ab, ac, , bb, bc, , , cc] = metric as [
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
  const ax = Math.sqrt(aa);
  const bx = ab / ax;
  const by = Math.sqrt(bb - bx * bx);
  const cx = ac / ax;
  const cy = (bc - bx * cx) / by;
  return [ax, bx, cx, 0, by, cy, 0, 0, Math.sqrt(cc - cx * cx - cy * cy)];
}

/** `t'ᵢⱼ… = Aᵢₚ Aⱼ_q … t_pq…`, index after index. */
function toCartesian(tensor: readonly number[], axes: readonly number[], rank: number): number[] {
  let work = [...tensor];
  for (let place = 1; place < 3 ** rank; place *= 3)
    work = work.map((_, index) => {
      const digit = Math.floor(index / place) % 3;
      return [0, 1, 2].reduce(
        (sum, other) => sum + (axes[3 * digit + other] as number) * (work[index + (other - digit) * place] as number),
        0,
      );
    });
  return work;
}
