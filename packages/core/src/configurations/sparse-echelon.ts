import {
  type Cyclotomic,
  invertCyclotomic,
  isCyclotomicZero,
  multiplyCyclotomic,
  negateCyclotomic,
  reduceOrder,
  safe,
  subtractCyclotomic,
} from "../numbers/index.js";

/** The non-zero entries of a row by column. */
export type SparseRow = ReadonlyMap<number, Cyclotomic>;

/**
 * Reduced echelon form of rows with few entries: each new row is cleared of the leading columns of those before it, then
 * its own leading column is cleared in them. The same rows as `reducedEchelon` gives, pivots rising.
 */
export function sparseEchelon(rows: readonly SparseRow[]): SparseRow[] {
  const leading = new Map<number, Map<number, Cyclotomic>>();
  for (const given of rows) {
    const row = new Map(given);
    for (const column of given.keys()) {
      const pivot = leading.get(column);
      // Rows found already have no entry in each other's leading columns, so nothing comes back.
      if (pivot !== undefined) subtractMultiple(row, row.get(column) as Cyclotomic, pivot);
    }
    if (row.size === 0) continue;
    let lead = Number.POSITIVE_INFINITY;
    for (const column of row.keys()) lead = Math.min(lead, column);
    const scaled = divided(row, row.get(lead) as Cyclotomic);
    for (const other of leading.values()) {
      const factor = other.get(lead);
      if (factor !== undefined) subtractMultiple(other, factor, scaled);
    }
    leading.set(lead, scaled);
  }
  return [...leading]
    .sort(([a], [b]) => a - b)
    .map(
      ([, row]) =>
        new Map(
          [...row]
            .sort(([a], [b]) => a - b)
            .map(([column, value]): [number, Cyclotomic] => [column, value.order === 1 ? value : reduceOrder(value)]),
        ),
    );
}

function divided(row: ReadonlyMap<number, Cyclotomic>, lead: Cyclotomic): Map<number, Cyclotomic> {
  if (isSmallInteger(lead, 1)) return new Map(row);
  if (isSmallInteger(lead, -1)) return new Map([...row].map(([column, value]) => [column, negateCyclotomic(value)]));
  const inverse = invertCyclotomic(lead);
  return new Map([...row].map(([column, value]) => [column, plainWhereRational(multiplyCyclotomic(inverse, value))]));
}

function isSmallInteger({ order, denominator, coefficients }: Cyclotomic, value: number): boolean {
  return order === 1 && denominator === 1 && coefficients[0] === value;
}

function subtractMultiple(target: Map<number, Cyclotomic>, factor: Cyclotomic, source: SparseRow): void {
  for (const [column, value] of source) {
    const product = times(factor, value);
    const own = target.get(column);
    const rest = own === undefined ? negateCyclotomic(product) : minus(own, product);
    if (isCyclotomicZero(rest)) target.delete(column);
    else target.set(column, rest);
  }
}

function isInteger({ order, denominator }: Cyclotomic): boolean {
  return order === 1 && denominator === 1;
}

function integer(value: number): Cyclotomic {
  return { order: 1, denominator: 1, coefficients: [safe(value) + 0] };
}

/** Most entries are small integers; they need no reduction to lowest terms. */
function times(a: Cyclotomic, b: Cyclotomic): Cyclotomic {
  if (isInteger(a) && isInteger(b)) return integer((a.coefficients[0] as number) * (b.coefficients[0] as number));
  return plainWhereRational(multiplyCyclotomic(a, b));
}

function minus(a: Cyclotomic, b: Cyclotomic): Cyclotomic {
  if (isInteger(a) && isInteger(b)) return integer((a.coefficients[0] as number) - (b.coefficients[0] as number));
  return plainWhereRational(subtractCyclotomic(a, b));
}

/** A fraction written in a larger field, as a plain one: cheaper than looking for the smallest field each time. */
function plainWhereRational(value: Cyclotomic): Cyclotomic {
  if (value.order === 1) return value;
  const { coefficients, denominator } = value;
  for (let index = 1; index < coefficients.length; index++) if (coefficients[index] !== 0) return value;
  return { order: 1, denominator, coefficients: [coefficients[0] as number] };
}
