import {
  coordinateNames,
  fractionalPart,
  integerDeterminant,
  mapVector,
  matrixFrom,
  multiplyMatrices,
  type RationalVector,
  roundNumber,
  subtractVectors,
  toNumber,
  type VariableNames,
  zeroVector,
} from "../numbers/index.js";
import { fixedForms } from "./fixed-forms.js";
import { holdsIntegers, isLatticeVector, latticePointsPerCell, reduceByLattice } from "./lattices.js";
import { applyOperator, rotationOf } from "./operators.js";
import { pointGroupSymbol } from "./point-groups.js";
import { snapPosition } from "./site-snapping.js";
import type { Cell, Site, SiteOrbit, SpaceGroup } from "./types.js";

const momentNames: VariableNames = ["mx", "my", "mz"];

/**
 * The orbit of a site modulo L, exact. A position near a special one is put onto it (see `siteSnapAngstrom`,
 * `siteSnapFraction`) and that is told in `snapped`. Position 0 is the site itself, coordinates in [0, 1); the others
 * are the lexicographically smallest non-negative representatives modulo L, in the order in which the operators reach
 * them. Where integer vectors do not all belong to L, position 0 stays as given.
 *
 * @param cell Å and degrees; without it nearness is judged in fractions of the axes
 */
export function siteOrbit(group: SpaceGroup, site: Site, cell: Cell | null): SiteOrbit {
  const conventional = holdsIntegers(group.lattice);
  const start = conventional ? mapVector(site.position, fractionalPart) : site.position;
  const snap = snapPosition(group, start, cell);
  const position = conventional ? mapVector(snap.position, fractionalPart) : snap.position;
  const { positions, carriers, siteSymmetry } = orbitOf(group, position);
  const rotations = siteSymmetry.map((index) => group.primitive.rotations[index] as readonly number[]);
  const matrices = siteSymmetry.map((index) => rotationOf(group.operators[index] as SpaceGroup["operators"][number]));
  const axial = matrices.map((matrix, index) => {
    const sign = integerDeterminant(rotations[index] as readonly number[]);
    return multiplyMatrices(matrixFrom([sign, 0, 0, 0, sign, 0, 0, 0, sign]), matrix);
  });
  return {
    label: site.label,
    position,
    multiplicity: positions.length * toNumber(latticePointsPerCell(group.lattice)),
    positions,
    carriers,
    siteSymmetry,
    siteSymmetryClass: pointGroupSymbol(rotations),
    freeCoordinates: fixedForms(matrices, position, coordinateNames, conventional),
    snapped: snap.moved
      ? {
          from: site.position,
          distanceAngstrom: snap.distanceAngstrom === null ? null : roundNumber(snap.distanceAngstrom),
        }
      : null,
    allowedMoment: fixedForms(axial, zeroVector, momentNames, false),
  };
}

interface Orbit {
  readonly positions: readonly RationalVector[];
  readonly carriers: SiteOrbit["carriers"];
  readonly siteSymmetry: readonly number[];
}

function orbitOf(group: SpaceGroup, position: RationalVector): Orbit {
  const positions: RationalVector[] = [];
  const carriers: { operator: number; shift: RationalVector }[] = [];
  const siteSymmetry: number[] = [];
  const seen = new Set<string>();
  group.operators.forEach((operator, index) => {
    const image = applyOperator(operator, position);
    if (isLatticeVector(group.lattice, subtractVectors(image, position))) siteSymmetry.push(index);
    const reduced = reduceByLattice(group.lattice, image);
    const key = reduced.join(";");
    if (seen.has(key)) return;
    seen.add(key);
    const representative = positions.length === 0 ? position : reduced;
    positions.push(representative);
    carriers.push({ operator: index, shift: subtractVectors(image, representative) });
  });
  return { positions, carriers, siteSymmetry };
}
