import { type KindOfK, type NearbyKind, type WaveVector, waveVectorToJson } from "../../kvectors/index.js";
import type { Cell, SpaceGroup } from "../../spacegroups/index.js";
import type { AtlasRecord, KindRecord } from "../records/atlas.js";
import { cellRecord, groupRecord } from "./names.js";

/** A k that the user gave, with what was found out about it; indices into the two lists of kinds. */
export interface PlacedK {
  readonly k: WaveVector;
  readonly kind: number;
  readonly kindPM: number;
  /** Null without a cell and while a letter is open. */
  readonly nearby: { readonly within: number; readonly kinds: readonly NearbyKind[] } | null;
}

export function atlasRecord(
  group: SpaceGroup,
  cell: Cell | null,
  found: { readonly kinds: readonly KindOfK[]; readonly kindsPM: readonly KindOfK[]; readonly given: PlacedK | null },
): AtlasRecord {
  const { given } = found;
  return {
    group: groupRecord(group),
    cell: cell && cellRecord(cell),
    kinds: found.kinds.map(kindRecord),
    kindsPM: found.kindsPM.map(kindRecord),
    given: given && {
      k: waveVectorToJson(given.k),
      kind: given.kind,
      kindPM: given.kindPM,
      within: given.nearby?.within ?? null,
      nearby:
        given.nearby?.kinds.map(({ index, nearest, distance }) => ({
          kindPM: index,
          nearest: waveVectorToJson(nearest),
          distance,
        })) ?? null,
    },
  };
}

function kindRecord(kind: KindOfK): KindRecord {
  return {
    k: waveVectorToJson(kind.k),
    dimension: kind.dimension,
    dimensionPM: kind.dimensionPM,
    littleCoGroup: kind.littleCoGroup,
    arms: kind.arms,
    minusK: kind.minusK,
    halfLattice: kind.halfLattice.map(waveVectorToJson),
  };
}
