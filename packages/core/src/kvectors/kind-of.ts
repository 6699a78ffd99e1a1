import { modulo, safe } from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import { type ActingRotation, extendedPointGroup, fixedDimension, fixedRows, fixingForm } from "./acting-rotations.js";
import {
  type DirectionTable,
  directionTable,
  type Flat,
  flatName,
  flatThrough,
  pointDenominator,
  pointOfFlat,
} from "./flats.js";
import { type IntegerForm, rotateRow, toIntegerForm } from "./integer-form.js";
import type { KindOfK, WaveVector } from "./types.js";

/**
 * The kind that k belongs to, as an index into `kinds`. The components of k decide (with a letter left open or given a
 * value, the whole line or plane), so a k never belongs to two kinds.
 *
 * @param kinds made by `atlas` of the same group with the same options; another list is an error of the caller
 */
export function kindOf(
  group: SpaceGroup,
  kinds: readonly KindOfK[],
  k: WaveVector,
  options: { readonly withInversion: boolean },
): number {
  const { withInversion } = options;
  const acting = extendedPointGroup(group).filter(({ own }) => own || withInversion);
  const form = toIntegerForm(group.lattice, k);
  const fixing = fixingForm(acting, form);
  const dimension = fixedDimension(fixing);
  const order = fixing.filter(({ own }) => own).length;
  const candidates = [...kinds.keys()].filter((index) => {
    const kind = kinds[index] as KindOfK;
    return (withInversion ? kind.dimensionPM : kind.dimension) === dimension && kind.littleCoGroup.order === order;
  });
  if (candidates.length === 1) return candidates[0] as number;
  const table = directionTable();
  const images = imageNames(flatFixedBy(fixing, form, table), acting, table);
  const found = candidates.find((index) => {
    const other = toIntegerForm(group.lattice, (kinds[index] as KindOfK).k);
    return images.has(flatName(flatFixedBy(fixingForm(acting, other), other, table)));
  });
  if (found === undefined) throw new Error("a wave vector lies on no kind of the atlas");
  return found;
}

function imageNames(flat: Flat, acting: readonly ActingRotation[], table: DirectionTable): ReadonlySet<string> {
  const point = pointOfFlat(flat);
  return new Set(
    acting.map(({ matrix }) => {
      const rows = flat.lattice.rows.map((row) => rotateRow(row, matrix));
      return flatName(flatThrough(table(rows), rotateRow(point, matrix)));
    }),
  );
}

/**
 * The flat of all k that are fixed in the same way as a form. Across it the form lies at a multiple of
 * 1/`pointDenominator`, whatever its own denominator is.
 */
function flatFixedBy(fixing: readonly ActingRotation[], form: IntegerForm, table: DirectionTable): Flat {
  const lattice = table(fixedRows(fixing));
  const across = rotateRow(form.base, lattice.coordinates).slice(lattice.rows.length);
  return {
    lattice,
    across: across.map((entry) => modulo(safe(entry * pointDenominator) / form.denominator, pointDenominator)),
  };
}
