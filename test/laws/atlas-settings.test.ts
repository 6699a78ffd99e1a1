import { atlas, formatWaveVector, type KindOfK, kindOf } from "@kvane/core/kvectors";
import { changeBasis, formatBasisChange } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { groupOf } from "../support/parsed-groups.js";
import { seeded } from "../support/random.js";
import { carriedWave, randomBasis } from "../support/random-bases.js";

/** Another sample: KVANE_SWEEP_SEED=n. */
const seed = Number(process.env["KVANE_SWEEP_SEED"] ?? "20");

/** What no change of axes may change. */
function invariantsOf(kind: KindOfK): string {
  const { dimension, dimensionPM, littleCoGroup, arms, minusK, halfLattice } = kind;
  return [dimension, dimensionPM, littleCoGroup.symbol, littleCoGroup.order, arms, minusK, halfLattice.length].join(
    " ",
  );
}

describe(`kinds of k do not depend on the setting, seed ${seed}`, () => {
  const tens = Array.from({ length: 23 }, (_, ten) => Array.from({ length: 10 }, (_, unit) => 10 * ten + unit + 1));

  test.for(tens.map((numbers) => ({ from: numbers[0], numbers })))("ten groups from $from", ({ numbers }) => {
    const wrong = numbers
      .filter((number) => number % 2 === seed % 2)
      .flatMap((number) => {
        const random = seeded(1000 * seed + 700 + number);
        const group = groupOf(number);
        const change = randomBasis(random);
        const changed = changeBasis(group, change);
        const withInversion = random.below(2) === 0;
        const kinds = atlas(group, { withInversion });
        const others = atlas(changed, { withInversion });
        // Each kind, carried to the new axes, is one of the kinds made there, and each of these is met once.
        const met = kinds.map((kind) => kindOf(changed, others, carriedWave(kind.k, change), { withInversion }));
        const bijective = new Set(met).size === others.length && met.length === others.length;
        const alike = met.every(
          (index, own) => invariantsOf(others[index] as KindOfK) === invariantsOf(kinds[own] as KindOfK),
        );
        const halves = kinds.every((kind, own) =>
          kind.halfLattice.every(
            (k) => kindOf(changed, others, carriedWave(k, change), { withInversion }) === met[own],
          ),
        );
        return bijective && alike && halves
          ? []
          : [`${number} in ${formatBasisChange(change)}: ${kinds.map((kind) => formatWaveVector(kind.k)).join(" ")}`];
      });
    expect(wrong).toEqual([]);
  });
});
