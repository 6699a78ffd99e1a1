import {
  addCyclotomic,
  type Cyclotomic,
  type CyclotomicMatrix,
  conjugateCyclotomic,
  cyclotomicNumbers,
  cyclotomicOne,
  cyclotomicZero,
  isCyclotomicZero,
  multiply,
  multiplyCyclotomic,
  reducedEchelon,
  reduceOrder,
  rootOfUnity,
  rootTurns,
} from "../numbers/index.js";

/**
 * A basis of the real space of vectors with `v = A v*`, for an A with `A A* = 1`: as many vectors as A has rows, e_p
 * times half the phase where A keeps e_p, else `e_p + A e_p` and `i (e_p − A e_p)`, as far as they are independent (real
 * vectors are so over the reals exactly when they are over the complex numbers).
 */
export function structureVectors(antilinear: CyclotomicMatrix): readonly (readonly Cyclotomic[])[] {
  const size = antilinear.length;
  const found: Cyclotomic[][] = [];
  const take = (vector: Cyclotomic[]): void => {
    if (vector.every(isCyclotomicZero)) return;
    if (reducedEchelon([...found, vector], cyclotomicNumbers).rows.length > found.length) found.push(vector);
  };
  const i = rootOfUnity([1, 4]);
  for (let p = 0; p < size && found.length < size; p++) {
    const column = antilinear.map((row) => row[p] as Cyclotomic);
    const turns = column.every((entry, row) => row === p || isCyclotomicZero(entry))
      ? rootTurns(column[p] as Cyclotomic)
      : null;
    const unit = column.map((_, row) => (row === p ? cyclotomicOne : cyclotomicZero));
    if (turns !== null) {
      take(unit.map((entry) => multiplyCyclotomic(rootOfUnity(multiply([1, 2], turns)), entry)));
      continue;
    }
    for (const factor of [cyclotomicOne, i])
      take(
        unit.map((entry, row) =>
          reduceOrder(
            addCyclotomic(
              multiplyCyclotomic(factor, entry),
              multiplyCyclotomic(conjugateCyclotomic(factor), column[row] as Cyclotomic),
            ),
          ),
        ),
      );
  }
  return found;
}
