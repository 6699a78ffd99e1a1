import { type Cyclotomic, conjugateCyclotomic } from "../numbers/index.js";
import { commonOrder, inverseModulo, type ModularField, modularField, residue } from "./modular-field.js";
import type { OrderParameter } from "./order-parameter.js";
import type { ParentQuotient } from "./parent-quotient.js";
import { invertResidues, multiplyResidues, type ResidueMatrix } from "./subspaces.js";

/** An order parameter with the residues of its matrices in the real basis. */
export interface ResidueAction {
  readonly parameter: OrderParameter;
  readonly field: ModularField;
  /** One matrix per operator of the selection. */
  readonly operators: readonly ResidueMatrix[];
  /** One per translation of the quotient. */
  readonly translations: readonly ResidueMatrix[];
}

/** The field that holds all matrices of these order parameters and the phases k·T of the arms. */
export function fieldFor(quotient: ParentQuotient, parameters: readonly OrderParameter[], skip = 0): ModularField {
  const orders = new Set<number>([quotient.selection.denominator]);
  const visit = (rows: readonly (readonly Cyclotomic[])[]): void => {
    for (const row of rows) for (const entry of row) orders.add(entry.order);
  };
  for (const { matrices, basis } of parameters) {
    matrices.forEach(visit);
    if (basis !== null) visit(basis);
  }
  return modularField(commonOrder(orders), skip);
}

/** Null when the real basis is singular modulo the prime, so that another must be taken. */
export function residueAction(
  quotient: ParentQuotient,
  parameter: OrderParameter,
  field: ModularField,
): ResidueAction | null {
  const convert = parameter.real ? realConverter(parameter, field) : doublingConverter(parameter, field);
  if (convert === null) return null;
  const { complexSize, irrep } = parameter;
  const { rows, denominator } = quotient.selection;
  const translations = quotient.translations.map((translation) => {
    const matrix = new Float64Array(complexSize * complexSize);
    const conjugate = new Float64Array(complexSize * complexSize);
    for (let index = 0; index < complexSize; index++) {
      const row = rows[Math.floor(index / irrep.dimension)] as readonly number[];
      const turns = row.reduce((sum, entry, axis) => sum + entry * (translation[axis] as number), 0);
      const step = (((turns % denominator) + denominator) % denominator) * (field.order / denominator);
      matrix[index * complexSize + index] = field.roots[step] as number;
      conjugate[index * complexSize + index] = field.roots[(field.order - step) % field.order] as number;
    }
    return convert(matrix, conjugate);
  });
  const operators = parameter.matrices.map((rowsOf) =>
    convert(
      Float64Array.from(rowsOf.flat(), (entry) => residue(field, entry)),
      parameter.real ? null : Float64Array.from(rowsOf.flat(), (entry) => residue(field, conjugateCyclotomic(entry))),
    ),
  );
  return { parameter, field, operators, translations };
}

type Converter = (matrix: ResidueMatrix, conjugate: ResidueMatrix | null) => ResidueMatrix;

function realConverter({ basis, complexSize }: OrderParameter, field: ModularField): Converter | null {
  const { prime } = field;
  const columns = Float64Array.from((basis ?? []).flat(), (entry) => residue(field, entry));
  const inverse = invertResidues(columns, complexSize, prime);
  if (inverse === null) return null;
  return (matrix) =>
    multiplyResidues(inverse, multiplyResidues(matrix, columns, complexSize, prime), complexSize, prime);
}

/** Real and imaginary parts as coordinates: each entry m becomes the block (Re m, −Im m; Im m, Re m). */
function doublingConverter({ complexSize, size }: OrderParameter, { prime, roots, order }: ModularField): Converter {
  const half = inverseModulo(2, prime);
  const halfOverI = (half * (roots[(3 * order) / 4] as number)) % prime;
  return (matrix, conjugate) => {
    const result = new Float64Array(size * size);
    for (let row = 0; row < complexSize; row++)
      for (let column = 0; column < complexSize; column++) {
        const entry = matrix[row * complexSize + column] as number;
        const other = (conjugate as ResidueMatrix)[row * complexSize + column] as number;
        if (entry === 0 && other === 0) continue;
        const real = (((entry + other) % prime) * half) % prime;
        const imaginary = (((entry + prime - other) % prime) * halfOverI) % prime;
        result[2 * row * size + 2 * column] = real;
        result[2 * row * size + 2 * column + 1] = imaginary === 0 ? 0 : prime - imaginary;
        result[(2 * row + 1) * size + 2 * column] = imaginary;
        result[(2 * row + 1) * size + 2 * column + 1] = real;
      }
    return result;
  };
}

/** The action on the direct sum of several order parameters. */
export function directSum(actions: readonly ResidueAction[]): {
  readonly size: number;
  readonly operators: readonly ResidueMatrix[];
  readonly translations: readonly ResidueMatrix[];
} {
  const [first] = actions;
  if (actions.length === 1 && first !== undefined)
    return { size: first.parameter.size, operators: first.operators, translations: first.translations };
  const size = actions.reduce((sum, { parameter }) => sum + parameter.size, 0);
  const joined = (pick: (action: ResidueAction) => readonly ResidueMatrix[]): ResidueMatrix[] =>
    (first === undefined ? [] : pick(first)).map((_, index) => {
      const matrix = new Float64Array(size * size);
      let start = 0;
      for (const action of actions) {
        const own = pick(action)[index] as ResidueMatrix;
        const width = action.parameter.size;
        for (let row = 0; row < width; row++)
          for (let column = 0; column < width; column++)
            matrix[(start + row) * size + start + column] = own[row * width + column] as number;
        start += width;
      }
      return matrix;
    });
  return {
    size,
    operators: joined((action) => action.operators),
    translations: joined((action) => action.translations),
  };
}
