import { evaluateFormNumber, isConstantForm, type RationalVector, toNumber } from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import {
  type AffineSet,
  affineForms,
  affineParameters,
  type Condition,
  fixingConditions,
  solveConditions,
} from "./affine.js";
import { fromPrimitiveIntegers, reciprocalDifference, rotateForm, toIntegerForm } from "./integer-form.js";
import { settingRotation } from "./rotations.js";
import type { Manifold, WaveVector } from "./types.js";
import { parameterValues } from "./wave-vector.js";

/**
 * The manifold of k: all k' with `k'R − k' = kR − k` for every R of the little co-group, in parametric form. With
 * `withInversion` the little co-group is taken in the point group extended by −1 (k and −k belong to one magnetic
 * structure), so that polar groups have isolated points too.
 */
export function manifold(group: SpaceGroup, k: WaveVector, options: { readonly withInversion: boolean }): Manifold {
  const set = manifoldSet(group, k, options);
  const parameters = affineParameters(set, k.components);
  const values = parameterValues(k);
  const numbers = parameters.map((form) =>
    isConstantForm(form) ? toNumber(form.constant) : values === null ? Number.NaN : evaluateFormNumber(form, values),
  );
  const open = numbers.some(Number.isNaN);
  return {
    form: {
      components: affineForms(set),
      values: open ? null : numbers,
      uncertainties: open ? null : numbers.map(() => null),
    },
    dimension: set.directions.length as 0 | 1 | 2 | 3,
  };
}

/** The same as an affine set. */
export function manifoldSet(group: SpaceGroup, k: WaveVector, options: { readonly withInversion: boolean }): AffineSet {
  const set = solveConditions(manifoldConditions(group, k, options.withInversion));
  // k itself solves the conditions when its parameters are set to anything, so there always is a solution.
  if (set === null) throw new Error("the manifold of a wave vector came out empty");
  return set;
}

function manifoldConditions(group: SpaceGroup, k: WaveVector, withInversion: boolean): Condition[] {
  const form = toIntegerForm(group.lattice, k);
  const conditions: Condition[] = [];
  group.primitive.rotations.forEach((rotation, index) => {
    for (const sign of withInversion ? ([1, -1] as const) : ([1] as const)) {
      const shift = reciprocalDifference(rotateForm(form, rotation), form, sign);
      if (shift === null) continue;
      const row: RationalVector = fromPrimitiveIntegers(group, shift, 1);
      conditions.push(...fixingConditions(settingRotation(group, index), row, sign));
    }
  });
  return conditions;
}
