import { numericWaveVector, star, usedParameters, type WaveVector } from "../kvectors/index.js";
import {
  addForms,
  constantForm,
  type LinearForm,
  negateForm,
  type Rational,
  rational,
  scaleForm,
  variableForm,
} from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";

/** Parts of a reciprocal lattice unit that a sum of more than three letters is rounded to; far below any measurement. */
const fineness = 1_000_000;

/** The k of a harmonic, m·k, with the same letters and values. */
export function multipleOf(k: WaveVector, factor: number): WaveVector {
  const times: Rational = [factor, 1];
  return { ...k, components: mapForms(k, (form) => scaleForm(times, form)) };
}

/** `k1 + s·(arm of k2)` for every arm of the star of k2 and both signs s, the arms in the order of the star. */
export function sumsOf(group: SpaceGroup, first: WaveVector, second: WaveVector): readonly WaveVector[] {
  return star(group, second).arms.flatMap((arm) => [
    sumOf(first, arm),
    sumOf(first, { ...arm, components: mapForms(arm, negateForm) }),
  ]);
}

/** The letters of the second come after those of the first; with more than three in all the sum is rounded. */
function sumOf(first: WaveVector, second: WaveVector): WaveVector {
  const [ours, theirs] = [usedParameters(first), usedParameters(second)];
  if (ours.length + theirs.length > 3) return rounded(first, second);
  const renamed = mapForms(second, (form) => rename(form, theirs, ours.length));
  const kept = mapForms(first, (form) => rename(form, ours, 0));
  return {
    components: [addForms(kept[0], renamed[0]), addForms(kept[1], renamed[1]), addForms(kept[2], renamed[2])],
    values: first.values === null || second.values === null ? null : [...first.values, ...second.values],
    uncertainties:
      first.uncertainties === null || second.uncertainties === null
        ? null
        : [...first.uncertainties, ...second.uncertainties],
  };
}

/** The form with its letters, in order, called by the letters from `start` on. */
function rename(form: LinearForm, letters: readonly number[], start: number): LinearForm {
  return letters.reduce(
    (sum, letter, place) =>
      addForms(sum, scaleForm(form.coefficients[letter as 0 | 1 | 2], variableForm(start + place))),
    constantForm(form.constant),
  );
}

function rounded(first: WaveVector, second: WaveVector): WaveVector {
  const [a, b] = [numericWaveVector(first) ?? [0, 0, 0], numericWaveVector(second) ?? [0, 0, 0]];
  const at = (axis: 0 | 1 | 2): LinearForm =>
    constantForm(rational(Math.round((a[axis] + b[axis]) * fineness), fineness));
  return { components: [at(0), at(1), at(2)], values: [], uncertainties: [] };
}

function mapForms(
  { components: [a, b, c] }: WaveVector,
  change: (form: LinearForm) => LinearForm,
): WaveVector["components"] {
  return [change(a), change(b), change(c)];
}
