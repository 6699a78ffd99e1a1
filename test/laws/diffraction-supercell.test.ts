import {
  addSquares,
  arrangementWith,
  basisFactors,
  lineForm,
  lineMembers,
  magneticFormFactor,
  magneticLengthPerMagneton,
  modeSpace,
  prepareSpace,
  quadraticForm,
  scatteringGeometry,
  type Triple,
} from "@kvane/core/diffraction";
import { smallIrreps } from "@kvane/core/irreps";
import { isHalfLattice, numericWaveVector } from "@kvane/core/kvectors";
import { siteModes } from "@kvane/core/modes";
import { satelliteLines } from "@kvane/core/reflections";
import { siteOrbit } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { floatGroup } from "../support/float-group.js";
import { groupOf } from "../support/parsed-groups.js";
import { seeded } from "../support/random.js";
import { generalSite, randomWaveVector, specialSite } from "../support/random-cases.js";
import { randomCell } from "../support/random-cells.js";
import { magnetonLength, type SupercellAtom, supercellSquare } from "../support/supercell-sum.js";

/** One or more of every crystal system, centred and not. */
const numbers = [1, 2, 5, 14, 15, 43, 62, 70, 88, 122, 136, 146, 161, 167, 176, 194, 216, 227];

/** Mn2+ <j0>, facts E: A a B b C c D. */
const manganese = (q: number): number => {
  const s = (q / (4 * Math.PI)) ** 2;
  return 0.422 * Math.exp(-17.684 * s) + 0.5948 * Math.exp(-6.005 * s) + 0.0043 * Math.exp(0.609 * s) - 0.0219;
};

describe("structure factors against a sum over an explicit supercell", () => {
  test.for(numbers)("group %i", (number) => {
    const random = seeded(700 + number);
    const group = groupOf(number);
    const cell = randomCell(group, random, 100);
    const { basis } = floatGroup(group);
    for (let round = 0; round < 2; round++) {
      const k = randomWaveVector(group, random);
      const numeric = numericWaveVector(k) as Triple;
      const halfLattice = isHalfLattice(group, k);
      const periods = basis.map((vector) =>
        vector.reduce((sum, entry, axis) => sum + entry * (numeric[axis] as number), 0),
      );
      // A general k of the cubic groups needs thousands of cells; the law is the same.
      if (periods.filter((turns) => Math.abs(turns * 12 - Math.round(turns * 12)) > 1e-9).length > 1) continue;
      const irreps = smallIrreps(group, k);
      const position = round === 0 ? generalSite(random) : specialSite(group, random);
      const modes = siteModes(group, irreps, siteOrbit(group, position, null));
      const present = modes.irreps.filter(({ multiplicity }) => multiplicity > 0);
      const chosen = random.pick(present);
      const site = { modes, formFactor: magneticFormFactor({ ion: "Mn2+" }) };
      const space = modeSpace(group, cell, [site], [chosen.irrep.label]);
      expect(space.basis.length).toBe(chosen.freeParameters);
      const amplitudes = space.basis.map(() => 2 * random.next() - 1);
      const arrangement = arrangementWith(space, amplitudes);
      const geometry = scatteringGeometry(group, cell);
      const prepared = prepareSpace(geometry, space);
      const atoms = arrangement.waves.map(({ components }) =>
        components.map(
          ({ real, imaginary }, atom): SupercellAtom => ({
            position: arrangement.atoms[atom]?.position as Triple,
            real,
            imaginary,
            factor: manganese,
          }),
        ),
      );
      const lines = satelliteLines(group, cell, k, { qMax: 3 });
      const members = lineMembers(group, k);
      const line = random.pick(lines);
      const vectors = members.of(line.h, line.sign);
      expect(vectors.length * (halfLattice ? 1 : 2)).toBe(line.multiplicity);
      let total = 0;
      for (const [index, q] of vectors.entries()) {
        const matrix = new Float64Array(space.basis.length ** 2);
        addSquares(matrix, basisFactors(prepared, 0, q), space.basis.length, 1);
        const own = quadraticForm(matrix, amplitudes);
        total += (halfLattice ? 1 : 2) * own;
        if (index > 2) continue;
        const scale = (magneticLengthPerMagneton / magnetonLength) ** 2;
        const expected = scale * supercellSquare(geometry.cell, basis, [{ k: numeric, halfLattice }], atoms, q);
        expect(Math.abs(own - expected)).toBeLessThan(1e-9 * Math.max(1, expected));
      }
      expect(quadraticForm(lineForm(prepared, members, line), amplitudes)).toBeCloseTo(total, 10);
    }
  });

  test("the length per magneton is that of the conventions page", () => {
    expect(magneticLengthPerMagneton).toBeCloseTo(0.2695, 4);
  });
});
