import type { FullIrrep, MinusKRelation, SmallIrrep, SmallIrreps } from "../../irreps/index.js";
import {
  type LittleGroup,
  type Manifold,
  parameterValues,
  reducedRepresentative,
  type Star,
  type WaveVector,
  waveVectorToJson,
} from "../../kvectors/index.js";
import { formatPhased, type PhasedNumber } from "../../numbers/index.js";
import { formatTriplet, operatorsModuloIntegers, type SpaceGroup } from "../../spacegroups/index.js";
import type { IrrepRecord, IrrepsRecord } from "../records/irreps.js";
import type { OpsRecord } from "../records/ops.js";
import type { StarRecord } from "../records/star.js";
import { complexRecord } from "./complex.js";
import { groupRecord, littleGroupRecord } from "./names.js";
import { fullIrrepsRecord, minusKRelationRecord } from "./relations.js";

/** The record of the operators of a group for JSON and text. */
export function opsRecord(group: SpaceGroup): OpsRecord {
  const operators = operatorsModuloIntegers(group);
  return {
    group: groupRecord(group),
    order: operators.length,
    pointGroupOrder: group.operators.length,
    pointGroup: group.pointGroup,
    operators: operators.map(formatTriplet),
  };
}

/** All that was found out about a k, put into one record. */
export function starRecord(
  group: SpaceGroup,
  k: WaveVector,
  found: {
    readonly star: Star;
    readonly littleGroup: LittleGroup;
    readonly manifold: Manifold;
    readonly manifoldPM: Manifold;
  },
): StarRecord {
  return {
    group: groupRecord(group),
    k: waveVectorToJson(k),
    reduced: waveVectorToJson(reducedRepresentative(group, k)),
    manifold: waveVectorToJson(found.manifold.form),
    dimension: found.manifold.dimension,
    manifoldPM: waveVectorToJson(found.manifoldPM.form),
    dimensionPM: found.manifoldPM.dimension,
    minusK: found.star.minusK,
    arms: found.star.arms.map(waveVectorToJson),
    littleGroup: littleGroupRecord(group, found.littleGroup),
  };
}

/**
 * The record of the small irreps of a k for JSON and text.
 *
 * @param full the irreps of the whole space group, where they were asked for
 */
export function irrepsRecord(
  group: SpaceGroup,
  found: SmallIrreps,
  relation: MinusKRelation | null,
  full: readonly FullIrrep[] | null = null,
): IrrepsRecord {
  return {
    group: groupRecord(group),
    k: waveVectorToJson(found.k),
    reduced: waveVectorToJson(reducedRepresentative(group, found.k)),
    minusK: found.minusK,
    arms: found.arms,
    littleGroup: littleGroupRecord(group, found.littleGroup),
    irreps: found.irreps.map((irrep) => ({
      label: irrep.label,
      dimension: irrep.dimension,
      reality: irrep.reality,
      conjugateOf: irrep.conjugateOf,
      physicalDimension: irrep.physicalDimension,
      ...irrepNumbers(found, irrep),
    })),
    minusKRelation: relation && minusKRelationRecord(group, relation),
    full: full && fullIrrepsRecord(group, found.k, full),
  };
}

/** D at the printed operators, `e^{2πi·phase}·Δ`, in numbers (null while a letter of k is open) and exactly. */
export function irrepNumbers(
  found: SmallIrreps,
  irrep: SmallIrrep,
): Pick<IrrepRecord, "characters" | "matrices" | "exact"> {
  const matrices = irrep.matrices.map((matrix, index) => {
    const phase = found.phases[index];
    if (phase === undefined) throw new RangeError(`operator ${index} has no phase`);
    return matrix.map((row) => row.map((factor): PhasedNumber => ({ phase, factor })));
  });
  const values = parameterValues(found.k);
  return {
    characters: values && irrep.characters.map((character) => complexRecord(character, values, irrep.dimension)),
    matrices: values && matrices.map((matrix) => matrix.map((row) => row.map((entry) => complexRecord(entry, values)))),
    exact: {
      characters: irrep.characters.map(formatPhased),
      matrices: matrices.map((matrix) => matrix.map((row) => row.map(formatPhased))),
    },
  };
}
