import { type SmallIrreps, smallIrreps } from "@kvane/core/irreps";
import type { WaveVector } from "@kvane/core/kvectors";
import { type SiteModes, siteModes } from "@kvane/core/modes";
import { type Site, type SpaceGroup, siteOrbit } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { groupOf } from "../support/parsed-groups.js";
import { constraintProblems } from "../support/validate-constraints.js";
import { fieldProblems } from "../support/validate-field.js";
import { irrepProblems } from "../support/validate-irreps.js";
import { relationProblems, reversalProblems } from "../support/validate-minus-k.js";
import { modeProblems } from "../support/validate-modes.js";
import { site, wave } from "../support/written.js";

/**
 * The validators must be able to fail: each test takes a sound result, spoils one thing, above all the sign of a phase,
 * and demands that it is noticed. `groupTurns`: the operators of the little group turn through lattice translations, so
 * that D and D* obey different products (where they do not, D* is another irrep of the same k and only the modes tell).
 */
const cases: readonly { group: string; k: string; at: string; groupTurns: boolean }[] = [
  { group: "P 63", k: "1/3 1/3 1/4", at: "0.12 0.31 0.4", groupTurns: false },
  { group: "P 21 3", k: "1/4 1/4 1/4", at: "0.13 -0.21 1.37", groupTurns: false },
  { group: "I 41", k: "0 0 1/5", at: "0.12 0.31 0.4", groupTurns: true },
  { group: "I 41", k: "0 0 2/3", at: "0 0 0.1", groupTurns: true },
  { group: "R 3 c:H", k: "0 0 3/5", at: "0.12 0.31 0.07", groupTurns: true },
  { group: "R 3 c:H", k: "0 0 3/4", at: "0 0 0.21", groupTurns: true },
];

interface Sound {
  readonly group: SpaceGroup;
  readonly irreps: SmallIrreps;
  readonly modes: SiteModes;
}

function soundOf(groupText: string, k: WaveVector, position: Site): Sound {
  const group = groupOf(groupText);
  const irreps = smallIrreps(group, k);
  return { group, irreps, modes: siteModes(group, irreps, siteOrbit(group, position, null)) };
}

/** D* for D: phases negated and matrices conjugated, characters with them. */
function conjugatedIrreps(irreps: SmallIrreps): SmallIrreps {
  return {
    ...irreps,
    phases: irreps.phases.map(negated),
    irreps: irreps.irreps.map((irrep) => ({
      ...irrep,
      matrices: irrep.matrices.map((rows) => rows.map((row) => row.map(mirrored))),
      characters: irrep.characters.map(({ phase, factor }) => ({ phase: negated(phase), factor: mirrored(factor) })),
    })),
  };
}

type Form = SmallIrreps["phases"][number];
type Exact = SmallIrreps["irreps"][number]["matrices"][number][number][number];

function negated(form: Form): Form {
  const minus = ([top, bottom]: readonly [number, number]): [number, number] => [0 - top, bottom];
  const [u, v, w] = form.coefficients;
  return { constant: minus(form.constant), coefficients: [minus(u), minus(v), minus(w)] };
}

/** The complex conjugate: ζ^e → ζ^{−e}, left unreduced (the validators sum powers and do not care). */
function mirrored(value: Exact): Exact {
  const coefficients = new Array<number>(value.order).fill(0);
  value.coefficients.forEach((coefficient, exponent) => {
    coefficients[(value.order - exponent) % value.order] = coefficient;
  });
  return { ...value, coefficients };
}

type Coupling = NonNullable<SiteModes["irreps"][number]["minusK"]>["matrix"][number][number];

type Moment = SiteModes["irreps"][number]["modes"][number]["moments"][number];

function conjugatedMoment({ phase, vector: [x, y, z] }: Moment): Moment {
  return { phase: negated(phase), vector: [mirrored(x), mirrored(y), mirrored(z)] };
}

/** Changes the moments of every mode. */
function withMoments(modes: SiteModes, change: (moment: Moment) => Moment): SiteModes {
  return {
    ...modes,
    irreps: modes.irreps.map((entry) => ({
      ...entry,
      modes: entry.modes.map((mode) => ({ ...mode, moments: mode.moments.map((moment) => change(moment)) })),
    })),
  };
}

describe("a conjugated phase is noticed", () => {
  for (const { group: name, k, at, groupTurns } of cases) {
    const title = `${name} at (${k}), site ${at}`;

    test(`${title}: sound as it is`, () => {
      const { group, irreps, modes } = soundOf(name, wave(k), site("M", at));
      expect(irrepProblems(group, irreps)).toEqual([]);
      expect(modeProblems(group, modes)).toEqual([]);
      expect(fieldProblems(group, modes)).toEqual([]);
    });

    test(`${title}: a field with e^{+2πi k·T} is refused`, () => {
      const { group, modes } = soundOf(name, wave(k), site("M", at));
      expect(fieldProblems(group, modes, { phaseSign: 1 }).join()).toContain("translation");
    });

    test(`${title}: D* for D is refused`, () => {
      const { group, irreps, modes } = soundOf(name, wave(k), site("M", at));
      const conjugated = conjugatedIrreps(irreps);
      if (groupTurns) expect(irrepProblems(group, conjugated).join()).toContain("D(g)D(h) ≠ D(gh)");
      expect(modeProblems(group, { ...modes, representations: conjugated }).join()).toContain("Γ(g) e ≠ Σ D e");
      expect(fieldProblems(group, modes, { conjugateMatrices: true }).join()).toContain("does not act as D says");
    });

    test(`${title}: S* for S is refused`, () => {
      const { group, modes } = soundOf(name, wave(k), site("M", at));
      const conjugated = withMoments(modes, conjugatedMoment);
      expect(modeProblems(group, conjugated).join()).toContain("Γ(g) e ≠ Σ D e");
      expect(fieldProblems(group, modes, { conjugateModes: true }).join()).toContain("does not act as D says");
    });

    // Where no operator carries an atom into another cell, D* with S* is again a pair of that k: P 21 3 here.
    if (name !== "P 21 3")
      test(`${title}: D* with S* is refused`, () => {
        const { group, irreps, modes } = soundOf(name, wave(k), site("M", at));
        const conjugated = withMoments(modes, conjugatedMoment);
        const both = { ...conjugated, representations: conjugatedIrreps(irreps) };
        expect(modeProblems(group, both).join()).toContain("Γ(g) e ≠ Σ D e");
        expect(fieldProblems(group, both).join()).toContain("does not act as D says");
      });
  }
});

describe("other faults are noticed", () => {
  const sound = soundOf("P 63 c m", wave("0 0 0"), site("M", "0.333 0 0"));
  const twoDimensional = sound.modes.irreps.findIndex(
    ({ irrep, multiplicity }) => irrep.dimension === 2 && multiplicity > 0,
  );
  const spoiled = (change: (entry: SiteModes["irreps"][number]) => SiteModes["irreps"][number]): SiteModes => ({
    ...sound.modes,
    irreps: sound.modes.irreps.map((entry, index) => (index === twoDimensional ? change(entry) : entry)),
  });

  test("a reality, a partner, an order of the irreps, an arm too many", () => {
    const [first, ...rest] = sound.irreps.irreps;
    const changed = { ...(first as SmallIrreps["irreps"][number]), reality: "pseudoreal" as const };
    const problems = irrepProblems(sound.group, { ...sound.irreps, arms: 2, irreps: [changed, ...rest] }).join();
    expect(problems).toContain("2 arms instead of 1");
    expect(problems).toContain("is said to be pseudoreal");
    expect(irrepProblems(sound.group, { ...sound.irreps, irreps: rest }).join()).toContain("Σ d² is");
  });

  test("a character that is not the trace", () => {
    const [first, second, ...rest] = sound.irreps.irreps as [
      SmallIrreps["irreps"][number],
      SmallIrreps["irreps"][number],
    ];
    const swapped = [{ ...first, characters: second.characters }, { ...second, characters: first.characters }, ...rest];
    expect(irrepProblems(sound.group, { ...sound.irreps, irreps: swapped }).join()).toContain("is not the trace");
  });

  test("partners exchanged", () => {
    const exchanged = spoiled((entry) => {
      const modes = [...entry.modes];
      const [a, b] = [modes[0] as (typeof modes)[number], modes[1] as (typeof modes)[number]];
      modes.splice(0, 2, { ...b, partner: 1 }, { ...a, partner: 2 });
      return { ...entry, modes };
    });
    expect(modeProblems(sound.group, exchanged).join()).toContain("Γ(g) e ≠ Σ D e");
    expect(fieldProblems(sound.group, exchanged).join()).toContain("does not act as D says");
  });

  test("a copy repeated, a copy left out", () => {
    const repeated = spoiled((entry) => {
      const half = entry.modes.slice(0, 2);
      return {
        ...entry,
        modes: entry.modes.map((mode, index) => ({ ...(half[index % 2] as typeof mode), copy: mode.copy })),
      };
    });
    expect(modeProblems(sound.group, repeated)).toContain("the mode vectors are linearly dependent");
    const short = spoiled((entry) => ({ ...entry, multiplicity: entry.multiplicity - 1, modes: entry.modes.slice(2) }));
    expect(modeProblems(sound.group, short).join()).toContain("multiplicity");
  });

  test("a sign, a letter and a phase of the constraint table", () => {
    expect(constraintProblems(sound.group, sound.modes)).toEqual([]);
    const withText = (change: (texts: readonly string[]) => readonly string[]): string =>
      constraintProblems(
        sound.group,
        spoiled((entry) => ({ ...entry, constraint: change(entry.constraint) })),
      ).join();
    const [first = "", second = "", ...rest] = sound.modes.irreps[twoDimensional]?.constraint ?? [];
    expect(first).toBe("(u, v, w)");
    expect(withText(() => ["(u, v, -w)", second, ...rest])).toContain("out of the span");
    expect(withText(() => ["(u, v, x)", second, ...rest])).toContain("letters for");
    expect(withText(() => [first, `${second}·e^{iπ/3}`, ...rest])).toContain("out of the span");
  });

  test("polar vectors taken for moments, and two atoms exchanged", () => {
    expect(modeProblems(sound.group, { ...sound.modes, axial: false }).join()).toContain("Γ(g) e ≠ Σ D e");
    expect(fieldProblems(sound.group, { ...sound.modes, axial: false }).join()).toContain("does not act as D says");
    const [first, second, ...rest] = sound.modes.orbit.positions;
    const orbit = { ...sound.modes.orbit, positions: [second, first, ...rest] as typeof sound.modes.orbit.positions };
    expect(modeProblems(sound.group, { ...sound.modes, orbit }).join()).toContain("Γ(g) e ≠ Σ D e");
  });

  test("the relation between k and −k with a conjugated or a missing entry", () => {
    const { group, irreps, modes } = soundOf("P 63 c m", wave("1/3 1/3 0"), site("M", "0 0 1/3"));
    expect(relationProblems(group, irreps)).toEqual([]);
    expect(reversalProblems(group, modes)).toEqual([]);
    const changed = (change: (number: Coupling) => Coupling): SiteModes => ({
      ...modes,
      irreps: modes.irreps.map((entry) => ({
        ...entry,
        minusK: entry.minusK && { ...entry.minusK, matrix: entry.minusK.matrix.map((row) => row.map(change)) },
      })),
    });
    const conjugated = changed(({ phase, factor }) => ({ phase: negated(phase), factor: mirrored(factor) }));
    const turned = changed(({ phase, factor }) => ({ phase: { ...phase, constant: [1, 3] }, factor }));
    for (const wrong of [conjugated, turned]) {
      expect(reversalProblems(group, wrong).join()).toContain("ΘE ≠ Σ E' N B");
      expect(fieldProblems(group, wrong).join()).toContain("takes k to −k");
    }
    const missing = { ...modes, irreps: modes.irreps.map((entry) => ({ ...entry, minusK: null })) };
    expect(reversalProblems(group, missing).join()).toContain("or missing");
  });
});
