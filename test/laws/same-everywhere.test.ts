import { smallIrreps } from "@kvane/core/irreps";
import {
  exactWaveVector,
  formatWaveVector,
  littleGroup,
  manifold,
  specialPoints,
  type WaveVector,
} from "@kvane/core/kvectors";
import { siteModes } from "@kvane/core/modes";
import { changeBasis, type Site, type SpaceGroup, siteOrbit } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { changedSite, changedWave, type Pair, randomChange, sumOf } from "../support/axes.js";
import type { Complex } from "../support/complex.js";
import { componentsOf, type FloatOperator, inner } from "../support/float-group.js";
import { floatIrreps } from "../support/float-irreps.js";
import { groupOf } from "../support/parsed-groups.js";
import { type Random, seeded } from "../support/random.js";
import { randomWaveVector, specialSite } from "../support/random-cases.js";
import { sweepCase } from "../support/sweep-case.js";

/** Dimension, reality, physical dimension and multiplicity on each site, sorted: what no choice of axes can change. */
function invariants(group: SpaceGroup, k: WaveVector, sites: readonly Site[]): string[] {
  const irreps = smallIrreps(group, k);
  const modes = sites.map((site) => siteModes(group, irreps, siteOrbit(group, site, null)));
  return irreps.irreps
    .map(({ dimension, reality, physicalDimension, conjugateOf }, index) => {
      const multiplicities = modes.map((entry) => `${entry.irreps[index]?.multiplicity}`);
      return [dimension, reality, physicalDimension, conjugateOf !== null, ...multiplicities].join(" ");
    })
    .sort();
}

const numbers = [15, 19, 70, 88, 122, 161, 167, 198, 220];

describe("axes and origin change nothing but the text", { timeout: 120_000 }, () => {
  test.for(numbers)(
    "group %i: dimensions, realities, multiplicities; validators in the new axes (seed: the number)",
    (number) => {
      const group = groupOf(number);
      const random = seeded(number);
      const points = specialPoints(group);
      const change = randomChange(random);
      const changed = changeBasis(group, change);
      for (const k of [random.pick(points).k, randomWaveVector(group, random)]) {
        const sites = [specialSite(group, random)];
        const moved = sites.map((site) => changedSite(site, change));
        expect(invariants(changed, changedWave(k, change), moved), formatWaveVector(k)).toEqual(
          invariants(group, k, sites),
        );
        expect(
          sweepCase(changed, changedWave(k, change), moved, { cells: 8, seed: number, polar: false }).problems,
        ).toEqual([]);
      }
    },
  );
});

/** Characters of Δ = e^{−2πi k·t} D, irrep by irrep in the order of their numbers. */
function charactersOfDelta(group: SpaceGroup, k: WaveVector): string[] {
  const read = floatIrreps(group, smallIrreps(group, k));
  return read.characters.map((list) =>
    list
      .map(([re, im]: Complex, at) => {
        const { translation } = read.group.operators[read.operators[at] as number] as FloatOperator;
        const angle = -2 * Math.PI * inner(read.k, translation);
        const value = [re * Math.cos(angle) - im * Math.sin(angle), re * Math.sin(angle) + im * Math.cos(angle)];
        return value.map((entry) => (Math.round(entry * 1e6) / 1e6 + 0).toFixed(6)).join("+i");
      })
      .join(" "),
  );
}

/** Random exact k that are no isolated points. */
function onManifolds(group: SpaceGroup, count: number, random: Random): WaveVector[] {
  const found: WaveVector[] = [];
  for (let tries = 0; tries < 40 && found.length < count; tries++) {
    const k = randomWaveVector(group, random);
    const { dimension } = manifold(group, k, { withInversion: false });
    if (dimension === 1 || dimension === 2) found.push(k);
  }
  return found;
}

describe("numbers of irreps", () => {
  test.for(numbers)(
    "group %i: the exact k and its line or plane with letters have the same Δ with the same numbers",
    (number) => {
      const group = groupOf(number);
      for (const k of onManifolds(group, 2, seeded(1000 + number))) {
        const { form } = manifold(group, k, { withInversion: false });
        expect(littleGroup(group, form).operators).toEqual(littleGroup(group, k).operators);
        expect(charactersOfDelta(group, form), formatWaveVector(k)).toEqual(charactersOfDelta(group, k));
      }
    },
  );

  // Numbers cannot be the same all round where k and k + H are two names of one irrep: going once along the zone may
  // exchange the irreps of a glide or screw. So one unit in 24 steps may meet a border of the zone, and nothing else.
  test.for([15, 31, 80, 161, 169, 198])(
    "group %i: along a line or plane numbers change at most at a border of the zone",
    (number) => {
      const group = groupOf(number);
      for (const k of onManifolds(group, 1, seeded(3000 + number))) {
        const { form } = manifold(group, k, { withInversion: false });
        const walk = Array.from({ length: 25 }, (_, step) =>
          charactersOfDelta(group, {
            ...form,
            values: (form.values ?? []).map((value, at) => value + (at === 0 ? step / 24 : 0.017)),
          }),
        );
        const changes = walk.filter((entry, step) => step > 0 && entry.join() !== walk[step - 1]?.join());
        expect(changes.length, formatWaveVector(k)).toBeLessThanOrEqual(2);
      }
    },
  );

  test.for(numbers)("group %i: k and k + H have the same irreps with the same numbers", (number) => {
    const group = groupOf(number);
    const random = seeded(2000 + number);
    for (let sample = 0; sample < 2; sample++) {
      const k = randomWaveVector(group, random);
      const shift = reciprocalVector(group, random);
      const [a, b, c] = k.components.map((form, at) => sumOf(form.constant, [shift[at] as number, 1])) as [
        Pair,
        Pair,
        Pair,
      ];
      const other = exactWaveVector([a, b, c]);
      const [first, second] = [k, other].map((wave) => floatIrreps(group, smallIrreps(group, wave)).characters);
      const largest = Math.max(
        ...(first ?? []).flatMap((list, irrep) =>
          list.map(([re, im], at) => {
            const [x, y] = second?.[irrep]?.[at] ?? [Number.NaN, Number.NaN];
            return Math.hypot(re - x, im - y);
          }),
        ),
      );
      expect(largest, `${componentsOf(k)} and ${componentsOf(other)}`).toBeLessThan(1e-9);
    }
  });

  test("the totally symmetric irrep at k = 0 is the first", () => {
    for (const number of numbers) {
      const [first] = floatIrreps(
        groupOf(number),
        smallIrreps(
          groupOf(number),
          exactWaveVector([
            [0, 1],
            [0, 1],
            [0, 1],
          ]),
        ),
      ).characters;
      for (const [re, im] of first ?? []) expect(Math.hypot(re - 1, im)).toBeLessThan(1e-12);
    }
  });
});

/** A small random vector of L* that is whole in the axes of the setting. */
function reciprocalVector(group: SpaceGroup, random: Random): number[] {
  for (;;) {
    const row = [0, 1, 2].map(() => random.below(5) - 2);
    const whole = group.lattice.vectors.every((vector) => {
      const turns = inner(row, vector) / group.lattice.denominator;
      return Math.abs(turns - Math.round(turns)) < 1e-9;
    });
    if (whole) return row;
  }
}
