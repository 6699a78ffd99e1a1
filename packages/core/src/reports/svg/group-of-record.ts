import { parseWaveVector, usedParameters, type WaveVector } from "../../kvectors/index.js";
import { parameterNames } from "../../numbers/index.js";
import { parseGroup, type SpaceGroup } from "../../spacegroups/index.js";
import type { GroupRecord, KRecord } from "../records/common.js";

/** Whether `groupOf` can give the group of a record: a group of operators that no table row was matched to has no name. */
export function isNamed(record: GroupRecord): boolean {
  return record.hall !== null;
}

/** The space group that a record names: drawings are made from the records alone. Null where it has no name. */
export function groupOf(record: GroupRecord): SpaceGroup | null {
  return record.hall === null ? null : parseGroup(`hall:${record.hall} (${record.basisChange})`);
}

/** The wave vector of a record. */
export function waveVectorOf(record: KRecord): WaveVector {
  const { components } = parseWaveVector(record.components.join(","));
  const letters = usedParameters({ components, values: null, uncertainties: null }).map(
    (index) => parameterNames[index as 0 | 1 | 2] as string,
  );
  if (record.numeric === null) return { components, values: null, uncertainties: null };
  return {
    components,
    values: letters.map((letter) => record.values[letter] ?? Number.NaN),
    uncertainties: letters.map((letter) => record.su[letter] ?? null),
  };
}
