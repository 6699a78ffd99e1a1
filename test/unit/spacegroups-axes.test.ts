import { KvaneError } from "@kvane/core/errors";
import {
  assembleGroup,
  type Cell,
  cellVolume,
  changeCell,
  checkCellAgainstGroup,
  directMetric,
  formatTriplet,
  groupFromOperators,
  invertBasisChange,
  latticeVectorsOfCell,
  lengthInMetric,
  parseBasisChange,
  parseCell,
  parseGroup,
  parseGroupWithNotes,
  parseTriplet,
  type SpaceGroup,
} from "@kvane/core/spacegroups";
import { describe, expect, it } from "vitest";
import { determinant, multiplyIntegerMatrices, toNumber } from "#core/numbers/index.js";
import { axisDirection, type HallAxis, hallRotation } from "#core/spacegroups/hall-rotations.js";
import { seeded } from "../support/random.js";
import { randomBasis } from "../support/random-bases.js";

const oblique = parseCell("5.1 6.2 7.3 81 95 112");

describe("cells in other axes", () => {
  it("have the volume times the determinant, the same lengths of vectors, and come back", () => {
    const random = seeded(21);
    for (let count = 0; count < 30; count++) {
      const change = randomBasis(random);
      const changed = changeCell(oblique, change);
      expect(cellVolume(changed) / cellVolume(oblique)).toBeCloseTo(Math.abs(toNumber(determinant(change.matrix))), 9);
      // x = P x'.
      const inner = [0, 1, 2].map(() => random.below(9) - 4);
      const outer = change.matrix.map((row) =>
        row.reduce((sum, entry, at) => sum + toNumber(entry) * (inner[at] ?? 0), 0),
      );
      expect(lengthInMetric(directMetric(changed), inner)).toBeCloseTo(lengthInMetric(directMetric(oblique), outer), 9);
      const back = changeCell(changed, invertBasisChange(change));
      for (const name of ["a", "b", "c", "alpha", "beta", "gamma"] as const)
        expect(back[name]).toBeCloseTo(oblique[name], 9);
    }
  });

  it("have angles of whole multiples of 30 degrees exactly", () => {
    const changed = (cell: string, axes: string): Cell => changeCell(parseCell(cell), parseBasisChange(axes));
    expect(changed("5 5 7 90 90 90", "a-b,a+b,c")).toMatchObject({ alpha: 90, beta: 90, gamma: 90 });
    expect(changed("5 5 7 90 90 120", "a,a+b,c").gamma).toBe(60);
    expect(changed("5 5 7 90 90 60", "a,b-a,c").gamma).toBe(120);
    expect(changed("5 5 5 90 90 90", "a/2+b/2,b/2+c/2,a/2+c/2")).toMatchObject({ alpha: 60, beta: 60, gamma: 60 });
    expect(changed("5 6 7 90 95.5 90", "c,b,-a").beta).toBeCloseTo(84.5, 9);
  });
});

const axes: readonly HallAxis[] = ["x", "y", "z", "x'", "y'", "z'", 'x"', 'y"', 'z"', "*"];

describe("rotations of Hall symbols", () => {
  it("have their order, determinant 1 and their axis", () => {
    const identity = [1, 0, 0, 0, 1, 0, 0, 0, 1];
    let count = 0;
    for (const axis of axes)
      for (const order of [2, 3, 4, 6]) {
        const rotation = hallRotation(order, axis);
        if (rotation === null) continue;
        count += 1;
        const powers = [rotation];
        while (powers.length < order)
          powers.push(multiplyIntegerMatrices(powers[powers.length - 1] as number[], rotation));
        expect(powers.map((power) => power.join() === identity.join())).toEqual(
          powers.map((_, index) => index === order - 1),
        );
        const direction = axisDirection(axis);
        const turned = [0, 3, 6].map((row) =>
          direction.reduce((sum, entry, at) => sum + (rotation[row + at] as number) * entry, 0),
        );
        expect(turned, `${order}${axis}`).toEqual(direction);
      }
    // Four orders about three axes, order 2 about six diagonals, order 3 about a + b + c.
    expect(count).toBe(19);
    expect(hallRotation(1, "z")).toEqual(identity);
  });

  it("about face diagonals refer to the axis before them, c where there is none", () => {
    const triplets = (symbol: string) => parseGroup(`hall:${symbol}`).operators.map((one) => formatTriplet(one));
    for (const axis of ["x", "y", "z"]) {
      expect(triplets(`P 4${axis} 2'`)).toEqual(triplets(`P 4${axis} 2${axis}'`));
      expect(triplets(`P 3${axis} 2"`)).toEqual(triplets(`P 3${axis} 2${axis}"`));
    }
    expect(triplets("P 2'")).toEqual(triplets("P 2z'"));
    expect(triplets("P 3* 2'")).toEqual(triplets("P 3* 2z'"));
  });
});

/** The smallest integer vector along the axis of an operator in conventional axes, first non-zero entry positive. */
function axisOf(proper: readonly number[]): readonly number[] {
  const found: number[][] = [];
  for (let x = -2; x <= 2; x++)
    for (let y = -2; y <= 2; y++)
      for (let z = -2; z <= 2; z++) {
        const v = [x, y, z];
        const fixed = [0, 1, 2].every(
          (row) => v.reduce((sum, entry, at) => sum + (proper[3 * row + at] as number) * entry, 0) === v[row],
        );
        if (fixed && (v.find((entry) => entry !== 0) ?? 0) > 0) found.push(v);
      }
  return found.sort((a, b) => Math.hypot(...a) - Math.hypot(...b))[0] ?? [0, 0, 0];
}

function determinantOf([a = 0, b = 0, c = 0, d = 0, e = 0, f = 0, g = 0, h = 0, i = 0]: readonly number[]): number {
  return a * (e * i - f * h) - b * (d * i - f * g) + c * (d * h - e * g);
}

/** What the order of operators goes by, worked out from the axes. */
function placeInOrder(rotation: readonly number[]): readonly number[] {
  const sign = determinantOf(rotation);
  const proper = rotation.map((entry) => sign * entry);
  const trace = (proper[0] as number) + (proper[4] as number) + (proper[8] as number);
  const order = new Map([
    [3, 1],
    [-1, 2],
    [0, 3],
    [1, 4],
    [2, 6],
  ]).get(trace) as number;
  if (order === 1) return [-sign, order, 0, 0, 0, 0, 0];
  const axis = axisOf(proper);
  const [u, v, w] = axis as [number, number, number];
  // The sign of det(axis, x, R x) for an x beside the axis.
  const x = [3, 5, 11];
  const turned = [0, 3, 6].map((row) => x.reduce((sum, entry, at) => sum + (proper[row + at] as number) * entry, 0));
  const sense = order === 2 ? 0 : Math.sign(determinantOf([...axis, ...x, ...turned]));
  return [-sign, order, u * u + v * v + w * w, -w, -v, -u, -sense].map((entry) => entry + 0);
}

describe("groups from elements", () => {
  it("are the same over any common denominator of the translations", () => {
    const { lattice } = parseGroup("P 1");
    const rotation = [-1, 0, 0, 0, -1, 0, 0, 0, -1];
    const identity = { rotation: [1, 0, 0, 0, 1, 0, 0, 0, 1], translation: [0, 0, 0] };
    const over = (denominator: number) =>
      assembleGroup(lattice, [{ rotation, translation: [denominator / 2, 0, 0] }, identity], denominator);
    expect(over(12)).toEqual(over(2));
    expect(over(12).primitive).toMatchObject({
      denominator: 2,
      translations: [
        [0, 0, 0],
        [1, 0, 0],
      ],
    });
    expect(over(12).operators.map((one) => formatTriplet(one))).toEqual(["x,y,z", "-x+1/2,-y,-z"]);
  });

  it("have lattice vectors in a cell of integers where these are in the lattice", () => {
    const vectors = (text: string) =>
      latticeVectorsOfCell(parseGroup(text).lattice).map((row) => row.map(([top, bottom]) => top / bottom));
    expect(vectors("F 2 2 2")).toEqual([
      [0, 0, 0],
      [0, 0.5, 0.5],
      [0.5, 0, 0.5],
      [0.5, 0.5, 0],
    ]);
    // Halves of a and 3/2 of b: the integers among them are (1,0,0) and (0,3,0).
    expect(vectors("P 1 (2a,2b/3,c)")).toEqual([
      [0, 0, 0],
      [0, 1.5, 0],
      [0.5, 0, 0],
      [0.5, 1.5, 0],
    ]);
  });
});

describe("cells that cannot be read", () => {
  it("have their problems in the order of the text", () => {
    const found = (text: string) => {
      try {
        parseCell(text);
      } catch (error) {
        if (error instanceof KvaneError) return error.problems.map(({ code, where }) => [code, where.column]);
      }
      return [];
    };
    expect(found("1 x 3")).toEqual([
      ["invalid-number", 3],
      ["invalid-cell", 6],
    ]);
    expect(found("1 2 3 90 y 90 7 z")).toEqual([
      ["invalid-number", 10],
      ["invalid-number", 17],
      ["invalid-cell", 15],
    ]);
  });
});

describe("the order of operators", () => {
  it.each(["P m m m", "P 4/m m m", "P -3 m 1", "P -3 1 m", "P 6/m m m", "P m -3 m", "P -4 2 m", "P -6 2 m"])(
    "of %s is that of the conventions",
    (name) => {
      const places = parseGroup(name).operators.map(({ rotation }) => placeInOrder(rotation));
      const sorted = [...places].sort((a, b) => {
        const at = a.findIndex((entry, index) => entry !== b[index]);
        return at < 0 ? 0 : (a[at] as number) - (b[at] as number);
      });
      expect(places).toEqual(sorted);
      expect(new Set(places.map(String)).size).toBe(places.length);
    },
  );

  it("of groups of low symmetry is that of International Tables", () => {
    const triplets = (name: string) => parseGroup(name).operators.map((operator) => formatTriplet(operator));
    expect(triplets("P 21/c")).toEqual(["x,y,z", "-x,y+1/2,-z+1/2", "-x,-y,-z", "x,-y+1/2,z+1/2"]);
    expect(triplets("P n m a")).toEqual([
      "x,y,z",
      "-x+1/2,-y,z+1/2",
      "-x,y+1/2,-z",
      "x+1/2,-y+1/2,-z+1/2",
      "-x,-y,-z",
      "x+1/2,y,-z+1/2",
      "x,-y+1/2,z",
      "-x+1/2,y+1/2,z+1/2",
    ]);
    expect(triplets("P 4")).toEqual(["x,y,z", "-x,-y,z", "-y,x,z", "y,-x,z"]);
  });
});

function expectedOf(cell: string, group: string | SpaceGroup): string {
  try {
    checkCellAgainstGroup(parseCell(cell), typeof group === "string" ? parseGroup(group) : group);
  } catch (error) {
    if (error instanceof KvaneError) return `${error.problems[0]?.message} | ${error.problems[0]?.expected}`;
    throw error;
  }
  return "fits";
}

describe("conditions on a cell in words", () => {
  it("are formulas where the axes are unusual", () => {
    // a' = a, c' = a + c of orthogonal axes: a·c' = a².
    expect(expectedOf("5 6 7 90 90 90", "P m m m (a,b,a+c)")).toMatch(
      /P m m m \(a,b,a\+c;0,0,0\) \| ac·cos\(beta\) = 1\/1·a²/,
    );
    expect(expectedOf("5 6 7 90 90 90", "P m m m (a,b,b/2+c)")).toContain("bc·cos(alpha) = 1/2·b²");
    expect(expectedOf("5 6 7 90 90 90", "P m m m (a,a+b,c)")).toContain("ab·cos(gamma) = 1/1·a²");
    expect(expectedOf("5 6 7 90 90 90", "P m m m (a,a+b,a+c)")).toContain("bc·cos(alpha) = 1/1·a²");
    // Two body diagonals of a cube: 3a² long each, a² their product.
    expect(expectedOf("5 5 5 90 90 91", "P m -3 m (a+b+c,a+b-c,a)")).toContain("ab·cos(gamma) = 1/3·a²");
    // Primitive axes of a body-centred cube: cos = −1/3.
    expect(expectedOf("5 5 5 109 109 109", "I m -3 m (-a/2+b/2+c/2,a/2-b/2+c/2,a/2+b/2-c/2)")).toContain("109.4712");
    expect(expectedOf("5 5 5 109.4712 109.4712 109.4712", "I m -3 m (-a/2+b/2+c/2,a/2-b/2+c/2,a/2+b/2-c/2)")).toBe(
      "fits",
    );
    const unnamed = groupFromOperators([parseTriplet("-x,-y,z"), parseTriplet("x,-y,-z")]);
    expect(expectedOf("5 6 7 90 91 90", unnamed)).toContain("a group of class 222 | beta = 90");
    expect(expectedOf("5 6 7 91 90 90", "P n m a")).toContain("P n m a | alpha = 90");
  });
});

describe("symbols that stand for several settings", () => {
  it("are taken for the standard one, and it is said which", () => {
    const noteOf = (text: string) =>
      parseGroupWithNotes(text).assumed.map(({ value, because }) => `${value}: ${because}`);
    expect(noteOf("F d -3 m").join()).toContain("origin choice 2, with the inversion centre at the origin");
    expect(noteOf("R -3 m").join()).toContain("hexagonal axes");
    expect(noteOf("P 2/c").join()).toContain("unique axis b");
    expect(noteOf("P n m a")).toEqual([]);
    expect(parseGroup("P n n n").name.choice).toBe("2");
  });

  it("that differ by the origin alone have it at the inversion centre, also where none is the standard", () => {
    expect(parseGroup("P n c b").name).toMatchObject({ number: 50, choice: "2cab" });
    expect(parseGroup("P m n m").name).toMatchObject({ number: 59, choice: "2bca" });
    expect(() => parseGroup("A e a a")).toThrowError(expect.objectContaining({ code: "ambiguous-group" }));
  });

  it("are Hermann–Mauguin symbols where they have no blanks, and Hall symbols are said to be such", () => {
    const readings = (text: string) =>
      parseGroupWithNotes(text).assumed.filter(({ what }) => what === "reading of the symbol");
    expect(readings("P2")).toEqual([]);
    expect(readings("P 2")).toHaveLength(1);
    expect(readings("P n m a")).toEqual([]);
    // A second order 2 behind 3 is along a − b: number 149.
    expect(readings("P 3 2").map(({ value }) => value)).toEqual(["Hall symbol P 3 2, P 3 1 2"]);
  });
});
