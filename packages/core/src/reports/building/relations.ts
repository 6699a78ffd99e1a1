import type { FullIrrep, MinusKRelation } from "../../irreps/index.js";
import { parameterValues, type WaveVector, waveVectorToJson } from "../../kvectors/index.js";
import { type PhasedNumber, zeroForm } from "../../numbers/index.js";
import type { SpaceGroup } from "../../spacegroups/index.js";
import type { FullIrrepsRecord, MinusKRelationRecord } from "../records/irreps.js";
import { matrixRecords } from "./complex.js";
import { operatorText } from "./names.js";

export function minusKRelationRecord(group: SpaceGroup, relation: MinusKRelation): MinusKRelationRecord {
  return {
    operator: operatorText(group, relation.operator),
    links: relation.links.map(({ label, partner, matrix }) => {
      // N holds no letter of k, so it has numbers always.
      const phased = matrix.map((row) => row.map((factor): PhasedNumber => ({ phase: zeroForm, factor })));
      const { numbers, exact } = matrixRecords(phased, []);
      return { label, partner, matrix: numbers ?? [], exact };
    }),
  };
}

export function fullIrrepsRecord(group: SpaceGroup, k: WaveVector, full: readonly FullIrrep[]): FullIrrepsRecord {
  const values = parameterValues(k);
  return {
    arms: full[0]?.arms.map(waveVectorToJson) ?? [],
    representatives: full[0]?.representatives.map((index) => operatorText(group, index)) ?? [],
    operators: group.operators.map((_, index) => operatorText(group, index)),
    irreps: full.map(({ label, dimension, matrices }) => {
      const records = matrices.map((matrix) => matrixRecords(matrix, values));
      return {
        label,
        dimension,
        matrices: values && records.map(({ numbers }) => numbers ?? []),
        exact: { matrices: records.map(({ exact }) => exact) },
      };
    }),
  };
}
