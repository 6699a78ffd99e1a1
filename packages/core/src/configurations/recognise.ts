import { composeMagnetic, invertMagnetic, type MagneticGroup, type MagneticOperator } from "../magneticgroups/index.js";
import { addVectors, formatRational, vectorFrom } from "../numbers/index.js";
import {
  fromPrimitiveColumn,
  operatorFrom,
  reduceByLattice,
  rotationOf,
  type SpaceGroup,
  translationOf,
} from "../spacegroups/index.js";
import type { Configuration } from "./types.js";

/** A configuration of a list that a field belongs to, and the parent operator that brings the listed one to the field. */
export interface Recognised {
  readonly configuration: Configuration;
  readonly operator: MagneticOperator;
}

/**
 * The configuration whose magnetic group is conjugate to that of a field under the parent group: the same arrangement in
 * another domain, arm or origin. Its irreps must be those of the field.
 *
 * @param cells translations of the parent modulo those of the field, primitive basis
 */
export function recognise(
  group: SpaceGroup,
  own: MagneticGroup,
  cells: readonly (readonly number[])[],
  labels: readonly string[],
  configurations: readonly Configuration[],
): Recognised | null {
  const wanted = new Set(own.operators.map((operator) => keyOf(own, operator)));
  const likely = configurations.filter(
    ({ magneticGroup: other, irreps }) =>
      other.type === own.type &&
      other.operators.length === own.operators.length &&
      other.pointGroup === own.pointGroup &&
      irreps.length === labels.length &&
      irreps.every((label) => labels.includes(label)),
  );
  for (const configuration of likely)
    for (const carrier of carriers(group, cells)) {
      const back = invertMagnetic(carrier);
      const listed = configuration.magneticGroup;
      const moved = (operator: MagneticOperator) => composeMagnetic(composeMagnetic(carrier, operator), back);
      if (!sameLattice(listed, own, carrier)) continue;
      if (listed.operators.every((operator) => wanted.has(keyOf(own, moved(operator)))))
        return { configuration, operator: carrier };
    }
  return null;
}

/** Every operator of the parent with every translation modulo the magnetic lattice. */
function* carriers(group: SpaceGroup, cells: readonly (readonly number[])[]): Generator<MagneticOperator> {
  for (const operator of group.operators)
    for (const cell of cells) {
      const column = addVectors(translationOf(operator), fromPrimitiveColumn(group.lattice, vectorFrom(cell)));
      yield { operator: operatorFrom(rotationOf(operator), column), timeReversal: 1 };
    }
}

function keyOf({ lattice }: MagneticGroup, { operator, timeReversal }: MagneticOperator): string {
  const translation = reduceByLattice(lattice, translationOf(operator)).map(formatRational).join();
  return `${operator.rotation.join()}/${operator.rotationDenominator};${translation};${timeReversal}`;
}

/** Whether the carrier takes the lattice of one group to that of the other. */
function sameLattice(listed: MagneticGroup, own: MagneticGroup, { operator }: MagneticOperator): boolean {
  const rotation = operator.rotation.map((entry) => entry / operator.rotationDenominator);
  const turned = listed.lattice.vectors.map((vector) =>
    [0, 1, 2].map(
      (row) =>
        vector.reduce((sum, entry, column) => sum + (rotation[3 * row + column] as number) * entry, 0) /
        listed.lattice.denominator,
    ),
  );
  const inside = turned.every((vector) => isIn(own, vector));
  return inside && Math.abs(volumeOf(listed) - volumeOf(own)) < 1e-9;
}

/** Triangular rows: solved from the first component down. */
function isIn({ lattice }: MagneticGroup, vector: readonly number[]): boolean {
  const rest = vector.map((entry) => entry * lattice.denominator);
  for (let axis = 0; axis < 3; axis++) {
    const row = lattice.vectors[axis] as readonly number[];
    const times = Math.round((rest[axis] as number) / (row[axis] as number));
    for (let column = 0; column < 3; column++)
      rest[column] = (rest[column] as number) - times * (row[column] as number);
  }
  return rest.every((entry) => Math.abs(entry) < 1e-6);
}

function volumeOf({ lattice }: MagneticGroup): number {
  return lattice.vectors.reduce((product, row, axis) => product * (row[axis] as number), 1) / lattice.denominator ** 3;
}
