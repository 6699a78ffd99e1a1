import { describe, expect, test } from "vitest";
import { cross, dot, plus, size, type Vector } from "#core/reports/svg/space.js";
import { imagesInZone, lineInZone, type ZoneShape, zoneShape } from "#core/reports/svg/zone-shape.js";
import { seeded } from "../support/random.js";

type Basis = readonly [Vector, Vector, Vector];

const cubic: Basis = [
  [1, 0, 0],
  [0, 1, 0],
  [0, 0, 1],
];
const bodyCentred: Basis = [
  [-1, 1, 1],
  [1, -1, 1],
  [1, 1, -1],
];
const faceCentred: Basis = [
  [0, 1, 1],
  [1, 0, 1],
  [1, 1, 0],
];
const hexagonal: Basis = [
  [1, 0, 0],
  [-0.5, Math.sqrt(3) / 2, 0],
  [0, 0, 1.4],
];

/** Faces by their number of corners: `{4: 6}` is a box. */
function faceCounts({ faces }: ZoneShape): Record<number, number> {
  const counts: Record<number, number> = {};
  for (const { corners } of faces) counts[corners.length] = (counts[corners.length] ?? 0) + 1;
  return counts;
}

/** Sum of the pyramids from the centre over the faces. */
function volume({ faces }: ZoneShape): number {
  return faces.reduce((sum, { corners }) => {
    const [first] = corners as readonly [Vector];
    const area = corners
      .slice(1, -1)
      .reduce(
        (total, corner, index) =>
          total + Math.abs(dot(first, cross(plus(corner, first, -1), plus(corners[index + 2] as Vector, first, -1)))),
        0,
      );
    return sum + area / 6;
  }, 0);
}

describe("the first zone", () => {
  // Ashcroft & Mermin, Solid State Physics (1976), chapters 4 and 5: cube, rhombic dodecahedron, truncated octahedron.
  test.each([
    ["primitive cubic", cubic, { 4: 6 }],
    ["of a face-centred reciprocal lattice (rhombic dodecahedron)", faceCentred, { 4: 12 }],
    ["of a body-centred reciprocal lattice (truncated octahedron)", bodyCentred, { 4: 6, 6: 8 }],
    ["hexagonal prism", hexagonal, { 4: 6, 6: 2 }],
  ] as const)("%s", (_name, basis, expected) => {
    expect(faceCounts(zoneShape(basis))).toEqual(expected);
  });

  test("has the volume of a primitive cell, and no lattice point is nearer to it than 0; seed 5", () => {
    const random = seeded(5);
    for (let sample = 0; sample < 30; sample++) {
      const vector = (): Vector => [random.next() * 2 - 1, random.next() * 2 - 1, random.next() * 2 - 1];
      const basis: Basis = [vector(), vector(), vector()];
      const cell = Math.abs(dot(basis[0], cross(basis[1], basis[2])));
      if (cell < 0.05) continue;
      const shape = zoneShape(basis);
      expect(Math.abs(volume(shape) - cell) / cell).toBeLessThan(1e-6);
      let nearest = Number.POSITIVE_INFINITY;
      for (const corner of shape.faces.flatMap(({ corners }) => corners))
        for (let i = -4; i <= 4; i++)
          for (let j = -4; j <= 4; j++)
            for (let k = -4; k <= 4; k++) {
              const point = plus(plus(plus([0, 0, 0], basis[0], i), basis[1], j), basis[2], k);
              nearest = Math.min(nearest, size(plus(corner, point, -1)) / size(corner));
            }
      expect(nearest).toBeGreaterThan(1 - 1e-6);
    }
  });

  test("points on its surface have all their equivalents, points inside one", () => {
    const box = zoneShape(cubic);
    expect(imagesInZone(box, [0.1, 0.2, 0.3])).toHaveLength(1);
    expect(imagesInZone(box, [2.1, -3.8, 0.3])[0]?.map((entry) => Number(entry.toFixed(9)))).toEqual([0.1, 0.2, 0.3]);
    expect(imagesInZone(box, [0.5, 0, 0])).toHaveLength(2);
    expect(imagesInZone(box, [0.5, 0.5, 0])).toHaveLength(4);
    expect(imagesInZone(box, [0.5, 0.5, 0.5])).toHaveLength(8);
    // W, the corner of the truncated octahedron, belongs to four zones.
    expect(imagesInZone(zoneShape(bodyCentred), [1, 0.5, 0])).toHaveLength(4);
  });

  test("lines end on its surface", () => {
    const box = zoneShape(cubic);
    const ends = lineInZone(box, [0, 0.25, 0], [1, 0, 0]) as readonly [Vector, Vector];
    expect(ends.map(([x]) => Number(x.toFixed(4)))).toEqual([-0.5, 0.5]);
    expect(lineInZone(box, [0, 0.75, 0], [1, 0, 0])).toBeNull();
  });
});
