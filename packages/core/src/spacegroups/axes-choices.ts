import { type IntegerMatrix, integerDeterminant, multiplyIntegerMatrices } from "../numbers/index.js";
import type { CrystalSystem } from "./conventional-axes.js";

const known = new Map<CrystalSystem, readonly IntegerMatrix[]>();

/**
 * In which ways fitting axes may be exchanged for others of the same kind: matrices W of determinant 1, columns in the
 * fitting axes. They hold representatives of all linear parts of the affine normalizers (International Tables A,
 * chapter 3.5) of the groups of the system, modulo those that act on the group as some other one does: for monoclinic
 * axes, and triclinic ones with an anti-translation, W matters modulo 2 only.
 */
export function axesChoices(system: CrystalSystem): readonly IntegerMatrix[] {
  const found = known.get(system) ?? listChoices(system);
  known.set(system, found);
  return found;
}

function listChoices(system: CrystalSystem): readonly IntegerMatrix[] {
  switch (system) {
    case "triclinic":
      return triclinicChoices();
    case "monoclinic":
      return monoclinicChoices();
    case "tetragonal":
      return generated([
        [0, -1, 0, 1, 0, 0, 0, 0, 1],
        [1, 0, 0, 0, -1, 0, 0, 0, -1],
      ]);
    case "hexagonal":
      return generated([
        [1, -1, 0, 1, 0, 0, 0, 0, 1],
        [1, -1, 0, 0, -1, 0, 0, 0, -1],
      ]);
    default:
      return generated([
        [0, -1, 0, 1, 0, 0, 0, 0, 1],
        [0, 0, 1, 1, 0, 0, 0, 1, 0],
      ]);
  }
}

function generated(generators: readonly IntegerMatrix[]): readonly IntegerMatrix[] {
  const identity: IntegerMatrix = [1, 0, 0, 0, 1, 0, 0, 0, 1];
  const reached = new Map([[identity.join(), identity]]);
  for (const element of reached.values())
    for (const generator of generators) {
      const next = multiplyIntegerMatrices(element, generator);
      if (!reached.has(next.join())) reached.set(next.join(), next);
    }
  return [...reached.values()];
}

const small = [0, 1, -1] as const;

/** b in both senses; a and c all pairs with entries of 0, 1, −1. */
function monoclinicChoices(): readonly IntegerMatrix[] {
  return small.flatMap((aa) =>
    small.flatMap((ac) =>
      small.flatMap((ca) =>
        small.flatMap((cc) =>
          [1, -1].map((b): IntegerMatrix => [aa, 0, ca, 0, b, 0, ac, 0, cc]).filter((m) => integerDeterminant(m) === 1),
        ),
      ),
    ),
  );
}

/** Any of the seven classes of half vectors along c, a and b two of the axes that there are. */
function triclinicChoices(): readonly IntegerMatrix[] {
  const units = [0, 1, 2].flatMap((axis) =>
    [1, -1].map((sign) => [0, 1, 2].map((index) => (index === axis ? sign : 0))),
  );
  const thirds = small.flatMap((x) => small.flatMap((y) => small.map((z) => [x, y, z])));
  return units.flatMap((a) =>
    units.flatMap((b) =>
      thirds
        .map((c): IntegerMatrix => [0, 1, 2].flatMap((row) => [a[row] as number, b[row] as number, c[row] as number]))
        .filter((matrix) => integerDeterminant(matrix) === 1),
    ),
  );
}
