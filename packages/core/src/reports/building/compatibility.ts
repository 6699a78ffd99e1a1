import type { Compatibility, SmallIrreps } from "../../irreps/index.js";
import { parameterValues, usedParameters, type WaveVector, waveVectorToJson } from "../../kvectors/index.js";
import { formatPhased, formatRational, parameterNames } from "../../numbers/index.js";
import type { SpaceGroup } from "../../spacegroups/index.js";
import type { CompatibilityRecord, NamedIrrepRecord, PartRecord } from "../records/compatibility.js";
import { complexRecord } from "./complex.js";
import { groupRecord, littleGroupRecord, operatorText } from "./names.js";

/**
 * The record of compatibility relations for JSON and text.
 *
 * @param from the k as it was given; `found` starts at the arm of its star that lies on the line or plane
 */
export function compatibilityRecord(group: SpaceGroup, from: WaveVector, found: Compatibility): CompatibilityRecord {
  const { to } = found;
  const dimensionOf = (label: string) => to.irreps.find((irrep) => irrep.label === label)?.dimension ?? 0;
  const splitting = found.rows.map(({ label, multiplicities }, index) => {
    const parts = partRecords(
      multiplicities,
      to.irreps.map((irrep) => irrep.label),
    );
    return {
      label,
      dimension: found.from.irreps[index]?.dimension ?? 0,
      dimensionOfParts: parts.reduce((sum, part) => sum + part.multiplicity * dimensionOf(part.label), 0),
      parts,
    };
  });
  const letters = usedParameters(to.k).map((letter) => parameterNames[letter as 0 | 1 | 2]);
  return {
    group: groupRecord(group),
    from: {
      k: waveVectorToJson(from),
      arm: waveVectorToJson(found.arm),
      operator: operatorText(group, found.operator),
      littleGroup: littleGroupRecord(group, found.from.littleGroup),
      irreps: namedIrreps(found.from),
    },
    to: {
      k: waveVectorToJson(to.k),
      dimension: letters.length,
      values: Object.fromEntries(
        letters.map((letter, index) => [letter, formatRational(found.parameters[index] ?? [0, 1])]),
      ),
      littleGroup: littleGroupRecord(group, to.littleGroup),
      irreps: namedIrreps(to),
    },
    splitting,
    joining: to.irreps.map(({ label }, column) => ({
      label,
      ends: partRecords(
        found.rows.map(({ multiplicities }) => multiplicities[column] ?? 0),
        found.rows.map((row) => row.label),
      ),
    })),
  };
}

function partRecords(multiplicities: readonly number[], labels: readonly string[]): PartRecord[] {
  return multiplicities.flatMap((multiplicity, index) =>
    multiplicity === 0 ? [] : [{ label: labels[index] ?? "", multiplicity }],
  );
}

function namedIrreps(found: SmallIrreps): NamedIrrepRecord[] {
  const values = parameterValues(found.k);
  return found.irreps.map(({ label, dimension, characters }) => ({
    label,
    dimension,
    characters: values && characters.map((character) => complexRecord(character, values, dimension)),
    exact: { characters: characters.map(formatPhased) },
  }));
}
