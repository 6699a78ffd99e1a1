import { describe, expect, test } from "vitest";
import { type MomentScene, momentScene } from "#core/reports/svg/moment-data.js";
import { momentProjections } from "#core/reports/svg/moment-drawing.js";
import { momentsOf } from "#core/reports/svg/moments.js";
import { dot, plus, size, type Vector } from "#core/reports/svg/space.js";
import { rockSalt, runAnswer, triangles } from "../support/report-answers.js";

async function sceneOf(study: string): Promise<MomentScene> {
  const record = (await runAnswer(study)).result;
  const [branch] = record?.branches ?? [];
  if (record === null || branch === undefined) throw new Error("no branch");
  const scene = momentScene(record, branch);
  if (scene === null) throw new Error("no scene");
  return scene;
}

/** The drawn moment at a position, in cells. */
function at(scene: MomentScene, vectors: readonly Vector[], position: readonly number[]): Vector {
  const index = scene.atoms.findIndex((atom) =>
    atom.at.every((entry, axis) => Math.abs(entry - (position[axis] as number)) < 1e-6),
  );
  if (index < 0) throw new Error(`no atom at ${position.join(" ")}`);
  return vectors[index] as Vector;
}

describe("moments of the drawings", () => {
  test("rock salt, k = (1/2, 1/2, 1/2): equal in (111) sheets, opposite in the next (Shull, Strauser & Wollan, Phys. Rev. 83 (1951) 333)", async () => {
    const scene = await sceneOf(rockSalt);
    expect(scene.cells).toEqual([2, 2, 2]);
    // 4 × 4 × 4 steps of half a cell, and the far sides: the points of the F lattice in the closed box.
    expect(scene.atoms).toHaveLength(63);
    scene.arrangements.forEach((_, arrangement) => {
      const { vectors } = momentsOf(scene, arrangement);
      const origin = at(scene, vectors, [0, 0, 0]);
      expect(size(origin)).toBeCloseTo(1, 9);
      scene.atoms.forEach(({ at: [x, y, z] }, index) => {
        const sheet = Math.round(x + y + z);
        expect(size(plus(vectors[index] as Vector, origin, sheet % 2 === 0 ? -1 : 1))).toBeLessThan(1e-7);
      });
    });
  });

  test("k = (1/3, 1/3, 0): the moments of a triangle add up to nothing, and repeat after three cells", async () => {
    const scene = await sceneOf(triangles);
    expect(scene.cells).toEqual([3, 3, 1]);
    scene.arrangements.forEach((_, arrangement) => {
      const { vectors } = momentsOf(scene, arrangement);
      const corner = (x: number, y: number) => at(scene, vectors, [x, y, 0]);
      for (const [x, y] of [
        [0, 0],
        [1, 0],
        [1, 1],
      ] as const) {
        const sum = plus(plus(corner(x, y), corner(x + 1, y)), corner(x + 1, y + 1));
        expect(size(sum)).toBeLessThan(1e-7);
      }
      expect(size(plus(corner(0, 0), corner(3, 0), -1))).toBeLessThan(1e-7);
      expect(size(plus(corner(0, 0), corner(3, 3), -1))).toBeLessThan(1e-7);
    });
    // In the plane, where a threefold axis allows it, such a field can turn by 120° from atom to atom.
    const turning = scene.arrangements.some((_, arrangement) => {
      const { vectors } = momentsOf(scene, arrangement);
      const [a, b] = [at(scene, vectors, [0, 0, 0]), at(scene, vectors, [1, 0, 0])];
      return Math.abs(size(a) - size(b)) < 1e-7 && Math.abs(dot(a, b) / size(a) ** 2 + 0.5) < 1e-7;
    });
    expect(turning).toBe(true);
  });

  test("every atom is in every projection, which has the scale of the others", async () => {
    const scene = await sceneOf(triangles);
    for (const { marks } of momentProjections(scene, 0))
      expect(marks.match(/class="atom"/g)).toHaveLength(scene.atoms.length);
  });
});
