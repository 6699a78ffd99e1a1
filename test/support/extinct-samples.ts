import {
  addSquares,
  basisFactors,
  type ExtinctionRule,
  extinctionRules,
  extinctionTest,
  lineMembers,
  magneticFormFactor,
  modeSpace,
  prepareSpace,
  quadraticForm,
  scatteringGeometry,
  type Triple,
} from "@kvane/core/diffraction";
import { smallIrreps } from "@kvane/core/irreps";
import { formatWaveVector, numericWaveVector, type WaveVector } from "@kvane/core/kvectors";
import { siteModes } from "@kvane/core/modes";
import { satelliteLines } from "@kvane/core/reflections";
import { type Cell, type Site, type SpaceGroup, siteOrbit } from "@kvane/core/spacegroups";
import type { Random } from "./random.js";

/** What came of one group at one k with one site. */
export interface ExtinctionSample {
  readonly problems: readonly string[];
  readonly satellites: number;
  /** Pairs of a satellite and an irrep that vanish. */
  readonly extinct: number;
  /** Of these, those that no rule says: at special values of free coordinates alone. */
  readonly unruled: number;
}

/**
 * All satellites of one single-k structure up to Q: for each irrep a random arrangement, whose |F⊥|² must be zero to
 * rounding exactly where the exact test says so; and every satellite of a rule must vanish.
 *
 * @param generic whether the site's free coordinates have no special values, so that every extinction must be in a rule
 */
export function extinctionSample(
  group: SpaceGroup,
  cell: Cell,
  k: WaveVector,
  site: Site,
  random: Random,
  options: { readonly qMax: number; readonly generic: boolean },
): ExtinctionSample {
  const name = `${group.name.hermannMauguin} ${group.name.choice} k ${formatWaveVector(k)} site ${site.position.map((x) => x.join("/")).join(" ")}`;
  const problems: string[] = [];
  const modes = siteModes(group, smallIrreps(group, k), siteOrbit(group, site, null));
  const exact = extinctionTest(group, [modes]);
  const rules = extinctionRules(group, [modes]);
  const numeric = numericWaveVector(k) as Triple;
  const formFactor = magneticFormFactor({ constant: 1 });
  const geometry = scatteringGeometry(group, cell);
  const members = lineMembers(group, k);
  const lines = satelliteLines(group, cell, k, { qMax: options.qMax });
  let extinct = 0;
  let unruled = 0;
  for (const { label, rules: own, complete } of rules) {
    const space = modeSpace(group, cell, [{ modes, formFactor }], [label]);
    const prepared = prepareSpace(geometry, space);
    const size = space.basis.length;
    const amplitudes = space.basis.map(() => random.next() + 0.3);
    for (const line of lines) {
      let largest = 0;
      for (const q of members.of(line.h, line.sign)) {
        const matrix = new Float64Array(size * size);
        addSquares(matrix, basisFactors(prepared, 0, q), size, 1);
        const square = quadraticForm(matrix, amplitudes);
        largest = Math.max(largest, square);
        const h = q.map((entry, axis) => entry - (numeric[axis] as number)) as unknown as Triple;
        const claimed = exact.vector(h).includes(label);
        // At 2k ∈ L* the real arrangement of a complex irrep also holds the conjugate.
        const vanishes = square < 1e-20;
        if (claimed !== vanishes && !(claimed && members.halfLattice))
          problems.push(
            `${name}, ${label}: (${h.join(" ")})+k is ${claimed ? "claimed" : "missed"}, |F⊥|² = ${square}`,
          );
        const ruled = own.some((rule) => ruleTakes(rule, h));
        if (ruled && !claimed) problems.push(`${name}, ${label}: a rule says too much at (${h.join(" ")})+k`);
        if (claimed) {
          extinct += 1;
          if (!ruled) unruled += 1;
          if (!ruled && options.generic && complete)
            problems.push(`${name}, ${label}: no rule says that (${h.join(" ")})+k vanishes`);
        }
      }
      const claimed = exact.line(line.h, line.sign).includes(label);
      if (claimed !== largest < 1e-20)
        problems.push(
          `${name}, ${label}: line (${line.h.join(" ")}) ${line.sign} is ${claimed ? "claimed" : "missed"}`,
        );
    }
  }
  return { problems, satellites: lines.length, extinct, unruled };
}

/** Whether H is in one of the classes of a rule: H − h is a whole combination of the steps. */
export function ruleTakes(rule: ExtinctionRule, h: readonly number[]): boolean {
  return rule.classes.some((start) =>
    isWholeCombination(
      rule.steps,
      h.map((entry, axis) => entry - (start[axis] as number)),
    ),
  );
}

function isWholeCombination(steps: readonly (readonly number[])[], vector: readonly number[]): boolean {
  if (steps.length === 0) return vector.every((entry) => Math.abs(entry) < 1e-6);
  // Normal equations of up to three steps, then a look whether the whole multiples give the vector.
  const gram = steps.map((a) => [...steps.map((b) => inner(a, b)), inner(a, vector)]);
  for (let column = 0; column < steps.length; column++) {
    const pivot = gram
      .slice(column)
      .reduce((best, row) => (Math.abs(row[column] as number) > Math.abs(best[column] as number) ? row : best));
    gram.splice(gram.indexOf(pivot), 1);
    gram.splice(column, 0, pivot);
    gram.forEach((row, index) => {
      if (index === column) return;
      const factor = (row[column] as number) / (pivot[column] as number);
      row.forEach((_, at) => {
        row[at] = (row[at] as number) - factor * (pivot[at] as number);
      });
    });
  }
  const times = gram.map((row, index) => Math.round((row.at(-1) as number) / (row[index] as number)));
  return vector.every(
    (entry, axis) =>
      Math.abs(steps.reduce((sum, step, index) => sum + (times[index] as number) * (step[axis] as number), 0) - entry) <
      1e-6,
  );
}

function inner(a: readonly number[], b: readonly number[]): number {
  return a.reduce((sum, entry, axis) => sum + entry * (b[axis] as number), 0);
}
